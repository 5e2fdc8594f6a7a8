import { Button, ButtonLink } from "~/ui/forms/button"
import { ErrorSummary } from "~/ui/forms/error-summary"
import { CheckField, SelectField, TextField } from "~/ui/forms/fields"
import { Notice } from "~/ui/forms/notice"
import { QuantityField } from "~/ui/forms/quantity-field"
import { Stepper } from "~/ui/forms/stepper"
import { PartGroup, State, States } from "./shown"

/** Buttons and fields in every state. */
export function ControlParts() {
	return (
		<PartGroup title="Controls">
			<States>
				<State caption="primary, one to a view">
					<Button type="button" variant="primary">
						Confirm
					</Button>
				</State>
				<State caption="hover, pressed">
					<Button type="button" variant="primary" className="is-hover">
						Confirm
					</Button>
				</State>
				<State caption="focus">
					<Button type="button" variant="primary" className="is-focus">
						Confirm
					</Button>
				</State>
				<State caption="disabled, with the reason">
					<Button type="button" disabledReason="waits on lot C14">
						Waits
					</Button>
				</State>
				<State caption="busy: keeps its width">
					<Button type="button" variant="primary" busy busyLabel="Confirming…">
						Confirm
					</Button>
				</State>
				<State caption="plain">
					<Button type="button" variant="plain">
						Add a product
					</Button>
				</State>
				<State caption="second">
					<Button type="button">Pause</Button>
				</State>
				<State caption="hover">
					<Button type="button" className="is-hover">
						Pause
					</Button>
				</State>
				<State caption="focus">
					<Button type="button" className="is-focus">
						Pause
					</Button>
				</State>
				<State caption="with a drawn sign; a link">
					<ButtonLink to="?sheet" icon="printer">
						Packing sheet
					</ButtonLink>
				</State>
				<State caption="pieces, for the shop">
					<Stepper name="pieces" label="Round section, clover" defaultValue={1} max={9} />
				</State>
				<State caption="keys">
					<kbd className="keycap">L</kbd> <kbd className="keycap">Ctrl</kbd> <kbd className="keycap">Enter</kbd>
				</State>
				<State caption="a fill-in in a sentence">
					<a className="fill-in font-display text-stall" href="#controls">
						other Tuesday
					</a>
				</State>
			</States>
			<States>
				<State caption="empty">
					<QuantityField name="empty" label="Cases, empty" />
				</State>
				<State caption="written, in clover">
					<QuantityField name="written" label="Cases, written" defaultValue="4" />
				</State>
				<State caption="focus">
					<QuantityField name="focus" label="Cases, with focus" defaultValue="4" className="is-focus" />
				</State>
				<State caption="wrong: stays as written">
					<QuantityField
						name="wrong"
						label="Cases, wrong"
						defaultValue="40"
						error="16 are free. Ask for 16, or keep 40 and it is shared out."
					/>
				</State>
				<State caption="not for this day">
					<QuantityField name="disabled" label="Cases, not for this day" disabled />
				</State>
				<State caption="not sent yet">
					<QuantityField name="unsent" label="Cases, not sent yet" defaultValue="4" notSent />
				</State>
			</States>
			<div className="grid gap-5 desk:grid-cols-2" id="controls">
				<TextField name="email" label="E-mail" type="email" hint="We send a code of six digits." />
				<TextField name="code" label="Code" defaultValue="12345" error="The code has six digits." inputMode="numeric" />
				<SelectField
					name="cadence"
					label="How often"
					options={[
						{ value: "weekly", label: "Every Tuesday" },
						{ value: "fortnightly", label: "Every other Tuesday" },
					]}
				/>
				<CheckField name="lower" label="A lower grade may stand in" hint="Only when Fancy is short." />
			</div>
			<ErrorSummary
				errors={[
					{ field: "wrong", message: "Clover rounds: 16 are free." },
					{ field: "code", message: "The code has six digits." },
				]}
			/>
			<Notice title="Comb softens above 90 °F">Nothing goes by post until Monday. Pick-up goes on as usual.</Notice>
		</PartGroup>
	)
}
