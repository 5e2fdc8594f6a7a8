import { data, redirect } from "react-router"
import { z } from "zod"
import { dayInZone, dayWords } from "~/domain/calendar"
import { endMembership } from "~/services/people/end-membership.server"
import { type InviteRefusal, invitePerson } from "~/services/people/invite-person.server"
import { listPeople } from "~/services/people/list-people.server"
import { withdrawInvitation } from "~/services/people/withdraw-invitation.server"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { waitWords } from "../auth/sign-in-fields"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/people"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { invitationForm } from "./people-form"
import { InvitePersonForm, type TypedInvitation } from "./people-invite"
import { MemberRows, WaitingRows } from "./people-rows"

export const meta: Route.MetaFunction = () => [{ title: "People · Waxbill" }]

export const loader = guard(admits.desk("owner"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const people = await listPeople(producer.id)
	const waiting = people.waiting.map(({ expiresAt, ...invitation }) => ({
		...invitation,
		until: dayWords(dayInZone(expiresAt, producer.timeZone)),
	}))
	const frame = await findDeskFrame(scope, { part: "people" })
	// Only what the list bears out is said, whatever stands in the address.
	const invited = waiting.find(({ email }) => email === url.searchParams.get("invited"))?.email ?? null
	return { frame, ...people, waiting, invited }
})

export const action = guard(admits.desk("owner"), async ({ request, url }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const intent = form.get("intent")
	if (intent === "invite") return invite(form, scope, url.pathname)
	const id = z.guid().safeParse(form.get("id"))
	if (!id.success) throw data(null, { status: 404 })
	if (intent === "withdraw") {
		await withdrawInvitation(scope.producer.id, scope.person.id, id.data)
		throw redirect(url.pathname)
	}
	if (intent !== "end") throw data(null, { status: 400 })
	const ended = await endMembership(scope.producer.id, scope.person.id, id.data)
	if (ended.ok) throw redirect(url.pathname)
	if (ended.reason === "not-found") throw data(null, { status: 404 })
	const message = "This is the only owner. Invite another and wait until they have accepted; then you can end this one."
	return data({ errors: [{ message }], typed: null }, { status: 409 })
})

async function invite(form: FormData, { producer, person }: DeskScope, page: string) {
	const typed: TypedInvitation = Object.fromEntries(
		["email", "name", "role", "storeId"].map((name) => [name, String(form.get(name) ?? "")]),
	)
	const parsed = invitationForm.safeParse(typed)
	const refuse = (status: number, ...errors: { field?: string; message: string }[]) =>
		data({ errors, typed }, { status })
	if (!parsed.success) {
		return refuse(400, ...parsed.error.issues.map(({ path, message }) => ({ field: String(path[0]), message })))
	}
	const invited = await invitePerson(producer, person, parsed.data)
	if (!invited.ok) return refuse(invited.reason === "too-many" ? 429 : 409, refusalWords(invited))
	throw redirect(`${page}?${new URLSearchParams({ invited: parsed.data.email })}`)
}

function refusalWords(refusal: InviteRefusal): { field?: string; message: string } {
	if (refusal.reason === "no-such-store") return { field: "storeId", message: "Choose a store of the list." }
	if (refusal.reason === "has-role-already")
		return { field: "email", message: "Whoever has this address does that already." }
	return { message: `Too many invitations were sent. You can go on ${waitWords(refusal.retryAfterSeconds)}.` }
}

export default function People({ loaderData, actionData }: Route.ComponentProps) {
	const { members, waiting, stores, invited } = loaderData
	const errors = actionData?.errors ?? []
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead title="People" lead="Who works at the desk, the cold room and the stall, and who buys for a store." />
			<ErrorSummary errors={errors} />
			{invited !== null && errors.length === 0 && (
				<MessageLine tone="saved" title={`The invitation to ${invited} is on its way.`}>
					It is good for two weeks.
				</MessageLine>
			)}
			<MemberRows members={members} />
			<WaitingRows waiting={waiting} />
			<InvitePersonForm stores={stores} typed={actionData?.typed ?? null} errors={errors} />
		</DeskBook>
	)
}
