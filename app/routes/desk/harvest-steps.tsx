import { Form, Link } from "react-router"
import { fullDay } from "~/domain/calendar"
import { piecesWords } from "~/domain/quantity"
import type { LookedAt } from "~/services/harvest/bring-in-harvest.server"
import type { FoundHarvest } from "~/services/harvest/find-harvest.server"
import type { HarvestProduct } from "~/services/harvest/find-harvest-page.server"
import { FilterLinks } from "~/ui/desk/filter-links"
import { Button, ButtonLink } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { TextField } from "~/ui/forms/fields"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { CountProduct } from "~/ui/lots/count-product"
import { HarvestLook, MoistureWords } from "~/ui/lots/harvest-look"
import { type ChoosableSuper, SuperChoice } from "~/ui/lots/super-choice"
import type { FieldProblem } from "./harvest-form"

type Typed = Readonly<Record<string, string>>

const errorIn = (errors: readonly FieldProblem[]) => (field: string) =>
	errors.find((error) => error.field === field)?.message
const idOf = (field: string) => field

/** The first step: which supers came off. */
export function ChooseStep({
	yards,
	supers,
	yardId,
	problem,
	base,
}: {
	yards: readonly { id: string; name: string }[]
	supers: readonly ChoosableSuper[]
	yardId: string | null
	problem: string | null
	base: string
}) {
	return (
		<>
			<SheetHead
				title="What came off the hives"
				lead="Choose the supers that came off together. Those that were ready are chosen already."
				action={<Link to={`${base}/crop`}>Back to the crop</Link>}
			/>
			<ErrorSummary errors={problem === null ? [] : [{ message: problem }]} />
			{yards.length > 1 && (
				<FilterLinks
					label="Supers by yard"
					name="yard"
					chosen={yardId ?? ""}
					options={[{ value: "", label: "All yards" }, ...yards.map(({ id, name }) => ({ value: id, label: name }))]}
				/>
			)}
			<SuperChoice key={yardId ?? ""} supers={supers} />
		</>
	)
}

/** The second step: how many pieces of each grade. */
export function CountStep({
	products,
	today,
	gone,
	formKey,
	typed,
	errors,
}: {
	products: readonly HarvestProduct[]
	today: string
	gone: number
	/** Made with the form, so that it counts once however often it is sent. */
	formKey: string
	typed: Typed
	errors: readonly FieldProblem[]
}) {
	const errorOf = errorIn(errors)
	return (
		<>
			<SheetHead
				title="Count what came off"
				lead="Pieces of each grade, and culls to cut up or sell as such: by super, or for all of them in the last row."
				action={<Link to="?">Choose other supers</Link>}
			/>
			<ErrorSummary errors={errors} idOf={idOf} />
			{gone > 0 && (
				<MessageLine tone="problem" title={`${gone} of the supers you chose came off already.`}>
					They are left out here.
				</MessageLine>
			)}
			<Form method="post" noValidate>
				<input type="hidden" name="key" value={typed.key ?? formKey} />
				<div className="lot-fields">
					<TextField
						name="harvestedOn"
						id="harvestedOn"
						label="Off the hives on"
						type="date"
						max={today}
						defaultValue={typed.harvestedOn ?? today}
						error={errorOf("harvestedOn")}
					/>
					<TextField
						name="note"
						id="note"
						label="Note"
						hint="For yourself: weather, help, what was odd."
						maxLength={500}
						defaultValue={typed.note}
					/>
				</div>
				{products.map((product) => (
					<CountProduct key={product.productId} product={product} typed={typed} errorOf={errorOf} />
				))}
				<div className="px-4 py-5 desk:px-8">
					<Button variant="primary" size="big" name="intent" value="look">
						See the lots
					</Button>
				</div>
			</Form>
		</>
	)
}

/** The third step: the lots as they would be, with their codes. */
export function LookStep({
	products,
	planned,
	typed,
	errors,
}: {
	products: readonly HarvestProduct[]
	planned: readonly LookedAt[]
	typed: Typed
	errors: readonly FieldProblem[]
}) {
	const looked = planned.map((plan) => {
		const { name = "", detail = "" } = products.find(({ productId }) => productId === plan.productId) ?? {}
		return { ...plan, name, detail }
	})
	const codeIds = new Map<string, string>(
		looked.flatMap(({ productId, lots }) =>
			lots.map(({ grade }, index) => [`code-${productId}-${grade}`, `code-${productId}-${index}`] as const),
		),
	)
	return (
		<>
			<SheetHead title="Look before they are lots" lead="One lot of each product and grade." />
			<ErrorSummary errors={errors} idOf={(field) => codeIds.get(field) ?? field} />
			<HarvestLook products={looked} typed={typed} errorOf={errorIn(errors)} />
		</>
	)
}

/** The end: the lots that were made, and where they go next. */
export function DoneStep({ base, harvest }: { base: string; harvest: FoundHarvest }) {
	const { harvestedOn, supers, lots, capacityPieces, finishedPieces, note } = harvest
	const wettest = Math.max(0, ...lots.map(({ moistureTenths }) => moistureTenths ?? 0))
	return (
		<>
			<SheetHead
				title={`Harvest of ${fullDay(harvestedOn)}`}
				lead={`${supers === 1 ? "1 super" : `${supers} supers`} came off with ${finishedPieces} of ${piecesWords(capacityPieces)} fit to sell as sections.${note ? ` ${note}` : ""}`}
			/>
			<MessageLine
				tone="saved"
				title={lots.length === 1 ? "The lot is in the cold room." : "The lots are in the cold room."}
			>
				They are held until they are frozen and weighed.
			</MessageLine>
			<table className="sheet-table">
				<thead>
					<tr>
						<th scope="col">Lot</th>
						<th scope="col">Product</th>
						<th scope="col">Next</th>
						<th scope="col" className="num pr-4! desk:pr-8!">
							Pieces
						</th>
					</tr>
				</thead>
				<tbody>
					{lots.map((lot) => (
						<tr key={lot.code}>
							<td>
								<Link className="name inline-block py-1 text-body!" to={`${base}/lots/${lot.code}`}>
									{lot.code}
								</Link>
							</td>
							<td>
								{lot.grade}, {lot.productName}
								<span className="note block">
									{lot.detail}, best before {fullDay(lot.bestBeforeOn)}
								</span>
							</td>
							<td>
								<Link className="inline-block py-1 pr-4" to={`${base}/lots/${lot.code}/grade`}>
									Grade
								</Link>
								<Link className="inline-block py-1" to={`${base}/lots/${lot.code}/regroup`}>
									Split or cut up
								</Link>
							</td>
							<td className="num fig pr-4! desk:pr-8!">{lot.pieces}</td>
						</tr>
					))}
				</tbody>
			</table>
			<div className="grid gap-4 px-4 py-4 desk:px-8">
				<MoistureWords moistureTenths={wettest === 0 ? null : wettest} />
				<div className="flex flex-wrap gap-3">
					<ButtonLink variant="primary" size="big" to={`${base}/cold-room`}>
						Put them in the freezer
					</ButtonLink>
					<ButtonLink to={`${base}/crop/harvest`}>Bring in more</ButtonLink>
				</div>
			</div>
		</>
	)
}
