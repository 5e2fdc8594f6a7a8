import { Link } from "react-router"

/** The way through a list that pages by key: back to its start, and on. `next` is the key of what follows. */
export function ListPages({
	params,
	next,
	laterWords,
}: {
	params: Record<string, string>
	next: string | null
	laterWords: string
}) {
	const { after, ...filter } = params
	if (!after && !next) return null
	const search = (more: Record<string, string>) => `?${new URLSearchParams({ ...filter, ...more })}`
	return (
		<nav className="flex gap-6 px-4 py-4 desk:px-8" aria-label="Pages">
			{after && (
				<Link className="py-1" to={search({})}>
					Back to the first
				</Link>
			)}
			{next && (
				<Link className="py-1" to={search({ after: next })}>
					{laterWords}
				</Link>
			)}
		</nav>
	)
}
