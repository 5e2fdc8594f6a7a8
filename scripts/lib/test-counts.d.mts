/** Counts of one suite. */
type Counts = { passed: number; failed: number; skipped: number }

export function ofCheck(exitCode: number): Counts
export function ofVitest(file: string, exitCode: number): Counts
export function ofPlaywright(file: string, exitCode: number): Counts
export function sum(all: readonly Counts[]): Counts
export function inWords(counts: Counts): string
