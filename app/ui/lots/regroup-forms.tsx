import type { ReactNode } from "react"
import { Form } from "react-router"
import { fullDay } from "~/domain/calendar"
import { piecesWords } from "~/domain/quantity"
import { Button } from "~/ui/forms/button"
import { FieldError } from "~/ui/forms/field-error"
import { SelectField, TextField } from "~/ui/forms/fields"
import { EmptyLine, MarginNote } from "~/ui/layout/sheet"

type Lot = { code: string; state: string; shelfPieces: number; pieceNetGrams: number }
type FormProps = {
	lot: Lot
	formKey: string
	typed: { [name: string]: string | undefined }
	errorOf: (field: string) => string | undefined
}

function WayForm({ way, formKey, children }: { way: string; formKey: string; children: ReactNode }) {
	return (
		<Form method="post" className="lot-part" noValidate>
			<input type="hidden" name="key" value={formKey} />
			<input type="hidden" name="way" value={way} />
			<div className="grid gap-4">{children}</div>
		</Form>
	)
}

function NewCode({ typed, errorOf }: Pick<FormProps, "typed" | "errorOf">) {
	return (
		<TextField
			name="code"
			label="Code of the new lot"
			hint="Empty: by your pattern."
			maxLength={20}
			autoComplete="off"
			defaultValue={typed.code}
			error={errorOf("code")}
		/>
	)
}

function Pieces({ label, lot, typed, errorOf }: { label: string } & Pick<FormProps, "lot" | "typed" | "errorOf">) {
	return (
		<TextField
			name="pieces"
			label={label}
			hint={`Of ${piecesWords(lot.shelfPieces)} on the shelves.`}
			inputMode="numeric"
			autoComplete="off"
			defaultValue={typed.pieces}
			error={errorOf("pieces")}
		/>
	)
}

/** Splits pieces off into a lot of their own. */
export function SplitForm(props: FormProps) {
	const { lot, formKey } = props
	return (
		<WayForm way="split" formKey={formKey}>
			<Pieces {...props} label="Pieces to split off" />
			<NewCode {...props} />
			<MarginNote>
				The new lot keeps product, dates, grade and readings
				{lot.state === "released" ? ", and is released too: its record names this lot." : ", and is held too."}
			</MarginNote>
			<div>
				<Button variant="primary" size="big">
					Split them off
				</Button>
			</div>
		</WayForm>
	)
}

/** Makes one lot of this and others. */
export function MergeForm({
	lots,
	...props
}: FormProps & { lots: readonly { code: string; grade: string; pieces: number; bestBeforeOn: string }[] }) {
	const { lot, formKey, errorOf } = props
	if (lots.length === 0) {
		return <EmptyLine>There is no other {lot.state} lot of this product with pieces on the shelves.</EmptyLine>
	}
	const error = errorOf("with")
	return (
		<WayForm way="merge" formKey={formKey}>
			<fieldset className="grid gap-2" id="field-with" aria-describedby={error ? "with-error" : undefined}>
				<legend className="field-label mb-2">Merge lot {lot.code} with</legend>
				{error && <FieldError id="with-error">{error}</FieldError>}
				{lots.map(({ code, grade, pieces, bestBeforeOn }) => (
					<div className="check" key={code}>
						<input type="checkbox" name="with" value={code} id={`with-${code}`} />
						<label htmlFor={`with-${code}`}>
							<b>{code}</b>
							{grade && `, ${grade}`}, {piecesWords(pieces)}, best before {fullDay(bestBeforeOn)}
						</label>
					</div>
				))}
			</fieldset>
			<NewCode {...props} />
			<MarginNote>
				All that lies on the shelves of these lots becomes one lot. The earliest best before stands; a grade that
				differs is left open.
			</MarginNote>
			<div>
				<Button variant="primary" size="big">
					Make one lot of them
				</Button>
			</div>
		</WayForm>
	)
}

/** Cuts pieces up into another product. */
export function CutUpForm({
	products,
	...props
}: FormProps & { products: readonly { id: string; name: string; detail: string; form: string }[] }) {
	const { lot, formKey, typed, errorOf } = props
	if (products.length === 0) return <EmptyLine>There is no cut comb or chunk among your products.</EmptyLine>
	return (
		<WayForm way="cut-up" formKey={formKey}>
			<Pieces {...props} label="Pieces cut up" />
			<TextField
				name="grams"
				label="What they weighed together, g"
				hint={`Empty: ${lot.pieceNetGrams} g a piece, as labelled. Culls are often lighter: weigh them.`}
				inputMode="numeric"
				autoComplete="off"
				defaultValue={typed.grams}
				error={errorOf("grams")}
			/>
			<SelectField
				name="into"
				label="Cut into"
				options={[
					{ value: "", label: "Choose" },
					...products.map(({ id, name, detail }) => ({ value: id, label: `${name}, ${detail}` })),
				]}
				defaultValue={typed.into}
				error={errorOf("into")}
			/>
			<TextField
				name="made"
				label="Pieces made"
				inputMode="numeric"
				autoComplete="off"
				defaultValue={typed.made}
				error={errorOf("made")}
			/>
			<NewCode {...props} />
			<MarginNote>
				What went in and came out as neither is kept as the loss of this cut. Half of a chunk jar counts as comb. The
				new lot is held until it is weighed.
			</MarginNote>
			<p className="note">
				Work clean and keep moths, bees and allergens away: comb is eaten raw. Your local food rules may ask for a
				licensed kitchen for cutting and filling.
			</p>
			<div>
				<Button variant="primary" size="big">
					Cut them up
				</Button>
			</div>
		</WayForm>
	)
}
