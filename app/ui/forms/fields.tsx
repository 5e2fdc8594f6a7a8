import type { ComponentProps, ReactNode } from "react"
import { describedBy, FieldError, fieldId } from "./field-error"

type Around = { name: string; label: string; hint?: ReactNode; error?: ReactNode }

/** What ties an input to its hint and error. */
function ties(id: string, { hint, error }: Pick<Around, "hint" | "error">) {
	return {
		"aria-invalid": error ? true : undefined,
		"aria-describedby": describedBy(hint ? `${id}-hint` : undefined, error ? `${id}-error` : undefined),
	}
}

function HintAndError({ id, hint, error }: { id: string } & Pick<Around, "hint" | "error">) {
	return (
		<>
			{hint && (
				<span className="field-hint" id={`${id}-hint`}>
					{hint}
				</span>
			)}
			{error && <FieldError id={`${id}-error`}>{error}</FieldError>}
		</>
	)
}

type TextFieldProps = Around & Omit<ComponentProps<"input">, "name">

/** One line of text with its label above, and its hint and error below. */
export function TextField({ label, hint, error, name, id = fieldId(name), className, ...input }: TextFieldProps) {
	return (
		<div className="field">
			<label className="field-label" htmlFor={id}>
				{label}
			</label>
			<input
				type="text"
				{...input}
				{...ties(id, { hint, error })}
				id={id}
				name={name}
				className={className ? `input ${className}` : "input"}
			/>
			<HintAndError id={id} hint={hint} error={error} />
		</div>
	)
}

type SelectFieldProps = Around &
	Omit<ComponentProps<"select">, "name"> & { options: readonly { value: string; label: string }[] }

/** One choice of a list, with its label above. */
export function SelectField({ label, hint, error, name, id = fieldId(name), options, ...select }: SelectFieldProps) {
	return (
		<div className="field">
			<label className="field-label" htmlFor={id}>
				{label}
			</label>
			<select {...select} {...ties(id, { hint, error })} id={id} name={name} className="input">
				{options.map((option) => (
					<option key={option.value} value={option.value}>
						{option.label}
					</option>
				))}
			</select>
			<HintAndError id={id} hint={hint} error={error} />
		</div>
	)
}

type CheckFieldProps = Around & Omit<ComponentProps<"input">, "name" | "type">

/** Yes or no, the box before its words. */
export function CheckField({ label, hint, error, name, id = fieldId(name), ...input }: CheckFieldProps) {
	return (
		<div className="check">
			<input {...input} {...ties(id, { hint, error })} id={id} name={name} type="checkbox" />
			<div>
				<label htmlFor={id}>{label}</label>
				<div className="grid">
					<HintAndError id={id} hint={hint} error={error} />
				</div>
			</div>
		</div>
	)
}
