import { Form } from "react-router"
import { isStoreRole } from "~/domain/people/roles"
import { Button } from "~/ui/forms/button"
import { SelectField, TextField } from "~/ui/forms/fields"
import { rolesToGive } from "./people-form"
import { roleWords } from "./role-words"

/** What stood in the form when it was refused, by field. */
export type TypedInvitation = Record<string, string>

const roleOptions = [
	{ value: "", label: "Choose" },
	...rolesToGive.map((role) => ({
		value: role,
		label: isStoreRole(role) ? `${roleWords(role).name} (for a store)` : roleWords(role).name,
	})),
]

/** Invites one person by e-mail to one role. A refused form keeps what was typed. */
export function InvitePersonForm({
	stores,
	typed,
	errors,
}: {
	stores: { id: string; name: string }[]
	typed: TypedInvitation | null
	errors: readonly { field?: string; message: string }[]
}) {
	const errorOf = (field: string) => errors.find((error) => error.field === field)?.message
	return (
		<section className="px-4 py-6 desk:px-8" aria-labelledby="invite-head">
			<h2 className="name" id="invite-head">
				Invite someone
			</h2>
			<Form method="post" className="mt-3 grid gap-4" noValidate>
				<input type="hidden" name="intent" value="invite" />
				<TextField name="name" label="Name" autoComplete="off" defaultValue={typed?.name} error={errorOf("name")} />
				<TextField
					name="email"
					label="E-mail address"
					type="email"
					autoComplete="off"
					spellCheck={false}
					defaultValue={typed?.email}
					error={errorOf("email")}
				/>
				<SelectField
					name="role"
					label="What they are to do"
					options={roleOptions}
					defaultValue={typed?.role}
					error={errorOf("role")}
				/>
				<SelectField
					name="storeId"
					label="Store"
					hint="Only for those who buy for one."
					options={[{ value: "", label: "None" }, ...stores.map(({ id, name }) => ({ value: id, label: name }))]}
					defaultValue={typed?.storeId}
					error={errorOf("storeId")}
				/>
				<div>
					<Button variant="primary" size="big">
						Send the invitation
					</Button>
				</div>
			</Form>
		</section>
	)
}
