import { Form } from "react-router"
import type { Role } from "~/domain/people/roles"
import { Button } from "~/ui/forms/button"
import { LedgerGroup, LedgerRow } from "~/ui/layout/ledger"
import { roleWords } from "./role-words"

type Named = { name: string; email: string; role: Role; storeName: string | null }

const whatFor = ({ role, storeName }: Named) =>
	storeName ? `${roleWords(role).name}, for ${storeName}` : roleWords(role).name

/** Who has a role now, each with the button that ends it. */
export function MemberRows({ members }: { members: (Named & { membershipId: string })[] }) {
	return (
		<LedgerGroup when="Here now">
			{members.map((member) => (
				<LedgerRow
					key={member.membershipId}
					name={member.name}
					line={`${whatFor(member)}, ${member.email}`}
					action={
						<OneButton
							intent="end"
							id={member.membershipId}
							words="End this role"
							about={`${member.name}, ${whatFor(member)}`}
						/>
					}
				/>
			))}
		</LedgerGroup>
	)
}

/** Who is invited and has not answered, each with the button that takes it back. */
export function WaitingRows({ waiting }: { waiting: (Named & { invitationId: string; until: string })[] }) {
	if (waiting.length === 0) return null
	return (
		<LedgerGroup when="Invited">
			{waiting.map((invitation) => (
				<LedgerRow
					key={invitation.invitationId}
					name={invitation.name}
					line={`${whatFor(invitation)}, ${invitation.email}; open until ${invitation.until}`}
					action={
						<OneButton
							intent="withdraw"
							id={invitation.invitationId}
							words="Take it back"
							about={`the invitation of ${invitation.name}, ${whatFor(invitation)}`}
						/>
					}
				/>
			))}
		</LedgerGroup>
	)
}

function OneButton({ intent, id, words, about }: { intent: string; id: string; words: string; about: string }) {
	return (
		<Form method="post" preventScrollReset>
			<input type="hidden" name="intent" value={intent} />
			<input type="hidden" name="id" value={id} />
			<Button aria-label={`${words}: ${about}`}>{words}</Button>
		</Form>
	)
}
