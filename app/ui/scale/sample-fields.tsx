import { FieldError, fieldId } from "~/ui/forms/field-error"

/** One small field for each package of the sample, in the order in which they are drawn. */
export function SampleFields({
	sample,
	weights,
	errorOf,
}: {
	sample: number
	weights: readonly string[]
	errorOf: (field: string) => string | undefined
}) {
	// Weights typed for a larger sample stay, so that nothing is lost when the plan changes.
	const lastTyped = weights.findLastIndex((weight) => weight.trim() !== "")
	const places = Array.from({ length: Math.max(sample, lastTyped + 1) }, (_, place) => place)
	const wrong = places.filter((place) => errorOf(`weight-${place}`))
	return (
		<>
			<ol className="sample-fields">
				{places.map((place) => {
					const error = errorOf(`weight-${place}`)
					return (
						<li key={place}>
							<label htmlFor={fieldId(`weight-${place}`)}>
								<span className="sr-only">Package </span>
								{place + 1}
							</label>
							<input
								className="qty"
								id={fieldId(`weight-${place}`)}
								name="weight"
								type="text"
								inputMode="decimal"
								autoComplete="off"
								defaultValue={weights[place] ?? ""}
								aria-invalid={error ? true : undefined}
								aria-describedby={error ? `weight-${place}-error` : undefined}
							/>
						</li>
					)
				})}
			</ol>
			{wrong.map((place) => (
				<FieldError key={place} id={`weight-${place}-error`}>
					{errorOf(`weight-${place}`)}
				</FieldError>
			))}
		</>
	)
}

/** The same weights in one box: a column of a sheet, or a line from the scale. */
export function PastedField({ pasted, error }: { pasted: string; error: string | undefined }) {
	const id = fieldId("pasted")
	return (
		<div className="field mt-4">
			<label className="field-label" htmlFor={id}>
				Or all of them at once
			</label>
			<textarea
				className="input"
				id={id}
				name="pasted"
				rows={3}
				spellCheck={false}
				defaultValue={pasted}
				aria-invalid={error ? true : undefined}
				aria-describedby={error ? `${id}-hint ${id}-error` : `${id}-hint`}
			/>
			<span className="field-hint" id={`${id}-hint`}>
				Full weights as a column, or apart by blanks, commas or semicolons.
			</span>
			{error && <FieldError id={`${id}-error`}>{error}</FieldError>}
		</div>
	)
}
