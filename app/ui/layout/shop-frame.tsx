import type { ReactNode } from "react"
import { Link } from "react-router"
import { Mark } from "~/ui/icons"
import { SkipLink } from "./book"

type ShopFrameProps = {
	yardName: string
	/** Where the yard is: "Teasel County". */
	place?: string
	homeHref: string
	nav: readonly { to: string; label: string; current?: boolean }[]
	basket?: { to: string; label: string }
	/** Words at the foot, before Waxbill's own name. */
	foot?: ReactNode
	children: ReactNode
}

/** The public shop: the yard's own name leads, Waxbill stands at the foot. */
export function ShopFrame({ yardName, place, homeHref, nav, basket, foot, children }: ShopFrameProps) {
	return (
		<div className="shop">
			<SkipLink />
			<header className="shop-top">
				<Link className="shop-yard" to={homeHref}>
					{yardName}
				</Link>
				{place && <span className="shop-place">{place}</span>}
				<nav aria-label="Shop">
					{nav.map((item) => (
						<Link key={item.to} to={item.to} aria-current={item.current ? "page" : undefined}>
							{item.label}
						</Link>
					))}
				</nav>
				{basket && (
					<Link className="shop-basket" to={basket.to}>
						{basket.label}
					</Link>
				)}
			</header>
			<main className="flex flex-1 flex-col" id="sheet" tabIndex={-1}>
				{children}
			</main>
			<footer className="shop-foot">
				{foot}
				<span className="flex items-center gap-2">
					<Mark size={21} /> Waxbill, the order desk for comb honey
				</span>
			</footer>
		</div>
	)
}

/** An opened book: the left page explains, the right page sells. On a phone the selling comes after the first words. */
export function ShopSpread({ verso, children }: { verso: ReactNode; children: ReactNode }) {
	return (
		<div className="shop-spread">
			<div className="shop-verso">{verso}</div>
			<div className="shop-recto">{children}</div>
		</div>
	)
}
