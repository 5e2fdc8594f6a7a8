import { Form } from "react-router"
import { fullDay } from "~/domain/calendar"
import { plainMoney } from "~/domain/money"
import { Button } from "~/ui/forms/button"
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

type EndFormProps = { intent: "end-own" | "end-promotion"; id: string; hasBegun: boolean; about: string }

/** Ends what runs; takes off what has not begun. */
function EndForm({ intent, id, hasBegun, about }: EndFormProps) {
	const words = hasBegun ? "End it today" : "Take it off"
	return (
		<Form method="post" preventScrollReset>
			<input type="hidden" name="id" value={id} />
			<Button size="small" name="intent" value={intent} aria-label={`${words}: ${about}`}>
				{words}
			</Button>
		</Form>
	)
}

/** Prices that single stores have for themselves, those to come included. */
export function OwnPriceTable({ own, today }: { own: readonly OwnPrice[]; today: string }) {
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
							<th scope="col" className="num">
								Price
							</th>
							<th scope="col" className="num pr-4! desk:pr-8!">
								<span className="sr-only">End</span>
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
								<td className="money">
									{price.minCases > 1 && <span className="note">from {price.minCases} </span>}
									{plainMoney(price.poundCents ?? price.caseCents)}
									{price.poundCents !== null && <span className="note"> a lb</span>}
								</td>
								<td className="num pr-4! desk:pr-8!">
									<EndForm
										intent="end-own"
										id={price.id}
										hasBegun={price.validFrom < today}
										about={`${price.code} ${price.productName} for ${price.storeName}`}
									/>
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
export function PromotionTable({ promotions, today }: { promotions: readonly Promotion[]; today: string }) {
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
							<th scope="col" className="num">
								Off
							</th>
							<th scope="col" className="num pr-4! desk:pr-8!">
								<span className="sr-only">End</span>
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
								<td className="money">{one.basisPoints / 100} %</td>
								<td className="num pr-4! desk:pr-8!">
									<EndForm
										intent="end-promotion"
										id={one.id}
										hasBegun={one.startsOn < today}
										about={`${one.name}, ${one.code} ${one.productName}`}
									/>
								</td>
							</tr>
						))}
					</tbody>
				</table>
			)}
		</section>
	)
}
