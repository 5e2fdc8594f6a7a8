import type { ReactNode } from "react"
import { SkipLink } from "~/ui/layout/book"
import { Brand } from "~/ui/layout/masthead"
import { ShopSpread } from "~/ui/layout/shop-frame"
import { FillStrip } from "~/ui/stock/fill-strip"
import type { StripRun } from "~/ui/stock/strip-geometry"
import { CombShelf } from "./comb-shelf"
import { StripKey } from "./strip-key"

const FORMS = [
	{ name: "Round section", form: "round" },
	{ name: "Basswood section", form: "basswood" },
	{ name: "Clear-box section", form: "clear-box" },
	{ name: "Cut comb", form: "cut-comb" },
	{ name: "Chunk honey", form: "chunk" },
] as const

type Room = { who: string; words: string; runs: readonly StripRun[]; caption: string }

const ROOMS: readonly Room[] = [
	{
		who: "Stores",
		words: "order by the case for their delivery day, and keep a standing order that repeats until they change it.",
		runs: [
			{ state: "free", count: 16 },
			{ state: "held", count: 6 },
		],
		caption: "16 free, 6 held until Friday",
	},
	{
		who: "The yard",
		words: "promises what is frozen, weighed and released, shares out a short crop, packs, sends and invoices.",
		runs: [
			{ state: "free", count: 5 },
			{ state: "promised", count: 12 },
			{ state: "short", count: 3 },
		],
		caption: "5 free, 12 promised, 3 short",
	},
	{
		who: "The market stall",
		words: "sells by the piece, by card or in cash with the change worked out, and counts down what is left.",
		runs: [
			{ state: "free", count: 7 },
			{ state: "promised", count: 1 },
		],
		caption: "7 left, 1 in this sale",
	},
	{
		who: "Everyone else",
		words: "sees what is in season, and what can be had on the next market day.",
		runs: [{ state: "expected", count: 12 }],
		caption: "12 still on the hives",
	},
]

/** The front door: on the left what Waxbill is for and the way in, on the right who does what, and how stock is drawn. */
export function FrontDoor({ title, lead, children }: { title: string; lead: string; children: ReactNode }) {
	return (
		<div className="shop">
			<SkipLink />
			<div className="band">
				<header className="mast">
					<Brand to="/" />
				</header>
			</div>
			<main className="flex flex-1 flex-col" id="sheet" tabIndex={-1}>
				<ShopSpread
					verso={
						<div>
							<h1 className="shop-display">{title}</h1>
							<p className="shop-lead">{lead}</p>
							{children}
						</div>
					}
				>
					<CombShelf items={FORMS} />
					<h2 className="head-italic front-head">One crop, one book</h2>
					<ul>
						{ROOMS.map(({ who, words, runs, caption }) => (
							<li key={who} className="front-room">
								<p>
									<b>{who}</b> {words}
								</p>
								<FillStrip runs={runs} label={caption} caption={caption} />
							</li>
						))}
					</ul>
					<div className="shop-close">
						<p className="note">One cell is one case, or one piece where pieces are sold.</p>
						<StripKey
							runs={[
								{ state: "free", words: "free" },
								{ state: "held", words: "held until it is proven" },
								{ state: "promised", words: "promised" },
								{ state: "short", words: "short" },
								{ state: "expected", words: "expected from the hives" },
							]}
						/>
					</div>
				</ShopSpread>
			</main>
		</div>
	)
}
