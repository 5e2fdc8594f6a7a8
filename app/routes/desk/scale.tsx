import { randomUUID } from "node:crypto"
import { data, redirect } from "react-router"
import { z } from "zod"
import { dayInZone, dayWords } from "~/domain/calendar"
import { refusalWords, shownWeight } from "~/domain/scale/net-contents-words"
import { samplingPlan, samplingWords } from "~/domain/scale/sampling-plan"
import { labelledOunces } from "~/domain/weight"
import { now } from "~/platform/clock.server"
import { findScalePage, type WeighedLot } from "~/services/scale/find-scale-page.server"
import { recordNetCheck } from "~/services/scale/record-net-check.server"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { SheetHead } from "~/ui/layout/sheet"
import { EarlierChecks } from "~/ui/scale/earlier-checks"
import { type TypedWeighing, WeighForm } from "~/ui/scale/weigh-form"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/scale"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { type FieldFault, fieldOfRefusal, readTyped, readWeighing } from "./scale-form"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Weigh lot ${params.code} · Waxbill` }]

const COLD_ROOM = admits.desk("owner", "desk", "packer")

/** What stands in a form that nobody has touched: the label of the product, and the pieces still on the shelves. */
function untouched(lot: WeighedLot): TypedWeighing {
	return {
		packages: `${lot.leftPieces || lot.piecesHarvested}`,
		inchPound: labelledOunces(lot.pieceNetGrams),
		metric: `${lot.pieceNetGrams}`,
		unit: "g",
		division: "",
		tareWeighed: "",
		tareEntered: "",
		weights: [],
		pasted: "",
		isSure: false,
		note: "",
	}
}

export const loader = guard(COLD_ROOM, async ({ params, url }: Route.LoaderArgs, scope) => {
	const after = url.searchParams.get("after")
	const page = await findScalePage({ producerId: scope.producer.id, code: params.code, after })
	if (!page) throw data(null, { status: 404 })
	return {
		frame: await findDeskFrame(scope, { part: "lots" }),
		lot: page.lot,
		checks: page.checks.map(({ average, unit, checkedOn, ...check }) => ({
			...check,
			on: dayWords(checkedOn),
			average: shownWeight(average, unit),
		})),
		next: page.next,
		untouched: untouched(page.lot),
		checkId: randomUUID(),
	}
})

export const action = guard(COLD_ROOM, async ({ request, params, url }: Route.ActionArgs, scope) => {
	const form = await request.formData()
	const { typed, faults } = await readTyped(form)
	const checkId = z.guid().safeParse(form.get("checkId"))
	if (!checkId.success) throw data(null, { status: 400 })
	const answer = (status: number, errors: FieldFault[], asks = false) =>
		data({ errors, typed, asks, checkId: checkId.data }, { status })
	// Another number of packages may ask for another number of fields: the form is drawn again, and nothing is judged.
	if (form.get("intent") === "plan") return answer(200, faults)
	if (faults.length > 0) return answer(422, faults)
	const weighing = readWeighing(typed)
	if (!weighing.ok) return answer(422, weighing.faults, weighing.asks)
	const recorded = await recordNetCheck({
		producerId: scope.producer.id,
		lotCode: params.code,
		checkId: checkId.data,
		personId: scope.person.id,
		checkedOn: dayInZone(now(), scope.producer.timeZone),
		input: weighing.input,
		note: weighing.note,
	})
	if (recorded.ok) throw redirect(`${url.pathname}/${recorded.checkId}`, 303)
	if (recorded.reason === "no-such-lot") throw data(null, { status: 404 })
	const message =
		recorded.reason === "more-than-harvested"
			? `Only ${recorded.pieces} pieces of this lot came off the hives. Write that number or fewer.`
			: refusalWords(recorded)
	return answer(422, [{ field: fieldOfRefusal(recorded.reason, typed), message }])
})

export default function Scale({ loaderData, actionData, params }: Route.ComponentProps) {
	const { lot, checks, next } = loaderData
	const typed = actionData?.typed ?? loaderData.untouched
	const errors = actionData?.errors ?? []
	const packages = /^\d{1,7}$/.test(typed.packages.trim()) ? Number(typed.packages) : lot.piecesHarvested
	const plan = samplingPlan(Math.max(1, packages))
	const here = `/desk/${params.producer}/lots/${encodeURIComponent(lot.code)}/scale`
	return (
		<DeskBook frame={loaderData.frame} ruled>
			<SheetHead
				title={`Weigh lot ${lot.code}`}
				lead={`${lot.productName}, ${lot.detail}. ${lot.piecesHarvested} pieces came off the hives, ${lot.leftPieces} are on the shelves.`}
				note="By the net-contents method of NIST Handbook 133. It is no official inspection; your weights-and-measures office decides."
			/>
			<ErrorSummary errors={errors} title="The lot was not judged" />
			<WeighForm
				typed={typed}
				errors={errors}
				asks={actionData?.asks ?? false}
				checkId={actionData?.checkId ?? loaderData.checkId}
				sample={plan.sample}
				tares={plan.tares}
				planWords={samplingWords(plan)}
			/>
			<EarlierChecks checks={checks} base={here} nextHref={next ? `${here}?after=${next}` : null} />
		</DeskBook>
	)
}
