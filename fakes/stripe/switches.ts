import { z } from "zod"

/** What a test or a person can turn on to see how the application bears it. */
const switchesSchema = z.strictObject({
	/** Each API answer waits this long. */
	slowMs: z.number().int().min(0).max(120_000),
	/** The next `count` API calls (below `path`, if given) fail before they do anything. */
	failNext: z
		.strictObject({
			count: z.number().int().min(0),
			status: z.union([z.literal(429), z.literal(500)]),
			path: z.string().optional(),
		})
		.nullable(),
	/** The next `count` API calls end in a closed connection, before or after they have taken effect. */
	dropNext: z
		.strictObject({
			count: z.number().int().min(0).default(1),
			when: z.enum(["before", "after"]),
			path: z.string().optional(),
		})
		.nullable(),
	/** Each event is delivered this many times more. */
	repeatEvents: z.number().int().min(0).max(20),
	/** Events wait until they are flushed. */
	holdEvents: z.boolean(),
	/** Events are recorded and listed, but never delivered. */
	muteEvents: z.boolean(),
	/** What a reader suffers from when a payment is sent to it, by reader id. */
	readerTrouble: z.record(z.string(), z.enum(["offline", "busy", "timeout"])),
})

export type Switches = z.infer<typeof switchesSchema>
export type SwitchChanges = Partial<z.input<typeof switchesSchema>>

/** All off. */
export function switchesOff(): Switches {
	return {
		slowMs: 0,
		failNext: null,
		dropNext: null,
		repeatEvents: 0,
		holdEvents: false,
		muteEvents: false,
		readerTrouble: {},
	}
}

/** Sets what `changes` names in `switches`. Throws a ZodError, and changes nothing, when a name or value is wrong. */
export function setSwitches(switches: Switches, changes: unknown): void {
	Object.assign(switches, switchesSchema.partial().parse(changes))
}

type Counted = { count: number; path?: string | undefined }

/** Whether a counted switch strikes a call of `path`; takes one from its count if so. */
export function strikes(counted: Counted | null, path: string): boolean {
	if (!counted || counted.count < 1) return false
	if (counted.path !== undefined && !path.startsWith(counted.path)) return false
	counted.count -= 1
	return true
}
