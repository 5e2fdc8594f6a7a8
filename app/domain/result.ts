/** A rule was met; `Value` is merged in beside `ok`. */
export type Ok<Value extends object = object> = { ok: true } & Value

/** A rule refused, as data that the edge turns into words; `reason` is a short kebab-case name. */
export type Refused<Reason extends string = string, Details extends object = object> = {
	ok: false
	reason: Reason
} & Details

/** What a rule answers when it can refuse. Refusals are expected and never thrown; only bugs are thrown. */
export type Result<Value extends object = object, Refusal extends Refused = Refused> = Ok<Value> | Refusal
