import { type MouseEvent, useRef, useState } from "react"
import { Icon } from "~/ui/icons"
import { fieldId } from "./field-error"

type StepperProps = {
	name: string
	/** What is counted: "Round section, clover". */
	label: string
	defaultValue: number
	min?: number
	max?: number
	/** The buttons' name in the posted form; their value is `less:<name>` or `more:<name>`. */
	stepName?: string
	onCount?: (count: number) => void
}

/**
 * Pieces, one at a time. Before the script arrives both buttons submit the form, which answers with the new count; after,
 * they change the number in place.
 */
export function Stepper({ name, label, defaultValue, min = 0, max, stepName = "step", onCount }: StepperProps) {
	const input = useRef<HTMLInputElement>(null)
	const [count, setCount] = useState(defaultValue)
	const limit = (n: number) => Math.max(min, Math.min(max ?? Number.POSITIVE_INFINITY, n))
	const tell = (next: number) => {
		setCount(next)
		onCount?.(next)
	}
	const stepBy = (by: number) => (event: MouseEvent) => {
		event.preventDefault()
		const written = Number(input.current?.value)
		const next = limit((Number.isFinite(written) ? written : count) + by)
		if (input.current) input.current.value = String(next)
		tell(next)
	}
	return (
		<span className="stepper">
			<button
				type="submit"
				name={stepName}
				value={`less:${name}`}
				aria-label={`One fewer: ${label}`}
				disabled={count <= min}
				onClick={stepBy(-1)}
			>
				<Icon name="minus" size={14} />
			</button>
			<input
				ref={input}
				id={fieldId(name)}
				name={name}
				aria-label={label}
				defaultValue={defaultValue}
				inputMode="numeric"
				autoComplete="off"
				onChange={(event) => {
					const written = Number(event.target.value)
					if (Number.isInteger(written)) tell(written)
				}}
			/>
			<button
				type="submit"
				name={stepName}
				value={`more:${name}`}
				aria-label={`One more: ${label}`}
				disabled={max !== undefined && count >= max}
				onClick={stepBy(1)}
			>
				<Icon name="plus" size={14} />
			</button>
		</span>
	)
}
