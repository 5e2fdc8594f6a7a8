import { redirect } from "react-router"
import { isDay } from "~/domain/calendar"
import { now } from "~/platform/clock.server"
import { findNextOpenDay } from "~/services/orders/find-order-sheet.server"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/next-sheet"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"
import { numberIn } from "./sheet.server"

export const meta: Route.MetaFunction = () => [{ title: "Order sheet · Waxbill" }]

/**
 * Goes to the sheet of the next delivery day that takes orders, on or after `from` where that is asked; `again` names an
 * order that it is to begin with.
 */
export const loader = guard(admits.store("buyer", "payer"), async ({ url, params }: Route.LoaderArgs, scope) => {
	const asked = url.searchParams.get("from")
	const from = asked !== null && isDay(asked) ? asked : undefined
	const { producer, store } = scope
	const day = await findNextOpenDay({
		producerId: producer.id,
		storeId: store.id,
		now: now(),
		zone: producer.timeZone,
		...(from ? { from } : {}),
	})
	const again = numberIn(url.searchParams, "again")
	const search = again === null ? "" : `?again=${again}`
	if (day !== null) throw redirect(`/buy/${params.producer}/${params.store}/sheet/${day}${search}`)
	return { frame: await findBuyFrame(scope, { part: "sheet" }), producerName: producer.name }
})

export default function NextSheet({ loaderData: { frame, producerName } }: Route.ComponentProps) {
	return (
		<BuyBook frame={frame}>
			<SheetHead title="Order sheet" />
			<EmptyLine>No delivery to you is planned. {producerName} can tell you when the van comes again.</EmptyLine>
		</BuyBook>
	)
}
