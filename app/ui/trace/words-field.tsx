import type { ReactNode } from "react"
import { describedBy, FieldError, fieldId } from "~/ui/forms/field-error"

/** A few sentences, with the label above and hint and error below. */
export function WordsField({
	name,
	label,
	hint,
	error,
	defaultValue,
	maxLength,
	id = fieldId(name),
}: {
	name: string
	label: string
	hint?: ReactNode
	error?: ReactNode
	defaultValue?: string
	maxLength: number
	id?: string
}) {
	return (
		<div className="field">
			<label className="field-label" htmlFor={id}>
				{label}
			</label>
			<textarea
				id={id}
				name={name}
				className="input words"
				defaultValue={defaultValue}
				maxLength={maxLength}
				aria-invalid={error ? true : undefined}
				aria-describedby={describedBy(hint ? `${id}-hint` : undefined, error ? `${id}-error` : undefined)}
			/>
			{hint && (
				<span className="field-hint" id={`${id}-hint`}>
					{hint}
				</span>
			)}
			{error && <FieldError id={`${id}-error`}>{error}</FieldError>}
		</div>
	)
}
