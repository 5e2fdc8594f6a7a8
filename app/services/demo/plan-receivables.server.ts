import type {
	bookAccounts,
	bookClosings,
	exemptionCertificates,
	invoiceRunOrders,
	invoiceRuns,
	paymentPromises,
	reminderSteps,
	remindersSent,
	taxRates,
} from "~/db/schema"
import { addDays, instantAt } from "~/domain/calendar"
import { drawPhoto } from "./draw-photo.server"
import type { Invoices } from "./plan-invoices"
import type { Payments } from "./plan-payments"
import type { Stores } from "./plan-stores"
import { minutesAfter, type Season } from "./season"

export type Receivables = {
	taxRates: (typeof taxRates.$inferInsert)[]
	certificates: (typeof exemptionCertificates.$inferInsert)[]
	steps: (typeof reminderSteps.$inferInsert)[]
	sent: (typeof remindersSent.$inferInsert)[]
	promises: (typeof paymentPromises.$inferInsert)[]
	accounts: (typeof bookAccounts.$inferInsert)[]
	closings: (typeof bookClosings.$inferInsert)[]
	runs: (typeof invoiceRuns.$inferInsert)[]
	runOrders: (typeof invoiceRunOrders.$inferInsert)[]
}

const STEPS = [
	{
		daysAfterDue: -3,
		subject: "Invoice {invoice} falls due on {due}",
		body: "A reminder ahead of time: {amount} of invoice {invoice} falls due on {due}. If it is paid already, thank you.",
	},
	{
		daysAfterDue: 7,
		subject: "Invoice {invoice} was due on {due}",
		body: "{amount} of invoice {invoice} was due on {due} and has not come yet. Please have a look, or write to us if something is not right with it.",
	},
	{
		daysAfterDue: 21,
		subject: "Invoice {invoice} is three weeks late",
		body: "{amount} of invoice {invoice} was due on {due}. Please pay it this week, or tell us when you can.",
	},
] as const

/** What stands around the invoices: rates, certificates, reminders and promises, the books, and the last dispatch in one go. */
export async function planReceivables(
	season: Season,
	{ stores, invoices, money }: { stores: Stores; invoices: Invoices; money: Payments },
): Promise<Receivables> {
	const { producerId, chance, scenario, userId, today } = season
	const begun = addDays(today, -7 * (scenario.seasonWeeks + 8))
	return {
		taxRates: [
			{ producerId, id: chance.id(), place: scenario.county, validFrom: begun, basisPoints: 625 },
			{ producerId, id: chance.id(), place: "Carder City", validFrom: begun, basisPoints: 700 },
			{ producerId, id: chance.id(), place: "Carder City", validFrom: addDays(today, 60), basisPoints: 725 },
		],
		certificates: await certificatesOf(season, stores),
		...reminders(season, invoices, money),
		accounts: [
			{ producerId, account: "receivable", number: "1200", name: "Owed by stores" },
			{ producerId, account: "sales", number: "4000", name: "Comb honey" },
		],
		// Before anything was sold, so that there is nothing in it.
		closings: [{ producerId, id: chance.id(), closedUntil: begun, totals: {}, closedBy: userId(scenario.ownerEmail) }],
		...lastRun(season, invoices),
	}
}

async function certificatesOf(season: Season, stores: Stores): Promise<Receivables["certificates"]> {
	const { producerId, chance, scenario, userId, now, today } = season
	const owner = userId(scenario.ownerEmail)
	const { content } = await drawPhoto()
	const paper = (storeId: string, handedInBy: string) => ({
		producerId,
		id: chance.id(),
		storeId,
		number: `RC-${chance.whole(10_000, 99_999)}`,
		fileName: "certificate.jpg",
		mediaType: "image/jpeg" as const,
		content,
		handedInBy,
	})
	const [held] = stores.rows.stores.filter((store) => store.resaleCertificateUntil)
	const [none] = stores.rows.stores.filter((store) => !store.resaleCertificateUntil)
	const buyerOf = (storeId?: string) =>
		stores.rows.memberships.find((membership) => membership.storeId === storeId)?.userId ?? owner
	const rows: Receivables["certificates"] = []
	if (held?.id && held.resaleCertificateUntil) {
		const handedInAt = minutesAfter(now, -60 * 1440)
		rows.push({
			...paper(held.id, buyerOf(held.id)),
			validUntil: held.resaleCertificateUntil,
			state: "accepted",
			handedInAt,
			decidedBy: owner,
			decidedAt: minutesAfter(handedInAt, 300),
		})
	}
	if (none?.id) {
		rows.push({
			...paper(none.id, buyerOf(none.id)),
			validUntil: addDays(today, 700),
			handedInAt: minutesAfter(now, -90),
		})
	}
	return rows
}

function reminders(
	{ producerId, chance, scenario, userId, now, today }: Season,
	invoices: Invoices,
	money: Payments,
): Pick<Receivables, "steps" | "sent" | "promises"> {
	const steps = STEPS.map((step) => ({ producerId, id: chance.id(), ...step }))
	const paid = new Map<string, number>()
	for (const { invoiceId, amountCents } of money.rows.settlements) {
		paid.set(invoiceId, (paid.get(invoiceId) ?? 0) + amountCents)
	}
	const late = invoices.invoices.filter(({ row }) => (paid.get(row.id) ?? 0) < row.totalCents && row.dueOn < today)
	const sent = late.flatMap(({ row }) =>
		steps.flatMap((step) => {
			const on = addDays(row.dueOn, step.daysAfterDue)
			return on < today && on >= row.issuedOn
				? [{ producerId, invoiceId: row.id, stepId: step.id, sentAt: instantAt(on, "08:00", scenario.timeZone) }]
				: []
		}),
	)
	const promised = late[0] ?? invoices.invoices.at(-1)
	const promises = promised
		? [
				{
					producerId,
					id: chance.id(),
					storeId: promised.order.store.id,
					amountCents: promised.row.totalCents - (paid.get(promised.row.id) ?? 0) || promised.row.totalCents,
					promisedOn: addDays(today, 4),
					note: "On the phone: the rest goes out on Friday.",
					notedBy: userId(scenario.deskEmail),
					notedAt: minutesAfter(now, -1440),
				},
			]
		: []
	return { steps, sent, promises }
}

/** The orders of the last delivery day went out and were invoiced together. */
function lastRun({ producerId, chance, scenario, userId, now }: Season, invoices: Invoices) {
	const last = invoices.invoices.at(-1)
	if (!last) return { runs: [], runOrders: [] }
	const runId = chance.id()
	const startedAt = last.order.sentAt ?? now
	return {
		runs: [{ producerId, id: runId, startedBy: userId(scenario.packerEmail), startedAt, finishedAt: startedAt }],
		runOrders: invoices.invoices
			.filter(({ row }) => row.issuedOn === last.row.issuedOn)
			.map(({ order }) => ({ producerId, runId, orderId: order.id, state: "done" as const })),
	}
}
