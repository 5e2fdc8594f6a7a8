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

/** What may stand in when a product is short: up to two product numbers, the most welcome first. */
export function InsteadField({ product, values, errors }: Omit<StandingFieldProps, "kind">) {
	const name = `instead-${product.productId}`
	const id = fieldId(name)
	const error = errors[name]
	return (
		<span className="inline-grid max-w-40 gap-1">
			<input
				id={id}
				name={name}
				type="text"
				autoComplete="off"
				className="input w-25! px-2! desk:w-32!"
				placeholder="none"
				aria-label={`If ${product.name} is short, numbers of up to two products to take instead`}
				aria-invalid={error ? true : undefined}
				aria-describedby={describedBy(error ? `${id}-error` : undefined)}
				defaultValue={values[name] ?? ""}
			/>
			{error && <FieldError id={`${id}-error`}>{error}</FieldError>}
		</span>
	)
}

type DateFieldProps = {
	product: { productId: string; name: string }
	formId: string
	value: string
	error: string | undefined
}

/** Cases of one product on the one date that is being changed. */
export function DateField({ product, formId, value, error }: DateFieldProps) {
	const name = `on-${product.productId}`
	const id = fieldId(name)
	return (
		<span className="inline-grid gap-1">
			<input
				id={id}
				name={name}
				form={formId}
				type="text"
				inputMode="numeric"
				autoComplete="off"
				className="qty w-14!"
				aria-label={`Cases of ${product.name} on this date only`}
				aria-invalid={error ? true : undefined}
				aria-describedby={describedBy(error ? `${id}-error` : undefined)}
				defaultValue={value}
			/>
			{error && <FieldError id={`${id}-error`}>{error}</FieldError>}
		</span>
	)
}
