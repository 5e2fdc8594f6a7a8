import { Form, Link } from "react-router"
import { casesWords } from "~/domain/quantity"
import { Button } from "~/ui/forms/button"
import { LedgerGroup, LedgerRow } from "~/ui/layout/ledger"
import { caseAndPieceWords } from "./number-words"
import { WeighedPrice, WeighField, type WeighPosted } from "./weigh-field"

type Pick = {
	place: "ready" | "cold-room"
	lotCode: string
	code: string
	productName: string
	pieces: number
	piecesPerCase: number
	/** In words. */
	bestBefore: string
}

const PLACE_WORDS = { ready: "Ready shelf", "cold-room": "Cold room" } as const

/** What to take for a whole day, by place and lot. */
export function PickTable({ picks, lotsHref }: { picks: readonly Pick[]; lotsHref: string }) {
	return (
		<table className="sheet-table">
			<caption className="head-italic px-4 pt-2 pb-1 text-left desk:px-8">To take from the shelves</caption>
			<thead>
				<tr>
					<th scope="col">Place</th>
					<th scope="col">Lot</th>
					<th scope="col">Product</th>
					<th scope="col" className="max-desk:hidden">
						Best before
					</th>
					<th scope="col" className="num pr-4! desk:pr-8!">
						Take
					</th>
				</tr>
			</thead>
			<tbody>
				{picks.map((pick) => (
					<tr key={`${pick.place} ${pick.lotCode}`}>
						<td>{PLACE_WORDS[pick.place]}</td>
						<td>
							<Link className="inline-block py-1 fig" to={`${lotsHref}/${pick.lotCode}`}>
								{pick.lotCode}
							</Link>
						</td>
						<td>
							<span className="fig text-ink-faint">{pick.code}</span> {pick.productName}
						</td>
						<td className="max-desk:hidden">{pick.bestBefore}</td>
						<td className="num pr-4! desk:pr-8!">
							<b>{caseAndPieceWords(pick.pieces, pick.piecesPerCase)}</b>
						</td>
					</tr>
				))}
			</tbody>
		</table>
	)
}

type PackingOrder = {
	number: number
	state: "confirmed" | "packed"
	storeName: string
	lines: readonly {
		id: string
		code: string
		productName: string
		cases: number
		lots: readonly { code: string; pieces: number }[]
		missingPieces: number
		byWeight: { poundCents: number; usualGrams: number; weighedGrams: number | null } | null
	}[]
}

/** What was typed for one order and refused. */
type Posted = WeighPosted & { number: number }

/** The orders of a day, each with what goes into it and its one next step; what is to pack comes before what is packed. */
export function PackingOrders({
	orders,
	day,
	posted,
}: {
	orders: readonly PackingOrder[]
	day: string
	posted: Posted | null
}) {
	const postedOf = (order: PackingOrder) => (posted?.number === order.number ? posted : null)
	const toPack = orders.filter((order) => order.state === "confirmed")
	const packed = orders.filter((order) => order.state === "packed")
	return (
		<div className="mt-4">
			{toPack.length > 0 && (
				<LedgerGroup when="To pack">
					{toPack.map((order, index) => (
						<OrderRow key={order.number} order={order} day={day} isFirst={index === 0} posted={postedOf(order)} />
					))}
				</LedgerGroup>
			)}
			{packed.length > 0 && (
				<LedgerGroup when="Packed, to send">
					{packed.map((order, index) => (
						<OrderRow
							key={order.number}
							order={order}
							day={day}
							isFirst={toPack.length === 0 && index === 0}
							posted={null}
						/>
					))}
				</LedgerGroup>
			)}
		</div>
	)
}

function OrderRow({
	order,
	day,
	isFirst,
	posted,
}: {
	order: PackingOrder
	day: string
	isFirst: boolean
	posted: Posted | null
}) {
	const form = `order-${order.number}`
	const cases = order.lines.reduce((sum, line) => sum + line.cases, 0)
	const isPacked = order.state === "packed"
	const words = isPacked ? "Sent, issue the invoice" : "Packed"
	return (
		<LedgerRow
			name={order.storeName}
			line={
				<>
					Order {order.number}, {casesWords(cases)}
					{isPacked && (
						<>
							{" "}
							<Link
								className="no-print inline-block py-1"
								relative="path"
								to={`../orders/${order.number}/packing-slip`}
							>
								Packing slip
							</Link>
						</>
					)}
				</>
			}
			action={
				<Form method="post" preventScrollReset id={form}>
					<input type="hidden" name="number" value={order.number} />
					<input type="hidden" name="day" value={day} />
					<Button
						variant={isFirst ? "primary" : "second"}
						name="intent"
						value={isPacked ? "send" : "pack"}
						aria-label={`${words}: order ${order.number} of ${order.storeName}`}
					>
						{words}
					</Button>
				</Form>
			}
		>
			<ul className="grid gap-1 pb-1">
				{order.lines.map((line) => (
					<li key={line.code} className="flex flex-wrap gap-x-3">
						<span className="min-w-18">{casesWords(line.cases)}</span>
						<span>
							<span className="fig text-ink-faint">{line.code}</span> {line.productName}
						</span>
						<span className="text-ink-soft">
							{line.lots.map((lot) => `lot ${lot.code}, ${lot.pieces} pieces`).join("; ")}
						</span>
						{line.missingPieces > 0 && (
							<span className="short font-semibold">{line.missingPieces} pieces are in no released lot</span>
						)}
						{line.byWeight && (
							<LineWeight line={{ ...line, byWeight: line.byWeight }} {...{ form, isPacked, posted }} />
						)}
					</li>
				))}
			</ul>
		</LedgerRow>
	)
}

type LineWeightProps = Parameters<typeof WeighField>[0] & { isPacked: boolean }

function LineWeight({ line, form, isPacked, posted }: LineWeightProps) {
	return isPacked ? <WeighedPrice line={line} /> : <WeighField line={line} form={form} posted={posted} />
}
