import { invalidRequest } from "./errors"

const LEAST_CENTS = 50
const MOST_CENTS = 99_999_999

/** Cents as dollars, as the messages and pages show them: 1250 → "$12.50". */
export function dollars(cents: number): string {
	return `$${(cents / 100).toFixed(2)}`
}

/** Refuses an amount below or above what Stripe charges in one payment; `param` names the culprit. */
export function checkAmount(cents: number, currency: string, param: string): void {
	if (cents < 1) {
		throw invalidRequest("This value must be greater than or equal to 1.", { code: "parameter_invalid_integer", param })
	}
	if (cents < LEAST_CENTS) {
		throw invalidRequest(`Amount must be at least ${dollars(LEAST_CENTS)} ${currency}`, {
			code: "amount_too_small",
			param,
		})
	}
	if (cents > MOST_CENTS) {
		throw invalidRequest(`Amount must be no more than ${dollars(MOST_CENTS)} ${currency}`, {
			code: "amount_too_large",
			param,
		})
	}
}
