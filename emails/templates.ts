import type { ComponentType } from "react"
import type { z } from "zod"
import * as breakageDeclined from "./breakage-declined"
import * as breakageReported from "./breakage-reported"
import * as certificateAnswer from "./certificate-answer"
import * as certificateExpiring from "./certificate-expiring"
import * as creditIssued from "./credit-issued"
import * as invitation from "./invitation"
import * as invoice from "./invoice"
import * as orderAnswer from "./order-answer"
import * as orderChanged from "./order-changed"
import * as orderConfirmed from "./order-confirmed"
import * as orderMessage from "./order-message"
import * as orderProposal from "./order-proposal"
import * as orderReceived from "./order-received"
import * as orderShared from "./order-shared"
import * as paymentFailed from "./payment-failed"
import * as paymentReceived from "./payment-received"
import * as paymentRefunded from "./payment-refunded"
import type { DrawElsewhere } from "./props"
import * as reminder from "./reminder"
import * as signInCode from "./sign-in-code"
import * as signInUnknown from "./sign-in-unknown"
import * as standingOrderReminder from "./standing-order-reminder"
import * as standingOrderSet from "./standing-order-set"
import * as statement from "./statement"
import * as withdrawal from "./withdrawal"

/** A file that goes with a letter. */
export interface MailAttachment {
	filename: string
	content: Buffer
	contentType: string
}

/** What a module in this folder exports to be a letter. `sample` is made-up data for previews and tests. */
export interface Template<Props> {
	schema: z.ZodType<Props>
	default: ComponentType<Props & object>
	subject: (props: Props) => string
	sample: Props
	attachments?: (props: Props, draw?: DrawElsewhere) => Promise<MailAttachment[]>
}

const letter = <Props>(template: Template<Props>): Template<Props> => template

/** Every letter the product sends, by the name that an outbox row carries. Names are kept: rows may wait for days. */
export const templates = {
	"sign-in-code": letter(signInCode),
	"sign-in-unknown": letter(signInUnknown),
	invitation: letter(invitation),
	"order-received": letter(orderReceived),
	"order-confirmed": letter(orderConfirmed),
	"order-shared": letter(orderShared),
	"order-proposal": letter(orderProposal),
	"order-changed": letter(orderChanged),
	"order-answer": letter(orderAnswer),
	"order-message": letter(orderMessage),
	invoice: letter(invoice),
	"credit-issued": letter(creditIssued),
	"breakage-reported": letter(breakageReported),
	"breakage-declined": letter(breakageDeclined),
	"payment-received": letter(paymentReceived),
	"payment-failed": letter(paymentFailed),
	"payment-refunded": letter(paymentRefunded),
	"standing-order-reminder": letter(standingOrderReminder),
	"standing-order-set": letter(standingOrderSet),
	statement: letter(statement),
	reminder: letter(reminder),
	"certificate-expiring": letter(certificateExpiring),
	"certificate-answer": letter(certificateAnswer),
	withdrawal: letter(withdrawal),
}

export type TemplateName = keyof typeof templates
type PropsOf<Name extends TemplateName> = z.infer<(typeof templates)[Name]["schema"]>

/** A letter as the outbox holds it: the name and the props that belong to that name. */
export type Letter = { [Name in TemplateName]: { template: Name; props: PropsOf<Name> } }[TemplateName]

/** Whether `name`, as it stands in an outbox row, is a letter this version knows. */
export function isTemplateName(name: string): name is TemplateName {
	return Object.hasOwn(templates, name)
}
