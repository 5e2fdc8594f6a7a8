import { Link } from "react-router"

/** The other pages of the crop, each with its words. */
export function CropLinks({ links }: { links: readonly { to: string; label: string }[] }) {
	return (
		<nav className="flex flex-wrap gap-x-5 gap-y-1 px-4 pb-3 desk:px-8" aria-label="More of the crop">
			{links.map(({ to, label }) => (
				<Link key={to} className="inline-block py-1" to={to}>
					{label}
				</Link>
			))}
		</nav>
	)
}
