import { Link } from "react-router"

/** What a list can be narrowed to: one link each, the chosen one marked. Kept in the address of the page. */
export function FilterLinks({
	label,
	name,
	chosen,
	options,
	keep = {},
}: {
	label: string
	/** The name in the address; the option with the value "" leaves it out. */
	name: string
	chosen: string
	options: readonly { value: string; label: string }[]
	/** What else stays in the address. */
	keep?: Record<string, string>
}) {
	return (
		<nav className="flex flex-wrap gap-x-5 gap-y-1 px-4 pb-3 desk:px-8" aria-label={label}>
			{options.map((option) => (
				<Link
					key={option.value}
					className={
						option.value === chosen
							? "inline-block py-1 first-letter:uppercase font-semibold no-underline shadow-[inset_0_-2px_0_var(--color-clover)]"
							: "inline-block py-1 first-letter:uppercase"
					}
					aria-current={option.value === chosen ? "true" : undefined}
					to={`?${new URLSearchParams(option.value === "" ? keep : { ...keep, [name]: option.value })}`}
				>
					{option.label}
				</Link>
			))}
		</nav>
	)
}
