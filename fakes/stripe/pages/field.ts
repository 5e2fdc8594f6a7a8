import { escapeHtml } from "./layout"

export type FieldSpec = { name: string; label: string; hint?: string; value: string; numeric?: boolean }

/** A field with its label, hint and error. */
// autocomplete is off so that no browser offers a real, saved card on a page that must never see one.
export function field(spec: FieldSpec, errors: Partial<Record<string, string>>): string {
	const { name, label, hint, value } = spec
	const error = errors[name]
	const described = [hint ? `${name}-hint` : "", error ? `${name}-error` : ""].filter(Boolean).join(" ")
	const attributes = [
		`id="${name}"`,
		`name="${name}"`,
		`value="${escapeHtml(value)}"`,
		'autocomplete="off"',
		spec.numeric ? 'inputmode="numeric"' : "",
		name === "email" ? 'type="email"' : 'type="text"',
		described ? `aria-describedby="${described}"` : "",
		error ? 'aria-invalid="true"' : "",
	].filter(Boolean)
	return `<div><label for="${name}">${label}${hint ? ` <span class="hint" id="${name}-hint">${hint}</span>` : ""}</label>
${error ? `<span class="wrong" id="${name}-error">${escapeHtml(error)}</span>` : ""}
<input ${attributes.join(" ")}></div>`
}
