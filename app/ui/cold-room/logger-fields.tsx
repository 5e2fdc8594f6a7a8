import { type FormEvent, useState } from "react"
import { Button } from "~/ui/forms/button"
import { FieldError } from "~/ui/forms/field-error"
import { SelectField } from "~/ui/forms/fields"
import { PROBE_OPTIONS } from "./probe-words"

type Wrong = { field?: string; message: string }

type LoggerFormProps = {
	/** Where the form is posted. With the script it goes to `${action}.json`, which answers as data. */
	action: string
	proofId: string
	typed: Record<string, string>
	errors: readonly Wrong[]
	onErrors: (errors: Wrong[]) => void
	onTaken: (href: string) => void
}

/**
 * The form for a logger's file. The file is the last field, so that the server knows what to make of it when it comes.
 * Without the script the browser posts it; with it, the bytes sent are shown as they go.
 */
export function LoggerForm({ action, proofId, typed, errors, onErrors, onTaken }: LoggerFormProps) {
	const [sent, setSent] = useState<number | null>(null)
	const errorOf = (name: string) => errors.find(({ field }) => field === name)?.message
	const send = (event: FormEvent<HTMLFormElement>) => {
		event.preventDefault()
		const post = new XMLHttpRequest()
		post.open("POST", `${action}.json`)
		post.responseType = "json"
		setSent(0)
		post.upload.onprogress = ({ loaded, total }) => setSent(total > 0 ? loaded / total : 0)
		const fail = (message: string) => {
			setSent(null)
			onErrors([{ message }])
		}
		post.onload = () => {
			const answer = post.response as { href?: string; errors?: Wrong[] } | null
			if (answer?.href) return onTaken(answer.href)
			if (!answer?.errors) return fail("The file could not be read. Nothing was changed; try again.")
			setSent(null)
			onErrors(answer.errors)
		}
		post.onerror = () => fail("The file did not arrive. Nothing was changed; try again when there is signal.")
		post.send(new FormData(event.currentTarget))
	}
	const fileError = errorOf("file")
	return (
		<form className="cold-form" method="post" encType="multipart/form-data" action={action} onSubmit={send}>
			<input type="hidden" name="proofId" value={proofId} />
			<SelectField
				name="probe"
				label="Where the probe was"
				options={PROBE_OPTIONS}
				defaultValue={typed.probe ?? "air-cases"}
				error={errorOf("probe")}
			/>
			<SelectField
				name="unit"
				label="Degrees"
				defaultValue={typed.unit ?? ""}
				error={errorOf("unit")}
				options={[
					{ value: "", label: "As the file says" },
					{ value: "C", label: "°C" },
					{ value: "F", label: "°F" },
				]}
			/>
			<SelectField
				name="dates"
				label="Days are written"
				defaultValue={typed.dates ?? ""}
				error={errorOf("dates")}
				options={[
					{ value: "", label: "As the file shows" },
					{ value: "month-first", label: "Month first: 8/13/2026" },
					{ value: "day-first", label: "Day first: 13/8/2026" },
				]}
			/>
			<div className="field">
				<label className="field-label" htmlFor="field-file">
					The logger’s file
				</label>
				<input
					id="field-file"
					type="file"
					name="file"
					accept=".csv,.txt,.tsv,text/csv,text/plain"
					className="input"
					required
					aria-invalid={fileError ? true : undefined}
					aria-describedby={fileError ? "field-file-hint field-file-error" : "field-file-hint"}
				/>
				<span className="field-hint" id="field-file-hint">
					Text with a time and a temperature in each line, up to 200 MB.
				</span>
				{fileError && <FieldError id="field-file-error">{fileError}</FieldError>}
			</div>
			<div>
				<Button variant="primary" busy={sent !== null} busyLabel="Reading…">
					Read it and judge
				</Button>
				{sent !== null && (
					<p className="mt-2" role="status">
						<progress className="cold-progress" max={1} value={sent} aria-label="Sent" />{" "}
						{sent < 1 ? `${Math.floor(sent * 20) * 5} % sent and read` : "All sent; it is being judged."}
					</p>
				)}
			</div>
		</form>
	)
}
