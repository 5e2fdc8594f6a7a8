import { describedBy, FieldError, fieldId } from "~/ui/forms/field-error"

type StandingFieldProps = {
	kind: "cases" | "least"
	product: { productId: string; name: string; detail: string }
	values: Readonly<Record<string, string>>
	errors: Readonly<Record<string, string>>
}

const LABELS = { cases: "Usual cases of", least: "Least you would take of" }

/** A field of the standing order: how much usually, or the least that is worth a delivery. */
export function StandingField({ kind, product, values, errors }: StandingFieldProps) {
	const name = `${kind}-${product.productId}`
	const id = fieldId(name)
	const error = errors[name]
	return (
		<span className="inline-grid max-w-40 justify-items-end gap-1">
			<input
				id={id}
				name={name}
				type="text"
				inputMode="numeric"
				autoComplete="off"
				className="qty w-14!"
				aria-label={`${LABELS[kind]} ${[product.name, product.detail].filter(Boolean).join(", ")}`}
				aria-invalid={error ? true : undefined}
				aria-describedby={describedBy(error ? `${id}-error` : undefined)}
				defaultValue={values[name] ?? ""}
				onFocus={(event) => event.currentTarget.select()}
			/>
			{error && <FieldError id={`${id}-error`}>{error}</FieldError>}
		</span>
	)
}
