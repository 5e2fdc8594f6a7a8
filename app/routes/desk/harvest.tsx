import { randomUUID } from "node:crypto"
import { data, redirect } from "react-router"
import { z } from "zod"
import { type Day, dayInZone } from "~/domain/calendar"
import { now as askClock } from "~/platform/clock.server"
import { bringInHarvest, type LookedAt, lookAtHarvest } from "~/services/harvest/bring-in-harvest.server"
import { findHarvest } from "~/services/harvest/find-harvest.server"
import { findChosenSupers, findSupersToTakeOff, type HarvestProduct } from "~/services/harvest/find-harvest-page.server"
import { admits, type DeskScope, guard } from "../guard.server"
import type { Route } from "./+types/harvest"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { type FieldProblem, placeOf, readHarvest, typedIn } from "./harvest-form"
import { ChooseStep, CountStep, DoneStep, LookStep } from "./harvest-steps"

export const meta: Route.MetaFunction = () => [{ title: "Harvest · Waxbill" }]

/** The most supers that are brought in at once: their ids stand in the address of the page. */
const MOST_SUPERS = 120

const id = z.guid()

function chosenIn(url: URL): string[] {
	return [...new Set(url.searchParams.getAll("super").filter((one) => id.safeParse(one).success))]
}

export const loader = guard(admits.desk("owner", "desk", "packer"), async ({ url }: Route.LoaderArgs, scope) => {
	const { producer } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const frame = await findDeskFrame(scope, { part: "crop", now })
	const done = url.searchParams.get("done")
	if (done !== null) {
		const harvest = id.safeParse(done).success ? await findHarvest({ producerId: producer.id, harvestId: done }) : null
		if (!harvest) throw data(null, { status: 404 })
		return { frame, step: "done" as const, harvest }
	}
	const chosen = chosenIn(url)
	const yardId = id.safeParse(url.searchParams.get("yard")).data ?? null
	const choose = async (problem: string | null) => ({
		frame,
		step: "choose" as const,
		yardId,
		problem,
		...(await findSupersToTakeOff({ producerId: producer.id, yardId })),
	})
	if (chosen.length === 0) return choose(null)
	if (chosen.length > MOST_SUPERS) return choose(`Bring in at most ${MOST_SUPERS} supers at once.`)
	const products = await findChosenSupers({ producerId: producer.id, superIds: chosen, harvestedOn: today })
	if (products.length === 0) return choose("These supers have come off already.")
	const found = products.reduce((sum, { supers }) => sum + supers.length, 0)
	return { frame, step: "count" as const, today, products, gone: chosen.length - found, formKey: randomUUID() }
})

type Typed = Record<string, string>
type Answer = { typed: Typed; errors: FieldProblem[]; planned: LookedAt[] | null }

export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ request, url }: Route.ActionArgs, scope) => {
		const form = await request.formData()
		const typed = typedIn(form)
		const today = dayInZone(askClock(), scope.producer.timeZone)
		const answer = (more: Partial<Answer>, status = 200) =>
			data<Answer>({ typed, errors: [], planned: null, ...more }, { status })
		if (form.get("intent") === "count") return answer({})
		const key = id.safeParse(typed.key)
		const superIds = chosenIn(url).slice(0, MOST_SUPERS)
		if (!key.success || superIds.length === 0) {
			return answer({ errors: [{ message: "Choose the supers that came off first." }] }, 400)
		}
		const products = await findChosenSupers({ producerId: scope.producer.id, superIds, harvestedOn: today })
		const { written, problems } = readHarvest(typed, asWritten(products, superIds, typed))
		if (problems.length > 0) return answer({ errors: problems }, 400)
		return harvest(form.get("intent"), { typed, written, today, key: key.data, scope, page: url.pathname })
	},
)

/** The products counted: a form that is sent again finds its supers off, and is known by its key. */
function asWritten(products: HarvestProduct[], superIds: readonly string[], typed: Typed) {
	if (products.length > 0) return products
	const [productId] = Object.keys(typed).flatMap((name) => /^best-(.+)$/.exec(name)?.[1] ?? [])
	return productId ? [{ productId, grades: [], supers: superIds.map((one) => ({ id: one })) }] : []
}

type Harvest = {
	typed: Typed
	written: ReturnType<typeof readHarvest>["written"]
	today: Day
	key: string
	scope: DeskScope
	page: string
}

async function harvest(intent: unknown, { typed, written, today, key, scope, page }: Harvest) {
	const producerId = scope.producer.id
	if (intent !== "bring-in") {
		const looked = await lookAtHarvest({ ...written, producerId, today })
		if (!looked.ok) return data<Answer>({ typed, errors: looked.problems.map(placeOf), planned: null }, { status: 422 })
		return data<Answer>({ typed, errors: [], planned: looked.products })
	}
	const brought = await bringInHarvest({
		...written,
		producerId,
		personId: scope.person.id,
		today,
		note: (typed.note ?? "").trim().slice(0, 500),
		idempotencyKey: key,
	})
	if (brought.ok) throw redirect(`${page}?done=${brought.harvestId}`)
	const errors = brought.problems.map(placeOf)
	const isAboutCodes = errors.every(({ field }) => field?.startsWith("code-"))
	const looked = isAboutCodes ? await lookAtHarvest({ ...written, producerId, today }) : null
	return data<Answer>({ typed, errors, planned: looked?.ok ? looked.products : null }, { status: 422 })
}

export default function Harvest({ loaderData, actionData, params }: Route.ComponentProps) {
	const base = `/desk/${params.producer}`
	return (
		<DeskBook frame={loaderData.frame}>
			{loaderData.step === "choose" && <ChooseStep base={base} {...loaderData} />}
			{loaderData.step === "done" && <DoneStep base={base} harvest={loaderData.harvest} />}
			{loaderData.step === "count" &&
				(actionData?.planned ? (
					<LookStep products={loaderData.products} {...actionData} planned={actionData.planned} />
				) : (
					<CountStep {...loaderData} typed={actionData?.typed ?? {}} errors={actionData?.errors ?? []} />
				))}
		</DeskBook>
	)
}
