import { useEffect, useRef, useState } from "react"
import { rowFromMiddle, sharesOfSections, tapsOfRow } from "~/domain/crop/check-sections"
import { SECTION_STATES } from "~/domain/crop/super-drawing"
import { describedBy, FieldError } from "~/ui/forms/field-error"
import { Icon } from "~/ui/icons"
import { SectionSign, SuperBlock } from "~/ui/stock/super-block"
import { sharesWords } from "./check-words"

type CheckRowsProps = {
	/** Begins the ids of its fields. */
	id: string
	across: number
	/** What was typed for each row. */
	values: readonly string[]
	error?: string
}

/** The taps that can be drawn: what was typed wrongly is left out of the drawing, not of the field. */
const drawable = (taps: string, across: number) => taps.replace(/[^0-4]/g, "").slice(0, tapsOfRow(across))

/**
 * A super row by row: each tap lays a code on the next section on either side of the middle, and the drawing follows.
 * Without script the codes are typed as digits into the same fields.
 */
export function CheckRows({ id, across, values, error }: CheckRowsProps) {
	const box = useRef<HTMLFieldSetElement>(null)
	const [rows, setRows] = useState<readonly string[]>(values)
	useEffect(() => {
		// What was typed before the script arrived, and what the browser put back, is drawn too.
		const written = [...(box.current?.querySelectorAll<HTMLInputElement>("input[data-row]") ?? [])]
		setRows(written.map((input) => input.value))
	}, [])
	const setRow = (index: number, taps: string) => setRows((before) => before.with(index, taps))
	const most = tapsOfRow(across)
	const sections = rows.map((taps) => rowFromMiddle(drawable(taps, across), across)).join("")
	const words = sharesWords(sharesOfSections(sections))
	return (
		<fieldset
			className="check-rows"
			ref={box}
			id={`${id}-rows`}
			tabIndex={-1}
			aria-describedby={describedBy(error && `${id}-rows-error`)}
		>
			<legend className="sr-only">What you see in each row, from the middle out</legend>
			<div className="check-drawing">
				<SuperBlock
					sections={[...sections].map((code) => SECTION_STATES[Number(code)] ?? "bare")}
					label={`Drawn so far: ${words}`}
				/>
				<output>{words}</output>
			</div>
			<p className="field-hint" id={`${id}-rows-hint`}>
				<span className="with-script">Each tap lays the next section on both sides of the middle.</span>
				<span className="without-script">
					Up to {most} digits a row, the middle first: 0 bare, 1 begun, 2 filling, 3 full, 4 capped. What is left out is
					bare.
				</span>
			</p>
			{error && <FieldError id={`${id}-rows-error`}>{error}</FieldError>}
			{rows.map((taps, index) => {
				const number = index + 1
				return (
					// biome-ignore lint/suspicious/noArrayIndexKey: a row is its place, and rows never move
					<fieldset className="check-row" key={index}>
						<legend className="sr-only">Row {number}</legend>
						<label htmlFor={`${id}-row${number}`}>Row {number}</label>
						<input
							data-row
							className="qty"
							id={`${id}-row${number}`}
							name={`row${number}`}
							value={taps}
							onChange={(event) => setRow(index, event.target.value)}
							inputMode="numeric"
							autoComplete="off"
							maxLength={most}
							aria-describedby={`${id}-rows-hint`}
						/>
						<div className="check-taps">
							{SECTION_STATES.map((state, code) => (
								<button
									type="button"
									key={state}
									disabled={taps.length >= most}
									onClick={() => setRow(index, taps + code)}
								>
									<SectionSign state={state} />
									{state}
								</button>
							))}
							<button
								type="button"
								disabled={taps === ""}
								aria-label={`Take back the last tap of row ${number}`}
								onClick={() => setRow(index, taps.slice(0, -1))}
							>
								<Icon name="left" size={16} />
								back
							</button>
						</div>
					</fieldset>
				)
			})}
		</fieldset>
	)
}
