import type { ReactNode } from "react"

/** The id that a field has when none is given, so that a summary of errors can link to it. */
export const fieldId = (name: string) => `field-${name}`

/** Joins ids for `aria-describedby`; undefined when there is nothing to describe. */
export function describedBy(...ids: (string | false | undefined)[]): string | undefined {
	return ids.filter(Boolean).join(" ") || undefined
}

/** What is wrong with a field and what to do, in words. `id` is named by the field's `aria-describedby`. */
export function FieldError({ id, children }: { id: string; children: ReactNode }) {
	return (
		<span className="field-error" id={id}>
			{children}
		</span>
	)
}
