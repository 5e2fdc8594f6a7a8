import { randomUUID } from "node:crypto"
import { data, Link, redirect, useNavigation } from "react-router"
import { formatMoney } from "~/domain/money"
import { creditByHand } from "~/services/credits/credit-by-hand.server"
import { findInvoiceLeft } from "~/services/credits/find-invoice-left.server"
import { CreditForm } from "~/ui/credits/credit-form"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/credit-new"
import { creditRefusal, readCreditForm } from "./credit-form"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Credit on invoice ${params.invoice} · Waxbill` }]

async function invoiceOf({ producer }: DeskScope, number: string) {
	const invoice = await findInvoiceLeft({ producerId: producer.id, number })
	if (!invoice) throw data(null, { status: 404 })
	return invoice
}

export const loader = guard(admits.desk("owner", "desk"), async ({ params }: Route.LoaderArgs, scope) => {
	const { storeName, leftCents, openCents, totalCents, lines } = await invoiceOf(scope, params.invoice)
	return {
		frame: await findDeskFrame(scope, { part: "invoices" }),
		storeName,
		leftCents,
		openCents,
		totalCents,
		lines,
		creditId: randomUUID(),
	}
})

export const action = guard(admits.desk("owner", "desk"), async ({ request, params }: Route.ActionArgs, scope) => {
	const { producer, person } = scope
	const { lines } = await invoiceOf(scope, params.invoice)
	const read = readCreditForm(await request.formData(), lines)
	const { typed, errors, head, wanted, wholeCents } = read
	if (errors.length > 0 || !head) return data({ errors, typed }, { status: 422 })
	const issued = await creditByHand({
		producer,
		invoiceNumber: params.invoice,
		...head,
		wanted,
		wholeCents,
		personId: person.id,
	})
	if (issued.ok) throw redirect(`/desk/${params.producer}/credits/${issued.number}?issued=1`)
	return data({ errors: creditRefusal(issued, read), typed }, { status: 422 })
})

export default function NewCredit({ loaderData, actionData, params }: Route.ComponentProps) {
	const { frame, storeName, leftCents, openCents, totalCents, lines, creditId } = loaderData
	const base = `/desk/${params.producer}`
	const isBusy = useNavigation().formMethod === "POST"
	const credited = totalCents - leftCents
	return (
		<DeskBook frame={frame}>
			<SheetHead
				title={`Credit on invoice ${params.invoice}`}
				lead={
					<>
						{storeName}, {formatMoney(totalCents)}
						{credited > 0 && `, ${formatMoney(credited)} of it credited before`}.{" "}
						{openCents > 0
							? `${formatMoney(openCents)} is still to pay: a credit takes it off first.`
							: "Nothing is open: a credit stays on the store’s account."}{" "}
						<Link to={`${base}/invoices/${params.invoice}`}>The invoice</Link>
					</>
				}
			/>
			<ErrorSummary title="No credit was issued" errors={actionData?.errors ?? []} />
			{leftCents === 0 ? (
				<EmptyLine>All of this invoice has been credited.</EmptyLine>
			) : (
				<CreditForm
					storeName={storeName}
					lines={lines}
					leftCents={leftCents}
					creditId={creditId}
					typed={actionData?.typed ?? null}
					errors={actionData?.errors ?? []}
					isBusy={isBusy}
				/>
			)}
		</DeskBook>
	)
}
