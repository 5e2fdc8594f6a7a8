import type { ReactNode } from "react"
import { StripKey } from "./strip-key"

/** The foot of the list: where and when to buy, and how the strips are read. */
export function ShopClose({ children, hasMore }: { children: ReactNode; hasMore: boolean }) {
	return (
		<div className="shop-close">
			<div>{children}</div>
			<StripKey
				runs={[
					{ state: "free", words: "left" },
					{ state: "promised", words: "sold, or promised to someone" },
					...(hasMore ? [{ state: "expected" as const, words: "still to come" }] : []),
				]}
			/>
		</div>
	)
}
