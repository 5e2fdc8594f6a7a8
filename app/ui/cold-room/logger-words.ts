import type { LoggerRefusal } from "~/domain/cold-room/logger-reader"

type Wrong = { field: string; message: string }

/** Why a logger file was refused and what to do, beside the field that it is about. `when` says a time in words. */
export function refusalWords(refusal: LoggerRefusal): Wrong {
	const file = (message: string): Wrong => ({ field: "file", message })
	switch (refusal.reason) {
		case "empty":
			return file("The file has no readings. Choose the file that the logger exported.")
		case "binary":
			return file("This is no text file, whatever its name says. Export the readings as CSV and choose that file.")
		case "no-columns":
			return file(
				`No column with times and one with temperatures was found; a line reads “${refusal.line}”. Export time and temperature as CSV.`,
			)
		case "decimal-comma":
			return file(
				`Commas stand between the columns and in the figures: “${refusal.line}”. Export with semicolons, or with decimal points.`,
			)
		case "unreadable-rows":
			return file(
				`${refusal.count} lines have no time with a temperature, the first is line ${refusal.row}: “${refusal.line}”. Export the readings again without them.`,
			)
		case "mixed-units":
			return file(
				`Line ${refusal.row} is in another unit than those before: “${refusal.line}”. Export all of it in °C or all in °F.`,
			)
		case "mixed-zones":
			return file(
				`Line ${refusal.row} names a time zone where others do not, or the other way: “${refusal.line}”. Export all of it one way.`,
			)
		case "unit-unknown":
			return { field: "unit", message: "The file does not say whether it is in °C or °F. Choose it here." }
		case "dates-unclear":
			return {
				field: "dates",
				message: `Whether the month or the day stands first cannot be told from “${refusal.line}”. Choose it here.`,
			}
		case "unsorted":
			return file(
				`Reading ${refusal.reading} is earlier than the one before it. Sort the file by time, or export it again, and choose it anew.`,
			)
		case "in-the-future":
			return file(
				"The file has readings from times to come. Look at the logger's clock, or choose below how the file writes its days.",
			)
	}
}
