import type { ReactNode } from "react"
import { type Day, fullDay } from "~/domain/calendar"

type Certificate = {
	id: string
	number: string
	validUntil: Day
	state: "handed-in" | "accepted" | "refused"
	answer: string
	handedInBy: string
	handedInOn: Day
	decidedBy: string | null
}

/** How a certificate stands, in words. */
function certificateWords({ state, validUntil, answer, decidedBy }: Certificate, today: Day): ReactNode {
	if (state === "handed-in") return <>waits to be looked at; said to be good until {fullDay(validUntil)}</>
	if (state === "refused") {
		return (
			<span className="short">
				refused{decidedBy && ` by ${decidedBy}`}: {answer}
			</span>
		)
	}
	if (validUntil < today) return <span className="short">ran out on {fullDay(validUntil)}</span>
	return (
		<>
			accepted{decidedBy && ` by ${decidedBy}`}, good until {fullDay(validUntil)}
		</>
	)
}

/** All that a store has handed in, the latest first; `more` is what stands below each. */
export function CertificateRows({
	certificates,
	today,
	more,
}: {
	certificates: readonly Certificate[]
	today: Day
	more?: (certificate: Certificate) => ReactNode
}) {
	return (
		<ul className="store-part">
			{certificates.map((certificate) => (
				<li className="border-b border-rule py-3" key={certificate.id}>
					<b>{certificate.number}</b>, {certificateWords(certificate, today)}
					<span className="note block">
						Handed in by {certificate.handedInBy} on {fullDay(certificate.handedInOn)}.
					</span>
					{more?.(certificate)}
				</li>
			))}
		</ul>
	)
}
