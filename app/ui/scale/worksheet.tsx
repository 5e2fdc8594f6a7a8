import { exactly, plainDecimal } from "~/domain/scale/fraction"
import type { NetContentsWorksheet } from "~/domain/scale/net-contents"
import { shownFigure, shownWeight } from "~/domain/scale/net-contents-words"
import { samplingWords } from "~/domain/scale/sampling-plan"

type Step = { name: string; how: string; figure: string; isShort?: boolean }

const metWords = (isMet: boolean) => (isMet ? "met" : "not met")

function labelStep(sheet: NetContentsWorksheet): Step[] {
	const { verified, unit } = sheet
	if (!verified) return [{ name: "Labelled weight", how: "Every package is held to its own label.", figure: "own" }]
	const { inchPoundGrams, metricGrams, weight } = verified
	const declared = `${plainDecimal(exactly(weight.amount), 4)} ${weight.unit}`
	const both =
		inchPoundGrams && metricGrams
			? `Ounces come to ${shownWeight(inchPoundGrams, "g")}, grams say ${shownWeight(metricGrams, "g")}: the larger is verified, ${declared}.`
			: `The label declares ${declared}.`
	return [{ name: "Labelled weight", how: both, figure: shownWeight(verified.target, unit) }]
}

function scaleStep(sheet: NetContentsWorksheet): Step {
	const { division, coarsestDivision, isDivisionFine, unit } = sheet
	const coarsest = shownWeight(coarsestDivision, unit)
	const own =
		division === null
			? "The division of the scale was not written down."
			: `The scale’s is ${shownWeight(division, unit)}: ${isDivisionFine ? "fine enough" : "too coarse"}.`
	return {
		name: "Scale division",
		how: `A sixth of the variation at the most. ${own}`,
		figure: coarsest,
		isShort: isDivisionFine === false,
	}
}

function tareSteps(sheet: NetContentsWorksheet): Step[] {
	const { tares, averageTare, unit, isTareEntered, ranges, verified } = sheet
	const sum = tares.map((tare) => shownFigure(tare, unit)).join(" + ")
	const how = isTareEntered ? "Known from before." : `(${sum}) ÷ ${tares.length}.`
	const more = ranges
		? ` Ranges: errors ${shownFigure(ranges.errors, unit)}, tares ${shownFigure(ranges.tares, unit)}${ranges.ratio ? `, ratio ${ranges.ratio}` : ""}. The handbook may ask for more tares by its table, which is not at hand.`
		: ""
	const nominal = verified && {
		name: "Nominal gross weight",
		how: `${shownFigure(averageTare, unit)} + ${shownFigure(verified.target, unit)}`,
		figure: shownWeight(sheet.packages[0]?.nominalGross ?? "0", unit),
	}
	return [
		{ name: "Average tare", how: `${how}${more}`, figure: shownWeight(averageTare, unit) },
		...(nominal ? [nominal] : []),
	]
}

function averageSteps(sheet: NetContentsWorksheet): Step[] {
	const { unit, plan, deviation, limit, average } = sheet
	const isBelow = average.startsWith("-")
	const steps: Step[] = [
		{ name: "Total error", how: "All errors added.", figure: shownWeight(sheet.total, unit) },
		{
			name: "Average error",
			how: `${shownFigure(sheet.total, unit)} ÷ ${plan.sample}`,
			figure: shownWeight(average, unit),
		},
	]
	if (!sheet.isAverageAsked || deviation === null) {
		return [...steps, { name: "Average test", how: "Not asked of a lot of one package.", figure: "none" }]
	}
	steps.push({
		name: "Standard deviation",
		how: `Of the sample, dividing by ${plan.sample - 1}.`,
		figure: shownWeight(deviation, unit),
	})
	if (limit === null) {
		return [
			...steps,
			{ name: "Average test", how: "The average is not below zero; no limit is computed.", figure: "met" },
		]
	}
	const against = sheet.isAverageAtLimit
		? "exactly the limit, which the handbook does not speak of: taken as a pass"
		: sheet.isAverageMet
			? "within the limit"
			: "more than the limit"
	return [
		...steps,
		{
			name: "Sample error limit",
			how: `${shownFigure(deviation, unit)} × correction factor ${plan.correctionFactor}`,
			figure: shownWeight(limit, unit),
		},
		{
			name: "Average test",
			how: isBelow ? `${shownFigure(average.replace("-", ""), unit)} short is ${against}.` : "",
			figure: metWords(sheet.isAverageMet),
			isShort: !sheet.isAverageMet,
		},
	]
}

function stepsOf(sheet: NetContentsWorksheet, lotPackages: number): Step[] {
	const { plan, unit, variation, tooShort } = sheet
	const words = samplingWords({ ...plan, to: plan.to ?? Number.POSITIVE_INFINITY })
	return [
		{
			name: "Sample",
			how: `${lotPackages.toLocaleString("en-US")} packages in the lot. ${words}`,
			figure: `${plan.sample}`,
		},
		...labelStep(sheet),
		{
			name: "Maximum allowable variation",
			how: "By the table for labels by weight.",
			figure: shownWeight(variation, unit),
		},
		scaleStep(sheet),
		...tareSteps(sheet),
		{
			name: "Short beyond the variation",
			how: `${plan.shortAllowed === 0 ? "None is" : `${plan.shortAllowed} is`} allowed in this sample. ${tooShort} found.`,
			figure: metWords(sheet.isVariationMet),
			isShort: !sheet.isVariationMet,
		},
		...averageSteps(sheet),
	]
}

/** Each step to the decision with its figures, as it would be worked on paper. */
export function WorksheetSteps({ sheet, lotPackages }: { sheet: NetContentsWorksheet; lotPackages: number }) {
	return (
		<table className="sheet-table worksheet-steps stacked-rows">
			<caption className="head-italic px-4 pt-4 pb-1 text-left desk:px-8">Step by step</caption>
			<thead>
				<tr>
					<th scope="col">Step</th>
					<th scope="col">How</th>
					<th scope="col" className="num">
						Figure
					</th>
				</tr>
			</thead>
			<tbody>
				{stepsOf(sheet, lotPackages).map((step) => (
					<tr key={step.name}>
						<th scope="row">{step.name}</th>
						<td>{step.how}</td>
						<td className={step.isShort ? "num fig short" : "num fig"}>{step.figure}</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

/** Every package of the sample with its error. */
export function PackageTable({ sheet }: { sheet: NetContentsWorksheet }) {
	const { unit } = sheet
	// In whole grams, ounces or pounds the errors in units of measure are the errors themselves.
	const unitOfMeasure = sheet.unitOfMeasure === "1" ? null : sheet.unitOfMeasure
	const isRandom = sheet.verified === null
	return (
		<table className="sheet-table package-table">
			<caption className="head-italic px-4 pt-6 pb-1 text-left desk:px-8">
				The packages, in {unit}, in the order drawn
			</caption>
			<thead>
				<tr>
					<th scope="col">No.</th>
					<th scope="col" className="num">
						Gross
					</th>
					{isRandom && (
						<th scope="col" className="num">
							Nominal
						</th>
					)}
					<th scope="col" className="num">
						Error
					</th>
					{unitOfMeasure && (
						<th scope="col" className="num">
							In {unitOfMeasure} {unit}
						</th>
					)}
					<th scope="col" className="pl-4!">
						<span className="sr-only">Remark</span>
					</th>
				</tr>
			</thead>
			<tbody>
				{sheet.packages.map((line, place) => (
					// biome-ignore lint/suspicious/noArrayIndexKey: the number of a package is its place in the sample
					<tr key={place}>
						<td>{place + 1}</td>
						<td className="num fig">{shownFigure(line.gross, unit)}</td>
						{isRandom && <td className="num fig">{shownFigure(line.nominalGross, unit)}</td>}
						<td className={line.isTooShort ? "num fig short" : "num fig"}>{shownFigure(line.error, unit)}</td>
						{unitOfMeasure && <td className="num fig">{line.units?.replace("-", "−")}</td>}
						<td className="pl-4!">
							{line.isTooShort && <span className="short">too short</span>}
							{line.isJustWithin && "exactly at the variation, counted as within"}
						</td>
					</tr>
				))}
			</tbody>
			<tfoot>
				<tr>
					<td>
						<b>Sum</b>
					</td>
					<td />
					{isRandom && <td />}
					<td className="num fig">
						<b>{shownFigure(sheet.total, unit)}</b>
					</td>
					{unitOfMeasure && <td />}
					<td />
				</tr>
			</tfoot>
		</table>
	)
}
