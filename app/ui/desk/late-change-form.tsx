import { Form, useNavigation } from "react-router"
import { plainMoney } from "~/domain/money"
import { Button } from "~/ui/forms/button"
import { TextField } from "~/ui/forms/fields"
import { WordsField } from "~/ui/trace/words-field"

type Line = {
	lineId: string
	code: string
	name: string
	askedCases: number
	givenCases: number
	caseCents: number
	isWeighed: boolean
}

type LateChangeProps = {
	lines: readonly Line[]
	storeName: string
	/** What was typed, by field, where it was refused. */
	values: Record<string, string>
	errors: Record<string, string>
}

/** Changes what was confirmed, until it is packed. Closed until it is wanted; open where it was refused. */
export function LateChangeForm({ lines, storeName, values, errors }: LateChangeProps) {
	const isSending = useNavigation().formMethod === "POST"
	const wasTyped = Object.keys(values).some((field) => field.startsWith("cases-"))
	return (
		<details className="late-change" open={wasTyped || undefined}>
			<summary>Change what was confirmed</summary>
			<Form method="post" noValidate>
				<p className="note">
					Fewer cases or a higher price wait until {storeName} accepts. More cases, up to what was asked, or a lower
					price hold at once, and a letter says so.
				</p>
				{lines.map((line) => (
					<fieldset className="late-line" key={line.lineId}>
						<legend>
							<span className="fig text-ink-faint">{line.code}</span> {line.name}
						</legend>
						<TextField
							name={`cases-${line.lineId}`}
							label={`Cases, ${line.askedCases} asked`}
							inputMode="numeric"
							autoComplete="off"
							defaultValue={values[`cases-${line.lineId}`] ?? String(line.givenCases)}
							error={errors[`cases-${line.lineId}`]}
						/>
						{line.isWeighed ? (
							<p className="note">Priced by weight: the scale decides what it costs.</p>
						) : (
							<TextField
								name={`price-${line.lineId}`}
								label="A case, in dollars"
								inputMode="decimal"
								autoComplete="off"
								defaultValue={values[`price-${line.lineId}`] ?? plainMoney(line.caseCents)}
								error={errors[`price-${line.lineId}`]}
							/>
						)}
					</fieldset>
				))}
				<WordsField
					name="change-reason"
					label="Why"
					hint={`${storeName} reads this.`}
					maxLength={500}
					defaultValue={values["change-reason"]}
					error={errors["change-reason"]}
				/>
				<Button name="intent" value="propose" busy={isSending} busyLabel="Sending">
					Change it and tell {storeName}
				</Button>
			</Form>
		</details>
	)
}
