import { color, type } from "../theme"
import { Row } from "./text"

interface Link {
	href: string
	words: string
}

/**
 * The one filled button of a letter, with a plain link beside it when there is a second thing to do. Two tables
 * standing side by side go under one another on a narrow screen without a style sheet.
 */
export function Button({ href, words, beside }: Link & { beside?: Link }) {
	return (
		<Row below={20}>
			<table role="presentation" align="left" cellPadding="0" cellSpacing="0" border={0}>
				<tbody>
					<tr>
						<td style={{ background: color.clover, borderRadius: "2px" }}>
							<a
								href={href}
								style={{ ...type.button, display: "inline-block", padding: "14px 24px", textDecoration: "none" }}
							>
								{words}
							</a>
						</td>
						<td data-skip-in-text style={{ width: "20px", fontSize: "1px" }}>
							&nbsp;
						</td>
					</tr>
				</tbody>
			</table>
			{beside && (
				<table role="presentation" align="left" cellPadding="0" cellSpacing="0" border={0}>
					<tbody>
						<tr>
							<td style={{ padding: "14px 0" }}>
								<a href={beside.href} style={type.link}>
									{beside.words}
								</a>
							</td>
						</tr>
					</tbody>
				</table>
			)}
		</Row>
	)
}
