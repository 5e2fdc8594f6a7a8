import { Form } from "react-router"
import { type Fault, faultNames } from "~/domain/grading/faults"
import { type CombForm, combForms, type GradeRule, type GradeScheme } from "~/domain/grading/grade-comb"
import { formatHundredths } from "~/domain/grading/hundredths"
import { measureNames, measures } from "~/domain/grading/measures"
import { Button } from "~/ui/forms/button"
import { CheckField, TextField } from "~/ui/forms/fields"
import { FaultBoxes } from "./fault-boxes"

/** What stood in the form: by name, names that come more than once with all their values. */
export type TypedScheme = Readonly<Record<string, readonly string[]>>

export const FORM_WORDS: Record<CombForm, string> = {
	round: "Round section",
	basswood: "Basswood section",
	"clear-box": "Clear-box section",
	"cut-comb": "Cut comb",
	"half-piece": "Half piece",
	chunk: "Chunk honey",
	frame: "Frame",
}

/** Rows for grades that a form has at least, so that one can be added without a script. */
export const GRADE_ROWS = 5

/** A scheme as the form writes it. */
export function schemeAsTyped(name: string, scheme: GradeScheme): TypedScheme {
	const colours = scheme.colours.map(({ name: colour, toPfundTenths: to, isUnder }) =>
		to === null ? colour : `${colour} ${isUnder ? "under" : "to"} ${to / 10}`,
	)
	const typed: Record<string, readonly string[]> = {
		name: [name],
		source: [scheme.source],
		form: scheme.forms,
		below: [String(scheme.belowPercent)],
		colours: [colours.join("; ")],
	}
	scheme.grades.forEach((rule, index) => {
		Object.assign(typed, gradeAsTyped(rule, index))
	})
	return typed
}

function gradeAsTyped(rule: GradeRule, index: number): TypedScheme {
	const limits = measureNames.flatMap((measure) => {
		const limit = rule.limits[measure]
		return limit === undefined ? [] : [[`${measure}-${index}`, [formatHundredths(limit)]] as const]
	})
	return {
		[`grade-${index}`]: [rule.name],
		[`outside-${index}`]: rule.outsideRowMayBeOpen ? ["on"] : [],
		[`excludes-${index}`]: rule.excludes,
		[`colours-${index}`]: [rule.colours.join("; ")],
		...Object.fromEntries(limits),
	}
}

type Around = { typed: TypedScheme; errorOf: (field: string) => string | undefined }

function GradeFields({ index, typed, errorOf }: Around & { index: number }) {
	const first = (name: string) => typed[`${name}-${index}`]?.[0]
	const name = first("grade")
	return (
		<details className="lot-part" open={Boolean(name)}>
			<summary className="name cursor-pointer py-1">{name || `Grade ${index + 1}`}</summary>
			<div className="grid gap-4 pt-3">
				<div className="lot-fields">
					<TextField
						name={`grade-${index}`}
						label="Name of the grade"
						maxLength={60}
						hint="Empty: no such grade."
						defaultValue={name}
						error={errorOf(`grade-${index}`)}
					/>
					{measureNames.map((measure) => (
						<TextField
							key={measure}
							name={`${measure}-${index}`}
							label={`${measures[measure].label}, at ${measures[measure].side} (${measures[measure].unit})`}
							inputMode="decimal"
							autoComplete="off"
							defaultValue={first(measure)}
							error={errorOf(`${measure}-${index}`)}
						/>
					))}
					<TextField
						name={`colours-${index}`}
						label="Colours it takes"
						hint="Names of the scheme, with ; between. Empty: any."
						maxLength={200}
						defaultValue={first("colours")}
						error={errorOf(`colours-${index}`)}
					/>
				</div>
				<CheckField
					name={`outside-${index}`}
					label="The row next to the wood may be unsealed"
					defaultChecked={first("outside") === "on"}
				/>
				<fieldset>
					<legend className="field-label mb-2">What must not be seen</legend>
					<FaultBoxes
						name={`excludes-${index}`}
						faults={faultNames as Fault[]}
						chosen={typed[`excludes-${index}`] ?? []}
					/>
				</fieldset>
			</div>
		</details>
	)
}

/** A grade scheme, to be written or changed: its limits are the producer's to answer for. */
export function SchemeForm({
	formKey,
	isNew,
	rows,
	typed,
	errorOf,
}: Around & { formKey: string; isNew: boolean; rows: number }) {
	const first = (name: string) => typed[name]?.[0]
	const forms = typed.form ?? []
	return (
		<Form method="post" noValidate>
			<input type="hidden" name="key" value={formKey} />
			<div className="lot-part grid gap-4">
				<TextField
					name="name"
					label="Name of the scheme"
					maxLength={80}
					defaultValue={first("name")}
					error={errorOf("name")}
				/>
				<TextField
					name="source"
					label="Where its limits come from"
					maxLength={400}
					defaultValue={first("source")}
					error={errorOf("source")}
				/>
				<fieldset>
					<legend className="field-label mb-2">For which comb</legend>
					<div className="grade-faults">
						{combForms.map((form) => (
							<div className="check" key={form}>
								<input
									type="checkbox"
									name="form"
									value={form}
									id={`form-${form}`}
									defaultChecked={forms.includes(form)}
								/>
								<label htmlFor={`form-${form}`}>{FORM_WORDS[form]}</label>
							</div>
						))}
					</div>
				</fieldset>
				<TextField
					name="below"
					label="Pieces that may be below the grade, % by count"
					hint="California lets 5 % of a lot of extracted honey be; comb schemes mostly say nothing: 0."
					inputMode="numeric"
					defaultValue={first("below") ?? "0"}
					error={errorOf("below")}
				/>
				<TextField
					name="colours"
					label="Colour names, the lightest first"
					hint="By Pfund in mm, with ; between: White under 35; Golden to 85; Dark"
					maxLength={300}
					defaultValue={first("colours")}
					error={errorOf("colours")}
				/>
			</div>
			{Array.from({ length: rows }, (_, index) => (
				// biome-ignore lint/suspicious/noArrayIndexKey: rows are never reordered, and a row is its place
				<GradeFields key={index} index={index} typed={typed} errorOf={errorOf} />
			))}
			<div className="flex flex-wrap gap-3 px-4 py-4 desk:px-8">
				<Button variant="primary" size="big" name="intent" value="save">
					Keep the scheme
				</Button>
				{!isNew && (
					<Button name="intent" value="put-away">
						Put it away
					</Button>
				)}
			</div>
		</Form>
	)
}
