import { data, Form, Link, redirect } from "react-router"
import { dayInZone, fullDay } from "~/domain/calendar"
import { formatMoney } from "~/domain/money"
import { differenceWords } from "~/domain/payments/stripe-difference"
import { listDifferences } from "~/services/payments/list-differences.server"
import { settleDifference } from "~/services/payments/settle-difference.server"
import { Button } from "~/ui/forms/button"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/stripe-differences"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Differences from Stripe · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async (_: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const found = await listDifferences({ producerId: producer.id })
	return {
		frame: await findDeskFrame(scope, { part: "invoices" }),
		differences: found.map(({ foundAt, ...one }) => ({ ...one, foundOn: dayInZone(foundAt, producer.timeZone) })),
	}
})

const uuid = /^[0-9a-f]{8}(-[0-9a-f]{4}){3}-[0-9a-f]{12}$/

export const action = guard(admits.desk("owner", "desk"), async ({ request, url }: Route.ActionArgs, scope) => {
	const differenceId = String((await request.formData()).get("difference") ?? "")
	if (!uuid.test(differenceId)) throw data(null, { status: 400 })
	await settleDifference({ producerId: scope.producer.id, differenceId, personId: scope.person.id })
	throw redirect(url.pathname)
})

export default function StripeDifferences({ loaderData, params }: Route.ComponentProps) {
	const { differences } = loaderData
	const base = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Differences from Stripe"
				lead="Every night what stands here is held beside what Stripe says. What could be put right by itself has been; this is left."
				action={<Link to={`${base}/payments`}>All payments</Link>}
			/>
			{differences.length === 0 ? (
				<EmptyLine>The two agree.</EmptyLine>
			) : (
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col" className="max-desk:hidden">
								Found
							</th>
							<th scope="col" className="max-desk:pl-4!">
								What differs
							</th>
							<th scope="col" className="num max-desk:hidden">
								Here
							</th>
							<th scope="col" className="num max-desk:hidden">
								At Stripe
							</th>
							<th scope="col" className="pr-4! desk:pr-8!">
								<span className="sr-only">Settle</span>
							</th>
						</tr>
					</thead>
					<tbody>
						{differences.map((one) => (
							<tr key={one.id}>
								<td className="max-desk:hidden">{fullDay(one.foundOn)}</td>
								<td className="max-desk:pl-4!">
									<b className="name">{differenceWords(one.kind)}</b>
									<span className="note block desk:hidden">
										{fullDay(one.foundOn)}: here {amountWords(one.ourCents)}, at Stripe {amountWords(one.theirCents)}.
									</span>
									<span className="note block">
										{one.detail}{" "}
										{one.paymentId ? (
											<Link to={`${base}/payments/${one.paymentId}`}>The payment</Link>
										) : (
											<span className="break-all">{one.stripeId}</span>
										)}
									</span>
								</td>
								<td className="money max-desk:hidden">{one.ourCents === null ? "" : formatMoney(one.ourCents)}</td>
								<td className="money max-desk:hidden">{one.theirCents === null ? "" : formatMoney(one.theirCents)}</td>
								<td className="pr-4! text-right desk:pr-8!">
									<Form method="post">
										<input type="hidden" name="difference" value={one.id} />
										<Button size="small">It is settled</Button>
									</Form>
								</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
		</DeskBook>
	)
}

const amountWords = (cents: number | null) => (cents === null ? "nothing" : formatMoney(cents))
