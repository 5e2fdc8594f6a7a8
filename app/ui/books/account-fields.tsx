import { ACCOUNT_WORDS, type AccountName, type BookAccountKey } from "~/domain/books/accounts"
import { FieldError, fieldId } from "~/ui/forms/field-error"

type Row = AccountName & { account: BookAccountKey; own: AccountName }

/** A number and a name for each account; what lies on it, and how it is called by itself, stands before them. */
export function AccountFields({
	accounts,
	errors,
}: {
	accounts: readonly Row[]
	errors: readonly { field: string; message: string }[]
}) {
	return (
		<table className="sheet-table">
			<thead>
				<tr>
					<th scope="col">What lies on it</th>
					<th scope="col">Number</th>
					<th scope="col">Name</th>
				</tr>
			</thead>
			<tbody>
				{accounts.map(({ account, own, number, name }) => (
					<tr key={account}>
						<th scope="row" id={`account-${account}`}>
							{ACCOUNT_WORDS[account]}
						</th>
						<td>
							<Field name={`number-${account}`} label={`Number of ${own.name}`} value={number} errors={errors} />
						</td>
						<td>
							<Field
								name={`name-${account}`}
								label={`Name of ${own.name}`}
								value={name}
								placeholder={own.name}
								errors={errors}
							/>
						</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

type FieldProps = {
	name: string
	label: string
	value: string
	placeholder?: string
	errors: readonly { field: string; message: string }[]
}

function Field({ name, label, value, placeholder, errors }: FieldProps) {
	const id = fieldId(name)
	const error = errors.find(({ field }) => field === name)?.message
	return (
		<>
			<input
				className="input w-full"
				id={id}
				name={name}
				aria-label={label}
				defaultValue={value}
				placeholder={placeholder}
				aria-invalid={error ? true : undefined}
				aria-describedby={error ? `${id}-error` : undefined}
			/>
			{error && <FieldError id={`${id}-error`}>{error}</FieldError>}
		</>
	)
}
