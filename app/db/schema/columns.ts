import { customType, date, integer, timestamp, uuid } from "drizzle-orm/pg-core"

/** A calendar day in the producer's zone, as "2026-08-18". */
export const day = (name: string) => date(name, { mode: "string" })

/** A moment; always with a zone, so that no server setting can shift it. */
export const instant = (name: string) => timestamp(name, { withTimezone: true, mode: "date" })

/** Money in integer cents. */
export const cents = (name: string) => integer(name)

/** Weight in whole grams. */
export const grams = (name: string) => integer(name)

/** A file kept beside its row. */
export const bytes = customType<{ data: Buffer }>({ dataType: () => "bytea" })

/** The tenant of a row; first in every key, so that a distributed PostgreSQL can place rows by it. */
export const producerId = () => uuid("producer_id").notNull()

export const id = (name = "id") => uuid(name).notNull().defaultRandom()

/** Stands in `place_ref` where a place needs no further name; a key column cannot be null. */
export const NO_REF = "00000000-0000-0000-0000-000000000000"
