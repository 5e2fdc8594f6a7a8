import { data, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { endPromotion, endStorePrice } from "~/services/pricing/end-special.server"
import { findOwnPrices } from "~/services/pricing/find-own-prices.server"
import { addPromotion, setStorePrice, setStoreTier } from "~/services/pricing/set-store-terms.server"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { OwnPriceForm, PromotionForm, StoreTierForm } from "~/ui/pricing/special-forms"
import { OwnPriceTable, PromotionTable } from "~/ui/pricing/special-tables"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/price-special"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { typedIn } from "./price-form"
import { type FieldError, readPromotion, readStorePrice, readStoreTier } from "./price-special-form"

export const meta: Route.MetaFunction = () => [{ title: "Stores’ own prices and promotions · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async ({ url }: Route.LoaderArgs, scope) => {
	const today = dayInZone(askClock(), scope.producer.timeZone)
	return {
		frame: await findDeskFrame(scope, { part: "prices" }),
		...(await findOwnPrices({ producerId: scope.producer.id, today })),
		today,
		isSaved: url.searchParams.has("saved"),
	}
})

const WORDS = {
	"not-known": "It is no longer there. Nothing was changed.",
	"in-the-past": "Choose today or a later day: what was in force is not changed.",
	"days-out-of-order": "The last day is before the first.",
} as const

/** Which price or promotion a button stands beside. Throws 400 where a form names none. */
function readId(form: FormData): string {
	const read = z.guid().safeParse(form.get("id"))
	if (!read.success) throw data(null, { status: 400 })
	return read.data
}

export const action = guard(admits.desk("owner", "desk"), async ({ request, url }: Route.ActionArgs, scope) => {
	const now = askClock()
	const today = dayInZone(now, scope.producer.timeZone)
	const by = { producerId: scope.producer.id, personId: scope.person.id, now, today }
	const form = await request.formData()
	const typed = typedIn(form)
	const refuse = (errors: FieldError[], status: number) => data({ typed, errors }, { status })
	const steps = {
		own: () => {
			const read = readStorePrice(typed, today)
			return read.ok ? setStorePrice({ ...by, ...read.price }) : read
		},
		promotion: () => {
			const read = readPromotion(typed, today)
			return read.ok ? addPromotion({ ...by, ...read.promotion }) : read
		},
		tier: () => {
			const read = readStoreTier(typed, today)
			return read.ok ? setStoreTier({ ...by, storeId: read.storeId, tierId: read.tierId }) : read
		},
		"end-own": () => endStorePrice({ ...by, id: readId(form) }),
		"end-promotion": () => endPromotion({ ...by, id: readId(form) }),
	}
	const intent = String(form.get("intent"))
	if (!Object.hasOwn(steps, intent)) return refuse([{ message: "Send one of the forms of this page." }], 400)
	const answer = await steps[intent as keyof typeof steps]()
	if (answer.ok) throw redirect(`${url.pathname}?saved`)
	if ("errors" in answer) return refuse([...answer.errors], 400)
	return refuse([{ message: WORDS[answer.reason] }], 422)
})

export default function PriceSpecial({ loaderData, actionData, params }: Route.ComponentProps) {
	const { own, promotions, stores, tiers, products, today, isSaved } = loaderData
	const errors: FieldError[] = actionData?.errors ?? []
	const typed: Record<string, string> = actionData?.typed ?? {}
	const field = (name: string, otherwise = "") => ({
		name,
		defaultValue: typed[name] ?? otherwise,
		error: errors.find((error) => error.field === name)?.message,
	})
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title="Stores’ own prices and promotions"
				lead="A store’s own price comes before its tier’s. Of several promotions on one day the largest comes off."
				action={<Link to={`/desk/${params.producer}/prices`}>Prices</Link>}
			/>
			<ErrorSummary errors={errors} />
			{isSaved && errors.length === 0 && <MessageLine tone="saved" title="Kept." />}
			<OwnPriceTable own={own} today={today} />
			<OwnPriceForm field={field} stores={stores} products={products} today={today} />
			<PromotionTable promotions={promotions} today={today} />
			<PromotionForm field={field} tiers={tiers} products={products} today={today} />
			<StoreTierForm field={field} stores={stores} tiers={tiers} />
		</DeskBook>
	)
}
