import { sql } from "drizzle-orm"
import { lotReleases } from "~/db/schema"
import type { Tx } from "~/db/transaction.server"

type Release = {
	lotId: string
	kind: "proven" | "by-hand"
	reason: string
	freezeProofId: string | null
	netCheckId: string | null
}

type Given = {
	producerId: string
	personId: string
	toLotId: string
	kind: "split" | "merge" | "cut-up"
	from: readonly { id: string; code: string }[]
}

/**
 * Puts the release of released lots on record for the lot made of them, so that its proof stands. A split keeps the proofs
 * of the lot it came from; a merged lot names each lot with how it was released, as no one proof covers it.
 */
export async function copyReleases(tx: Tx, given: Given): Promise<void> {
	const { producerId, personId, toLotId, from } = given
	const { rows } = await tx.execute<Release>(sql`
		select lot_id as "lotId", kind, reason, freeze_proof_id as "freezeProofId", net_check_id as "netCheckId"
		from lot_releases
		where producer_id = ${producerId} and lot_id = any(${sql.param(from.map(({ id }) => id))}::uuid[])`)
	const [only] = rows
	const reason = from
		.map(({ id, code }) =>
			wordsOf(
				code,
				rows.find(({ lotId }) => lotId === id),
			),
		)
		.join("; ")
	const row = { producerId, lotId: toLotId, releasedBy: personId }
	if (given.kind === "split" && only) {
		const { kind, freezeProofId, netCheckId } = only
		await tx.insert(lotReleases).values({ ...row, kind, freezeProofId, netCheckId, reason: `split from ${reason}` })
		return
	}
	const begins = given.kind === "split" ? "split from" : "merged from"
	await tx.insert(lotReleases).values({ ...row, kind: "by-hand", reason: `${begins} ${reason}` })
}

function wordsOf(code: string, release: Release | undefined): string {
	if (!release) return `lot ${code}, released before releases were put on record`
	const how = release.kind === "proven" ? "released on its proofs" : "released by hand"
	return `lot ${code}, ${how}${release.reason === "" ? "" : `: ${release.reason}`}`
}
