import { z } from "zod"
import { BLANKS, unknownBlanks } from "~/domain/receivables/reminders"

const KNOWN = Object.keys(BLANKS)
	.map((name) => `{${name}}`)
	.join(" ")

const written = (most: number, empty: string) =>
	z
		.string()
		.default("")
		.transform((text, context) => {
			const plain = text.replaceAll("\r\n", "\n").trim()
			const [unknown] = unknownBlanks(plain)
			const message =
				plain === ""
					? empty
					: plain.length > most
						? `Shorten it to ${most} characters.`
						: unknown === undefined
							? null
							: `There is no blank {${unknown}}. There are ${KNOWN}.`
			if (message === null) return plain
			context.addIssue({ code: "custom", message })
			return z.NEVER
		})

const whole = (least: number, most: number, message: string) =>
	z
		.string()
		.default("")
		.transform((text, context) => {
			if (/^\d{1,3}$/.test(text.trim()) && Number(text) >= least && Number(text) <= most) return Number(text)
			context.addIssue({ code: "custom", message })
			return z.NEVER
		})

/** A step as typed: so many days before or after the due day, and its words. */
export const stepForm = z
	.object({
		stepId: z.guid(),
		days: whole(0, 365, "Write whole days from 0 to 365."),
		side: z.enum(["before", "after"], "Choose before or after."),
		subject: written(200, "Write a subject."),
		body: written(2000, "Write what the letter says."),
		isActive: z
			.string()
			.optional()
			.transform((value) => value === "yes"),
	})
	.transform(({ stepId, days, side, ...words }, context) => {
		if (side === "before" && days > 30) {
			context.addIssue({ code: "custom", path: ["days"], message: "Write at most 30 days before." })
			return z.NEVER
		}
		return { id: stepId, step: { ...words, daysAfterDue: side === "before" ? 0 - days || 0 : days } }
	})

/** The monthly charge as typed: a percentage up to 10, and days. */
export const financeForm = z.object({
	rate: z
		.string()
		.default("")
		.transform((text, context) => {
			const [, wholePart, part = ""] = /^(\d{1,2})(?:[.,](\d{1,2}))?\s*%?$/.exec(text.trim()) ?? []
			const points = wholePart === undefined ? null : Number(wholePart) * 100 + Number(part.padEnd(2, "0"))
			if (points !== null && points <= 1000) return points
			context.addIssue({ code: "custom", message: "Write a percentage from 0 to 10, such as 1.5." })
			return z.NEVER
		}),
	afterDays: whole(0, 365, "Write whole days from 0 to 365."),
})
