import { Link } from "react-router"
import { type Day, fullDay } from "~/domain/calendar"
import { type Fact, FactList } from "./lot-facts"

type Made = { from: string; to: string; kind: "split" | "merge" | "cut-up"; pieces: number; piecesMade: number }

export type History = {
	code: string
	productName: string
	detail: string
	state: "held" | "released" | "withdrawn"
	harvestedOn: Day
	bestBeforeOn: Day
	piecesHarvested: number
	yard: string
	flora: string
	harvestNote: string
	supers: readonly { hive: string; yard: string; setOn: Day; offOn: Day | null; finishedPieces: number | null }[]
	gradings: readonly { gradedOn: Day; grade: string; schemeName: string }[]
	freezings: readonly { loadNumber: number; freezer: string; provenOn: Day | null }[]
	weighings: readonly { checkedOn: Day; hasPassed: boolean }[]
	release: { kind: "proven" | "by-hand"; reason: string; releasedOn: Day; by: string | null } | null
}

/** Where lots come from: each with its harvest, supers, proofs and release, the ones asked for first. */
export function LotHistories({
	lots,
	links,
	lotsHref,
}: {
	lots: readonly History[]
	links: readonly Made[]
	lotsHref: string
}) {
	return lots.map((lot) => (
		<section key={lot.code} aria-labelledby={`history-${lot.code}`} className="beside-margin pt-4">
			<h3 className="name px-4 desk:px-8" id={`history-${lot.code}`}>
				<Link to={`${lotsHref}/${encodeURIComponent(lot.code)}`}>Lot {lot.code}</Link>
				<span className="note ml-2">
					{lot.productName}, {lot.detail}; {lot.state}
				</span>
			</h3>
			<FactList facts={factsOf(lot, links)} />
		</section>
	))
}

function factsOf(lot: History, links: readonly Made[]): Fact[] {
	const cameFrom = links.filter(({ to }) => to === lot.code)
	const harvest = [
		fullDay(lot.harvestedOn),
		lot.yard,
		lot.flora,
		cameFrom.length === 0 && `${lot.piecesHarvested} pieces`,
		lot.harvestNote,
	]
	return [
		{ name: "Off the hives", fact: harvest.filter(Boolean).join(", ") },
		{ name: "Supers", fact: lot.supers.map(superWords).join("; ") },
		{ name: "Made from", fact: cameFrom.map(linkWords).join("; ") },
		{
			name: "Graded",
			fact: lot.gradings.map((one) => `${one.grade} by ${one.schemeName}, ${fullDay(one.gradedOn)}`).join("; "),
		},
		{
			name: "Frozen",
			fact: lot.freezings
				.map(
					(one) =>
						`load ${one.loadNumber}, ${one.freezer}${one.provenOn ? `, proven ${fullDay(one.provenOn)}` : ", not proven"}`,
				)
				.join("; "),
		},
		{
			name: "Weighed",
			fact: lot.weighings.map((one) => `${one.hasPassed ? "passed" : "failed"} ${fullDay(one.checkedOn)}`).join("; "),
		},
		{ name: "Released", fact: lot.release ? releaseWords(lot.release) : "" },
		{ name: "Best before", fact: fullDay(lot.bestBeforeOn) },
	]
}

function superWords({ hive, yard, setOn, offOn, finishedPieces }: History["supers"][number]): string {
	const off = offOn ? `, off ${fullDay(offOn)}` : ""
	const pieces = finishedPieces === null ? "" : `, ${finishedPieces} pieces`
	return `hive ${hive} at ${yard}, set on ${fullDay(setOn)}${off}${pieces}`
}

function linkWords({ from, kind, pieces, piecesMade }: Made): string {
	if (kind === "cut-up") return `${pieces} pieces of lot ${from}, cut up into ${piecesMade}`
	return `${pieces} pieces of lot ${from}`
}

function releaseWords({ kind, reason, releasedOn, by }: NonNullable<History["release"]>): string {
	const whom = by ? ` by ${by}` : ""
	if (kind === "proven") return `${fullDay(releasedOn)}${whom}, frozen and weighed`
	return `by hand${whom}, ${fullDay(releasedOn)}: ${reason}`
}
