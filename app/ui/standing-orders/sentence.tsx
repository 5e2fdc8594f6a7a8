import { type Day, fullDay, monthDay, type Weekday, weekdayName } from "~/domain/calendar"
import { FieldError, fieldId } from "~/ui/forms/field-error"

type Option = { value: string; label: string }

/** How often, as the sentence offers it; the value is what the form sends. */
const OFTEN: readonly Option[] = [
	{ value: "every-1", label: "every" },
	{ value: "every-2", label: "every other" },
	{ value: "month-1", label: "on the month’s first" },
	{ value: "month-2", label: "on the month’s second" },
	{ value: "month-3", label: "on the month’s third" },
	{ value: "month-4", label: "on the month’s fourth" },
	{ value: "month--1", label: "on the month’s last" },
]

/** The value of "until" that stands for no end. */
export const CROP_ENDS = "crop"

type SentenceProps = {
	values: { often: string; weekday: string; startsOn: string; endsOn: string }
	weekdays: readonly Weekday[]
	/** Days it can start on, the earliest first, and last days it can have. */
	starts: readonly Day[]
	ends: readonly Day[]
	today: Day
	address: string
	errors: Readonly<Record<string, string>>
}

const dayIn = (today: Day) => (on: Day) => ({
	value: on,
	label: on.slice(0, 4) === today.slice(0, 4) ? monthDay(on) : fullDay(on),
})

/** A standing order as one sentence with fill-ins: how often, on which day, from when, until when. */
export function StandingSentence({ values, weekdays, starts, ends, today, address, errors }: SentenceProps) {
	return (
		<div className="text-[1.625rem] leading-[1.45] desk:text-[2rem] font-display [&_p]:text-balance">
			<p>
				Deliver <FillIn name="often" label="How often" value={values.often} options={OFTEN} error={errors.often} />{" "}
				<FillIn
					name="weekday"
					label="On which weekday"
					value={values.weekday}
					options={weekdays.map((day) => ({ value: String(day), label: weekdayName(day) }))}
					error={errors.weekday}
				/>{" "}
				to {address || "us"}, from{" "}
				<FillIn
					name="startsOn"
					label="From"
					value={values.startsOn}
					options={starts.map(dayIn(today))}
					error={errors.startsOn}
				/>{" "}
				until{" "}
				<FillIn
					name="endsOn"
					label="Until"
					value={values.endsOn}
					options={[{ value: CROP_ENDS, label: "the crop ends" }, ...ends.map(dayIn(today))]}
					error={errors.endsOn}
				/>
				.
			</p>
			{Object.entries(errors)
				.filter(([name]) => ["often", "weekday", "startsOn", "endsOn"].includes(name))
				.map(([name, message]) => (
					<FieldError key={name} id={`${fieldId(name)}-error`}>
						{message}
					</FieldError>
				))}
		</div>
	)
}

type FillInProps = { name: string; label: string; value: string; options: readonly Option[]; error: string | undefined }

/** A value in the sentence that can be chosen anew. */
function FillIn({ name, label, value, options, error }: FillInProps) {
	const id = fieldId(name)
	return (
		<select
			id={id}
			name={name}
			aria-label={label}
			defaultValue={value}
			className="fill-select"
			aria-invalid={error ? true : undefined}
			aria-describedby={error ? `${id}-error` : undefined}
		>
			{options.map((option) => (
				<option key={option.value} value={option.value}>
					{option.label}
				</option>
			))}
		</select>
	)
}
