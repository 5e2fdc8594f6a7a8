import type { ReactNode } from "react"

/** A few sentences that belong to one part of a page: a caution, a reason, what to do next. Not a reply to an action. */
export function Notice({
	title,
	tone = "plain",
	children,
}: {
	title: string
	tone?: "plain" | "problem"
	children?: ReactNode
}) {
	return (
		<section className={tone === "problem" ? "notice problem" : "notice"}>
			<h2 className={tone === "problem" ? "name short" : "name"}>{title}</h2>
			{children}
		</section>
	)
}
