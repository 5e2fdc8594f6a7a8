import { Form } from "react-router"
import { faultNames } from "~/domain/grading/faults"
import type { GradeScheme } from "~/domain/grading/grade-comb"
import { type Measure, measureNames, measures } from "~/domain/grading/measures"
import { Button } from "~/ui/forms/button"
import { CheckField, SelectField, TextField } from "~/ui/forms/fields"
import { FaultBoxes, type FaultChoice } from "./fault-boxes"

/** The measures that a scheme asks for, in the order of the form. */
export function measuresAsked({ grades }: GradeScheme): Measure[] {
	return measureNames.filter((measure) => grades.some(({ limits }) => limits[measure] !== undefined))
}

/** What is seen on a lot, as its scheme asks for it. */
export function GradingForm({
	scheme,
	schemeName,
	formKey,
	typed,
	pfund,
	errorOf,
}: {
	scheme: GradeScheme
	schemeName: string
	formKey: string
	typed: FaultChoice
	/** The reading of the lot so far. */
	pfund: string
	errorOf: (field: string) => string | undefined
}) {
	return (
		<Form method="post" noValidate>
			<input type="hidden" name="key" value={formKey} />
			<input type="hidden" name="scheme" value={schemeName} />
			<section className="lot-part" aria-labelledby="measured-head">
				<h2 className="name" id="measured-head">
					Measured on the worst piece
				</h2>
				<div className="lot-fields">
					{measuresAsked(scheme).map((measure) => (
						<TextField
							key={measure}
							name={measure}
							label={`${measures[measure].label}, ${measures[measure].unit}`}
							inputMode="decimal"
							autoComplete="off"
							defaultValue={typed.values[measure]}
							error={errorOf(measure)}
						/>
					))}
					<TextField
						name="pfund"
						label="Pfund, mm"
						inputMode="decimal"
						autoComplete="off"
						defaultValue={typed.values.pfund ?? pfund}
						error={errorOf("pfund")}
					/>
					<TextField
						name="seen"
						label="Pieces looked at"
						inputMode="numeric"
						autoComplete="off"
						defaultValue={typed.values.seen}
						error={errorOf("seen")}
					/>
					<TextField
						name="below"
						label="Of those, below what is written here"
						hint={`The scheme lets ${scheme.belowPercent} % by count be.`}
						inputMode="numeric"
						autoComplete="off"
						defaultValue={typed.values.below ?? "0"}
						error={errorOf("below")}
					/>
					{scheme.caseRule && (
						<>
							<TextField
								name="caseLb"
								label={`Net weight of a case of ${scheme.caseRule.pieces}, lb`}
								inputMode="decimal"
								defaultValue={typed.values.caseLb}
								error={errorOf("caseLb")}
							/>
							<SelectField
								name="separators"
								label="Sections were built"
								options={[
									{ value: "separators", label: "with separators" },
									{ value: "half", label: "half separatored" },
									{ value: "none", label: "without separators" },
								]}
								defaultValue={typed.values.separators}
							/>
						</>
					)}
				</div>
			</section>
			<section className="lot-part" aria-labelledby="seen-head">
				<h2 className="name" id="seen-head">
					Seen on any piece
				</h2>
				<div className="grid gap-3">
					<CheckField
						name="outsideRow"
						label="Cells of the row next to the wood are unsealed"
						defaultChecked={typed.values.outsideRow === "on"}
					/>
					<FaultBoxes name="fault" faults={faultNames} chosen={typed.faults} />
				</div>
			</section>
			<div className="flex flex-wrap gap-3 px-4 py-4 desk:px-8">
				<Button variant="primary" size="big" name="intent" value="save">
					Grade the lot
				</Button>
				<Button name="intent" value="look">
					See the grade first
				</Button>
			</div>
		</Form>
	)
}
