import type { ComponentProps, ReactNode } from "react"
import { describedBy, FieldError, fieldId } from "./field-error"

export type QuantityFieldProps = Omit<ComponentProps<"input">, "type" | "value" | "name"> & {
	name: string
	/** What is counted, in full: "Cases of round section, clover, 8 oz". Read out, not shown, in a table. */
	label: string
	showLabel?: boolean
	error?: ReactNode
	/** The id of an element elsewhere that says what is wrong, where a row is too narrow for the words. */
	errorId?: string
	/** Written on this device and not taken by the server yet. */
	notSent?: boolean
}

/**
 * A count of cases or pieces. It keeps what was typed, however wrong, and says what is wrong below. The input is not
 * controlled, so nothing typed before the script arrives is lost.
 */
export function QuantityField({
	name,
	label,
	showLabel = false,
	error,
	errorId: elsewhere,
	notSent,
	id = fieldId(name),
	className,
	...input
}: QuantityFieldProps) {
	const errorId = elsewhere ?? `${id}-error`
	return (
		<span className="inline-grid max-w-56 justify-items-end gap-1 text-left">
			{showLabel && (
				<label className="field-label justify-self-start" htmlFor={id}>
					{label}
				</label>
			)}
			<input
				{...input}
				id={id}
				name={name}
				type="text"
				inputMode="numeric"
				autoComplete="off"
				className={["qty", notSent && "not-sent", className].filter(Boolean).join(" ")}
				aria-label={showLabel ? undefined : label}
				aria-invalid={error ? true : undefined}
				aria-describedby={describedBy(input["aria-describedby"], error ? errorId : undefined)}
			/>
			{error && !elsewhere && <FieldError id={errorId}>{error}</FieldError>}
		</span>
	)
}
