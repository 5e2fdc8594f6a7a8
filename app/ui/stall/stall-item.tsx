import type { ComponentProps } from "react"
import { Icon, PieceGlyph, type PieceName } from "~/ui/icons"
import { FillStrip } from "~/ui/stock/fill-strip"

/** From so few on, the words turn to propolis. */
const FEW = 2

type StallItemProps = {
	piece: PieceName
	/** One or two words: "Round", "Chunk jar". */
	name: string
	price: string
	/** Pieces that can still be sold, not counting those in this sale. */
	left: number
	inSale: number
	/** Name and value, or handlers, of the buttons: they submit the form unless handled. */
	add: ComponentProps<"button">
	fewer: ComponentProps<"button">
}

/** One product at the stall. The whole row adds one piece; pieces in this sale turn from solid to outlined. */
export function StallItem({ piece, name, price, left, inSale, add, fewer }: StallItemProps) {
	const isGone = left === 0 && inSale === 0
	return (
		<div className={["stall-item", inSale > 0 && "has", isGone && "gone"].filter(Boolean).join(" ")}>
			<PieceGlyph piece={piece} />
			<div className="words">
				<h2 className="name">{name}</h2>
				<p className="price">
					<span className="fig">{price}</span>
					<span className={left > 0 && left <= FEW ? "few" : undefined}>{left > 0 ? `${left} left` : "none left"}</span>
				</p>
				{!isGone && (
					<FillStrip
						runs={[
							{ state: "free", count: left },
							{ state: "promised", count: inSale },
						]}
						countsThrough
						label={`${left} left, ${inSale} in this sale`}
					/>
				)}
			</div>
			{inSale > 0 && (
				<>
					<button type="submit" {...fewer} className="fewer" aria-label={`One fewer ${name}`}>
						<Icon name="minus" size={26} />
					</button>
					<span className="count">{inSale}</span>
				</>
			)}
			{left > 0 && (
				<button type="submit" {...add} className="add" aria-label={`One more ${name}`}>
					<Icon name="plus" size={30} />
				</button>
			)}
		</div>
	)
}
