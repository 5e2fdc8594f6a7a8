const BROWSERS: [RegExp, string][] = [
	[/Edg\//, "Edge"],
	[/OPR\//, "Opera"],
	[/Firefox\//, "Firefox"],
	[/Chrome\//, "Chrome"],
	[/Safari\//, "Safari"],
]
const DEVICES: [RegExp, string][] = [
	[/iPhone/, "an iPhone"],
	[/iPad/, "an iPad"],
	[/Android/, "an Android device"],
	[/Windows/, "Windows"],
	[/Macintosh/, "a Mac"],
	[/Linux/, "Linux"],
]

/** A browser by its User-Agent, as its owner would name it: "Firefox on Windows". A guess; browsers may say anything. */
export function browserWords(userAgent: string): string {
	const browser = nameIn(BROWSERS, userAgent) ?? "A browser"
	const device = nameIn(DEVICES, userAgent)
	return device ? `${browser} on ${device}` : browser
}

function nameIn(names: [RegExp, string][], userAgent: string): string | undefined {
	return names.find(([pattern]) => pattern.test(userAgent))?.[1]
}
