import { plainMoney } from "~/domain/money"

/** Basis points as a percentage without needless digits: 200 is "2 %", 725 "7.25 %". */
export function percentWords(basisPoints: number): string {
	return `${plainMoney(basisPoints).replace(/\.?0+$/, "")} %`
}
