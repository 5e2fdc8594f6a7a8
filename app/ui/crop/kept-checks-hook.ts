import { useCallback, useEffect, useRef, useState } from "react"
import { dropCheck, type KeptCheck, keepCheck, listKept, type SendState, sendKept } from "./kept-checks-store"

export type KeptChecksState = {
	kept: readonly KeptCheck[]
	/** Those that the server has taken since the page was opened. */
	taken: readonly KeptCheck[]
	state: SendState
	/** Writes a check down and sends what waits. Rejects where the browser keeps nothing. */
	keep: (check: KeptCheck) => Promise<void>
	drop: (id: string) => Promise<void>
	send: () => Promise<void>
}

/**
 * The checks that this phone keeps for a producer. They are sent when the page is opened, when there is signal again, and
 * after each new one; `onTaken` is told when the server has taken some.
 */
export function useKeptChecks(producer: string, onTaken?: () => void): KeptChecksState {
	const [kept, setKept] = useState<readonly KeptCheck[]>([])
	const [taken, setTaken] = useState<readonly KeptCheck[]>([])
	const [state, setState] = useState<SendState>("rest")
	const tell = useRef(onTaken)
	useEffect(() => {
		tell.current = onTaken
	}, [onTaken])
	const queue = useRef(Promise.resolve())

	const send = useCallback(() => {
		// One after the other: a check that is kept while others are on their way goes with the next turn.
		queue.current = queue.current.then(async () => {
			setState("sending")
			const ended = await sendKept(producer).catch(() => ({ state: "rest" as const, taken: [] }))
			setKept(await listKept(producer).catch(() => []))
			setState(ended.state)
			if (ended.taken.length === 0) return
			setTaken((before) => [...before, ...ended.taken])
			tell.current?.()
		})
		return queue.current
	}, [producer])

	useEffect(() => {
		send()
		window.addEventListener("online", send)
		return () => window.removeEventListener("online", send)
	}, [send])

	const keep = useCallback(
		async (check: KeptCheck) => {
			await keepCheck(check)
			setKept(await listKept(producer))
			await send()
		},
		[producer, send],
	)
	const drop = useCallback(
		async (id: string) => {
			await dropCheck(id)
			setKept(await listKept(producer))
		},
		[producer],
	)
	return { kept, taken, state, keep, drop, send }
}
