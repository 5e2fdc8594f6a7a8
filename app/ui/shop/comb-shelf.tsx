import type { Form } from "~/domain/stall/short-names"
import { ART_OF_FORM } from "./art-of-form"

type ShelfItem = { code: string; name: string; form: Form }

/** The forms that are sold, drawn side by side on a shelf with their numbers. Repeats the list, so it is not read out. */
export function CombShelf({ items }: { items: readonly ShelfItem[] }) {
	const firstOfForm = items.filter((item, at) => items.findIndex((other) => other.form === item.form) === at)
	if (firstOfForm.length === 0) return null
	return (
		<div className="comb-shelf" aria-hidden="true">
			{firstOfForm.map(({ code, name, form }) => {
				const art = ART_OF_FORM[form]
				return (
					<figure key={code}>
						<img {...art} alt="" />
						<figcaption>
							<b>{code}</b> {name.split(",")[0]}
						</figcaption>
					</figure>
				)
			})}
		</div>
	)
}
