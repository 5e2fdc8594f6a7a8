import { ButtonLink } from "~/ui/forms/button"
import { LedgerGroup, LedgerRow } from "~/ui/layout/ledger"
import { FillStrip } from "~/ui/stock/fill-strip"

/** Products of one delivery day that are to be shared out. */
export type SharingDay = {
	/** "Before noon tomorrow", "Tuesday, August 18". */
	when: string
	note?: string
	rows: { to: string; name: string; line: string; supply: number; short: number }[]
}

/** What must be shared out, by day. The first has the one filled button of the page. */
export function OpenSharings({ days }: { days: readonly SharingDay[] }) {
	return days.map(({ when, note, rows }, index) => (
		<LedgerGroup key={when} when={when} note={note}>
			{rows.map(({ to, name, line, supply, short }, at) => (
				<LedgerRow
					key={to}
					name={name}
					line={line}
					strip={
						<FillStrip
							runs={[
								{ state: "free", count: supply },
								{ state: "short", count: short },
							]}
							caption={
								<>
									{supply} can be ready
									{short > 0 && (
										<>
											, <span className="short">{short} short</span>
										</>
									)}
								</>
							}
						/>
					}
					action={
						<ButtonLink
							variant={index === 0 && at === 0 ? "primary" : "second"}
							to={to}
							aria-label={`Share out: ${name}`}
						>
							Share out
						</ButtonLink>
					}
				/>
			))}
		</LedgerGroup>
	))
}
