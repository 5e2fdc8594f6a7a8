import { Link } from "react-router"
import { shortMonthDay } from "~/domain/calendar"
import type { Advice } from "~/domain/crop/advice"
import type { BoardHive, BoardSuper, BoardYard } from "~/domain/crop/board"
import { sectionsOf } from "~/domain/crop/super-drawing"
import { counted } from "~/ui/desk/number-words"
import { SuperBlock } from "~/ui/stock/super-block"
import { ADVICE_ORDER, adviceGroupWords } from "./advice-words"

/** The hives of a yard side by side, the supers on each stacked as on the hive. `base` is the address of the crop pages. */
export function YardBoard({ yard, base }: { yard: BoardYard; base: string }) {
	const headId = `yard-${yard.id}`
	return (
		<section className="crop-yard" aria-labelledby={headId}>
			<div>
				<h2 className="name" id={headId}>
					{yard.name}
				</h2>
				<p className="aside">
					{yard.flora && `${yard.flora}, `}
					{counted(yard.hives.length, "hive")}
				</p>
				<Link className="inline-block py-1" to={`${base}/yards/${yard.id}`}>
					Look into them
				</Link>
			</div>
			<div className="min-w-0">
				<div className="crop-hives">
					{yard.hives.map((hive) => (
						<Hive key={hive.id} hive={hive} base={base} />
					))}
				</div>
				<YardHints yard={yard} />
			</div>
		</section>
	)
}

function Hive({ hive, base }: { hive: BoardHive; base: string }) {
	return (
		<div className="crop-hive">
			<div className="crop-stack">
				{hive.supers.map((one) => (
					<SuperLink key={one.id} one={one} base={base} />
				))}
			</div>
			<h3>Hive {hive.label}</h3>
			{hive.supers.length === 0 && <p className="note">no super on</p>}
		</div>
	)
}

function SuperLink({ one, base }: { one: BoardSuper; base: string }) {
	const { latest, isReady, isUnseen } = one
	const [left, right] = captionOf(one)
	const checks = latest ? [latest] : []
	return (
		<Link className={isReady ? "crop-super is-ready" : "crop-super"} to={`${base}/supers/${one.id}`}>
			<SuperBlock
				sections={sectionsOf({ capacityPieces: one.capacityPieces, checks })}
				isReady={isReady}
				isUnseen={isUnseen}
				label={`Super ${one.level}, ${one.productName}${latest ? `, ${latest.filledPercent}% filled` : ""},`}
			/>
			<span className="crop-caption">
				<span>{left}</span> <span>{right}</span>
			</span>
		</Link>
	)
}

/** Capped share, and the day it comes off or what can be done. */
function captionOf({ latest, isClearing, isReady, isUnseen, readyOn }: BoardSuper): [string, string] {
	const capped = latest ? `${latest.cappedPercent}% capped` : isUnseen ? "never seen" : "just set on"
	if (isClearing) return [capped, "clearing"]
	return [capped, isReady ? "take off" : shortMonthDay(readyOn)]
}

/** What the checks suggest in a yard, one line for each kind of hint with the hives it is about. */
function YardHints({ yard }: { yard: BoardYard }) {
	const hivesOf = (kind: Advice["kind"]) =>
		yard.hives
			.filter(({ supers }) => supers.some(({ advice }) => advice.some((hint) => hint.kind === kind)))
			.map(({ label }) => label)
	const hints = ADVICE_ORDER.map((kind) => ({ kind, hives: hivesOf(kind) })).filter(({ hives }) => hives.length > 0)
	if (hints.length === 0) return null
	return (
		<ul className="crop-hints aside">
			{hints.map(({ kind, hives }) => {
				const { head, reason } = adviceGroupWords(kind)
				return (
					<li key={kind}>
						<b>{head}:</b> {hiveWords(hives)}; {reason}.
					</li>
				)
			})}
		</ul>
	)
}

const MOST_NAMED = 8

/** "hive 3", "hives 1, 2 and 7", "hives 1, 2 … and 14 more". */
export function hiveWords(labels: readonly string[]): string {
	const once = [...new Set(labels)]
	if (once.length === 1) return `hive ${once[0]}`
	if (once.length > MOST_NAMED) {
		return `hives ${once.slice(0, MOST_NAMED).join(", ")} and ${once.length - MOST_NAMED} more`
	}
	return `hives ${once.slice(0, -1).join(", ")} and ${once.at(-1)}`
}
