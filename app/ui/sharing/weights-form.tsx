import { Form } from "react-router"
import { Button } from "~/ui/forms/button"
import { QuantityField } from "~/ui/forms/quantity-field"

export const weightName = (storeId: string) => `weight-${storeId}`

type WeightsFormProps = {
	stores: readonly { storeId: string; storeName: string; weightPercent: number }[]
	values: Record<string, string>
	errors: Record<string, string>
}

/** How much each store counts when something is shared out. Opens without a script. */
export function WeightsForm({ stores, values, errors }: WeightsFormProps) {
	return (
		<details className="share-weights no-print" open={Object.keys(errors).length > 0}>
			<summary>How much each store counts</summary>
			<Form method="post" noValidate className="share-hand">
				<p className="note">100 counts once, 200 twice. From 10 to 1000, for every product from now on.</p>
				<ul>
					{stores.map(({ storeId, storeName, weightPercent }) => (
						<li key={storeId}>
							<span>{storeName}</span>
							<QuantityField
								name={weightName(storeId)}
								label={`Weight of ${storeName}, of 100`}
								defaultValue={values[weightName(storeId)] ?? String(weightPercent)}
								error={errors[weightName(storeId)]}
							/>
						</li>
					))}
				</ul>
				<Button name="intent" value="weights">
					Save how stores count
				</Button>
			</Form>
		</details>
	)
}
