import type { BankAccount } from "./banks"
import type { Card } from "./cards"

/** What is charged: a card that was typed on a page or presented to a reader, or an account at a bank. */
export type Presented = { name: string | null; email: string | null } & (
	| { card: Card; reader?: string }
	| { bank: BankAccount }
)
