import { z } from "zod"
import { verifiedDeclaration } from "~/domain/labelling/verified-declaration"
import { plainDecimal } from "~/domain/scale/fraction"
import type { NetContentsInput, WrittenWeight } from "~/domain/scale/net-contents"
import { doubtWords, weightsRefusalWords } from "~/domain/scale/net-contents-words"
import { parseWeights } from "~/domain/scale/parse-weights"
import { weightDoubt } from "~/domain/scale/unit-doubt"
import { exactlyIn, parseWeight, type Weight, type WeightUnit, weightUnits } from "~/domain/scale/weight-units"
import type { TypedWeighing } from "~/ui/scale/weigh-form"

export type FieldFault = { field?: string; message: string }

/** The largest file of weights that is read. */
const MOST_BYTES = 256 * 1024
const MOST_NOTE = 500

const head = z.object({
	packages: z
		.string()
		.trim()
		.regex(/^\d{1,7}$/, "Write how many packages are in the lot, in figures.")
		.transform(Number)
		.refine((count) => count > 0, "Write how many packages are in the lot, 1 or more."),
	unit: z.enum(weightUnits, "Choose what the scale shows."),
	note: z.string().trim().max(MOST_NOTE, `Shorten the note to ${MOST_NOTE} characters.`),
})

const textOf = (form: FormData, name: string) => String(form.get(name) ?? "").slice(0, 20_000)

/** What stands in the form; a file is read into the box of pasted weights, so that nothing sent is lost. */
export async function readTyped(form: FormData): Promise<{ typed: TypedWeighing; faults: FieldFault[] }> {
	const typed: TypedWeighing = {
		packages: textOf(form, "packages"),
		inchPound: textOf(form, "inchPound"),
		metric: textOf(form, "metric"),
		unit: textOf(form, "unit"),
		division: textOf(form, "division"),
		tareWeighed: textOf(form, "tareWeighed"),
		tareEntered: textOf(form, "tareEntered"),
		weights: form.getAll("weight").slice(0, 48).map(String),
		pasted: textOf(form, "pasted"),
		isSure: form.get("isSure") === "yes",
		note: textOf(form, "note"),
	}
	const file = form.get("file")
	if (!(file instanceof File) || file.size === 0) return { typed, faults: [] }
	const read = await readFile(file)
	if (!read.ok) return { typed, faults: [{ field: "file", message: read.message }] }
	if (typed.pasted.trim() !== "") {
		const message = "There is a file and there are weights in the box. Empty the box, or leave the file out."
		return { typed, faults: [{ field: "file", message }] }
	}
	return { typed: { ...typed, pasted: read.text }, faults: [] }
}

async function readFile(file: File): Promise<{ ok: true; text: string } | { ok: false; message: string }> {
	if (file.size > MOST_BYTES) {
		return { ok: false, message: "The file is larger than 256 KB. Send the weights of the sample only." }
	}
	const bytes = new Uint8Array(await file.arrayBuffer())
	const isWide = bytes[0] === 0xff && bytes[1] === 0xfe
	try {
		const text = new TextDecoder(isWide ? "utf-16le" : "utf-8", { fatal: true }).decode(bytes)
		if (!text.includes("\u0000")) return { ok: true, text: text.slice(0, 20_000) }
	} catch {
		// Bytes that are no text are told the same way.
	}
	return { ok: false, message: "The file is not text, whatever its name says. Save the sheet as CSV and send that." }
}

/** A field that holds one weight: empty is null, what is no weight is a fault. */
function weightIn(text: string, unit: WeightUnit): Weight | null | "wrong" {
	if (text.trim() === "") return null
	const read = parseWeight(text, unit)
	return read.ok && read.weight.amount.top > 0n ? read.weight : "wrong"
}

const written = ({ amount, unit }: Weight): WrittenWeight => ({ amount: plainDecimal(amount, 12), unit })

type Read<Value> = { value: Value; faults: FieldFault[] }

function readLabel(typed: TypedWeighing): Read<{ inchPound: Weight | null; metric: Weight | null }> {
	const faults: FieldFault[] = []
	const inchPound = weightIn(typed.inchPound, "oz")
	const metric = weightIn(typed.metric, "g")
	const isInchPound = inchPound !== "wrong" && inchPound?.unit !== "g"
	const isMetric = metric !== "wrong" && (metric === null || metric.unit === "g")
	if (!isInchPound) faults.push({ field: "inchPound", message: "Write ounces or pounds, such as 12 oz or 1 lb 8 oz." })
	if (!isMetric) faults.push({ field: "metric", message: "Write grams, such as 340." })
	if (faults.length === 0 && !inchPound && !metric) {
		faults.push({ field: "inchPound", message: "Write what the label declares, in ounces, in grams or in both." })
	}
	return { value: { inchPound: isInchPound ? inchPound : null, metric: isMetric ? metric : null }, faults }
}

function readTare(typed: TypedWeighing, unit: WeightUnit): Read<NetContentsInput["tare"]> {
	const nothing = { kind: "weighed" as const, weights: [] }
	if (typed.tareWeighed.trim() !== "" && typed.tareEntered.trim() !== "") {
		const message = "Either empty packages were weighed now or the tare is known. Empty one of the two fields."
		return { value: nothing, faults: [{ field: "tareEntered", message }] }
	}
	if (typed.tareEntered.trim() !== "") {
		const weight = parseWeights(typed.tareEntered, unit)
		const [only, another] = weight.ok ? weight.weights : []
		if (only !== undefined && another === undefined) return { value: { kind: "entered", weight: only }, faults: [] }
		return { value: nothing, faults: [{ field: "tareEntered", message: "Write one weight, such as 28." }] }
	}
	const read = parseWeights(typed.tareWeighed, unit)
	if (read.ok) return { value: { kind: "weighed", weights: read.weights }, faults: [] }
	const message =
		read.reason === "empty"
			? "Write what the empty packages weigh, here or as a known tare below."
			: weightsRefusalWords(read)
	return { value: nothing, faults: [{ field: "tareWeighed", message }] }
}

function readPackages(typed: TypedWeighing, unit: WeightUnit): Read<string[]> {
	const isTyped = typed.weights.some((weight) => weight.trim() !== "")
	const isPasted = typed.pasted.trim() !== ""
	if (isTyped && isPasted) {
		const message = "There are weights in the fields and in the box. Empty one of the two."
		return { value: [], faults: [{ field: "pasted", message }] }
	}
	if (isPasted || !isTyped) {
		const read = parseWeights(typed.pasted, unit)
		if (read.ok) return { value: read.weights, faults: [] }
		const field = isPasted ? "pasted" : "weight-0"
		return { value: [], faults: [{ field, message: weightsRefusalWords(read) }] }
	}
	const faults: FieldFault[] = []
	const value = typed.weights.map((weight, place) => {
		const read = weight.trim() === "" ? null : parseWeights(weight, unit)
		const [only = "", another] = read?.ok ? read.weights : []
		if (only === "" || another !== undefined) {
			const message = read ? "write one weight, such as 368" : "its weight is missing"
			faults.push({ field: `weight-${place}`, message: `Package ${place + 1}: ${message}.` })
		}
		return only
	})
	return { value, faults }
}

function readDivision(text: string, unit: WeightUnit): Read<string | null> {
	const division = weightIn(text, unit)
	if (division === null) return { value: null, faults: [] }
	if (division !== "wrong") return { value: plainDecimal(exactlyIn(division, unit), 9), faults: [] }
	return {
		value: null,
		faults: [{ field: "division", message: "Write the division of the scale, such as 1 or 0.002." }],
	}
}

/**
 * Reads a weighing as typed into what the method asks for, or all that is wrong with it. Weights that cannot be right (all
 * about 28.35 or 453.6 times off, or one far off) are asked about once, and taken when the person says they are right.
 */
export function readWeighing(
	typed: TypedWeighing,
): { ok: true; input: NetContentsInput; note: string } | { ok: false; faults: FieldFault[]; asks: boolean } {
	const parsed = head.safeParse(typed)
	const unit = parsed.data?.unit ?? z.enum(weightUnits).catch("g").parse(typed.unit)
	const label = readLabel(typed)
	const division = readDivision(typed.division, unit)
	const tare = readTare(typed, unit)
	const packages = readPackages(typed, unit)
	const faults: FieldFault[] = [
		...(parsed.error?.issues.map(({ path, message }) => ({ field: String(path[0]), message })) ?? []),
		...[label, division, tare, packages].flatMap((part) => part.faults),
	]
	if (!parsed.success || faults.length > 0) return { ok: false, faults, asks: false }
	const { inchPound, metric } = label.value
	const doubt = typed.isSure ? null : weightDoubt(packages.value, unit, verifiedDeclaration(label.value).weight)
	if (doubt) {
		const field = doubt.kind === "unit" ? "unit" : typed.pasted.trim() ? "pasted" : `weight-${doubt.places[0] ?? 0}`
		return { ok: false, faults: [{ field, message: doubtWords(doubt, unit) }], asks: true }
	}
	const input: NetContentsInput = {
		lotPackages: parsed.data.packages,
		label: { inchPound: inchPound && written(inchPound), metric: metric && written(metric) },
		unit,
		division: division.value,
		tare: tare.value,
		packages: packages.value.map((gross) => ({ gross })),
	}
	return { ok: true, input, note: parsed.data.note }
}

/** The field that a refusal of the method is about. */
export function fieldOfRefusal(reason: string, typed: TypedWeighing): string {
	const weights = typed.pasted.trim() === "" ? "weight-0" : "pasted"
	const fields: Record<string, string> = {
		"no-label": "inchPound",
		"over-the-table": "inchPound",
		"no-packages": "packages",
		"more-than-harvested": "packages",
		"too-few-tares": "tareWeighed",
		"tare-too-heavy": typed.tareEntered.trim() === "" ? "tareWeighed" : "tareEntered",
	}
	return fields[reason] ?? weights
}
