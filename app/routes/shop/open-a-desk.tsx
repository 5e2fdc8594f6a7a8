import { data, Form, redirect } from "react-router"
import { z } from "zod"
import { openDesk } from "~/services/producers/open-desk.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { SelectField, TextField } from "~/ui/forms/fields"
import { PlainPage } from "~/ui/layout/plain-page"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/open-a-desk"
import { openDeskForm, TIME_ZONES } from "./open-a-desk-form"

export const meta: Route.MetaFunction = () => [{ title: "Open a desk · Waxbill" }]

export const loader = guard(admits.signedIn, () => null)

export const action = guard(admits.signedIn, async ({ request }: Route.ActionArgs, { person }) => {
	const typed = Object.fromEntries(
		[...(await request.formData())].map(([name, value]) => [name, typeof value === "string" ? value : ""]),
	)
	const refuse = (errors: Record<string, string | undefined>) => data({ typed, errors }, { status: 422 })
	const form = openDeskForm.safeParse(typed)
	if (!form.success) {
		const { fieldErrors } = z.flattenError(form.error)
		return refuse(Object.fromEntries(Object.entries(fieldErrors).map(([name, errors]) => [name, errors[0]])))
	}
	const opened = await openDesk({ person, ...form.data })
	if (!opened.ok) return refuse({ slug: "Another yard has this address. Choose another one." })
	return redirect(`/desk/${opened.slug}`)
})

const LABELS = ["name", "slug", "county", "timeZone"] as const

/** A new producer opens a desk; everything here can be changed later. */
export default function OpenADesk({ actionData }: Route.ComponentProps) {
	const field = (name: (typeof LABELS)[number]) => ({
		name,
		defaultValue: actionData?.typed[name],
		error: actionData?.errors[name],
	})
	const errors = LABELS.flatMap((name) => {
		const message = actionData?.errors[name]
		return message ? [{ field: name, message }] : []
	})
	return (
		<PlainPage
			title="Open a desk"
			lead="For a yard that sells comb honey. You become its owner, and invite the others."
		>
			{errors.length > 0 && <ErrorSummary errors={errors} />}
			<Form method="post" className="mt-4 grid gap-4" noValidate>
				<TextField {...field("name")} label="Name of the yard" autoComplete="organization" maxLength={80} />
				<TextField
					{...field("slug")}
					label="Its name in addresses"
					hint="Stands in the address of your shop and desk, such as /shop/larkmoor."
					autoCapitalize="none"
					spellCheck={false}
				/>
				<TextField {...field("county")} label="Town or county" />
				<SelectField {...field("timeZone")} label="Time zone" options={TIME_ZONES} />
				<div>
					<Button variant="primary" size="big">
						Open the desk
					</Button>
				</div>
			</Form>
		</PlainPage>
	)
}
