import type { ReactNode } from "react"
import type { SharingRule } from "~/domain/sharing/share-out"
import { RULE_NAMES, ruleSentence } from "~/domain/sharing/share-words"
import { Icon } from "~/ui/icons"
import { FillStrip } from "~/ui/stock/fill-strip"
import type { ShareRow, ToldRule } from "./told-rules"

type RuleTableProps = {
	rows: readonly ShareRow[]
	rules: readonly ToldRule[]
	chosen: SharingRule
	onChoose: (rule: SharingRule) => void
	/** What stands in the margin beside a row, under the reason. */
	margin?: (row: ShareRow, index: number) => ReactNode
}

/** The three rules side by side: asked and given by store, drawn, with the least acceptable and the reasons of the chosen. */
export function RuleTable({ rows, rules, chosen, onChoose, margin }: RuleTableProps) {
	const told = rules.find(({ rule }) => rule === chosen)
	const asked = rows.reduce((sum, row) => sum + row.askedCases, 0)
	return (
		<table className="share-table">
			<thead>
				<tr>
					<th scope="col" className="st">
						Store
					</th>
					<th scope="col" className="ask">
						Asked
					</th>
					<th scope="col" className="lst">
						{lastHead(rows)}
					</th>
					{rules.map((one) => (
						<th key={one.rule} scope="col" className={one.rule === chosen ? "rule on" : "rule"}>
							<label>
								<input
									type="radio"
									name="rule"
									value={one.rule}
									defaultChecked={one.rule === chosen}
									onChange={() => onChoose(one.rule)}
								/>
								<b>{RULE_NAMES[one.rule]}</b>
								<span>{ruleSentence(one.told)}</span>
							</label>
						</th>
					))}
					<th scope="col" className="m aside">
						Why, with {RULE_NAMES[chosen].toLowerCase()}
					</th>
				</tr>
			</thead>
			<tbody>
				{rows.map((row, index) => (
					<tr key={row.lineId}>
						<th scope="row" className="st">
							<span className="name">{row.storeName}</span>
							{row.weightPercent !== 100 && <span className="note"> counts {row.weightPercent / 100} times</span>}
						</th>
						<td className="ask">
							{row.askedCases}
							<span className="desk:hidden"> asked</span>
						</td>
						<td className="lst">
							{row.last ? `${row.last.given} of ${row.last.asked}` : "new"}
							{row.last && <span className="desk:hidden"> when last short</span>}
						</td>
						{rules.map((one) => (
							<RuleCell key={one.rule} row={row} told={one} index={index} isChosen={one.rule === chosen} />
						))}
						<td className="m aside">
							{told?.rows[index]?.reason}
							{margin?.(row, index)}
						</td>
					</tr>
				))}
			</tbody>
			<tfoot>
				<tr>
					<th scope="row" className="st">
						Together
					</th>
					<td className="ask">
						<b>{asked}</b>
						<span className="desk:hidden"> asked</span>
					</td>
					<td className="lst" />
					{rules.map(({ rule, verdict }) => (
						<td key={rule} className={rule === chosen ? "rule on" : "rule"}>
							<span className="share-rule-name">{RULE_NAMES[rule]}</span>
							<span className={verdict.isGood ? "verdict can" : "verdict short"}>
								<Icon name={verdict.isGood ? "tick" : "cross"} size={14} /> {verdict.head}
							</span>{" "}
							<span className="soft">{verdict.line}</span>
						</td>
					))}
					<td className="m" />
				</tr>
			</tfoot>
		</table>
	)
}

function RuleCell(props: { row: ShareRow; told: ToldRule; index: number; isChosen: boolean }) {
	const { row, told, index, isChosen } = props
	const { given, isAside } = told.rows[index] ?? { given: 0, isAside: false }
	const { askedCases, leastCases } = row
	const isUnder = isAside || given < leastCases
	const least = leastCases > 0 ? `, least ${leastCases}` : ""
	return (
		<td className={isChosen ? "rule on" : "rule"}>
			<span className="share-rule-name">{RULE_NAMES[told.rule]}</span>
			<div className="got">
				<FillStrip
					size="lg"
					countsThrough
					{...(leastCases > 0 ? { least: leastCases } : {})}
					runs={[
						{ state: "free", count: given },
						{ state: "short", count: askedCases - given },
					]}
					label={`given ${given} of ${askedCases} asked${least}`}
				/>
				<span className={isUnder ? "fig under" : "fig"}>
					<b>{given}</b> of {askedCases}
					{isUnder && <small>under least</small>}
				</span>
			</div>
		</td>
	)
}

/** "Aug 4, when last short", where it was the same day for all; each row says no more then than its figures. */
function lastHead(rows: readonly ShareRow[]): string {
	const days = [...new Set(rows.flatMap(({ last }) => last?.when ?? []))]
	return days.length === 1 ? `${days[0]}, when last short` : "When last short"
}
