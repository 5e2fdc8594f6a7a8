import { useId, useState } from "react"
import { Form, Link, useNavigation } from "react-router"
import { casesWords, parseCases } from "~/domain/quantity"
import type { Claim, SharingRule } from "~/domain/sharing/share-out"
import { storeSentence } from "~/domain/sharing/share-words"
import { countHead, countWords } from "~/ui/desk/number-words"
import { Button } from "~/ui/forms/button"
import { QuantityField } from "~/ui/forms/quantity-field"
import { FillStrip } from "~/ui/stock/fill-strip"
import { HandFields, handName } from "./hand-fields"
import { RuleTable } from "./rule-table"
import { type ShareRow, type ToldRule, tellRules } from "./told-rules"

export type ShareSheetProps = {
	/** "Tuesday". */
	dayName: string
	rows: readonly ShareRow[]
	/** Of the rows, in their order. */
	claims: readonly Claim[]
	supply: number
	/** The rule that the address or the refused form names. */
	rule: SharingRule
	/** What the address supposes to be ready, as typed; empty where it supposes nothing. */
	suppose: string
	seen: string
	idempotencyKey: string
	values: Record<string, string>
	errors: Record<string, string>
}

/** A supply that is supposed: only what reads as cases counts. */
function readSupposed(typed: string, supply: number): { cases: number; error: string | null } {
	if (typed.trim() === "") return { cases: supply, error: null }
	const read = parseCases(typed)
	return read.ok ? { cases: read.cases, error: null } : { cases: supply, error: read.message }
}

/** The rules for what is there, or for what is supposed to be; then one decision. The rule works without a script. */
export function ShareSheet(props: ShareSheetProps) {
	const { rows, claims, supply, values, errors } = props
	const [rule, setRule] = useState(props.rule)
	const [suppose, setSuppose] = useState(props.suppose)
	const [hand, setHand] = useState<Record<string, string>>({})
	const supposed = readSupposed(suppose, supply)
	const rules = tellRules(rows, claims, supposed.cases)
	const told = rules.find((one) => one.rule === rule) as ToldRule
	const given = rows.map((row, index) => {
		const typed = hand[row.lineId] ?? values[handName(row.lineId)] ?? ""
		const read = parseCases(typed)
		return typed.trim() !== "" && read.ok ? read.cases : (told.rows[index]?.given ?? 0)
	})
	const total = rows.reduce((sum, row, index) => sum + (given[index] ?? 0) - row.sureCases, 0)
	return (
		<>
			<Supply {...props} supposed={supposed} suppose={suppose} rule={rule} onSuppose={setSuppose} />
			<Form method="post" noValidate>
				<input type="hidden" name="seen" value={props.seen} />
				<input type="hidden" name="idempotencyKey" value={props.idempotencyKey} />
				<RuleTable
					rows={rows}
					rules={rules}
					chosen={rule}
					onChoose={setRule}
					margin={(row, index) => (
						<Instead
							row={row}
							isShort={(given[index] ?? 0) < row.askedCases}
							chosen={values[`instead-${row.lineId}`]}
						/>
					)}
				/>
				<div className="share-acts">
					<div>
						<Decide total={total} stores={storesOf(rows)} supply={supply} supposed={supposed.cases} />
						<HandFields
							rows={rows}
							ruled={told.rows.map((row) => row.given)}
							supply={supposed.cases}
							total={total}
							values={values}
							errors={errors}
							onType={(lineId, typed) => setHand((before) => ({ ...before, [lineId]: typed }))}
						/>
						<LeastKey />
					</div>
					<p className="aside">{readWords(rows, told)}</p>
				</div>
			</Form>
		</>
	)
}

const storesOf = (rows: readonly ShareRow[]) => new Set(rows.map(({ storeId }) => storeId)).size

/** "18 cases can be ready for Tuesday. Nine stores ask for 31.", drawn, and a field to suppose another supply. */
function Supply(
	props: ShareSheetProps & {
		supposed: { cases: number; error: string | null }
		onSuppose: (typed: string) => void
	},
) {
	const { rows, claims, supply, supposed, suppose, onSuppose, rule, dayName } = props
	const asked = claims.reduce((sum, claim) => sum + claim.asked, 0)
	const stores = storesOf(rows)
	const isSupposed = supposed.cases !== supply
	const errorId = useId()
	return (
		<div className="share-supply">
			<FillStrip
				size="lg"
				runs={[
					{ state: "free", count: Math.min(supposed.cases, asked) },
					{ state: "short", count: Math.max(0, asked - supposed.cases) },
				]}
				label={`${supposed.cases} can be ready, ${Math.max(0, asked - supposed.cases)} short`}
			/>
			<p aria-live="polite">
				{isSupposed ? "Suppose " : ""}
				<b>{casesWords(supposed.cases)}</b> {isSupposed ? "were" : "can be"} ready for {dayName}. {countHead(stores)}{" "}
				{stores === 1 ? "store asks" : "stores ask"} for <b>{asked}</b>
				{rows.some((row) => row.sureCases > 0) && " beyond what is sure"}.
			</p>
			<Form method="get" className="share-suppose no-print" preventScrollReset>
				<input type="hidden" name="rule" value={rule} />
				<span aria-hidden="true">What if so many cases were ready</span>
				<QuantityField
					name="suppose"
					label="What if so many cases were ready"
					defaultValue={suppose}
					placeholder={String(supply)}
					error={supposed.error}
					errorId={errorId}
					onChange={(event) => onSuppose(event.currentTarget.value)}
				/>
				<Button size="small">Look</Button>
				{supposed.error && (
					<span className="field-error" id={errorId}>
						{supposed.error}
					</span>
				)}
			</Form>
		</div>
	)
}

function Decide(props: { total: number; stores: number; supply: number; supposed: number }) {
	const { total, stores, supply, supposed } = props
	const isSending = useNavigation().formMethod === "POST"
	const tell = `tell ${countWords(stores)} ${stores === 1 ? "store" : "stores"}`
	const reason =
		supposed === supply ? undefined : (
			<>
				This is a supposition: {casesWords(supply)} can be ready. <Link to="?">Back to what is there</Link>
			</>
		)
	return (
		<Button
			variant="primary"
			size="big"
			name="intent"
			value="share"
			busy={isSending}
			busyLabel="Sharing out"
			disabledReason={reason}
		>
			{total > 0 ? `Promise ${casesWords(total)} and ${tell}` : tell.charAt(0).toUpperCase() + tell.slice(1)}
		</Button>
	)
}

/** What is over and may stand in for what a store does not get. */
function Instead({ row, isShort, chosen }: { row: ShareRow; isShort: boolean; chosen: string | undefined }) {
	if (!isShort) return null
	return row.instead.slice(0, 1).map(({ productId, code, name, overCases }) => (
		<label key={productId} className="share-instead">
			<input
				type="checkbox"
				name={`instead-${row.lineId}`}
				value={productId}
				defaultChecked={chosen === productId}
				aria-label={`${row.storeName} takes ${name} instead`}
			/>
			<span>
				{code} {name}: {overCases} over; takes it instead
			</span>
		</label>
	))
}

function LeastKey() {
	return (
		<p className="share-key">
			<svg width="26" height="26" viewBox="0 0 26 26" aria-hidden="true">
				<path className="c-free" d="M2 5h7v16h-7z" />
				<path className="c-least" d="M11 1v24m-3 0h6" />
				<path className="c-short" d="M13 20h7" />
			</svg>
			The stroke marks the least a store would take.
		</p>
	)
}

/** What a store would read, for the first that gets less than it asked. */
function readWords(rows: readonly ShareRow[], { told, rows: shares }: ToldRule): string {
	const short = rows.findIndex((row, index) => {
		const given = shares[index]?.given ?? 0
		return given > 0 && given < row.askedCases
	})
	const index = short === -1 ? 0 : short
	const row = rows[index]
	if (!row) return ""
	const result = { asked: row.askedCases, given: shares[index]?.given ?? 0, sure: row.sureCases, byHand: null }
	return `Stores read: “${storeSentence(told, index, result)}”`
}
