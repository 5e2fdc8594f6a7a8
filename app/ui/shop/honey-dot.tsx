export type HoneyTone = "straw" | "light" | "amber" | "dark"

const GROUNDS: Record<HoneyTone, string> = {
	straw: "bg-honey-straw",
	light: "bg-honey-light",
	amber: "bg-honey-amber",
	dark: "bg-honey-dark",
}

/** The colour of a honey as a small edged dot with its name: "light straw". */
export function HoneyDot({ tone, name }: { tone: HoneyTone; name: string }) {
	return (
		<span className="ml-2 whitespace-nowrap">
			<span className={`honey-dot ${GROUNDS[tone]}`} /> {name}
		</span>
	)
}
