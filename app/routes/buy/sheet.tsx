import { data, Link, redirect, type ShouldRevalidateFunctionArgs } from "react-router"
import { dayInZone, dayWords, isDay } from "~/domain/calendar"
import { casesWords } from "~/domain/quantity"
import { now } from "~/platform/clock.server"
import { placeOrder } from "~/services/orders/place-order.server"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { OrderSheet } from "~/ui/orders/order-sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/sheet"
import { BuyBook } from "./buy-book"
import { loadSheet, refusalWords } from "./sheet.server"
import { readSheet } from "./sheet-form"

export const meta: Route.MetaFunction = ({ loaderData }) => [
	{ title: `Order for ${loaderData ? dayWords(loaderData.day) : "a day"} · Waxbill` },
]

export const loader = guard(admits.store("buyer", "payer"), ({ params }: Route.LoaderArgs, scope) =>
	loadSheet(scope, params.day),
)

export const action = guard(admits.store("buyer", "payer"), async ({ request, params }: Route.ActionArgs, scope) => {
	const { producer, store, person } = scope
	if (!isDay(params.day)) throw data(null, { status: 404 })
	const posted = readSheet(await request.formData())
	if (!posted) throw data(null, { status: 400 })
	const refuse = (errors: Record<string, string>) =>
		data({ errors, values: posted.values, idempotencyKey: posted.idempotencyKey }, { status: 422 })
	if (Object.keys(posted.errors).length > 0) return refuse(posted.errors)

	const at = now()
	const zone = producer.timeZone
	const answer = await placeOrder({
		producerId: producer.id,
		storeId: store.id,
		person,
		zone,
		now: at,
		deliveryOn: params.day,
		lines: posted.lines,
		poNumber: posted.poNumber,
		note: posted.note,
		idempotencyKey: posted.idempotencyKey,
	})
	if (!answer.ok) return refuse(refusalWords(answer, { posted, zone, today: dayInZone(at, zone) }))
	throw redirect(`/buy/${producer.slug}/${store.slug}/orders/${answer.number}?sent`)
})

/** A refusal reads the sheet again: what is free may have changed, which is often why it was refused. */
export function shouldRevalidate({ actionStatus, defaultShouldRevalidate }: ShouldRevalidateFunctionArgs): boolean {
	return actionStatus === 422 || defaultShouldRevalidate
}

export default function Sheet({ loaderData, actionData, params }: Route.ComponentProps) {
	const { day, today, isOpen, closes, store, producerName, products, orders, nextOpenDay } = loaderData
	const base = `/buy/${params.producer}/${params.store}`
	const errors = actionData?.errors ?? {}
	// Written for a day that has closed meanwhile: the same sheet can go to the next one.
	const moveTo = actionData && !isOpen ? nextOpenDay : null
	const receiving = [store.receivingNote, "Prices are your store’s, by the case."].filter(Boolean).join(" ")
	return (
		<BuyBook frame={loaderData.frame} ruled>
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
						{orders.map((order) => (
							<span className="block" key={order.number}>
								You have asked for {casesWords(order.cases)}:{" "}
								<Link to={`${base}/orders/${order.number}`}>order {order.number}</Link>.
							</span>
						))}
					</>
				}
			/>
			<ErrorSummary
				title="The order was not sent"
				errors={Object.entries(errors).map(([field, message]) => {
					const product = products.find((one) => field === `cases-${one.productId}`)
					const words = product ? `${product.code} ${product.name}: ${message}` : message
					return field === "" ? { message: words } : { field, message: words }
				})}
			/>
			{products.length === 0 ? (
				<EmptyLine>Nothing is for sale to you yet. {producerName} sets the prices of your store first.</EmptyLine>
			) : (
				<OrderSheet
					// A new day is a new sheet: what was typed for another is not carried over.
					key={day}
					day={day}
					today={today}
					products={products}
					terms={store.terms}
					isClosed={!isOpen && moveTo === null}
					action={moveTo ? `${base}/sheet/${moveTo}` : undefined}
					idempotencyKey={actionData?.idempotencyKey ?? loaderData.idempotencyKey}
					values={actionData?.values ?? {}}
					errors={errors}
					sendLabel={moveTo ? `Send for ${dayWords(moveTo)}` : "Send order"}
				/>
			)}
		</BuyBook>
	)
}
