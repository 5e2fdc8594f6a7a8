import { useRef } from "react"
import { describedBy, FieldError } from "~/ui/forms/field-error"
import { Icon } from "~/ui/icons"

const STEP = 5

type CheckPercentProps = {
	id: string
	name: string
	label: string
	defaultValue: string
	/** Where the buttons begin while nothing is written: the share of the last check. */
	from: number
	error?: string
}

/** A share in percent: typed, or by fives with two large buttons once the script has arrived. */
export function CheckPercent({ id, name, label, defaultValue, from, error }: CheckPercentProps) {
	const input = useRef<HTMLInputElement>(null)
	const step = (by: number) => () => {
		if (!input.current) return
		const written = Number.parseInt(input.current.value, 10)
		const start = Number.isNaN(written) ? from : written
		const next = (by > 0 ? Math.floor(start / STEP) + 1 : Math.ceil(start / STEP) - 1) * STEP
		input.current.value = String(Math.max(0, Math.min(100, next)))
	}
	return (
		<div className="check-percent">
			<label htmlFor={id}>{label}</label>
			<span className="check-stepper">
				<button type="button" aria-label={`${STEP} percent less: ${label}`} onClick={step(-STEP)}>
					<Icon name="minus" size={18} />
				</button>
				<input
					ref={input}
					id={id}
					name={name}
					defaultValue={defaultValue}
					inputMode="numeric"
					autoComplete="off"
					aria-invalid={error ? true : undefined}
					aria-describedby={describedBy(`${id}-unit`, error && `${id}-error`)}
				/>
				<span id={`${id}-unit`}>
					%<span className="sr-only"> of all sections</span>
				</span>
				<button type="button" aria-label={`${STEP} percent more: ${label}`} onClick={step(STEP)}>
					<Icon name="plus" size={18} />
				</button>
			</span>
			{error && <FieldError id={`${id}-error`}>{error}</FieldError>}
		</div>
	)
}
