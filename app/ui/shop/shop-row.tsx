import type { ReactNode } from "react"
import { Link } from "react-router"
import { HoneyDot, type HoneyTone } from "./honey-dot"

type ShopRowProps = {
	no?: ReactNode
	name: string
	href?: string
	/** Grade and weight of a piece: "Fancy, 8 oz". */
	detail: string
	honey?: { tone: HoneyTone; name: string }
	/** The address of a drawing or picture. It repeats the name, so it is not read out. */
	picture?: string
	price: string
	/** A fill strip with its words. */
	stock: ReactNode
	/** A stepper; or words where there is nothing to choose: "none for this day", "not yet". Left out where nothing is sold. */
	field?: ReactNode
}

/** One product in the shop, an item of a list. */
export function ShopRow({ no, name, href, detail, honey, picture, price, stock, field }: ShopRowProps) {
	return (
		<li className="shop-row">
			{no && <span className="row-no">{no}</span>}
			{picture && <img className="row-art" src={picture} alt="" width={60} height={54} loading="lazy" />}
			<span className="name">{href ? <Link to={href}>{name}</Link> : name}</span>
			<span className="row-detail note">
				{detail} {honey && <HoneyDot {...honey} />}
			</span>
			{stock}
			<span className="money">{price}</span>
			{field && <span className="row-field">{field}</span>}
		</li>
	)
}

/** What has been chosen and what it comes to, with the one button. Stays in sight on a phone. */
export function ShopTally({
	children,
	note,
	total,
	action,
}: {
	children: ReactNode
	note?: ReactNode
	total: string
	action: ReactNode
}) {
	return (
		<div className="shop-tally">
			<div>
				{children}
				{note && <p className="note">{note}</p>}
			</div>
			<b>{total}</b>
			{action}
		</div>
	)
}
