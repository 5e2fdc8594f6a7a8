import { randomUUID } from "node:crypto"
import { data, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone, fullDay } from "~/domain/calendar"
import { piecesWords } from "~/domain/quantity"
import { now as askClock } from "~/platform/clock.server"
import { cutUpLot } from "~/services/lots/cut-up-lot.server"
import { findLotAtHand } from "~/services/lots/find-lot-at-hand.server"
import { findRegroupChoices } from "~/services/lots/find-regroup-choices.server"
import { mergeLots } from "~/services/lots/merge-lots.server"
import type { RegroupAnswer, RegroupQuery } from "~/services/lots/regroup-lots.server"
import { splitLot } from "~/services/lots/split-lot.server"
import { FilterLinks } from "~/ui/desk/filter-links"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { EmptyLine, SheetHead } from "~/ui/layout/sheet"
import { CutUpForm, MergeForm, SplitForm } from "~/ui/lots/regroup-forms"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/regroup"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"
import { type ReadRegroup, readRegroup } from "./regroup-form"

export const meta: Route.MetaFunction = ({ params }) => [{ title: `Regroup lot ${params.code} · Waxbill` }]

const WAYS = [
	{ value: "", label: "Split" },
	{ value: "merge", label: "Merge" },
	{ value: "cut-up", label: "Cut up" },
] as const

export const loader = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params, url }: Route.LoaderArgs, scope) => {
		const producerId = scope.producer.id
		const lot = await findLotAtHand({ producerId, code: params.code })
		if (!lot) throw data(null, { status: 404 })
		return {
			frame: await findDeskFrame(scope, { part: "lots" }),
			lot,
			choices: await findRegroupChoices({ producerId, code: params.code }),
			way: WAYS.find(({ value }) => value === url.searchParams.get("do"))?.value ?? "",
			formKey: randomUUID(),
		}
	},
)

export const action = guard(
	admits.desk("owner", "desk", "packer"),
	async ({ params, request }: Route.ActionArgs, scope) => {
		const form = await request.formData()
		const { producer, person } = scope
		const key = z.guid().safeParse(form.get("key"))
		const read = readRegroup(form, params.code)
		if (!key.success || !read.ok) {
			const errors = read.ok ? [{ message: "Open this page again and send the form once more." }] : read.errors
			return data({ typed: read.typed, errors }, { status: 400 })
		}
		const query = { producerId: producer.id, personId: person.id, newLotId: key.data, newCode: read.newCode }
		const answer = await regroup(read, query, { code: params.code, today: dayInZone(askClock(), producer.timeZone) })
		if (answer.ok) throw redirect(`/desk/${producer.slug}/lots/${answer.code}`)
		if (answer.reason === "no-such-lot") throw data(null, { status: 404 })
		const { field, message } = answer
		return data({ typed: read.typed, errors: [{ message, ...(field ? { field } : {}) }] }, { status: 422 })
	},
)

function regroup(
	{ ask }: Extract<ReadRegroup, { ok: true }>,
	query: RegroupQuery,
	{ code, today }: { code: string; today: string },
): Promise<RegroupAnswer> {
	if (ask.way === "merge") return mergeLots({ ...query, codes: [code, ...ask.withCodes] })
	if (ask.way === "cut-up") return cutUpLot({ ...query, ...ask, code, today })
	return splitLot({ ...query, code, pieces: ask.pieces })
}

export default function Regroup({ loaderData, actionData, params }: Route.ComponentProps) {
	const { lot, choices, way, formKey } = loaderData
	const errors = actionData?.errors ?? []
	const form = {
		formKey: actionData?.typed.key ?? formKey,
		typed: actionData?.typed ?? {},
		errorOf: (field: string) => errors.find((error) => "field" in error && error.field === field)?.message,
	}
	const words = [
		`${lot.productName}, ${lot.detail}${lot.grade ? `, ${lot.grade}` : ""}: ${piecesWords(lot.shelfPieces)} on the shelves,`,
		`best before ${fullDay(lot.bestBeforeOn)}, ${lot.state}.`,
	]
	const canRegroup = lot.state !== "withdrawn" && lot.shelfPieces > 0
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={`Regroup lot ${lot.code}`}
				lead={words.join(" ")}
				action={<Link to={`/desk/${params.producer}/lots/${lot.code}`}>Back to the lot</Link>}
			/>
			<ErrorSummary errors={errors} />
			{canRegroup ? (
				<>
					<FilterLinks label="What to do" name="do" chosen={way} options={WAYS} />
					{way === "" && <SplitForm lot={lot} {...form} />}
					{way === "merge" && <MergeForm lot={lot} lots={choices.lots} {...form} />}
					{way === "cut-up" && <CutUpForm lot={lot} products={choices.products} {...form} />}
				</>
			) : (
				<EmptyLine>
					{lot.state === "withdrawn"
						? "A withdrawn lot stays as it is."
						: "Nothing of this lot is left on the shelves."}
				</EmptyLine>
			)}
		</DeskBook>
	)
}
