import { randomUUID } from "node:crypto"
import { expect, test } from "vitest"
import { schemeTemplates } from "~/domain/grading/templates"
import { listLots } from "~/services/desk/list-lots.server"
import { findGrading } from "~/services/lots/find-gradings.server"
import { gradeLot } from "~/services/lots/grade-lot.server"
import { saveLotSettings } from "~/services/lots/lot-code-settings.server"
import { listSchemes, putSchemeAway, saveScheme } from "~/services/lots/save-scheme.server"
import { splitLot } from "~/services/lots/split-lot.server"
import { addProduct, openStore, openYard } from "../orders/place-yard"

const [template] = schemeTemplates
if (!template) throw new Error("no template")

async function openLot() {
	const yard = await openYard()
	const { person } = await openStore(yard)
	await addProduct(yard, { code: "21", readyCases: 2 })
	return { producerId: yard.producerId, personId: person.id, code: "L-21" }
}

test("a grading is kept with its scheme and reasons, and the lot carries the grade", async () => {
	const lot = await openLot()
	const grading = {
		...lot,
		gradingId: randomUUID(),
		gradedOn: "2026-08-13",
		schemeName: template.name,
		scheme: template.scheme,
		facts: {
			measured: { netOz: 1100, grossOz: 1200, attachedPercent: 8500, unsealedCells: 3 },
			isOutsideRowOpen: true,
			faults: [],
			pfundTenths: 340,
			caseWeighed: null,
			piecesSeen: 24,
			piecesBelow: 0,
		},
	}
	const [first, second] = await Promise.all([gradeLot(grading), gradeLot({ ...grading })])
	expect([first.ok, second.ok]).toEqual([true, true])
	const found = await findGrading(grading)
	expect(found).toMatchObject({ grade: "Wisconsin No. 1", schemeName: template.name, who: "Rosa Quill" })
	expect(found?.reasons).toHaveLength(3)
	const { lots } = await listLots({ producerId: lot.producerId, state: null, after: null })
	expect(lots).toMatchObject([{ code: "L-21", grade: "Wisconsin No. 1", missing: [] }])
})

test("a lot that nobody has is not graded", async () => {
	const lot = await openLot()
	const { scheme } = template
	const facts = {
		measured: {},
		isOutsideRowOpen: false,
		faults: [],
		pfundTenths: null,
		caseWeighed: null,
		piecesSeen: 1,
		piecesBelow: 0,
	}
	const answer = await gradeLot({
		...lot,
		code: "none",
		gradingId: randomUUID(),
		gradedOn: "2026-08-13",
		schemeName: "x",
		scheme,
		facts,
	})
	expect(answer).toEqual({ ok: false, reason: "no-such-lot" })
})

test("a scheme is written once, changed, and put away", async () => {
	const { producerId } = await openLot()
	const id = randomUUID()
	const scheme = { producerId, id, isNew: true, name: "Ours", scheme: template.scheme }
	expect((await saveScheme(scheme)).ok).toBe(true)
	expect((await saveScheme(scheme)).ok).toBe(true)
	expect(await saveScheme({ ...scheme, id: randomUUID() })).toEqual({ ok: false, reason: "name-taken" })
	expect((await saveScheme({ ...scheme, isNew: false, name: "Ours, 2026" })).ok).toBe(true)
	expect((await listSchemes(producerId)).map(({ name }) => name)).toEqual(["Ours, 2026"])
	await putSchemeAway({ producerId, id })
	expect(await listSchemes(producerId)).toEqual([])
})

test("new lots follow the producer's pattern, and one that cannot be unique is refused", async () => {
	const lot = await openLot()
	const { producerId } = lot
	expect(await saveLotSettings({ producerId, lotCodePattern: "{product}", bestBeforeDays: 300 })).toMatchObject({
		ok: false,
		reason: "not-unique",
	})
	expect((await saveLotSettings({ producerId, lotCodePattern: "LM{yy}.{nn}", bestBeforeDays: 300 })).ok).toBe(true)
	expect(await splitLot({ ...lot, newLotId: randomUUID(), newCode: null, pieces: 4 })).toEqual({
		ok: true,
		code: "LM26.01",
	})
})
