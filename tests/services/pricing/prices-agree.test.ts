import fc from "fast-check"
import { expect, test } from "vitest"
import { prices, promotions, storePrices } from "~/db/schema"
import { readProducer, withProducer } from "~/db/transaction.server"
import { addDays } from "~/domain/calendar"
import { breaksForStore, caseCentsAfter, promotionInForce } from "~/domain/pricing/price-in-force"
import { findPricesOfStores } from "~/services/pricing/find-prices-of-stores.server"
import { findStorePrices } from "~/services/pricing/find-store-prices.server"
import { addProduct, openStore, openYard } from "../orders/place-yard"

const TODAY = "2026-08-13"

const day = fc.integer({ min: -9, max: 9 }).map((days) => addDays(TODAY, days))
const cents = fc.integer({ min: 0, max: 40_000 })
const aDatedPrice = fc.record({
	minCases: fc.integer({ min: 1, max: 4 }),
	caseCents: cents,
	poundCents: fc.option(fc.integer({ min: 1, max: 4_000 })),
	validFrom: day,
})
/** Prices as a table takes them: one for each break and day. */
const somePrices = fc.uniqueArray(aDatedPrice, {
	selector: ({ minCases, validFrom }) => `${minCases} ${validFrom}`,
	maxLength: 8,
})
const aPromotion = fc
	.record({ basisPoints: fc.integer({ min: 1, max: 10_000 }), from: day, days: fc.integer({ min: 0, max: 9 }) })
	.map(({ basisPoints, from, days }) => ({ basisPoints, startsOn: from, endsOn: addDays(from, days) }))

test("the prices that a store is shown are those that the rule gives, whatever has been set and has ended", async () => {
	const yard = await openYard()
	const { storeId } = await openStore(yard)
	const { storeId: otherId } = await openStore(yard)
	const { producerId, tierId } = yard
	let made = 0
	await fc.assert(
		fc.asyncProperty(
			fc.record({
				tier: somePrices,
				own: somePrices,
				ends: fc.array(fc.option(fc.integer({ min: 0, max: 9 })), { minLength: 8, maxLength: 8 }),
				offs: fc.array(aPromotion, { maxLength: 3 }),
			}),
			async ({ tier, own, ends, offs }) => {
				made += 1
				const productId = await addProduct(yard, { code: `P${made}`, readyCases: 0 })
				const ended = own.map((price, index) => {
					const days = ends[index] ?? null
					return { ...price, validUntil: days === null ? null : addDays(price.validFrom, days) }
				})
				await withProducer(producerId, async (tx) => {
					const row = { producerId, productId }
					await tx.delete(prices)
					if (tier.length > 0) await tx.insert(prices).values(tier.map((price) => ({ ...row, tierId, ...price })))
					if (ended.length > 0) {
						await tx.insert(storePrices).values(ended.map((price) => ({ ...row, storeId, ...price })))
					}
					if (offs.length > 0) {
						await tx.insert(promotions).values(offs.map((off) => ({ ...row, tierId: null, name: "some days", ...off })))
					}
				})
				const query = { producerId, today: TODAY, productIds: [productId] }
				const [found] = await readProducer(producerId, (tx) => findStorePrices(tx, { ...query, storeId }))
				const ofStores = await readProducer(producerId, (tx) =>
					findPricesOfStores(tx, { ...query, storeIds: [storeId, otherId] }),
				)
				const off = promotionInForce(offs, TODAY)
				const sizes = { pieceNetGrams: found?.pieceNetGrams ?? 0, piecesPerCase: found?.piecesPerCase ?? 0 }
				const ruled = breaksForStore({ own: ended, tier }, TODAY).map((price) => ({
					minCases: price.minCases,
					...caseCentsAfter(price, sizes, off),
				}))
				expect(found?.breaks ?? []).toEqual(ruled)
				// The statement for many stores at once says the same of each: the other has no price of its own.
				expect(ofStores.get(storeId)?.[0]).toEqual(found)
				const ofTier = breaksForStore({ own: [], tier }, TODAY).map((price) => ({
					minCases: price.minCases,
					...caseCentsAfter(price, sizes, off),
				}))
				expect(found === undefined ? [] : (ofStores.get(otherId)?.[0]?.breaks ?? [])).toEqual(found ? ofTier : [])
			},
		),
		{ numRuns: 120 },
	)
})
