import { data, Form, Link, redirect } from "react-router"
import { accountsInOrder, OWN_CHART } from "~/domain/books/accounts"
import { findAccounts, setAccounts } from "~/services/books/set-accounts.server"
import { AccountFields } from "~/ui/books/account-fields"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { MarginNote, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/books-accounts"
import { readAccounts } from "./books-form"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Names of accounts · Waxbill" }]

export const loader = guard(admits.desk("owner"), async ({ url }: Route.LoaderArgs, scope) => ({
	frame: await findDeskFrame(scope, { part: "invoices" }),
	chart: await findAccounts({ producerId: scope.producer.id }),
	isSaved: url.searchParams.has("saved"),
}))

export const action = guard(admits.desk("owner"), async ({ request, url }: Route.ActionArgs, { producer, person }) => {
	const { names, typed, errors } = readAccounts(await request.formData())
	if (errors.length > 0) return data({ typed, errors }, { status: 422 })
	await setAccounts({ producerId: producer.id, personId: person.id, names })
	throw redirect(`${url.pathname}?saved`)
})

export default function BooksAccounts({ loaderData, actionData, params }: Route.ComponentProps) {
	const errors = actionData?.errors ?? []
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Names of accounts"
				lead={
					<>
						Number and name of each account as your bookkeeper has them.{" "}
						<Link to={`/desk/${params.producer}/books`}>Back to the books</Link>
					</>
				}
				note="Days that are closed keep the names that they were closed with."
			/>
			<ErrorSummary errors={errors} title="Nothing was saved" />
			{loaderData.isSaved && errors.length === 0 && <MessageLine tone="saved" title="Saved." />}
			<Form method="post" className="accounts-form" noValidate>
				<AccountFields
					accounts={accountsInOrder.map((account) => ({
						account,
						own: OWN_CHART[account],
						number: actionData?.typed[`number-${account}`] ?? loaderData.chart[account].number,
						name: actionData?.typed[`name-${account}`] ?? loaderData.chart[account].name,
					}))}
					errors={errors}
				/>
				<div className="sheet-part">
					<Button variant="primary">Save the names</Button>
					<MarginNote>Leave a name empty to go back to the one that it has by itself.</MarginNote>
				</div>
			</Form>
		</DeskBook>
	)
}
