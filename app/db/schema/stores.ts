import { sql } from "drizzle-orm"
import {
	boolean,
	check,
	foreignKey,
	index,
	integer,
	pgTable,
	primaryKey,
	smallint,
	text,
	unique,
	uuid,
} from "drizzle-orm/pg-core"
import { cents, day, id, instant, producerId } from "./columns"
import { users } from "./people"
import { priceTiers } from "./pricing"
import { producers } from "./producers"

/** A wholesale customer: its prices, its terms, where the van stops. */
export const stores = pgTable(
	"stores",
	{
		producerId: producerId().references(() => producers.id),
		id: id(),
		slug: text("slug").notNull(),
		name: text("name").notNull(),
		tierId: uuid("tier_id").notNull(),
		address: text("address").notNull().default(""),
		/** How the store is reached; stands in the records of what was delivered to whom. */
		phone: text("phone").notNull().default(""),
		email: text("email").notNull().default(""),
		/** Where and until when goods are taken in: "To the back door, before 10 am." */
		receivingNote: text("receiving_note").notNull().default(""),
		minimumCents: cents("minimum_cents").notNull().default(0),
		deliveryChargeCents: cents("delivery_charge_cents").notNull().default(0),
		/** Orders of this much and more are delivered free; null = never. */
		freeAboveCents: cents("free_above_cents"),
		termsKind: text("terms_kind", { enum: ["on-receipt", "net", "end-of-month"] })
			.notNull()
			.default("net"),
		termsDays: smallint("terms_days").notNull().default(14),
		termsDiscountBasisPoints: integer("terms_discount_basis_points").notNull().default(0),
		termsDiscountDays: smallint("terms_discount_days").notNull().default(0),
		/** Bought for resale under a certificate good until this day; null = sales tax is charged where it applies. */
		resaleCertificateUntil: day("resale_certificate_until"),
		/** In a sharing: 100 counts once, 200 twice. */
		sharingWeightPercent: smallint("sharing_weight_percent").notNull().default(100),
		/** Every order on an invoice of its own, or all of a month on one. */
		invoicing: text("invoicing", { enum: ["each-order", "month-end"] })
			.notNull()
			.default("each-order"),
		/** Names the place of `tax_rates` whose rate is charged; empty = the producer's own rate. */
		taxPlace: text("tax_place").notNull().default(""),
		/** What may be owed before the desk is warned; null = no limit. */
		creditLimitCents: cents("credit_limit_cents"),
		/** Orders are warned of until something is paid: the producer's own word. */
		isStopped: boolean("is_stopped").notNull().default(false),
		remindersHeld: boolean("reminders_held").notNull().default(false),
		stripeCustomerId: text("stripe_customer_id"),
		stripePaymentMethodId: text("stripe_payment_method_id"),
		/** The kept way to pay as its owner knows it: "card ending in 4242". */
		paysWithWords: text("pays_with_words").notNull().default(""),
		/** What falls due is taken by itself; agreed to by `autopayAgreedBy`. */
		paysAutomatically: boolean("pays_automatically").notNull().default(false),
		autopayAgreedBy: uuid("autopay_agreed_by").references(() => users.id),
		autopayAgreedAt: instant("autopay_agreed_at"),
		isActive: boolean("is_active").notNull().default(true),
		createdAt: instant("created_at").notNull().defaultNow(),
	},
	(t) => [
		primaryKey({ name: "stores_pk", columns: [t.producerId, t.id] }),
		foreignKey({
			name: "stores_tier",
			columns: [t.producerId, t.tierId],
			foreignColumns: [priceTiers.producerId, priceTiers.id],
		}),
		unique("stores_slug_once").on(t.producerId, t.slug),
		index("stores_by_name").on(t.producerId, t.name, t.id),
		check("stores_slug_form", sql`${t.slug} ~ '^[a-z0-9]+(-[a-z0-9]+)*$'`),
		check(
			"stores_money_not_negative",
			sql`${t.minimumCents} >= 0 and ${t.deliveryChargeCents} >= 0 and coalesce(${t.freeAboveCents}, 0) >= 0`,
		),
		check("stores_sharing_weight_sane", sql`${t.sharingWeightPercent} between 10 and 1000`),
		check("stores_invoicing_known", sql`${t.invoicing} in ('each-order','month-end')`),
		check("stores_credit_limit_not_negative", sql`coalesce(${t.creditLimitCents}, 0) >= 0`),
		check(
			"stores_autopay_agreed",
			sql`not ${t.paysAutomatically} or (${t.stripePaymentMethodId} is not null and ${t.autopayAgreedBy} is not null and ${t.autopayAgreedAt} is not null)`,
		),
		check("stores_terms_known", sql`${t.termsKind} in ('on-receipt','net','end-of-month')`),
		check(
			"stores_terms_sane",
			sql`${t.termsDays} between 0 and 365 and ${t.termsDiscountBasisPoints} between 0 and 10000 and ${t.termsDiscountDays} between 0 and 365`,
		),
	],
)
