import { sql } from "drizzle-orm"
import { readProducer } from "~/db/transaction.server"
import type { CurveBucket } from "~/domain/cold-room/curve"
import type { LoggerReport } from "~/domain/cold-room/logger-report"

export type LoadLot = { code: string; productName: string; detail: string; pieces: number; state: string }

export type LoadProof = {
	id: string
	kind: "entry" | "logger"
	isAccepted: boolean
	rowTenthsC: number | null
	requiredMinutes: number | null
	/** Minutes at that row that count, without the allowance. */
	heldMinutes: number
	allowanceMinutes: number
	runFrom: Date | null
	runTo: Date | null
	fileName: string
	/** Null for a treatment entered by hand. */
	report: LoggerReport | null
	note: string
	who: string | null
	createdAt: Date
}

export type Load = {
	id: string
	number: number
	freezer: string
	loadedAt: Date
	provenAt: Date | null
	loadedBy: string | null
	lots: LoadLot[]
	/** The latest first. */
	proofs: LoadProof[]
	/** The curve of the accepted logger reading, or of the latest one; null when there is none. */
	curve: { proofId: string; buckets: CurveBucket[] } | null
}

type Row = Omit<LoadProof, "runFrom" | "runTo" | "createdAt" | "report"> & {
	runFrom: string | null
	runTo: string | null
	createdAt: string
	report: LoggerReport | Record<string, never>
}

/** One load with what lies in it and every reading of its treatment; null when the producer has none of that number. */
export function findLoad(query: { producerId: string; number: number }): Promise<Load | null> {
	const { producerId, number } = query
	return readProducer(producerId, async (tx) => {
		const {
			rows: [load],
		} = await tx.execute<
			Omit<Load, "loadedAt" | "provenAt" | "lots" | "proofs" | "curve"> & { loadedAt: string; provenAt: string | null }
		>(sql`
			select d.id, d.number, d.freezer, d.loaded_at as "loadedAt", d.proven_at as "provenAt", u.name as "loadedBy"
			from freezer_loads d left join users u on u.id = d.loaded_by
			where d.producer_id = ${producerId} and d.number = ${number}`)
		if (!load) return null
		const { rows: lots } = await tx.execute<LoadLot>(sql`
			select l.code, p.name as "productName", p.detail, m.pieces, l.state
			from freezer_load_lots m
			join lots l on l.producer_id = m.producer_id and l.id = m.lot_id
			join products p on p.producer_id = l.producer_id and p.id = l.product_id
			where m.producer_id = ${producerId} and m.load_id = ${load.id}
			order by l.code`)
		const { rows: proofs } = await tx.execute<Row>(sql`
			select f.id, f.kind, f.is_accepted as "isAccepted", f.row_tenths_c as "rowTenthsC",
				f.required_minutes as "requiredMinutes", f.held_minutes as "heldMinutes", f.allowance_minutes as "allowanceMinutes",
				f.run_from as "runFrom", f.run_to as "runTo", f.file_name as "fileName", f.report, f.note, u.name as who,
				f.created_at as "createdAt"
			from freeze_proofs f left join users u on u.id = f.entered_by
			where f.producer_id = ${producerId} and f.load_id = ${load.id}
			order by f.created_at desc, f.id desc
			limit 50`)
		const {
			rows: [curve],
		} = await tx.execute<{ proofId: string; buckets: CurveBucket[] }>(sql`
			select f.id as "proofId", f.curve as buckets from freeze_proofs f
			where f.producer_id = ${producerId} and f.load_id = ${load.id} and jsonb_array_length(f.curve) > 1
			order by f.is_accepted desc, f.created_at desc, f.id desc
			limit 1`)
		return {
			...load,
			loadedAt: new Date(load.loadedAt),
			provenAt: load.provenAt === null ? null : new Date(load.provenAt),
			lots,
			proofs: proofs.map(({ report, ...proof }) => ({
				...proof,
				report: "readings" in report ? (report as LoggerReport) : null,
				runFrom: proof.runFrom === null ? null : new Date(proof.runFrom),
				runTo: proof.runTo === null ? null : new Date(proof.runTo),
				createdAt: new Date(proof.createdAt),
			})),
			curve: curve ?? null,
		}
	})
}
