export type HoneyTone = "straw" | "light" | "amber" | "dark"

const GROUNDS: Record<HoneyTone, string> = {
	straw: "bg-honey-straw",
	light: "bg-honey-light",
	amber: "bg-honey-amber",
	dark: "bg-honey-dark",
}

/** The colour of a honey in words, as shop and label name it. */
export const HONEY_NAMES: Record<HoneyTone, string> = {
	straw: "light straw",
	light: "light amber",
	amber: "amber",
	dark: "dark amber",
}

/** The colour of a honey as a small edged dot with its name: "light straw". */
export function HoneyDot({ tone, name }: { tone: HoneyTone; name: string }) {
	return (
		<span className="ml-2 whitespace-nowrap">
			<span className={`honey-dot ${GROUNDS[tone]}`} /> {name}
		</span>
	)
}
