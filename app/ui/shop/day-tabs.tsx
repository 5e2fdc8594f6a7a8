import { useId } from "react"
import { Link } from "react-router"

type DayTabsProps = {
	/** What the days are for: "Pick up at". */
	label: string
	tabs: readonly { to: string; title: string; detail: string; current: boolean }[]
}

/** The days to choose from, as tabs on what is sold below. The chosen day is in the address. */
export function DayTabs({ label, tabs }: DayTabsProps) {
	const labelId = useId()
	return (
		<nav className="day-tabs" aria-labelledby={labelId}>
			<h2 className="head-italic" id={labelId}>
				{label}
			</h2>
			<ul>
				{tabs.map((tab) => (
					<li key={tab.to}>
						<Link to={tab.to} aria-current={tab.current ? "true" : undefined} preventScrollReset>
							<b>{tab.title}</b> {tab.detail}
						</Link>
					</li>
				))}
			</ul>
		</nav>
	)
}
