import { fullDay } from "~/domain/calendar"
import { plainMoney } from "~/domain/money"
import { EmptyLine } from "~/ui/layout/sheet"

type OwnPrice = {
	id: string
	storeName: string
	code: string
	productName: string
	minCases: number
	caseCents: number
	poundCents: number | null
	validFrom: string
	validUntil: string | null
}

type Promotion = {
	id: string
	name: string
	code: string
	productName: string
	tierName: string | null
	basisPoints: number
	startsOn: string
	endsOn: string
}

/** Prices that single stores have for themselves, those to come included. */
export function OwnPriceTable({ own }: { own: readonly OwnPrice[] }) {
	return (
		<section aria-labelledby="own-prices">
			<div className="sheet-part">
				<h2 className="head-italic" id="own-prices">
					Prices of single stores
				</h2>
			</div>
			{own.length === 0 ? (
				<EmptyLine>Every store pays the prices of its tier.</EmptyLine>
			) : (
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col">Store</th>
							<th scope="col">Product</th>
							<th scope="col" className="num pr-4! desk:pr-8!">
								Price
							</th>
						</tr>
					</thead>
					<tbody>
						{own.map((price) => (
							<tr key={price.id}>
								<td className="py-2!">
									{price.storeName}
									<span className="note block">
										from {fullDay(price.validFrom)}
										{price.validUntil && ` through ${fullDay(price.validUntil)}`}
									</span>
								</td>
								<td>
									<span className="fig text-ink-faint">{price.code}</span> {price.productName}
								</td>
								<td className="money pr-4! desk:pr-8!">
									{price.minCases > 1 && <span className="note">from {price.minCases} </span>}
									{plainMoney(price.poundCents ?? price.caseCents)}
									{price.poundCents !== null && <span className="note"> a lb</span>}
								</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
		</section>
	)
}

/** Promotions that run or are to come. */
export function PromotionTable({ promotions }: { promotions: readonly Promotion[] }) {
	return (
		<section aria-labelledby="promotions">
			<div className="sheet-part">
				<h2 className="head-italic" id="promotions">
					Promotions
				</h2>
			</div>
			{promotions.length === 0 ? (
				<EmptyLine>None runs or is to come.</EmptyLine>
			) : (
				<table className="sheet-table">
					<thead>
						<tr>
							<th scope="col">Name</th>
							<th scope="col">Product</th>
							<th scope="col" className="num pr-4! desk:pr-8!">
								Off
							</th>
						</tr>
					</thead>
					<tbody>
						{promotions.map((one) => (
							<tr key={one.id}>
								<td className="py-2!">
									{one.name}
									<span className="note block">
										{fullDay(one.startsOn)} through {fullDay(one.endsOn)}, {one.tierName ?? "every tier"}
									</span>
								</td>
								<td>
									<span className="fig text-ink-faint">{one.code}</span> {one.productName}
								</td>
								<td className="money pr-4! desk:pr-8!">{one.basisPoints / 100} %</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
		</section>
	)
}
