import type { AgeingBucket } from "~/domain/invoicing/ageing"

/** How the columns of an ageing are headed; the days are counted past the due date. */
export const AGEING_HEADS: Record<AgeingBucket, string> = {
	current: "Not due yet",
	"1–30": "1–30 days late",
	"31–60": "31–60 days late",
	"61–90": "61–90 days late",
	"over 90": "Over 90 days late",
}

/** The pattern of each column in a picture: told apart by hatching, and from light to solid. */
export const AGEING_FILLS: Record<AgeingBucket, string> = {
	current: "age-current",
	"1–30": "age-dots",
	"31–60": "age-lines",
	"61–90": "age-cross",
	"over 90": "age-solid",
}
