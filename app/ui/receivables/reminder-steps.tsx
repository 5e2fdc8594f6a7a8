import { Form } from "react-router"
import { previewOf } from "~/domain/receivables/reminder-preview"
import { BLANKS, stepWords } from "~/domain/receivables/reminders"
import { Button } from "~/ui/forms/button"
import { CheckField, SelectField, TextField } from "~/ui/forms/fields"
import { WordsField } from "~/ui/trace/words-field"

export type Step = { id: string; daysAfterDue: number; subject: string; body: string; isActive: boolean }
/** What was typed into a step's form, what is wrong with it, and whether it is only to be looked at. */
export type TypedStep = {
	typed: Record<string, string>
	errors: readonly { field?: string; message: string }[]
	preview: { subject: string; body: string } | null
}

const typedOf = (step: Step): Record<string, string> => ({
	days: String(Math.abs(step.daysAfterDue)),
	side: step.daysAfterDue < 0 ? "before" : "after",
	subject: step.subject,
	body: step.body,
	isActive: step.isActive ? "yes" : "",
})

/** One step: when it is written, in which words, and how it reads. Its form is folded away until it is wanted. */
export function ReminderStep({
	step,
	typed,
	yardName,
	isEditable,
}: {
	step: Step
	typed: TypedStep | null
	yardName: string
	isEditable: boolean
}) {
	const preview = typed?.preview ?? previewOf(step, yardName)
	return (
		<section className="store-part" aria-labelledby={`step-${step.id}`}>
			<h2 className="name" id={`step-${step.id}`}>
				{sentence(stepWords(step.daysAfterDue))}
				{!step.isActive && <span className="note"> rests</span>}
			</h2>
			<Letter letter={preview} />
			{isEditable && (
				<details open={typed !== null}>
					<summary className="cursor-pointer py-2 text-clover">Change it</summary>
					<StepForm id={step.id} begin={typedOf(step)} typed={typed} saveWords="Save this step" />
				</details>
			)}
		</section>
	)
}

/** The form of one more step. */
export function NewReminderStep({ id, typed }: { id: string; typed: TypedStep | null }) {
	return (
		<section className="store-part" aria-labelledby="new-step">
			<h2 className="name" id="new-step">
				One more step
			</h2>
			{typed?.preview && <Letter letter={typed.preview} />}
			<details open={typed !== null}>
				<summary className="cursor-pointer py-2 text-clover">Write one</summary>
				<StepForm
					id={id}
					begin={{ days: "14", side: "after", isActive: "yes" }}
					typed={typed}
					saveWords="Add this step"
				/>
			</details>
		</section>
	)
}

function Letter({ letter }: { letter: { subject: string; body: string } }) {
	return (
		<figure className="my-2">
			<figcaption className="note">How it reads, with a made-up store</figcaption>
			<div className="letter-preview">
				<b>{letter.subject}</b>
				{`\n\n${letter.body}`}
			</div>
		</figure>
	)
}

function StepForm({
	id,
	begin,
	typed,
	saveWords,
}: {
	id: string
	begin: Record<string, string>
	typed: TypedStep | null
	saveWords: string
}) {
	const field = (name: string) => ({
		name,
		// Several of these forms stand on a page.
		id: `field-${name}-${id}`,
		defaultValue: (typed ? typed.typed[name] : begin[name]) ?? "",
		error: typed?.errors.find((error) => error.field === name)?.message,
	})
	const { defaultValue: isActive, ...active } = field("isActive")
	const blanks = Object.entries(BLANKS).map(([name, words]) => `{${name}}: ${words}`)
	return (
		<Form method="post" noValidate className="grid max-w-[38rem] gap-4 pt-2" aria-label={saveWords}>
			<input type="hidden" name="stepId" value={id} />
			<div className="flex flex-wrap gap-4">
				<TextField label="Days" inputMode="numeric" autoComplete="off" {...field("days")} />
				<SelectField
					label="Before or after it falls due"
					options={[
						{ value: "before", label: "before" },
						{ value: "after", label: "after" },
					]}
					{...field("side")}
				/>
			</div>
			<TextField label="Subject" autoComplete="off" {...field("subject")} />
			<WordsField
				label="What the letter says"
				maxLength={2000}
				hint={`Blanks are filled in: ${blanks.join("; ")}.`}
				{...field("body")}
			/>
			<CheckField label="In use" {...active} value="yes" defaultChecked={isActive === "yes"} />
			<div className="flex flex-wrap gap-3">
				<Button name="intent" value="save-step">
					{saveWords}
				</Button>
				<Button variant="plain" name="intent" value="look">
					See how it reads
				</Button>
			</div>
		</Form>
	)
}

const sentence = (words: string) => words.charAt(0).toUpperCase() + words.slice(1)
