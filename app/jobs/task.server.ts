import type { z } from "zod"

/** A job's handler: gets what `jobs.enqueue` was given. Throwing means "again later". */
export type Task = (payload: unknown) => Promise<void>

/** Makes a task from the shape of its payload and the one service it calls. A payload of another shape throws. */
export function task<Payload>(shape: z.ZodType<Payload>, run: (payload: Payload) => Promise<void>): Task {
	return async (payload) => run(shape.parse(payload))
}
