import { randomUUID } from "node:crypto"
import { describe, expect, test } from "vitest"
import { hives, superChecks, supers } from "~/db/schema"
import { withProducer } from "~/db/transaction.server"
import { findSuper } from "~/services/crop/find-super.server"
import { findYardRound } from "~/services/crop/find-yard-round.server"
import { listSuperChecks } from "~/services/crop/list-super-checks.server"
import { look, openBeeYard, takeOff } from "./yard-steps"

describe("the round of a yard", () => {
	test("shows each hive with its supers from the top down, and the latest check of each", async () => {
		const yard = await openBeeYard()
		const { producerId, hiveId, productId } = yard
		const top = randomUUID()
		await withProducer(producerId, (tx) =>
			tx.insert(supers).values({ producerId, id: top, hiveId, productId, setOn: "2026-08-01", level: 2 }),
		)
		await look(yard, { checkedOn: "2026-08-01", filled: "10", capped: "0" })
		await look(yard, { checkedOn: "2026-08-10" })
		const round = await findYardRound({ ...yard, after: null })
		expect(round?.yard.name).toBe("Weld Farm")
		expect(round?.hives.map(({ label }) => label)).toEqual(["7"])
		expect(round?.hives[0]?.supers).toMatchObject([
			{ id: top, level: 2, lastCheck: null },
			{ id: yard.superId, level: 1, lastCheck: { checkedOn: "2026-08-10", filledPercent: 60 } },
		])
	})

	test("leaves out supers that came off, and keeps their hive", async () => {
		const yard = await openBeeYard()
		await takeOff(yard, "2026-08-12")
		expect((await findYardRound({ ...yard, after: null }))?.hives).toMatchObject([{ label: "7", supers: [] }])
		expect(await findSuper(yard)).toMatchObject({ state: "off", offOn: "2026-08-12", hiveLabel: "7" })
	})

	test("counts hives as people do and pages through a large yard without losing one", async () => {
		const yard = await openBeeYard()
		const { producerId, yardId } = yard
		const labels = [...Array.from({ length: 95 }, (_, i) => String(i + 10)), "2", "2b", "Swarm by the gate"]
		await withProducer(producerId, (tx) =>
			tx.insert(hives).values(labels.map((label) => ({ producerId, yardId, label }))),
		)
		const seen: string[] = []
		let after: string | null = null
		do {
			const round = await findYardRound({ producerId, yardId, after })
			seen.push(...(round?.hives.map(({ label }) => label) ?? []))
			after = round?.next ?? null
		} while (after !== null)
		expect(seen.slice(0, 4)).toEqual(["2", "2b", "7", "10"])
		expect(seen.at(-1)).toBe("Swarm by the gate")
		expect(seen).toHaveLength(labels.length + 1)
		expect(new Set(seen).size).toBe(seen.length)
	})

	test("is nobody else’s", async () => {
		const [ours, theirs] = [await openBeeYard(), await openBeeYard()]
		expect(await findYardRound({ producerId: ours.producerId, yardId: theirs.yardId, after: null })).toBeNull()
		expect(await findSuper({ producerId: ours.producerId, superId: theirs.superId })).toBeNull()
	})
})

test("a super’s history pages from the latest check back, and no check is left out or shown twice", async () => {
	const yard = await openBeeYard()
	const { producerId, superId } = yard
	// Many of one day and of one moment: the key must tell them apart.
	const checks = Array.from({ length: 45 }, (_, i) => ({
		producerId,
		superId,
		id: randomUUID(),
		checkedOn: i < 5 ? "2026-07-30" : "2026-08-01",
		filledPercent: i,
		cappedPercent: 0,
		receivedAt: new Date(i % 2 === 0 ? "2026-08-01T12:00:00.123Z" : "2026-08-01T13:00:00Z"),
	}))
	await withProducer(producerId, (tx) => tx.insert(superChecks).values(checks))
	const seen: string[] = []
	let after: string | null = null
	do {
		const page = await listSuperChecks({ producerId, superId, after })
		seen.push(...page.checks.map(({ id }) => id))
		after = page.next
	} while (after !== null)
	expect(seen.toSorted()).toEqual(checks.map(({ id }) => id).toSorted())
	const first = await listSuperChecks({ producerId, superId, after: "not a key" })
	expect(first.checks.map(({ id }) => id)).toEqual(seen.slice(0, 20))
	expect(first.checks[0]?.checkedOn).toBe("2026-08-01")
})
