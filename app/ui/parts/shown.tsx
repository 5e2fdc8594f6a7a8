import type { ReactNode } from "react"

/** One kind of part, under its head. */
export function PartGroup({ title, children }: { title: string; children: ReactNode }) {
	return (
		<section className="grid gap-x-6 gap-y-4 border-b border-ink py-5 desk:grid-cols-[168px_minmax(0,1fr)]">
			<h2 className="head-italic">{title}</h2>
			<div className="grid min-w-0 gap-6">{children}</div>
		</section>
	)
}

/** States of a part, side by side. */
export function States({ children }: { children: ReactNode }) {
	return (
		<div className="grid grid-cols-[repeat(auto-fill,minmax(9.5rem,1fr))] items-start gap-x-6 gap-y-5">{children}</div>
	)
}

/** One state with its name below it. */
export function State({ caption, children }: { caption: ReactNode; children: ReactNode }) {
	return (
		<div className="min-w-0">
			{children}
			<p className="mt-2 text-note text-ink-soft">{caption}</p>
		</div>
	)
}
