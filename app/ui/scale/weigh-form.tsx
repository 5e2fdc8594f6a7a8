import { Form } from "react-router"
import { Button } from "~/ui/forms/button"
import { FieldError, fieldId } from "~/ui/forms/field-error"
import { CheckField, SelectField, TextField } from "~/ui/forms/fields"
import { MarginNote } from "~/ui/layout/sheet"
import { PastedField, SampleFields } from "./sample-fields"

/** What stands in the form, as text, whatever it is worth. */
export type TypedWeighing = {
	packages: string
	inchPound: string
	metric: string
	unit: string
	division: string
	tareWeighed: string
	tareEntered: string
	weights: string[]
	pasted: string
	isSure: boolean
	note: string
}

type WeighFormProps = {
	typed: TypedWeighing
	errors: readonly { field?: string; message: string }[]
	/** Something looks wrong, and the person may say that it is right. */
	asks: boolean
	/** The check's own id, so that a second send is the same check. */
	checkId: string
	sample: number
	tares: number
	planWords: string
}

const UNITS = [
	{ value: "g", label: "grams" },
	{ value: "oz", label: "ounces" },
	{ value: "lb", label: "pounds" },
]

/** Weighs a lot: how many, what the label says, the empty packages, the full ones. Keeps everything typed. */
export function WeighForm({ typed, errors, asks, checkId, sample, tares, planWords }: WeighFormProps) {
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	const field = (name: "packages" | "inchPound" | "metric" | "division" | "tareWeighed" | "tareEntered" | "note") => ({
		name,
		defaultValue: typed[name],
		error: errorOf(name),
		autoComplete: "off",
	})
	return (
		<Form method="post" encType="multipart/form-data" className="weigh-form" noValidate aria-label="Weigh this lot">
			<input type="hidden" name="checkId" value={checkId} />
			<fieldset className="weigh-part">
				<legend className="name">The lot and its label</legend>
				<div className="weigh-main">
					<div className="weigh-row">
						<div className="weigh-packages">
							<TextField {...field("packages")} label="Packages in the lot" inputMode="numeric" />
							<Button name="intent" value="plan" size="small">
								Set the sample
							</Button>
						</div>
						<TextField {...field("inchPound")} label="Label, ounces" hint="12 oz, 1 lb 8 oz" />
						<TextField
							{...field("metric")}
							label="Label, grams"
							inputMode="decimal"
							hint="Leave empty if not printed"
						/>
					</div>
				</div>
				<MarginNote>{planWords} The larger of the two declarations is the one that is verified.</MarginNote>
			</fieldset>
			<fieldset className="weigh-part">
				<legend className="name">The scale and the empty package</legend>
				<div className="weigh-main">
					<div className="weigh-row">
						<SelectField
							name="unit"
							label="The scale shows"
							options={UNITS}
							defaultValue={typed.unit}
							error={errorOf("unit")}
						/>
						<TextField
							{...field("division")}
							label="Its division"
							hint="If you know it: 1, 0.002"
							inputMode="decimal"
						/>
					</div>
					<div className="weigh-row">
						<TextField
							{...field("tareWeighed")}
							label="Empty packages, weighed now"
							hint={`${tares === 1 ? "One" : `At least ${tares}`} of the sample, opened, cleaned and dried: 27 29`}
						/>
						<TextField
							{...field("tareEntered")}
							label="Or the known tare"
							inputMode="decimal"
							hint="One figure, such as 28"
						/>
					</div>
				</div>
				<MarginNote>Box, wrap, wood and labels are tare. The wax comb is product.</MarginNote>
			</fieldset>
			<fieldset className="weigh-part">
				<legend className="name">
					{sample === 1 ? "The full package" : `${sample} full packages, drawn at random`}
				</legend>
				<div className="weigh-main">
					<SampleFields sample={sample} weights={typed.weights} errorOf={errorOf} />
					<PastedField pasted={typed.pasted} error={errorOf("pasted")} />
					<div className="field mt-4">
						<label className="field-label" htmlFor={fieldId("file")}>
							Or a CSV file with them
						</label>
						<input
							className="weigh-file"
							id={fieldId("file")}
							name="file"
							type="file"
							accept=".csv,.txt,text/csv,text/plain"
							aria-invalid={errorOf("file") ? true : undefined}
							aria-describedby={errorOf("file") ? `${fieldId("file")}-error` : undefined}
						/>
						{errorOf("file") && <FieldError id={`${fieldId("file")}-error`}>{errorOf("file")}</FieldError>}
					</div>
				</div>
				<MarginNote>Keep the order in which they were drawn, and do not pick the full-looking ones.</MarginNote>
			</fieldset>
			<div className="weigh-part">
				<div className="weigh-end grid gap-4">
					{(asks || typed.isSure) && (
						<CheckField
							name="isSure"
							value="yes"
							label="The weights and the unit are right as they stand"
							defaultChecked={typed.isSure}
						/>
					)}
					<TextField
						{...field("note")}
						label="Note"
						hint="Which scale, who drew the sample. It stays with the check."
					/>
					<div>
						<Button variant="primary" size="big" name="intent" value="judge">
							Judge the lot
						</Button>
					</div>
				</div>
			</div>
		</Form>
	)
}
