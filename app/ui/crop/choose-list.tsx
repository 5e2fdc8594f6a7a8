import type { ReactNode } from "react"

/** The box that chooses one row of a table; its words are read with it. */
export function ChooseBox({
	name,
	value,
	label,
	chosen,
}: {
	name: string
	value: string
	label: string
	chosen: boolean
}) {
	return (
		<label className="choose-box">
			<input type="checkbox" name={name} value={value} defaultChecked={chosen} />
			<span>{label}</span>
		</label>
	)
}

/** One thing that can be done with what is chosen above: a sentence, its fields and its button. */
export function ChosenDeed({ title, children }: { title: string; children: ReactNode }) {
	return (
		<fieldset className="chosen-deed">
			<legend className="name">{title}</legend>
			{children}
		</fieldset>
	)
}
