import { data, Form, Link, type ShouldRevalidateFunctionArgs } from "react-router"
import { dayWords, isDay } from "~/domain/calendar"
import { casesWords } from "~/domain/quantity"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, MessageLine, SheetHead } from "~/ui/layout/sheet"
import { OrderSheet } from "~/ui/orders/order-sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/sheet"
import { BuyBook } from "./buy-book"
import { loadSheet, type SheetStart } from "./sheet.server"
import { answerSheet } from "./sheet-action.server"

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `Order for ${loaderData ? dayWords(loaderData.day) : "a day"} · Waxbill` },
]

export const loader = guard(admits.store("buyer", "payer"), ({ params, url }: Route.LoaderArgs, scope) =>
	loadSheet(scope, params.day, url.searchParams),
)

export const action = guard(
	admits.store("buyer", "payer"),
	async ({ request, params, url }: Route.ActionArgs, scope) => {
		if (!isDay(params.day)) throw data(null, { status: 404 })
		return answerSheet({ scope, day: params.day, url, form: await request.formData() })
	},
)

/**
 * A refusal reads the sheet again: what is free may have changed, which is often why it was refused. Keeping what is typed
 * reads nothing: figures that change under the typing hand would be taken unseen.
 */
export function shouldRevalidate({ actionStatus, formData, defaultShouldRevalidate }: ShouldRevalidateFunctionArgs) {
	if (formData?.get("intent") === "keep-quietly") return false
	return actionStatus === 422 || defaultShouldRevalidate
}

/** Says that a product was taken off the price list since the order was placed, so that its line does not go unseen. */
function goneWords(gone: number): string {
	if (gone === 0) return ""
	return gone === 1
		? " One line is left out: its product is no longer sold to you."
		: ` ${gone} lines are left out: their products are no longer sold to you.`
}

/** What the sheet was begun with, in a sentence; nothing for a blank one. */
function StartLine({ start }: { start: SheetStart }) {
	if (start.changes !== null) {
		return (
			<MessageLine tone="saved" title={`You are changing order ${start.changes}.`}>
				It stays as it is until you save it.{goneWords(start.gone)}
			</MessageLine>
		)
	}
	if (start.again !== null) {
		return (
			<MessageLine tone="saved" title={`This is what you asked for in order ${start.again}.`}>
				Nothing is ordered yet.{goneWords(start.gone)}
			</MessageLine>
		)
	}
	if (!start.draft) return null
	const { when, by } = start.draft
	return (
		<MessageLine
			tone="saved"
			title={by ? `${by} wrote last on this sheet ${when}.` : `You had begun this sheet ${when}.`}
			action={
				<Form method="post">
					<Button variant="plain" size="small" name="intent" value="afresh">
						Start afresh
					</Button>
				</Form>
			}
		>
			It is as {by ? "it was" : "you"} left{by ? "" : " it"}.
		</MessageLine>
	)
}

function sendWords(changes: number | null, moveTo: string | null): string {
	if (moveTo) return `Send for ${dayWords(moveTo)}`
	return changes === null ? "Send order" : "Save the change"
}

export default function Sheet({ loaderData, actionData, params }: Route.ComponentProps) {
	const { day, today, isOpen, closes, store, producerName, products, orders, nextOpenDay, start } = loaderData
	const base = `/buy/${params.producer}/${params.store}`
	const errors = actionData?.errors ?? {}
	// Written for a day that has closed meanwhile: the same sheet can go to the next one.
	const moveTo = actionData && !isOpen && start.changes === null ? nextOpenDay : null
	const receiving = [store.receivingNote, "Prices are your store’s, by the case."].filter(Boolean).join(" ")
	return (
		<BuyBook frame={loaderData.frame} ruled>
			{isOpen && !actionData && <StartLine start={start} />}
			{actionData?.told && <MessageLine tone="saved" title={actionData.told} />}
			<SheetHead
				title={`Order for ${dayWords(day)}`}
				lead={receiving}
				note={
					<>
						{isOpen ? (
							<>
								Last orders <b>{closes.words}</b>, in {closes.left}.
							</>
						) : (
							<>
								Last orders were <b>{closes.words}</b>. This delivery is fixed.
							</>
						)}
						{isOpen && store.isLookedAtFirst && (
							<span className="block">
								The yard will look at this order first. <Link to={`${base}/statement`}>Your statement</Link>
							</span>
						)}
						{orders
							.filter(({ number }) => number !== start.changes)
							.map((order) => (
								<span className="block" key={order.number}>
									You have asked for {casesWords(order.cases)}:{" "}
									<Link to={`${base}/orders/${order.number}`}>order {order.number}</Link>.
								</span>
							))}
					</>
				}
			/>
			<ErrorSummary
				title={start.changes === null ? "The order was not sent" : "The order was not changed"}
				errors={Object.entries(errors).map(([field, message]) => {
					const product = products.find((one) => field.endsWith(one.productId))
					const words = product ? `${product.code} ${product.name}: ${message}` : message
					return field === "" ? { message: words } : { field, message: words }
				})}
			/>
			{products.length === 0 ? (
				<EmptyLine>Nothing is for sale to you yet. {producerName} sets the prices of your store first.</EmptyLine>
			) : (
				<OrderSheet
					// A sheet that begins with something else is a new sheet: what was typed before is not carried over.
					key={`${start.key} ${actionData?.fill ?? ""}`}
					day={day}
					today={today}
					products={products}
					terms={store.terms}
					isClosed={!isOpen && moveTo === null}
					sheetPath={`${base}/sheet`}
					action={moveTo ? `${base}/sheet/${moveTo}` : undefined}
					isChange={start.changes !== null}
					idempotencyKey={actionData?.idempotencyKey ?? loaderData.idempotencyKey}
					values={actionData?.values ?? start.values}
					errors={errors}
					unmatched={actionData?.unmatched ?? []}
					elsewhere={actionData?.elsewhere ?? {}}
					showsLeast={actionData?.showsLeast ?? false}
					sendLabel={sendWords(start.changes, moveTo)}
				/>
			)}
		</BuyBook>
	)
}
