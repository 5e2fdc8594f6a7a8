import { Link } from "react-router"
import { type Day, dayInZone, dayWords, timeWords } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { listSharings, type OpenSharing } from "~/services/sharing/list-sharings.server"
import { countHead } from "~/ui/desk/number-words"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { OpenSharings, type SharingDay } from "~/ui/sharing/open-sharings"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/sharing"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Sharing out · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async (_: Route.LoaderArgs, scope) => {
	const now = askClock()
	const { id: producerId, timeZone: zone, slug } = scope.producer
	const open = await listSharings({ producerId, now, zone })
	return {
		frame: await findDeskFrame(scope, { part: "sharing", now }),
		days: sharingDays(open, { now, zone, base: `/desk/${slug}/sharing` }),
	}
})

function sharingDays(open: readonly OpenSharing[], at: { now: Date; zone: string; base: string }): SharingDay[] {
	const days = new Map<Day, SharingDay>()
	for (const one of open) {
		const note = cutoffNote(one.cutoffAt, at)
		const day = days.get(one.deliveryOn) ?? { when: dayWords(one.deliveryOn), rows: [], ...(note ? { note } : {}) }
		days.set(one.deliveryOn, day)
		const short = Math.max(0, one.askedCases - one.supply)
		const asked = `${countHead(one.orders)} ${one.orders === 1 ? "order asks" : "orders ask"} for ${one.askedCases}`
		day.rows.push({
			to: `${at.base}/${encodeURIComponent(one.productCode)}/${one.deliveryOn}`,
			name: one.productName,
			line: short > 0 ? `${asked}; ${one.supply} can be ready.` : `${asked}, and all of it can be ready now.`,
			supply: Math.min(one.supply, one.askedCases),
			short,
		})
	}
	return [...days.values()]
}

/** Whether the day is still open to orders: what is shared out before may be asked for again. */
function cutoffNote(cutoffAt: Date | null, { now, zone }: { now: Date; zone: string }): string | null {
	if (cutoffAt === null) return null
	if (cutoffAt <= now) return "Orders for this day are closed."
	return `Last orders are ${dayWords(dayInZone(cutoffAt, zone))}, ${timeWords(cutoffAt, zone)}. Until then stores can change what they ask.`
}

/** What must be shared out, in order of the hour. */
export default function SharingList({ loaderData, params }: Route.ComponentProps) {
	const { days } = loaderData
	return (
		<DeskBook frame={loaderData.frame} ruled>
			<SheetHead title="Sharing out" lead="Where stores ask for more than can be ready, the nearest delivery first." />
			{days.length === 0 ? (
				<EmptyLine action={<Link to={`/desk/${params.producer}/orders`}>See the orders</Link>}>
					Nothing is short: all that stores ask for can be ready.
				</EmptyLine>
			) : (
				<OpenSharings days={days} />
			)}
		</DeskBook>
	)
}
