import { Form, useNavigation } from "react-router"
import { Button } from "~/ui/forms/button"
import { WordsField } from "~/ui/trace/words-field"

/** Writes to the other side about an order. `messageKey` is made with the page: sending it twice is one message. */
export function MessageForm({
	to,
	messageKey,
	value,
	error,
}: {
	to: string
	messageKey: string
	value?: string
	error?: string
}) {
	const navigation = useNavigation()
	const isSending = navigation.formMethod === "POST" && navigation.formData?.get("intent") === "write"
	return (
		<Form method="post" className="message-form" noValidate preventScrollReset key={messageKey}>
			<input type="hidden" name="messageKey" value={messageKey} />
			<WordsField
				name="body"
				label={`Write to ${to}`}
				hint="It goes by letter too, and stays with the order."
				error={error}
				defaultValue={value}
				maxLength={2000}
			/>
			<Button name="intent" value="write" busy={isSending} busyLabel="Sending">
				Send the message
			</Button>
		</Form>
	)
}
