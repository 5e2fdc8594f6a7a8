import { useEffect, useState } from "react"
import { Form, Link, useNavigation } from "react-router"
import { formatMoney } from "~/domain/money"
import { piecesWords } from "~/domain/quantity"
import type { Form as CombForm } from "~/domain/stall/short-names"
import { Button } from "~/ui/forms/button"
import { MessageLine } from "~/ui/layout/sheet"
import { StallFrame } from "~/ui/layout/stall-frame"
import { PIECE_OF_FORM } from "~/ui/stall/piece-of-form"
import { StallItem } from "~/ui/stall/stall-item"
import { StallPay } from "~/ui/stall/stall-pay"
import { type SaleInHand, saleFields, saleQuery } from "./sale-in-hand"
import { useSignal } from "./use-signal"

type Stall = {
	base: string
	listHref: string
	marketName: string
	hasReader: boolean
	table: { productId: string; form: CombForm; name: string; pieceCents: number; left: number }[]
	/** What was done just before. */
	done: string | null
}

type SaleSheetProps = { stall: Stall; sale: SaleInHand; problem: string | undefined }

/** What stands on the table and what of it is in the sale at hand. Counts at once; the address follows. */
export function SaleSheet({ stall, sale: begun, problem }: SaleSheetProps) {
	const { base, listHref, marketName, hasReader, table, done } = stall
	const [counts, setCounts] = useState(() => new Map(begun.items.map((item) => [item.productId, item.pieces])))
	const navigation = useNavigation()
	const hasSignal = useSignal()
	const rows = table.map((item) => ({ ...item, inSale: Math.min(counts.get(item.productId) ?? 0, item.left) }))
	const pieces = rows.reduce((sum, row) => sum + row.inSale, 0)
	const totalCents = rows.reduce((sum, row) => sum + row.inSale * row.pieceCents, 0)
	const sale: SaleInHand = {
		saleId: begun.saleId,
		items: rows.flatMap(({ productId, inSale }) => (inSale > 0 ? { productId, pieces: inSale } : [])),
	}
	const here = `${base}?${saleQuery(sale)}`
	const isBegun = counts.size > 0
	// Back and reload find the sale in the address. It changes without a navigation: nothing is asked of the server.
	useEffect(() => {
		if (isBegun) window.history.replaceState(window.history.state, "", here)
	}, [isBegun, here])
	/** Counts here and at once; before the page is awake, the button sends the form, which counts on the server. */
	const step = (productId: string, by: number) => ({
		name: by > 0 ? "add" : "fewer",
		value: productId,
		onClick: (event: { preventDefault: () => void }) => {
			event.preventDefault()
			setCounts((before) => new Map(before).set(productId, Math.max(0, (before.get(productId) ?? 0) + by)))
		},
	})
	const isTaking = navigation.state !== "idle" && navigation.formMethod === "POST"
	const cardWaits = hasSignal ? (hasReader ? undefined : "no reader for this market") : "card needs signal"
	return (
		<StallFrame
			title={marketName}
			back={{ to: listHref, label: "Market days" }}
			signal={hasSignal ? undefined : { state: "none", text: "No signal: this sale waits here until it is back" }}
		>
			{problem && <MessageLine tone="problem" title={problem} />}
			{done && !problem && pieces === 0 && <MessageLine tone="saved" title={done} />}
			<Form method="get" action={base} className="stall-sale">
				{saleFields(sale).map(([name, value]) => (
					<input key={name} type="hidden" name={name} value={value} />
				))}
				{rows.length === 0 && <p className="stall-words">Nothing was loaded for this day.</p>}
				{rows.map((row) => (
					<StallItem
						key={row.productId}
						piece={PIECE_OF_FORM[row.form]}
						name={row.name}
						price={formatMoney(row.pieceCents)}
						left={row.left - row.inSale}
						inSale={row.inSale}
						add={step(row.productId, 1)}
						fewer={step(row.productId, -1)}
					/>
				))}
				<StallPay
					total={formatMoney(totalCents)}
					ways={
						<>
							<Button
								formAction={`${base}/cash`}
								icon="cash"
								iconSize={26}
								disabled={pieces === 0 || !hasSignal}
								disabledReason={hasSignal ? undefined : "waits for signal"}
							>
								Take cash
							</Button>
							<Button
								variant="primary"
								icon="card"
								iconSize={26}
								formMethod="post"
								formAction={here}
								busy={isTaking}
								disabled={pieces === 0 || cardWaits !== undefined}
								disabledReason={cardWaits}
							>
								Take card
							</Button>
						</>
					}
				>
					<p>{piecesWords(pieces)}</p>
					{pieces > 0 ? <Link to={base}>Start again</Link> : <Link to={`${base}/totals`}>The day's totals</Link>}
				</StallPay>
			</Form>
		</StallFrame>
	)
}

/** What is to be seen of a day on which nothing is sold. */
export function DayNotOpen({ state, base }: { state: "planned" | "closed"; base: string }) {
	return (
		<div className="stall-words">
			<p>
				{state === "planned" ? "This market day is not loaded yet. The yard opens it." : "This market day is closed."}
			</p>
			{state === "closed" && (
				<p>
					<Link to={`${base}/totals`}>The day's totals</Link>
				</p>
			)}
		</div>
	)
}
