const WAYS = [
	{ art: "/art/cut-cold.svg", name: "Cut it cold.", words: "A sharp knife, straight down through the caps." },
	{ art: "/art/warm-toast.svg", name: "Lay it on warm toast.", words: "The wax softens and spreads. You eat it all." },
	{
		art: "/art/on-cheese.svg",
		name: "Or on cheese.",
		words: "Chew the wax like gum and leave it, if you would rather.",
	},
]

/** How comb is eaten, for those who never had it, and the cautions that belong to it. */
export function EatingComb() {
	return (
		<div className="eating-comb">
			<h2 className="head-italic">How comb is eaten</h2>
			<ul>
				{WAYS.map((way) => (
					<li key={way.name}>
						<img src={way.art} alt="" width={58} height={46} loading="lazy" />
						<span>
							<b>{way.name}</b> {way.words}
						</span>
					</li>
				))}
			</ul>
			<p className="note">
				Honey must not be given to infants under one year. Comb can carry pollen and traces of propolis: take care with
				allergies.
			</p>
		</div>
	)
}
