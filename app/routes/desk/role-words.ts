import type { Role } from "~/domain/people/roles"

/** Roles as people say them: `name` beside a person, `purpose` after "invites you to". */
const WORDS: Record<Role, { name: string; purpose: string }> = {
	owner: { name: "Owner", purpose: "run the desk" },
	desk: { name: "Desk hand", purpose: "work at the desk" },
	packer: { name: "Packer", purpose: "pick and pack the orders" },
	stall: { name: "Stall volunteer", purpose: "sell at the market stall" },
	buyer: { name: "Buyer", purpose: "order comb" },
	payer: { name: "Buyer who pays", purpose: "order comb and pay for it" },
}

export function roleWords(role: Role): { name: string; purpose: string } {
	return WORDS[role]
}
