import { data, Form, redirect, useNavigation } from "react-router"
import { dayInZone, fullDay } from "~/domain/calendar"
import { findVisit } from "~/services/payments/find-visit.server"
import { findWayToPay } from "~/services/payments/find-way-to-pay.server"
import { keepMethod } from "~/services/payments/keep-method.server"
import { removeMethod, setAutomatic } from "~/services/payments/set-method.server"
import { Button } from "~/ui/forms/button"
import { CheckField } from "~/ui/forms/fields"
import { PaymentOnItsWay } from "~/ui/invoicing/payment-on-its-way"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/payment-method"
import { BuyBook } from "./buy-book"
import { findBuyFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Way to pay · Waxbill" }]

export const loader = guard(admits.store("payer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer, store } = scope
	const ofStore = { producerId: producer.id, storeId: store.id }
	// The visit first: where it is done, what was kept is there.
	const visit = await findVisit({ ...ofStore, visitId: url.searchParams.get("kept") })
	const { agreedAt, ...way } = await findWayToPay(ofStore)
	return {
		frame: await findBuyFrame(scope, { part: "invoices" }),
		producerName: producer.name,
		storeName: store.name,
		...way,
		agreedOn: agreedAt && dayInZone(agreedAt, producer.timeZone),
		isBeingKept: visit?.kind === "keep-method" && visit.state === "open",
		isJustKept: visit?.state === "paid" && way.keptWords !== "",
		done: url.searchParams.get("done"),
	}
})

export const action = guard(admits.store("payer"), async ({ request, url }: Route.ActionArgs, scope) => {
	const { producer, store, person } = scope
	const form = await request.formData()
	const query = { producerId: producer.id, storeId: store.id, personId: person.id }
	switch (form.get("intent")) {
		case "keep-card":
		case "keep-account": {
			const method = form.get("intent") === "keep-card" ? "card" : "bank-debit"
			const started = await keepMethod({ producer, store, person, method })
			if (started.ok) throw redirect(started.url)
			return data({ problem: "The payment service does not answer. Try again in a few minutes." }, { status: 503 })
		}
		case "remove":
			await removeMethod(query)
			throw redirect(`${url.pathname}?done=removed`)
		case "automatic": {
			const isOn = form.get("automatic") !== null
			const set = await setAutomatic({ ...query, isOn })
			if (!set.ok) return data({ problem: "Keep a card or a bank account first." }, { status: 409 })
			throw redirect(`${url.pathname}?done=${isOn ? "agreed" : "ended"}`)
		}
		default:
			throw data(null, { status: 400 })
	}
})

const DONE: Record<string, string> = {
	removed: "It is forgotten. Nothing is taken from it any more.",
	agreed: "What falls due from today on is taken by itself.",
	ended: "Nothing is taken by itself any more.",
}

export default function PaymentMethod({ loaderData, actionData }: Route.ComponentProps) {
	const { keptWords, isBeingKept, isJustKept, done, producerName, storeName } = loaderData
	const isBusy = useNavigation().formMethod === "POST"
	return (
		<BuyBook frame={loaderData.frame}>
			{actionData && (
				<MessageLine tone="problem" title="Nothing was changed.">
					{actionData.problem}
				</MessageLine>
			)}
			{isBeingKept && <PaymentOnItsWay what="kept" />}
			{isJustKept && !done && <MessageLine tone="saved" title={`Your ${keptWords} is kept.`} />}
			{done && DONE[done] && !actionData && <MessageLine tone="saved" title={DONE[done]} />}
			<SheetHead
				title="Way to pay"
				lead={
					keptWords === ""
						? `${storeName} keeps no card and no bank account.`
						: `${storeName} keeps a ${keptWords}: the payment page offers it.`
				}
			/>
			<div className="pay-foot">
				{keptWords !== "" && <Automatic loaderData={loaderData} />}
				<p className="note">
					Numbers are typed on the page of the payment service and kept there; {producerName} sees the last four digits
					alone. Nothing is charged when you keep one.
				</p>
				<Form method="post" className="flex flex-wrap gap-3">
					<Button name="intent" value="keep-card" variant={keptWords === "" ? "primary" : "second"} busy={isBusy}>
						{keptWords === "" ? "Keep a card" : "Keep another card instead"}
					</Button>
					<Button name="intent" value="keep-account" busy={isBusy}>
						{keptWords === "" ? "Keep a bank account" : "Keep a bank account instead"}
					</Button>
					{keptWords !== "" && (
						<Button name="intent" value="remove" variant="plain">
							Forget the {keptWords}
						</Button>
					)}
				</Form>
			</div>
		</BuyBook>
	)
}

function Automatic({ loaderData }: Pick<Route.ComponentProps, "loaderData">) {
	const { keptWords, isAutomatic, agreedBy, agreedOn, producerName } = loaderData
	return (
		<Form method="post" className="grid gap-3" key={String(isAutomatic)}>
			<CheckField
				name="automatic"
				label={`${producerName} may take each invoice from our ${keptWords} by itself on the day it is due`}
				hint={
					isAutomatic && agreedBy && agreedOn
						? `${agreedBy} agreed to it on ${fullDay(agreedOn)}.`
						: "From today on; what was due before, you pay yourselves. You get a receipt each time. If the bank refuses, a letter says so and nothing is tried again by itself. Take the tick away to end it at any time."
				}
				defaultChecked={isAutomatic}
			/>
			<div>
				<Button name="intent" value="automatic" variant="primary">
					Save
				</Button>
			</div>
		</Form>
	)
}
