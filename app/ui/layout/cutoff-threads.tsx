/**
 * A line that ties a moment of "last orders" to the delivery it closes. Positions count days from the left edge of the
 * ribbon: 1.5 is noon of the second day. A start before 0 or an end after the last day runs off the edge.
 */
export type CutoffThread = { fromDay: number; toDay: number; label: string }

/** Lengths in per cent of the ribbon, as SVG attributes: the policy of the page forbids styles on elements. */
export function CutoffThreads({ threads, dayCount }: { threads: readonly CutoffThread[]; dayCount: number }) {
	const percent = (day: number) => `${Math.round((Math.max(0, Math.min(dayCount, day)) / dayCount) * 10_000) / 100}%`
	return (
		<svg className="threads" height={20} role="img" aria-label={threads.map((thread) => thread.label).join("; ")}>
			{threads.map(({ fromDay, toDay, label }, index) => {
				const nextStart = threads[index + 1]?.fromDay ?? dayCount
				return (
					<g key={label}>
						<line x1={percent(fromDay)} x2={percent(toDay)} y1={6} y2={6} />
						{fromDay >= 0 && <line x1={percent(fromDay)} x2={percent(fromDay)} y1={6} y2={20} />}
						{toDay <= dayCount && <circle cx={percent(toDay)} cy={6} r={3.5} />}
						{/* A label is cut off where the next thread begins rather than written over it. */}
						{fromDay >= 0 && (
							<svg x={percent(fromDay)} width={percent(nextStart - fromDay)} height={20} aria-hidden="true">
								<text x={7} y={17}>
									{label}
								</text>
							</svg>
						)}
					</g>
				)
			})}
		</svg>
	)
}
