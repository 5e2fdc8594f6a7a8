import { Form } from "react-router"
import { formatMoney } from "~/domain/money"
import { Button } from "~/ui/forms/button"
import { TextField } from "~/ui/forms/fields"
import { WordsField } from "~/ui/trace/words-field"
import { ReportLines, type ShownLine } from "./report-lines"

type AnswerFormProps = {
	storeName: string
	lines: readonly (ShownLine & { acceptable: AcceptablePieces })[]
	photosHref: string
	typed: Record<string, string> | null
	errors: readonly { field?: string; message: string }[]
	isBusy: boolean
}

/** The most pieces of a line that can be accepted, and what they come to with tax. */
type AcceptablePieces = { pieces: number; cents: number }

/** The producer's answer: pieces accepted line by line, and the sentence that goes to the store. */
export function AnswerForm({ storeName, lines, photosHref, typed, errors, isBusy }: AnswerFormProps) {
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	const acceptable = new Map(lines.map((line) => [line.id, line.acceptable]))
	const allCents = lines.reduce((sum, line) => sum + line.acceptable.cents, 0)
	return (
		<Form method="post" noValidate aria-label="Answer the report">
			<ReportLines
				lines={lines}
				photosHref={photosHref}
				beside={(line) => (
					<AcceptedField
						line={line}
						acceptable={acceptable.get(line.id)}
						typed={typed?.[`accepted-${line.id}`]}
						error={errorOf(`accepted-${line.id}`)}
					/>
				)}
			/>
			<div className="breakage-foot">
				<WordsField
					name="answer"
					label={`Your sentence to ${storeName}`}
					maxLength={1000}
					defaultValue={typed?.answer}
					hint="It stands in the letter. It may be left out only when all of it is credited."
					error={errorOf("answer")}
				/>
				<p className="note">
					All of it comes to {formatMoney(allCents)}. What is credited takes off the invoice first; the rest stays on
					the store’s account. The pieces go to waste by lot. A credit has its number for good and cannot be undone.
				</p>
				<div className="flex flex-wrap gap-3">
					<Button variant="primary" name="intent" value="accept" busy={isBusy} busyLabel="Issuing the credit">
						Credit these pieces and tell {storeName}
					</Button>
					<Button name="intent" value="decline">
						Credit nothing and say why
					</Button>
				</div>
			</div>
		</Form>
	)
}

function AcceptedField(field: {
	line: ShownLine
	acceptable: AcceptablePieces | undefined
	typed: string | undefined
	error: string | undefined
}) {
	const { line, acceptable, typed, error } = field
	const most = acceptable?.pieces ?? line.pieces
	return (
		<>
			<TextField
				name={`accepted-${line.id}`}
				label="Pieces to credit"
				inputMode="numeric"
				autoComplete="off"
				className="w-24"
				defaultValue={typed ?? String(most)}
				error={error}
			/>
			<p className="note">
				{most < line.pieces ? `at most ${most}, the others are credited` : `all ${most}`}:{" "}
				{formatMoney(acceptable?.cents ?? 0)}
			</p>
		</>
	)
}
