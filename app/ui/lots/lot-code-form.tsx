import { Form } from "react-router"
import { Button } from "~/ui/forms/button"
import { TextField } from "~/ui/forms/fields"

/** How new lots are named, and how long they keep. */
export function LotCodeForm({
	pattern,
	days,
	errorOf,
}: {
	pattern: string
	days: string
	errorOf: (field: string) => string | undefined
}) {
	return (
		<section className="lot-part" aria-labelledby="codes-head">
			<h2 className="name" id="codes-head">
				Lot codes and best before
			</h2>
			<Form method="post" className="grid gap-4" noValidate>
				<TextField
					name="pattern"
					label="Pattern of a lot code"
					hint="{product} the product's number, {yy} or {yyyy} the year, {ddd} the day of the year, {nnn} the lot's number in the year. At most 20 characters, for the case label."
					maxLength={60}
					spellCheck={false}
					autoComplete="off"
					defaultValue={pattern}
					error={errorOf("pattern")}
				/>
				<TextField
					name="days"
					label="Best before, days after harvest"
					inputMode="numeric"
					autoComplete="off"
					defaultValue={days}
					error={errorOf("days")}
				/>
				<div>
					<Button name="intent" value="codes">
						Keep codes and days
					</Button>
				</div>
			</Form>
		</section>
	)
}
