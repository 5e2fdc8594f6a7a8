import { useEffect, useRef } from "react"
import { fieldId } from "./field-error"

type ErrorSummaryProps = {
	title?: string
	/** One entry for each wrong field; `field` is the field's name, left out for what concerns the whole form. */
	errors: readonly { field?: string; message: string }[]
	/** The id of a field, where it is not the one that its name gives. */
	idOf?: (field: string) => string
}

/** All that is wrong with a form, at its top, each with a link to its field. Takes the focus whenever it is new. */
export function ErrorSummary({ title = "Please look at this again", errors, idOf = fieldId }: ErrorSummaryProps) {
	const box = useRef<HTMLElement>(null)
	const shown = errors.map((error) => `${error.field}: ${error.message}`).join("\n")
	useEffect(() => {
		if (shown) box.current?.focus()
	}, [shown])
	if (errors.length === 0) return null
	return (
		<section className="error-summary" role="alert" tabIndex={-1} ref={box}>
			<h2 className="name">{title}</h2>
			<ul>
				{errors.map(({ field, message }) => (
					<li key={`${field}: ${message}`}>{field ? <a href={`#${idOf(field)}`}>{message}</a> : message}</li>
				))}
			</ul>
		</section>
	)
}
