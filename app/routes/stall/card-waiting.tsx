import { Form, Link, useNavigation } from "react-router"
import { Button } from "~/ui/forms/button"
import { MessageLine } from "~/ui/layout/sheet"
import { CardState } from "~/ui/stall/card-state"

/** What the reader does: asks for the card; is away; asks for another sale; asks for nothing any more. */
export type Reader = "asks" | "away" | "busy" | "off"

type CardWaitingProps = {
	figure: string
	/** The try that is on, or failed: sent with the next one, so that pressing twice is one try. */
	attempt: number
	/** The bank's reason; empty while no card was declined. */
	declined: string
	reader: Reader
	/** What could not be done just now. */
	problem: string | undefined
	totalsHref: string
}

const READER_WORDS: Record<Exclude<Reader, "asks">, { title: string; words: string }> = {
	away: {
		title: "The card reader does not answer.",
		words: "Nothing was charged. See that it is on, then try again, or take cash.",
	},
	busy: {
		title: "The card reader asks for another sale.",
		words: "Nothing was charged here. Finish that sale first, or take cash.",
	},
	off: { title: "The card reader asks for nothing now.", words: "Nothing was charged. Try the card again." },
}

/** An open card sale: what the reader does, and the ways on. */
export function CardWaiting({ figure, attempt, declined, reader, problem, totalsHref }: CardWaitingProps) {
	const navigation = useNavigation()
	const pressed = navigation.formMethod === "POST" ? navigation.formData?.get("intent") : null
	const isWaiting = !declined && reader === "asks"
	return (
		<>
			<CardWords declined={declined} reader={reader} problem={problem} />
			<CardState
				icon="card"
				words={isWaiting ? "Hold out the reader. It asks for" : "Still to be paid"}
				figure={figure}
			/>
			{reader === "busy" && !declined && (
				<p className="stall-words">
					<Link to={totalsHref}>See which sale is open</Link>
				</p>
			)}
			<Form method="post" className="stall-done">
				<input type="hidden" name="attempt" value={attempt} />
				{isWaiting ? (
					<Button name="intent" value="look" busy={pressed === "look"}>
						Look whether it is paid
					</Button>
				) : (
					<Button variant="primary" name="intent" value="again" busy={pressed === "again"}>
						Try the card again
					</Button>
				)}
				<div className="stall-ways">
					<Button name="intent" value="cash" busy={pressed === "cash"}>
						Take cash instead
					</Button>
					<Button name="intent" value="give-up" busy={pressed === "give-up"}>
						Give up the card
					</Button>
				</div>
			</Form>
		</>
	)
}

/** One thing at a time: what could not be done just now, else what the bank said, else what ails the reader. */
function CardWords({ declined, reader, problem }: Pick<CardWaitingProps, "declined" | "reader" | "problem">) {
	if (problem) return <MessageLine tone="problem" title={problem} />
	if (declined)
		return (
			<MessageLine tone="problem" title="The card was refused.">
				The bank says: “{declined}” Nothing was charged; the sale is still open.
			</MessageLine>
		)
	if (reader === "asks") return null
	const { title, words } = READER_WORDS[reader]
	return (
		<MessageLine tone="problem" title={title}>
			{words}
		</MessageLine>
	)
}
