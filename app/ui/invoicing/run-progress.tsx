import { useEffect } from "react"
import { useRevalidator } from "react-router"

const ASK_EVERY_MS = 1_000

/**
 * How many of the orders of a run are through, in words and as a bar, while the job works: asks again by itself with a
 * script, and without one by loading the page anew.
 */
export function RunProgress({ done, refused, waiting }: { done: number; refused: number; waiting: number }) {
	const { revalidate, state } = useRevalidator()
	const all = done + refused + waiting
	useEffect(() => {
		if (waiting === 0 || state !== "idle") return
		const timer = setTimeout(revalidate, ASK_EVERY_MS)
		return () => clearTimeout(timer)
	}, [waiting, state, revalidate])
	const words = `${done + refused} of ${all} ${all === 1 ? "order" : "orders"}`
	return (
		<>
			{waiting > 0 && (
				<noscript>
					<meta httpEquiv="refresh" content="3" />
				</noscript>
			)}
			<p className="px-4 py-3 desk:px-8" role="status">
				<progress className="run-progress" max={all} value={done + refused} aria-label={words} /> {words}
				{refused > 0 && <span className="short font-semibold">, {refused} of them refused</span>}
			</p>
		</>
	)
}
