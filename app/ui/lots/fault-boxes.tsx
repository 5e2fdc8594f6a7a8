import { type Fault, faults } from "~/domain/grading/faults"

/** What was typed in a form, with the faults that were chosen. */
export type FaultChoice = { values: Readonly<Record<string, string | undefined>>; faults: readonly string[] }

/** A box for each fault. */
export function FaultBoxes({
	name,
	faults: names,
	chosen,
}: {
	name: string
	faults: readonly Fault[]
	chosen: readonly string[]
}) {
	return (
		<div className="grade-faults">
			{names.map((fault) => (
				<div className="check" key={fault}>
					<input
						type="checkbox"
						name={name}
						value={fault}
						id={`${name}-${fault}`}
						defaultChecked={chosen.includes(fault)}
					/>
					<label htmlFor={`${name}-${fault}`}>{faults[fault]}</label>
				</div>
			))}
		</div>
	)
}
