import { randomUUID } from "node:crypto"
import { expect, type Page } from "@playwright/test"
import sharp from "sharp"
import { askDatabase, DESK } from "./desk-visits"

export const PHONE = { viewport: { width: 390, height: 844 }, hasTouch: true }

/** A yard at Larkmoor that no other test knows: two hives with three supers of a product that nobody sells. */
export async function openBeeYard() {
	const [yardId, productId] = [randomUUID(), randomUUID()]
	const [hive1, hive2, low, top, other] = [1, 2, 3, 4, 5].map(() => randomUUID())
	const larkmoor = "(select id from producers where slug = 'larkmoor')"
	await askDatabase(
		`insert into products (producer_id, id, code, name, form, colour, detail, piece_net_grams, piece_cents, pieces_per_case,
			break_family, is_active)
		select id, $1, 'Y9', 'Trial box', 'clear-box', 'light', '12 oz', 340, null, 12, 'trial', false
		from producers where slug = 'larkmoor'`,
		[productId],
	)
	await askDatabase(
		`insert into yards (producer_id, id, name, flora) select id, $1, 'Barley Mow', 'late clover' from producers
		where slug = 'larkmoor'`,
		[yardId],
	)
	await askDatabase(
		`insert into hives (producer_id, id, yard_id, label)
		select ${larkmoor}, h.id, $1, h.label from (values ($2::uuid, 'B1'), ($3::uuid, 'B2')) as h(id, label)`,
		[yardId, hive1, hive2],
	)
	await askDatabase(
		`insert into supers (producer_id, id, hive_id, product_id, level, set_on)
		select ${larkmoor}, s.id, s.hive_id, $1, s.level, current_date - 20
		from (values ($2::uuid, $5::uuid, 1), ($3::uuid, $5::uuid, 2), ($4::uuid, $6::uuid, 1)) as s(id, hive_id, level)`,
		[productId, low, top, other, hive1, hive2],
	)
	const ofYard = `in (select s.id from supers s join hives h on h.producer_id = s.producer_id and h.id = s.hive_id
		where h.yard_id = $1)`
	return {
		address: `${DESK}/crop/yards/${yardId}`,
		supers: { low: String(low), top: String(top), other: String(other) },
		/** The yard's checks as they were recorded, the first first. */
		checks: () =>
			askDatabase<{
				superId: string
				filled: number
				capped: number
				sections: string
				note: string
				photoId: string | null
				who: string
			}>(
				`select c.super_id as "superId", c.filled_percent as filled, c.capped_percent as capped, c.sections, c.note,
					c.photo_id as "photoId", u.name as who
				from super_checks c left join users u on u.id = c.checked_by where c.super_id ${ofYard} order by c.received_at`,
				[yardId],
			),
		takeOff: (superId: string | undefined) =>
			askDatabase("update supers set state = 'off', off_on = current_date where id = $1", [superId]),
		clear: async () => {
			const photos = await askDatabase<{ id: string }>(
				`delete from super_checks where super_id ${ofYard} returning photo_id as id`,
				[yardId],
			)
			await askDatabase("delete from uploads where id = any($1)", [photos.map(({ id }) => id)])
			await askDatabase("delete from supers where product_id = $1", [productId])
			await askDatabase("delete from hives where yard_id = $1", [yardId])
			await askDatabase("delete from yards where id = $1", [yardId])
			for (const table of ["expected_supplies", "crop_forecasts"]) {
				await askDatabase(`delete from ${table} where product_id = $1`, [productId])
			}
			await askDatabase("delete from products where id = $1", [productId])
		},
	}
}

/** A photo as a phone takes one. */
export async function takePhoto() {
	const buffer = await sharp({ create: { width: 2400, height: 1800, channels: 3, background: "#b0660f" } })
		.jpeg()
		.toBuffer()
	return { name: "super.jpg", mimeType: "image/jpeg", buffer }
}

/** Opens the form of a super and answers its box. */
export async function openForm(page: Page, name: string) {
	const row = page.locator(".yard-super").filter({ has: page.getByRole("heading", { name, exact: true }) })
	await row.locator("summary").click()
	return row
}

/** Notes shares in an open form and presses the button. */
export async function noteShares(form: ReturnType<Page["locator"]>, filled: string, capped: string): Promise<void> {
	await form.getByLabel("By shares").check()
	await form.getByLabel("Share filled", { exact: true }).fill(filled)
	await form.getByLabel("Share capped", { exact: true }).fill(capped)
	await form.getByRole("button", { name: /^Record/ }).click()
}

/** Waits until the worker has kept the page and what it needs. */
export async function untilKept(page: Page): Promise<void> {
	const isKept = () =>
		page.evaluate(async () => {
			const parts = [...document.querySelectorAll<HTMLLinkElement>('link[rel="modulepreload"]')].map(({ href }) => href)
			const found = await Promise.all([location.href, ...parts].map((address) => caches.match(address)))
			return parts.length > 0 && found.every(Boolean) && navigator.serviceWorker.controller !== null
		})
	await expect.poll(isKept).toBe(true)
}
