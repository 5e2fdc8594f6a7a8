import { FieldError, fieldId } from "~/ui/forms/field-error"

type LeastFieldProps = { name: string; label: string; defaultValue: string; error: string | undefined }

/** The least cases that are of use, small under the field for cases: fewer than that, and none is wanted. */
export function LeastField({ name, label, defaultValue, error }: LeastFieldProps) {
	const id = fieldId(name)
	return (
		<span className="least">
			<span aria-hidden="true">at least </span>
			<input
				id={id}
				name={name}
				type="text"
				inputMode="numeric"
				autoComplete="off"
				className="least-field"
				aria-label={label}
				defaultValue={defaultValue}
				aria-invalid={error ? true : undefined}
				aria-describedby={error ? `${id}-error` : undefined}
				onFocus={(event) => event.currentTarget.select()}
			/>
			{error && <FieldError id={`${id}-error`}>{error}</FieldError>}
		</span>
	)
}
