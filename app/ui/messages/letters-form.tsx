import { LETTER_WORDS, letterKinds } from "~/domain/people/letters"
import { Button } from "~/ui/forms/button"
import { CheckField } from "~/ui/forms/fields"

/** Which letters a person wants, with what stays whatever is chosen. Stands inside a form. */
export function LettersForm({ off, email }: { off: readonly string[]; email: string }) {
	return (
		<fieldset className="letters-form">
			<legend>What Waxbill writes to {email}</legend>
			{letterKinds.map((kind) => (
				<CheckField
					key={kind}
					name="letters"
					id={`letters-${kind}`}
					value={kind}
					label={LETTER_WORDS[kind].name}
					hint={LETTER_WORDS[kind].holds}
					defaultChecked={!off.includes(kind)}
				/>
			))}
			<p className="note">
				This is for you alone. If nobody at your store takes a letter it goes to all of you, so that somebody knows;
				reminders then stay away. Sign-in codes and withdrawals always come.
			</p>
			<Button>Keep this choice</Button>
		</fieldset>
	)
}
