import type { ReactNode } from "react"
import { Head, Html, Preview } from "react-email"
import type { Yard } from "../props"
import { color, gutter, type } from "../theme"

interface FrameProps {
	/** Title of the document, the same words as the subject. */
	title: string
	/** First line as the list of letters shows it. */
	preview: string
	/** Whose letter it is; the service itself writes the sign-in letters. */
	yard?: Yard
	/** What the letter is, at the right of the head: a number and a day. */
	about?: readonly string[]
	sentTo: string
	children: ReactNode
}

/** The sheet every letter is written on: head with double rule, rows (`<tr>`) as children, foot. */
export function Frame({ title, preview, yard, about = [], sentTo, children }: FrameProps) {
	return (
		<Html lang="en-US">
			<Head>
				<meta name="viewport" content="width=device-width, initial-scale=1" />
				<meta name="color-scheme" content="light only" />
				<meta name="supported-color-schemes" content="light only" />
				<title>{title}</title>
			</Head>
			<body style={{ margin: 0, padding: 0, background: color.wax, color: color.ink }}>
				<Preview useTitleTag={false}>{preview}</Preview>
				<table
					role="presentation"
					width="100%"
					cellPadding="0"
					cellSpacing="0"
					border={0}
					style={{ background: color.wax }}
				>
					<tbody>
						<tr>
							<td align="center">
								<table
									role="presentation"
									width="600"
									cellPadding="0"
									cellSpacing="0"
									border={0}
									style={{ width: "100%", maxWidth: "600px", background: color.sheet, textAlign: "left" }}
								>
									<tbody>
										<FrameHead name={yard?.name ?? "Waxbill"} about={about} />
										{children}
										<FrameFoot yard={yard} sentTo={sentTo} />
									</tbody>
								</table>
							</td>
						</tr>
					</tbody>
				</table>
			</body>
		</Html>
	)
}

function FrameHead({ name, about }: { name: string; about: readonly string[] }) {
	return (
		<tr>
			<td style={{ padding: `26px ${gutter}px 16px`, borderBottom: `3px double ${color.ink}` }}>
				<table role="presentation" width="100%" cellPadding="0" cellSpacing="0" border={0}>
					<tbody>
						<tr>
							<td style={type.yard}>{name}</td>
							{about.length > 0 && (
								<td
									align="right"
									style={{ ...type.small, lineHeight: "17px", whiteSpace: "nowrap", paddingLeft: "16px" }}
								>
									{about.map((line) => (
										<div key={line}>{line}</div>
									))}
								</td>
							)}
						</tr>
					</tbody>
				</table>
			</td>
		</tr>
	)
}

function FrameFoot({ yard, sentTo }: { yard?: Yard; sentTo: string }) {
	return (
		<tr>
			<td style={{ ...type.caption, padding: `14px ${gutter}px 20px`, background: color.wax }}>
				{yard && (
					<div>
						{yard.name}, {yard.address}. {yard.email}
					</div>
				)}
				<div>Sent with Waxbill to {sentTo}.</div>
			</td>
		</tr>
	)
}
