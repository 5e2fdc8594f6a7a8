import { type CropPieces, harvestedPieces, soldPercent } from "~/domain/figures/shares"
import { FigurePart } from "./figure-part"
import { FigureTable } from "./figure-table"
import { FillKey } from "./fill-key"
import { PartBars } from "./part-bars"

type Crop = CropPieces & { code: string; name: string; detail: string }

const PLACES = [
	["soldPieces", "sold"],
	["stockPieces", "in stock"],
	["wastePieces", "waste"],
	["missingPieces", "missing"],
	["cutUpPieces", "cut up"],
] as const

const FILLS = [
	["crop-sold", "sold"],
	["crop-stock", "in stock"],
	["crop-lost", "waste or missing"],
	["crop-cut", "cut up"],
] as const

/** "312 of 480 sold, 140 in stock, 28 waste". */
function cropWords(crop: Crop): string {
	const rest = PLACES.slice(1).flatMap(([key, word]) => (crop[key] > 0 ? [`${crop[key]} ${word}`] : []))
	return [`${crop.soldPieces} of ${harvestedPieces(crop)} sold`, ...rest].join(", ")
}

/** How much of the season's crop is sold, by product, and where the rest is. In pieces. */
export function CropPart({ crop, csvHref }: { crop: readonly Crop[]; csvHref: string }) {
	return (
		<FigurePart
			id="crop"
			title="The crop of these days"
			lead={
				crop.length === 0
					? "Nothing was harvested in these days."
					: "Pieces off the hives in these days, and where they are by now."
			}
			csvHref={csvHref}
			tableName="The crop as a table"
			table={crop.length === 0 ? undefined : <CropTable crop={crop} />}
		>
			{crop.length > 0 && <FillKey fills={FILLS} />}
			<PartBars
				label="Where the crop is"
				isWordy
				bars={crop.map((one) => ({
					key: one.code,
					name: (
						<>
							<span className="fig text-ink-faint">{one.code}</span> {one.name}
						</>
					),
					parts: [
						{ fill: "crop-sold", amount: one.soldPieces },
						{ fill: "crop-stock", amount: one.stockPieces },
						{ fill: "crop-lost", amount: one.wastePieces + one.missingPieces },
						{ fill: "crop-cut", amount: one.cutUpPieces },
					],
					words: <CropWords crop={one} />,
					label: `${one.code} ${one.name}: ${cropWords(one)}`,
				}))}
			/>
		</FigurePart>
	)
}

function CropWords({ crop }: { crop: Crop }) {
	const percent = soldPercent(crop)
	return (
		<>
			{percent !== null && <b>{percent} % sold</b>} <span className="note">{cropWords(crop)}</span>
		</>
	)
}

function CropTable({ crop }: { crop: readonly Crop[] }) {
	return (
		<FigureTable
			label="The crop, in pieces"
			columns={[
				{ head: "Product" },
				{ head: "Harvested", isFigure: true },
				...PLACES.map(([, word]) => ({ head: word.replace(/^./, (first) => first.toUpperCase()), isFigure: true })),
			]}
			rows={crop.map((one) => ({
				key: one.code,
				cells: [`${one.code} ${one.name}, ${one.detail}`, harvestedPieces(one), ...PLACES.map(([key]) => one[key])],
			}))}
		/>
	)
}
