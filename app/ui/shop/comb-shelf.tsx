import type { Form } from "~/domain/stall/short-names"
import { ART_OF_FORM } from "./art-of-form"

type ShelfItem = { code?: string; name: string; form: Form }

/**
 * The forms that are sold, drawn side by side on a shelf with their numbers, and what the bees flew to between them.
 * Repeats the list, so it is not read out. With nothing to sell the shelf is bare.
 */
export function CombShelf({ items }: { items: readonly ShelfItem[] }) {
	const firstOfDrawing = items.filter(
		(item, at) => items.findIndex((other) => ART_OF_FORM[other.form].src === ART_OF_FORM[item.form].src) === at,
	)
	if (firstOfDrawing.length === 0) return <BareShelf />
	return (
		<div className="comb-shelf" aria-hidden="true">
			{firstOfDrawing.map(({ code, name, form }, at) => (
				<figure key={form} className={`shelf-${form}`}>
					<span className="shelf-art">
						<img {...ART_OF_FORM[form]} alt="" />
						{at === 0 && <img className="shelf-plant" src="/art/sainfoin.svg" alt="" width={140} height={204} />}
						{at === 2 && <img className="shelf-plant" src="/art/clover.svg" alt="" width={124} height={180} />}
					</span>
					<figcaption>
						{code && <b>{code} </b>}
						{name.split(",")[0]}
					</figcaption>
				</figure>
			))}
		</div>
	)
}

/** Nothing to sell yet: only what the bees fly to stands there. */
function BareShelf() {
	return (
		<div className="comb-shelf bare" aria-hidden="true">
			<span className="shelf-art">
				<img className="shelf-plant" src="/art/clover.svg" alt="" width={124} height={180} />
				<img className="shelf-plant" src="/art/sainfoin.svg" alt="" width={140} height={204} />
				<img className="shelf-plant" src="/art/clover.svg" alt="" width={124} height={180} />
			</span>
		</div>
	)
}
