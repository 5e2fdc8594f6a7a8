import { withProducer } from "~/db/transaction.server"
import {
	coolingAllowance,
	enteredRuns,
	type FreezeVerdict,
	judgeFreezing,
	type ProbePlace,
	type TemperatureUnit,
} from "~/domain/cold-room/freezing"
import type { Result } from "~/domain/result"
import { lockLoad, writeProof } from "./write-proof.server"

export type EnteredTreatment = {
	producerId: string
	personId: string
	number: number
	/** Made with the form: a second send of it changes nothing. */
	proofId: string
	temperature: number
	unit: TemperatureUnit
	minutes: number
	probe: ProbePlace
	note: string
	now: Date
}

export type EnteredTreatmentAnswer = Result<
	{ verdict: FreezeVerdict },
	{ ok: false; reason: "no-such-load" } | { ok: false; reason: "longer-than-in"; mostMinutes: number }
>

/**
 * Judges a treatment read off a thermometer: so many minutes at a temperature or colder, with the allowance for where the
 * probe was. It is kept whether or not it proves the load. Refused when it is longer than the load has been in.
 */
export function enterTreatment(entry: EnteredTreatment): Promise<EnteredTreatmentAnswer> {
	const { producerId, minutes, probe, temperature, unit, now } = entry
	return withProducer(producerId, async (tx): Promise<EnteredTreatmentAnswer> => {
		const load = await lockLoad(tx, entry)
		if (!load) return { ok: false, reason: "no-such-load" }
		const mostMinutes = Math.floor((now.getTime() - load.loadedAt.getTime()) / 60_000)
		if (minutes > mostMinutes) return { ok: false, reason: "longer-than-in", mostMinutes: Math.max(0, mostMinutes) }
		const verdict = judgeFreezing(enteredRuns(entry), coolingAllowance(probe))
		const proof = {
			producerId,
			id: entry.proofId,
			loadId: load.id,
			kind: "entry" as const,
			isAccepted: verdict.isProven,
			rowTenthsC: verdict.row.tenthsC,
			requiredMinutes: verdict.row.minutes,
			heldMinutes: verdict.countedMinutes,
			allowanceMinutes: coolingAllowance(probe),
			report: { entered: { temperature, unit, minutes, probe } },
			note: entry.note,
			enteredBy: entry.personId,
		}
		await writeProof(tx, proof, now)
		return { ok: true, verdict }
	})
}
