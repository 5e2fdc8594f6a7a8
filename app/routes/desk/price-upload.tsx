import { data, Form, Link, redirect } from "react-router"
import { z } from "zod"
import { dayInZone, isDay } from "~/domain/calendar"
import type { PriceChange } from "~/domain/pricing/compare-prices"
import { now as askClock } from "~/platform/clock.server"
import { type NamedPreview, previewPriceList } from "~/services/pricing/preview-price-list.server"
import { setPrices } from "~/services/pricing/set-prices.server"
import { Button } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { FieldError } from "~/ui/forms/field-error"
import { MessageLine, SheetHead } from "~/ui/layout/sheet"
import { OddRows, PricePreviewTable } from "~/ui/pricing/price-preview"
import { admits, guard } from "../guard.server"
import type { Route } from "./+types/price-upload"
import { DeskBook } from "./desk-book"
import { findDeskFrame } from "./frame.server"

export const meta: Route.MetaFunction = () => [{ title: "Upload a price list · Waxbill" }]

export const loader = guard(admits.desk("owner", "desk"), async (_args: Route.LoaderArgs, scope) => ({
	frame: await findDeskFrame(scope, { part: "prices" }),
}))

/** The rows of a preview, as the form carries them to where they are applied. */
const sentRows = z
	.array(
		z.object({
			tierId: z.guid(),
			productId: z.guid(),
			minCases: z.int().min(1).max(999),
			cents: z.int().min(0).max(100_000_000),
			validFrom: z.string().refine(isDay),
			oldCents: z.int().nullable(),
		}),
	)
	.min(1)
	.max(10_000)

const FILE_WORDS = {
	empty: "Choose a file with prices; this one holds nothing.",
	"too-large": "This file is above 200 kB. Send the list in two parts.",
	"no-columns": "Name the columns in the first row: code, tier, and case price or price per lb.",
} as const

const APPLY_WORDS = {
	"prices-changed": "Prices changed since this list was read, so nothing was set. Read the file again.",
	"in-the-past": "A price would begin before today, so nothing was set. Read the file again.",
	"not-known": "A product or tier is no longer there, so nothing was set. Read the file again.",
} as const

type Answer = { errors: { field?: string; message: string }[]; preview: NamedPreview | null; rows: string }

function refuse(message: string, status: number, field?: string) {
	const answer: Answer = { errors: [field ? { field, message } : { message }], preview: null, rows: "" }
	return data(answer, { status })
}

function asRows(changes: readonly PriceChange[]): string {
	const rows = changes.filter(({ kind }) => kind !== "unchanged")
	return JSON.stringify(
		rows.map(({ tierId, productId, minCases, cents, validFrom, oldCents }) => ({
			tierId,
			productId,
			minCases,
			cents,
			validFrom,
			oldCents,
		})),
	)
}

function parsed(text: string): unknown {
	try {
		return JSON.parse(text)
	} catch {
		return null
	}
}

export const action = guard(admits.desk("owner", "desk"), async ({ request, params }: Route.ActionArgs, scope) => {
	const { producer, person } = scope
	const now = askClock()
	const today = dayInZone(now, producer.timeZone)
	const form = await request.formData()
	if (form.get("intent") === "apply") {
		const rows = sentRows.safeParse(parsed(String(form.get("rows") ?? "")))
		if (!rows.success) return refuse("This page was not sent whole. Read the file again.", 400)
		const prices = rows.data
		const answer = await setPrices({ producerId: producer.id, personId: person.id, now, today, prices })
		if (!answer.ok) return refuse(APPLY_WORDS[answer.reason], 422)
		throw redirect(`/desk/${params.producer}/prices?set=${answer.set}`)
	}
	const file = form.get("file")
	if (!(file instanceof File)) return refuse(FILE_WORDS.empty, 400, "file")
	const read = await previewPriceList({ producerId: producer.id, file, today })
	if (!read.ok) return refuse(FILE_WORDS[read.reason], 422, "file")
	const answer: Answer = { errors: [], preview: read.preview, rows: asRows(read.preview.changes) }
	return data(answer)
})

export default function PriceUpload({ loaderData, actionData, params }: Route.ComponentProps) {
	const errors = actionData?.errors ?? []
	const preview = actionData?.preview ?? null
	return (
		<DeskBook frame={loaderData.frame}>
			<SheetHead
				title={preview ? "What the list would change" : "Upload a price list"}
				lead={
					preview
						? "Nothing is set yet. Orders that are placed keep their prices."
						: "You see every change before it is made. Earlier days and placed orders keep their prices."
				}
				action={<Link to={`/desk/${params.producer}/prices`}>Prices</Link>}
			/>
			<ErrorSummary errors={errors} />
			{preview ? (
				<Preview preview={preview} rows={actionData?.rows ?? ""} />
			) : (
				<FileForm error={errors.find(({ field }) => field === "file")?.message} />
			)}
		</DeskBook>
	)
}

function Preview({ preview, rows }: { preview: NamedPreview; rows: string }) {
	const { changes, odd, products, tiers } = preview
	const toSet = changes.filter(({ kind }) => kind !== "unchanged").length
	const sum = `${toSet} to set, ${changes.length - toSet} as ${changes.length - toSet === 1 ? "it is" : "they are"}, ${odd.length} not understood.`
	return (
		<>
			<MessageLine tone={odd.length > 0 ? "problem" : "saved"} title={sum} />
			{changes.length > 0 && <PricePreviewTable changes={changes} products={products} tiers={tiers} />}
			<OddRows odd={odd} />
			<Form method="post" className="sheet-form">
				<input type="hidden" name="rows" value={rows} />
				<div className="flex flex-wrap items-center gap-4">
					{toSet > 0 && (
						<Button variant="primary" name="intent" value="apply">
							{toSet === 1 ? "Set this price" : `Set these ${toSet} prices`}
						</Button>
					)}
					<Link to="?">Read another file</Link>
				</div>
			</Form>
		</>
	)
}

function FileForm({ error }: { error: string | undefined }) {
	return (
		<Form method="post" encType="multipart/form-data" className="sheet-form" noValidate>
			<div className="field">
				<label className="field-label" htmlFor="field-file">
					The list, as CSV
				</label>
				<input
					id="field-file"
					type="file"
					name="file"
					accept=".csv,.txt,text/csv"
					className="input"
					required
					aria-invalid={error ? true : undefined}
					aria-describedby={error ? "field-file-hint field-file-error" : "field-file-hint"}
				/>
				<span className="field-hint" id="field-file-hint">
					The first row names the columns: code, tier, min cases, case price or price per lb, valid from. Left out, min
					cases is 1 and valid from is today.
				</span>
				{error && <FieldError id="field-file-error">{error}</FieldError>}
			</div>
			<div>
				<Button variant="primary">Read it and show what changes</Button>
			</div>
		</Form>
	)
}
