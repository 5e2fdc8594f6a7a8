import { Link, useLocation } from "react-router"
import { type Account, SignOut } from "./masthead"

export type Tab = { to: string; label: string; current: boolean }

const ON_THE_FOOT_BAR = 4

function TabLink({ to, label, current, className }: Tab & { className?: string }) {
	return (
		<Link className={className} to={to} aria-current={current ? "page" : undefined}>
			{label}
		</Link>
	)
}

/**
 * The parts of the book at the right edge of the sheet; below 1024 a foot bar of the first four and More, which opens
 * without a script. The tabs under More are in the page twice, and only the one that fits the width is shown or read.
 */
export function ThumbIndex({ tabs, account }: { tabs: readonly Tab[]; account?: Account }) {
	const { key } = useLocation()
	const later = tabs.slice(ON_THE_FOOT_BAR)
	return (
		<nav className="thumb" aria-label="Parts of the book">
			<ul className="thumb-tabs">
				{tabs.map((tab, index) => (
					<li key={tab.to} className={index < ON_THE_FOOT_BAR ? undefined : "thumb-later"}>
						<TabLink className="thumb-tab" {...tab} />
					</li>
				))}
				{(later.length > 0 || account) && (
					<li>
						{/* A new page starts with More shut. */}
						<details className="thumb-more" key={key}>
							<summary className={later.some((tab) => tab.current) ? "thumb-tab is-current" : "thumb-tab"}>
								More
							</summary>
							<ul className="thumb-slip">
								{later.map((tab) => (
									<li key={tab.to}>
										<TabLink {...tab} />
									</li>
								))}
								{account?.href && (
									<li>
										<Link to={account.href}>{account.name}</Link>
									</li>
								)}
								{account && (
									<li>
										<SignOut action={account.signOutAction} />
									</li>
								)}
							</ul>
						</details>
					</li>
				)}
			</ul>
		</nav>
	)
}
