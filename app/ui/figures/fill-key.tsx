/** How a part of a bar is drawn. */
export type PartFill = "money-in" | "money-out" | "crop-sold" | "crop-stock" | "crop-lost" | "crop-cut"

/** What the parts of the bars below mean. */
export function FillKey({ fills }: { fills: readonly (readonly [fill: PartFill, words: string])[] }) {
	return (
		<p className="books-key note">
			{fills.map(([fill, words]) => (
				<span key={fill}>
					<svg width="14" height="14" viewBox="0 0 14 14" aria-hidden="true">
						<path className={fill} d="M1.5 1.5h11v11h-11z" />
					</svg>
					{words}
				</span>
			))}
		</p>
	)
}
