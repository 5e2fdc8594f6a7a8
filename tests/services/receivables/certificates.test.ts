import { randomUUID } from "node:crypto"
import { describe, expect, test } from "vitest"
import { stores } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { CERTIFICATE_BYTES } from "~/domain/receivables/certificate"
import { answerCertificate } from "~/services/certificates/answer-certificate.server"
import { findCertificateFile } from "~/services/certificates/find-certificate-file.server"
import { handInCertificate } from "~/services/certificates/hand-in-certificate.server"
import { listCertificates } from "~/services/certificates/list-certificates.server"
import { remindCertificates } from "~/services/certificates/remind-certificates.server"
import { findToLookAt } from "~/services/receivables/find-to-look-at.server"
import { addHand } from "../desk/desk-steps"
import { findOutbox, openStore, openYard, type Shop, ZONE } from "../orders/place-yard"
import { writeLetters } from "./account"

const TODAY = "2026-08-31"
const NOW = new Date("2026-08-31T14:00:00Z")
const PDF = Buffer.from("%PDF-1.7\n%%EOF\n")

const handIn = (shop: Shop, facts: Partial<Parameters<typeof handInCertificate>[0]> = {}) =>
	handInCertificate({
		producerId: shop.producerId,
		storeId: shop.storeId,
		personId: shop.person.id,
		certificateId: randomUUID(),
		number: "R-204-118",
		validUntil: "2027-06-30",
		fileName: "certificate.exe",
		content: PDF,
		today: TODAY,
		...facts,
	})

async function openShop() {
	const yard = await openYard()
	const shop = await openStore(yard)
	return { yard, shop, personId: await addHand() }
}

const untilOf = async (shop: Shop) => {
	const rows = await readProducer(shop.producerId, (tx) => tx.select().from(stores))
	return rows.find(({ id }) => id === shop.storeId)?.resaleCertificateUntil ?? null
}

describe("a certificate that is handed in", () => {
	test("is what its content says, whatever its name, and changes nothing until it is accepted", async () => {
		const { shop } = await openShop()
		expect(await handIn(shop)).toEqual({ ok: true })
		const { certificates, validUntil } = await listCertificates(shop)
		expect(certificates).toMatchObject([{ state: "handed-in", mediaType: "application/pdf", handedInBy: "Rosa Quill" }])
		expect(validUntil).toBeNull()
	})

	test("is refused with a day that has passed, empty, of another type or heavier than 10 MB", async () => {
		const { shop } = await openShop()
		expect(await handIn(shop, { validUntil: "2026-08-30" })).toEqual({ ok: false, reason: "expired" })
		expect(await handIn(shop, { content: Buffer.alloc(0) })).toEqual({ ok: false, reason: "empty" })
		const page = Buffer.from("<html><script>alert(1)</script>")
		expect(await handIn(shop, { content: page, fileName: "a.pdf" })).toEqual({ ok: false, reason: "other-type" })
		const heavy = Buffer.concat([PDF, Buffer.alloc(CERTIFICATE_BYTES)])
		expect(await handIn(shop, { content: heavy })).toEqual({ ok: false, reason: "too-large" })
		expect((await listCertificates(shop)).certificates).toEqual([])
	})

	test("sent three times at once is one", async () => {
		const { shop } = await openShop()
		const certificateId = randomUUID()
		await Promise.all([1, 2, 3].map(() => handIn(shop, { certificateId })))
		expect((await listCertificates(shop)).certificates).toHaveLength(1)
	})

	test("is no other producer's to see", async () => {
		const { shop } = await openShop()
		const certificateId = randomUUID()
		await handIn(shop, { certificateId })
		const other = await openYard()
		expect(await findCertificateFile({ producerId: other.producerId, certificateId })).toBeNull()
		expect((await findCertificateFile({ producerId: shop.producerId, certificateId }))?.content.equals(PDF)).toBe(true)
	})
})

describe("the producer's answer", () => {
	const answered = async (answer: Parameters<typeof answerCertificate>[0]["answer"]) => {
		const facts = await openShop()
		const certificateId = randomUUID()
		await handIn(facts.shop, { certificateId })
		const query = {
			producerId: facts.yard.producerId,
			certificateId,
			personId: facts.personId,
			answer,
			today: TODAY,
			now: NOW,
		}
		return { ...facts, first: await answerCertificate(query), again: () => answerCertificate(query) }
	}

	test("accepts until a day, from which on no tax is charged, and tells the store", async () => {
		const { shop, yard, first, again } = await answered({ accepted: true, until: "2027-03-31" })
		expect(first).toEqual({ ok: true })
		expect(await untilOf(shop)).toBe("2027-03-31")
		expect(await again()).toEqual({ ok: false, reason: "answered-already" })
		expect(await writeLetters(yard.producerId)).toEqual([expect.stringContaining("on file until March 31, 2027")])
		const letters = await findOutbox(yard.producerId)
		expect(letters).toMatchObject([
			{ template: "certificate-answer", props: { validUntil: "2027-03-31", reason: null } },
		])
	})

	test("refuses with a sentence that the store reads, and nothing else changes", async () => {
		const { shop, yard } = await answered({ accepted: false, sentence: "The photo cuts off the signature." })
		expect(await untilOf(shop)).toBeNull()
		expect(await findOutbox(yard.producerId)).toMatchObject([
			{ props: { validUntil: null, reason: "The photo cuts off the signature." } },
		])
	})

	test("cannot accept until a day that has passed", async () => {
		const { shop, first } = await answered({ accepted: true, until: "2026-08-01" })
		expect(first).toEqual({ ok: false, reason: "expired" })
		expect(await untilOf(shop)).toBeNull()
	})
})

test("a store is told 30 and 7 days before its certificate runs out, once each, however often the job runs", async () => {
	const { yard, shop } = await openShop()
	await withProducer(yard.producerId, (tx) => tx.update(stores).set({ resaleCertificateUntil: "2026-09-30" }))
	const remind = (now: string) => remindCertificates({ producerId: yard.producerId, now: new Date(now), zone: ZONE })
	await remind("2026-08-30T14:00:00Z")
	expect(await findOutbox(yard.producerId)).toHaveLength(0)
	await Promise.all([remind("2026-08-31T14:00:00Z"), remind("2026-08-31T14:00:00Z")])
	await remind("2026-09-10T14:00:00Z")
	expect(await findOutbox(yard.producerId)).toHaveLength(1)
	await remind("2026-09-23T14:00:00Z")
	await remind("2026-09-24T14:00:00Z")
	const letters = await findOutbox(yard.producerId)
	expect(letters).toHaveLength(2)
	expect(letters[0]).toMatchObject({ template: "certificate-expiring", recipient: shop.person.email })
	await remind("2026-10-01T14:00:00Z")
	expect(await findOutbox(yard.producerId)).toHaveLength(2)
})

test("what waits and what runs out stands among what is to be looked at, and no reminder goes while a new one waits", async () => {
	const { yard, shop } = await openShop()
	await withProducer(yard.producerId, (tx) => tx.update(stores).set({ resaleCertificateUntil: "2026-09-20" }))
	const kinds = async () => (await findToLookAt({ producerId: yard.producerId, today: TODAY })).map(({ kind }) => kind)
	expect(await kinds()).toEqual(["certificate-ends"])
	await handIn(shop)
	expect(await kinds()).toEqual(["certificate-waits"])
	await remindCertificates({ producerId: yard.producerId, now: NOW, zone: ZONE })
	expect(await findOutbox(yard.producerId)).toEqual([])
})
