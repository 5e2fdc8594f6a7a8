import type { ReactNode } from "react"
import { color, gutter, type } from "../theme"

/** One row of the sheet; `above` and `below` are its padding in pixels. */
export function Row({ children, above = 0, below = 0 }: { children: ReactNode; above?: number; below?: number }) {
	return (
		<tr>
			<td style={{ padding: `${above}px ${gutter}px ${below}px` }}>{children}</td>
		</tr>
	)
}

/** The sentence that the letter is about. */
export function Title({ children }: { children: ReactNode }) {
	return (
		<Row above={30} below={8}>
			<h1 style={type.title}>{children}</h1>
		</Row>
	)
}

/** A paragraph under the title. */
export function Lead({ children }: { children: ReactNode }) {
	return (
		<Row below={22}>
			<p style={{ ...type.body, margin: 0 }}>{children}</p>
		</Row>
	)
}

/** The plain small print before the foot: one paragraph to each child string. */
export function Small({ lines }: { lines: readonly string[] }) {
	return (
		<Row above={14} below={30}>
			{lines.map((line) => (
				<p key={line} style={{ ...type.small, margin: 0 }}>
					{line}
				</p>
			))}
		</Row>
	)
}

/** The reason for something on the letter, right of a double propolis rule. */
export function Note({ children }: { children: ReactNode }) {
	return (
		<Row above={22} below={8}>
			<table role="presentation" width="100%" cellPadding="0" cellSpacing="0" border={0}>
				<tbody>
					<tr>
						<td style={{ ...type.note, borderLeft: `3px double ${color.propolisRule}`, padding: "2px 0 2px 16px" }}>
							{children}
						</td>
					</tr>
				</tbody>
			</table>
		</Row>
	)
}
