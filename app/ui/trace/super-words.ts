/** The hives whose supers went into a lot, yard by yard: "Weld Farm, hives 7, 9 and 10 (13 supers)". */
export function superWords(supers: readonly { hive: string; yard: string }[]): string {
	const yards = [...new Set(supers.map(({ yard }) => yard))]
	return yards
		.map((yard) => {
			const ofYard = supers.filter((one) => one.yard === yard)
			const hives = [...new Set(ofYard.map(({ hive }) => hive))]
			const names = hives.length === 1 ? hives[0] : `${hives.slice(0, -1).join(", ")} and ${hives.at(-1)}`
			const count = ofYard.length > hives.length ? ` (${ofYard.length} supers)` : ""
			return `${yard}, ${hives.length === 1 ? "hive" : "hives"} ${names}${count}`
		})
		.join("; ")
}
