import type { ReactNode } from "react"
import { SkipLink } from "./book"
import { Brand } from "./masthead"

type PlainPageProps = { title: ReactNode; lead?: ReactNode; homeHref?: string; children?: ReactNode }

/** A page with one thing to do and no book around it: signing in, or what went wrong. */
export function PlainPage({ title, lead, homeHref = "/", children }: PlainPageProps) {
	return (
		<>
			<SkipLink />
			<div className="band">
				<header className="mast">
					<Brand to={homeHref} />
				</header>
			</div>
			<main className="plain-page" id="sheet" tabIndex={-1}>
				<h1 className="title">{title}</h1>
				{lead && <p className="lead">{lead}</p>}
				{children && <div className="mt-6">{children}</div>}
			</main>
		</>
	)
}
