/** Runs `work` as a program: an error is told in one line with its cause, without a stack, and exit code 1. */
export async function run(work: () => Promise<void>): Promise<void> {
	try {
		await work()
	} catch (error) {
		console.error(messages(error).join(": "))
		process.exit(1)
	}
}

function messages(error: unknown): string[] {
	if (!(error instanceof Error)) return [String(error)]
	return [error.message, ...(error.cause === undefined ? [] : messages(error.cause))]
}
