CREATE TABLE "book_accounts" (
	"producer_id" uuid NOT NULL,
	"account" text NOT NULL,
	"number" text DEFAULT '' NOT NULL,
	"name" text NOT NULL,
	CONSTRAINT "book_accounts_pk" PRIMARY KEY("producer_id","account"),
	CONSTRAINT "book_accounts_known" CHECK ("book_accounts"."account" in ('receivable','sales','delivery-income','sales-tax','finance-charges','credits-given','discount-given','bad-debt','cash','bank','on-its-way','stripe','card-fees','disputes')),
	CONSTRAINT "book_accounts_named" CHECK (length(trim("book_accounts"."name")) between 1 and 120)
);
--> statement-breakpoint
CREATE TABLE "book_closings" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"closed_until" date NOT NULL,
	"totals" jsonb NOT NULL,
	"closed_by" uuid NOT NULL,
	"closed_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "book_closings_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "book_closings_once" UNIQUE("producer_id","closed_until")
);
--> statement-breakpoint
CREATE TABLE "breakage_lines" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"report_id" uuid NOT NULL,
	"invoice_line_id" uuid NOT NULL,
	"pieces" integer NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"accepted_pieces" integer,
	CONSTRAINT "breakage_lines_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "breakage_lines_once" UNIQUE("producer_id","report_id","invoice_line_id"),
	CONSTRAINT "breakage_lines_sane" CHECK ("breakage_lines"."pieces" > 0 and "breakage_lines"."accepted_pieces" between 0 and "breakage_lines"."pieces")
);
--> statement-breakpoint
CREATE TABLE "breakage_photos" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"line_id" uuid NOT NULL,
	"position" smallint DEFAULT 1 NOT NULL,
	"content" "bytea" NOT NULL,
	"media_type" text NOT NULL,
	"width" integer NOT NULL,
	"height" integer NOT NULL,
	CONSTRAINT "breakage_photos_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "breakage_photos_position_once" UNIQUE("producer_id","line_id","position"),
	CONSTRAINT "breakage_photos_sane" CHECK ("breakage_photos"."width" > 0 and "breakage_photos"."height" > 0 and length("breakage_photos"."content") <= 5242880)
);
--> statement-breakpoint
CREATE TABLE "breakage_reports" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"store_id" uuid NOT NULL,
	"invoice_id" uuid NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"answer" text DEFAULT '' NOT NULL,
	"credit_id" uuid,
	"reported_by" uuid NOT NULL,
	"reported_at" timestamp with time zone DEFAULT now() NOT NULL,
	"answered_by" uuid,
	"answered_at" timestamp with time zone,
	CONSTRAINT "breakage_reports_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "breakage_reports_state_known" CHECK ("breakage_reports"."state" in ('open','accepted','part-accepted','declined')),
	CONSTRAINT "breakage_reports_answer_whole" CHECK (("breakage_reports"."state" = 'open') = ("breakage_reports"."answered_at" is null)),
	CONSTRAINT "breakage_reports_credit_follows" CHECK (("breakage_reports"."state" in ('accepted','part-accepted')) = ("breakage_reports"."credit_id" is not null))
);
--> statement-breakpoint
CREATE TABLE "exemption_certificates" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"store_id" uuid NOT NULL,
	"number" text NOT NULL,
	"valid_until" date NOT NULL,
	"file_name" text NOT NULL,
	"media_type" text NOT NULL,
	"content" "bytea" NOT NULL,
	"state" text DEFAULT 'handed-in' NOT NULL,
	"answer" text DEFAULT '' NOT NULL,
	"handed_in_by" uuid NOT NULL,
	"handed_in_at" timestamp with time zone DEFAULT now() NOT NULL,
	"decided_by" uuid,
	"decided_at" timestamp with time zone,
	CONSTRAINT "exemption_certificates_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "exemption_certificates_state_known" CHECK ("exemption_certificates"."state" in ('handed-in','accepted','refused')),
	CONSTRAINT "exemption_certificates_decided_whole" CHECK (("exemption_certificates"."state" = 'handed-in') = ("exemption_certificates"."decided_at" is null)),
	CONSTRAINT "exemption_certificates_size_sane" CHECK (length("exemption_certificates"."content") between 1 and 10485760)
);
--> statement-breakpoint
CREATE TABLE "invoice_orders" (
	"producer_id" uuid NOT NULL,
	"order_id" uuid NOT NULL,
	"invoice_id" uuid NOT NULL,
	CONSTRAINT "invoice_orders_pk" PRIMARY KEY("producer_id","order_id")
);
--> statement-breakpoint
CREATE TABLE "invoice_run_orders" (
	"producer_id" uuid NOT NULL,
	"run_id" uuid NOT NULL,
	"order_id" uuid NOT NULL,
	"state" text DEFAULT 'waiting' NOT NULL,
	"problem" text DEFAULT '' NOT NULL,
	CONSTRAINT "invoice_run_orders_pk" PRIMARY KEY("producer_id","run_id","order_id"),
	CONSTRAINT "invoice_run_orders_state_known" CHECK ("invoice_run_orders"."state" in ('waiting','done','refused'))
);
--> statement-breakpoint
CREATE TABLE "invoice_runs" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"started_by" uuid NOT NULL,
	"started_at" timestamp with time zone DEFAULT now() NOT NULL,
	"finished_at" timestamp with time zone,
	CONSTRAINT "invoice_runs_pk" PRIMARY KEY("producer_id","id")
);
--> statement-breakpoint
CREATE TABLE "tax_rates" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"place" text NOT NULL,
	"valid_from" date NOT NULL,
	"basis_points" integer NOT NULL,
	CONSTRAINT "tax_rates_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "tax_rates_once" UNIQUE("producer_id","place","valid_from"),
	CONSTRAINT "tax_rates_sane" CHECK ("tax_rates"."basis_points" between 0 and 3000 and length(trim("tax_rates"."place")) > 0)
);
--> statement-breakpoint
CREATE TABLE "credit_lines" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"credit_id" uuid NOT NULL,
	"position" smallint NOT NULL,
	"invoice_line_id" uuid,
	"code" text DEFAULT '' NOT NULL,
	"name" text NOT NULL,
	"detail" text DEFAULT '' NOT NULL,
	"pieces" integer DEFAULT 0 NOT NULL,
	"line_cents" integer NOT NULL,
	"tax_cents" integer DEFAULT 0 NOT NULL,
	CONSTRAINT "credit_lines_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "credit_lines_position_once" UNIQUE("producer_id","credit_id","position"),
	CONSTRAINT "credit_lines_sane" CHECK ("credit_lines"."pieces" >= 0 and "credit_lines"."line_cents" >= 0 and "credit_lines"."tax_cents" >= 0)
);
--> statement-breakpoint
CREATE TABLE "credits" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"year" smallint NOT NULL,
	"sequence" integer NOT NULL,
	"store_id" uuid NOT NULL,
	"invoice_id" uuid,
	"issued_on" date NOT NULL,
	"kind" text NOT NULL,
	"reason" text NOT NULL,
	"lines_cents" integer NOT NULL,
	"tax_cents" integer NOT NULL,
	"total_cents" integer NOT NULL,
	"settled_cents" integer DEFAULT 0 NOT NULL,
	"issued_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "credits_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "credits_number_once" UNIQUE("producer_id","year","sequence"),
	CONSTRAINT "credits_sum" CHECK ("credits"."total_cents" = "credits"."lines_cents" + "credits"."tax_cents" and "credits"."total_cents" > 0),
	CONSTRAINT "credits_money_not_negative" CHECK ("credits"."lines_cents" >= 0 and "credits"."tax_cents" >= 0),
	CONSTRAINT "credits_within_total" CHECK ("credits"."settled_cents" between 0 and "credits"."total_cents"),
	CONSTRAINT "credits_kind_known" CHECK ("credits"."kind" in ('breakage','price','quantity','goodwill'))
);
--> statement-breakpoint
CREATE TABLE "online_payment_parts" (
	"producer_id" uuid NOT NULL,
	"online_payment_id" uuid NOT NULL,
	"invoice_id" uuid NOT NULL,
	"amount_cents" integer NOT NULL,
	"discount_cents" integer DEFAULT 0 NOT NULL,
	CONSTRAINT "online_payment_parts_pk" PRIMARY KEY("producer_id","online_payment_id","invoice_id"),
	CONSTRAINT "online_payment_parts_sane" CHECK ("online_payment_parts"."amount_cents" > 0 and "online_payment_parts"."discount_cents" >= 0)
);
--> statement-breakpoint
CREATE TABLE "online_payments" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"store_id" uuid NOT NULL,
	"kind" text DEFAULT 'visit' NOT NULL,
	"method" text DEFAULT 'card' NOT NULL,
	"amount_cents" integer NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"stripe_session_id" text,
	"stripe_payment_intent_id" text,
	"decline_message" text DEFAULT '' NOT NULL,
	"due_on" date,
	"started_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "online_payments_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "online_payments_automatic_once" UNIQUE("producer_id","store_id","due_on"),
	CONSTRAINT "online_payments_amount_sane" CHECK (("online_payments"."kind" = 'keep-method') = ("online_payments"."amount_cents" = 0) and "online_payments"."amount_cents" >= 0),
	CONSTRAINT "online_payments_kind_known" CHECK ("online_payments"."kind" in ('visit','automatic','keep-method')),
	CONSTRAINT "online_payments_method_known" CHECK ("online_payments"."method" in ('card','bank-debit')),
	CONSTRAINT "online_payments_state_known" CHECK ("online_payments"."state" in ('open','on-its-way','paid','declined','expired')),
	CONSTRAINT "online_payments_started_whole" CHECK (("online_payments"."kind" = 'automatic') = ("online_payments"."started_by" is null) and ("online_payments"."kind" = 'automatic') = ("online_payments"."due_on" is not null))
);
--> statement-breakpoint
CREATE TABLE "payment_returns" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"payment_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"state" text NOT NULL,
	"amount_cents" integer NOT NULL,
	"returned_on" date NOT NULL,
	"stripe_id" text,
	"note" text DEFAULT '' NOT NULL,
	"entered_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "payment_returns_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "payment_returns_stripe_once" UNIQUE("producer_id","stripe_id"),
	CONSTRAINT "payment_returns_amount_positive" CHECK ("payment_returns"."amount_cents" > 0),
	CONSTRAINT "payment_returns_kind_known" CHECK ("payment_returns"."kind" in ('refund','bank-return','dispute','bounced')),
	CONSTRAINT "payment_returns_state_known" CHECK ("payment_returns"."state" in ('asked','done','failed','won'))
);
--> statement-breakpoint
CREATE TABLE "payouts" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"stripe_payout_id" text NOT NULL,
	"arrived_on" date NOT NULL,
	"gross_cents" integer NOT NULL,
	"fee_cents" integer NOT NULL,
	"net_cents" integer NOT NULL,
	CONSTRAINT "payouts_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "payouts_once" UNIQUE("producer_id","stripe_payout_id"),
	CONSTRAINT "payouts_sum" CHECK ("payouts"."net_cents" = "payouts"."gross_cents" - "payouts"."fee_cents")
);
--> statement-breakpoint
CREATE TABLE "settlements" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"invoice_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"payment_id" uuid,
	"credit_id" uuid,
	"amount_cents" integer NOT NULL,
	"settled_on" date NOT NULL,
	"settled_at" timestamp with time zone DEFAULT now() NOT NULL,
	"entered_by" uuid,
	CONSTRAINT "settlements_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "settlements_not_nothing" CHECK ("settlements"."amount_cents" <> 0),
	CONSTRAINT "settlements_source_whole" CHECK (("settlements"."kind" in ('payment','discount')) = ("settlements"."payment_id" is not null) and ("settlements"."kind" = 'credit') = ("settlements"."credit_id" is not null)),
	CONSTRAINT "settlements_kind_known" CHECK ("settlements"."kind" in ('payment','credit','discount','write-off'))
);
--> statement-breakpoint
CREATE TABLE "stripe_differences" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"kind" text NOT NULL,
	"stripe_id" text NOT NULL,
	"our_cents" integer,
	"their_cents" integer,
	"detail" text DEFAULT '' NOT NULL,
	"found_at" timestamp with time zone DEFAULT now() NOT NULL,
	"settled_at" timestamp with time zone,
	CONSTRAINT "stripe_differences_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "stripe_differences_once" UNIQUE("producer_id","kind","stripe_id"),
	CONSTRAINT "stripe_differences_kind_known" CHECK ("stripe_differences"."kind" in ('missing-here','missing-there','other-amount','other-state'))
);
--> statement-breakpoint
CREATE TABLE "payment_promises" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"store_id" uuid NOT NULL,
	"amount_cents" integer NOT NULL,
	"promised_on" date NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"noted_by" uuid NOT NULL,
	"noted_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "payment_promises_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "payment_promises_amount_positive" CHECK ("payment_promises"."amount_cents" > 0),
	CONSTRAINT "payment_promises_state_known" CHECK ("payment_promises"."state" in ('open','kept','broken'))
);
--> statement-breakpoint
CREATE TABLE "reminder_steps" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"days_after_due" smallint NOT NULL,
	"subject" text NOT NULL,
	"body" text NOT NULL,
	"is_active" boolean DEFAULT true NOT NULL,
	CONSTRAINT "reminder_steps_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "reminder_steps_day_once" UNIQUE("producer_id","days_after_due"),
	CONSTRAINT "reminder_steps_sane" CHECK ("reminder_steps"."days_after_due" between -30 and 365),
	CONSTRAINT "reminder_steps_say_something" CHECK (length(trim("reminder_steps"."subject")) between 1 and 200 and length(trim("reminder_steps"."body")) between 1 and 2000)
);
--> statement-breakpoint
CREATE TABLE "reminders_sent" (
	"producer_id" uuid NOT NULL,
	"invoice_id" uuid NOT NULL,
	"step_id" uuid NOT NULL,
	"sent_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "reminders_sent_pk" PRIMARY KEY("producer_id","invoice_id","step_id")
);
--> statement-breakpoint
ALTER TABLE "invoices" DROP CONSTRAINT "invoices_paid_within_total";--> statement-breakpoint
ALTER TABLE "invoices" DROP CONSTRAINT "invoices_money_not_negative";--> statement-breakpoint
ALTER TABLE "payments" DROP CONSTRAINT "payments_card_names_its_payment";--> statement-breakpoint
DROP INDEX "invoices_open";--> statement-breakpoint
DROP INDEX "payments_by_store";--> statement-breakpoint
ALTER TABLE "invoice_lines" ALTER COLUMN "product_id" DROP NOT NULL;--> statement-breakpoint
ALTER TABLE "invoice_lines" ADD COLUMN "order_id" uuid;--> statement-breakpoint
ALTER TABLE "invoice_lines" ADD COLUMN "order_line_id" uuid;--> statement-breakpoint
ALTER TABLE "invoice_lines" ADD COLUMN "pound_cents" integer;--> statement-breakpoint
ALTER TABLE "invoices" ADD COLUMN "kind" text DEFAULT 'goods' NOT NULL;--> statement-breakpoint
ALTER TABLE "invoices" ADD COLUMN "once_key" text;--> statement-breakpoint
ALTER TABLE "invoices" ADD COLUMN "credited_cents" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "invoices" ADD COLUMN "discount_cents" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "invoices" ADD COLUMN "written_off_cents" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "invoices" ADD COLUMN "open_cents" integer GENERATED ALWAYS AS (total_cents - paid_cents - credited_cents - discount_cents - written_off_cents) STORED NOT NULL;--> statement-breakpoint
ALTER TABLE "invoices" ADD COLUMN "discount_until" date;--> statement-breakpoint
ALTER TABLE "invoices" ADD COLUMN "discount_basis_points" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "invoices" ADD COLUMN "tax_basis_points" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "invoices" ADD COLUMN "tax_place" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "invoices" ADD COLUMN "po_numbers" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "payments" ADD COLUMN "state" text DEFAULT 'settled' NOT NULL;--> statement-breakpoint
ALTER TABLE "payments" ADD COLUMN "received_on" date;--> statement-breakpoint
ALTER TABLE "payments" ADD COLUMN "settled_cents" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "payments" ADD COLUMN "returned_cents" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "payments" ADD COLUMN "reference" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "payments" ADD COLUMN "fee_cents" integer;--> statement-breakpoint
ALTER TABLE "payments" ADD COLUMN "stripe_payout_id" text;--> statement-breakpoint
ALTER TABLE "producer_settings" ADD COLUMN "breakage_days" smallint DEFAULT 3 NOT NULL;--> statement-breakpoint
ALTER TABLE "producer_settings" ADD COLUMN "reminders_on" boolean DEFAULT true NOT NULL;--> statement-breakpoint
ALTER TABLE "producer_settings" ADD COLUMN "finance_charge_basis_points" integer DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "producer_settings" ADD COLUMN "finance_charge_after_days" smallint DEFAULT 30 NOT NULL;--> statement-breakpoint
ALTER TABLE "sales" ADD COLUMN "fee_cents" integer;--> statement-breakpoint
ALTER TABLE "sales" ADD COLUMN "stripe_payout_id" text;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "invoicing" text DEFAULT 'each-order' NOT NULL;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "tax_place" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "credit_limit_cents" integer;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "is_stopped" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "reminders_held" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "stripe_customer_id" text;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "stripe_payment_method_id" text;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "pays_with_words" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "pays_automatically" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "autopay_agreed_by" uuid;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "autopay_agreed_at" timestamp with time zone;--> statement-breakpoint
ALTER TABLE "book_accounts" ADD CONSTRAINT "book_accounts_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "book_closings" ADD CONSTRAINT "book_closings_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "book_closings" ADD CONSTRAINT "book_closings_closed_by_users_id_fk" FOREIGN KEY ("closed_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "breakage_lines" ADD CONSTRAINT "breakage_lines_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "breakage_lines" ADD CONSTRAINT "breakage_lines_report" FOREIGN KEY ("producer_id","report_id") REFERENCES "public"."breakage_reports"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "breakage_lines" ADD CONSTRAINT "breakage_lines_invoice_line" FOREIGN KEY ("producer_id","invoice_line_id") REFERENCES "public"."invoice_lines"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "breakage_photos" ADD CONSTRAINT "breakage_photos_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "breakage_photos" ADD CONSTRAINT "breakage_photos_line" FOREIGN KEY ("producer_id","line_id") REFERENCES "public"."breakage_lines"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "breakage_reports" ADD CONSTRAINT "breakage_reports_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "breakage_reports" ADD CONSTRAINT "breakage_reports_reported_by_users_id_fk" FOREIGN KEY ("reported_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "breakage_reports" ADD CONSTRAINT "breakage_reports_answered_by_users_id_fk" FOREIGN KEY ("answered_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "breakage_reports" ADD CONSTRAINT "breakage_reports_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "breakage_reports" ADD CONSTRAINT "breakage_reports_invoice" FOREIGN KEY ("producer_id","invoice_id") REFERENCES "public"."invoices"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "breakage_reports" ADD CONSTRAINT "breakage_reports_credit" FOREIGN KEY ("producer_id","credit_id") REFERENCES "public"."credits"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exemption_certificates" ADD CONSTRAINT "exemption_certificates_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exemption_certificates" ADD CONSTRAINT "exemption_certificates_handed_in_by_users_id_fk" FOREIGN KEY ("handed_in_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exemption_certificates" ADD CONSTRAINT "exemption_certificates_decided_by_users_id_fk" FOREIGN KEY ("decided_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "exemption_certificates" ADD CONSTRAINT "exemption_certificates_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_orders" ADD CONSTRAINT "invoice_orders_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_orders" ADD CONSTRAINT "invoice_orders_order" FOREIGN KEY ("producer_id","order_id") REFERENCES "public"."orders"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_orders" ADD CONSTRAINT "invoice_orders_invoice" FOREIGN KEY ("producer_id","invoice_id") REFERENCES "public"."invoices"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_run_orders" ADD CONSTRAINT "invoice_run_orders_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_run_orders" ADD CONSTRAINT "invoice_run_orders_run" FOREIGN KEY ("producer_id","run_id") REFERENCES "public"."invoice_runs"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_run_orders" ADD CONSTRAINT "invoice_run_orders_order" FOREIGN KEY ("producer_id","order_id") REFERENCES "public"."orders"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_runs" ADD CONSTRAINT "invoice_runs_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_runs" ADD CONSTRAINT "invoice_runs_started_by_users_id_fk" FOREIGN KEY ("started_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "tax_rates" ADD CONSTRAINT "tax_rates_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "credit_lines" ADD CONSTRAINT "credit_lines_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "credit_lines" ADD CONSTRAINT "credit_lines_credit" FOREIGN KEY ("producer_id","credit_id") REFERENCES "public"."credits"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "credit_lines" ADD CONSTRAINT "credit_lines_invoice_line" FOREIGN KEY ("producer_id","invoice_line_id") REFERENCES "public"."invoice_lines"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "credits" ADD CONSTRAINT "credits_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "credits" ADD CONSTRAINT "credits_issued_by_users_id_fk" FOREIGN KEY ("issued_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "credits" ADD CONSTRAINT "credits_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "credits" ADD CONSTRAINT "credits_invoice" FOREIGN KEY ("producer_id","invoice_id") REFERENCES "public"."invoices"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "online_payment_parts" ADD CONSTRAINT "online_payment_parts_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "online_payment_parts" ADD CONSTRAINT "online_payment_parts_payment" FOREIGN KEY ("producer_id","online_payment_id") REFERENCES "public"."online_payments"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "online_payment_parts" ADD CONSTRAINT "online_payment_parts_invoice" FOREIGN KEY ("producer_id","invoice_id") REFERENCES "public"."invoices"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "online_payments" ADD CONSTRAINT "online_payments_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "online_payments" ADD CONSTRAINT "online_payments_started_by_users_id_fk" FOREIGN KEY ("started_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "online_payments" ADD CONSTRAINT "online_payments_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payment_returns" ADD CONSTRAINT "payment_returns_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payment_returns" ADD CONSTRAINT "payment_returns_entered_by_users_id_fk" FOREIGN KEY ("entered_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payment_returns" ADD CONSTRAINT "payment_returns_payment" FOREIGN KEY ("producer_id","payment_id") REFERENCES "public"."payments"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payouts" ADD CONSTRAINT "payouts_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settlements" ADD CONSTRAINT "settlements_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settlements" ADD CONSTRAINT "settlements_entered_by_users_id_fk" FOREIGN KEY ("entered_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settlements" ADD CONSTRAINT "settlements_invoice" FOREIGN KEY ("producer_id","invoice_id") REFERENCES "public"."invoices"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settlements" ADD CONSTRAINT "settlements_payment" FOREIGN KEY ("producer_id","payment_id") REFERENCES "public"."payments"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "settlements" ADD CONSTRAINT "settlements_credit" FOREIGN KEY ("producer_id","credit_id") REFERENCES "public"."credits"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stripe_differences" ADD CONSTRAINT "stripe_differences_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payment_promises" ADD CONSTRAINT "payment_promises_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payment_promises" ADD CONSTRAINT "payment_promises_noted_by_users_id_fk" FOREIGN KEY ("noted_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payment_promises" ADD CONSTRAINT "payment_promises_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reminder_steps" ADD CONSTRAINT "reminder_steps_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reminders_sent" ADD CONSTRAINT "reminders_sent_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reminders_sent" ADD CONSTRAINT "reminders_sent_invoice" FOREIGN KEY ("producer_id","invoice_id") REFERENCES "public"."invoices"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "reminders_sent" ADD CONSTRAINT "reminders_sent_step" FOREIGN KEY ("producer_id","step_id") REFERENCES "public"."reminder_steps"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "breakage_lines_by_invoice_line" ON "breakage_lines" USING btree ("producer_id","invoice_line_id");--> statement-breakpoint
CREATE INDEX "breakage_reports_by_invoice" ON "breakage_reports" USING btree ("producer_id","invoice_id");--> statement-breakpoint
CREATE INDEX "breakage_reports_by_day" ON "breakage_reports" USING btree ("producer_id","reported_at","id");--> statement-breakpoint
CREATE INDEX "breakage_reports_open" ON "breakage_reports" USING btree ("producer_id","reported_at","id") WHERE state = 'open';--> statement-breakpoint
CREATE INDEX "exemption_certificates_by_store" ON "exemption_certificates" USING btree ("producer_id","store_id","handed_in_at");--> statement-breakpoint
CREATE INDEX "exemption_certificates_waiting" ON "exemption_certificates" USING btree ("producer_id","handed_in_at") WHERE state = 'handed-in';--> statement-breakpoint
CREATE INDEX "invoice_orders_by_invoice" ON "invoice_orders" USING btree ("producer_id","invoice_id");--> statement-breakpoint
CREATE INDEX "invoice_runs_by_start" ON "invoice_runs" USING btree ("producer_id","started_at","id");--> statement-breakpoint
CREATE INDEX "credit_lines_by_invoice_line" ON "credit_lines" USING btree ("producer_id","invoice_line_id");--> statement-breakpoint
CREATE INDEX "credits_by_store" ON "credits" USING btree ("producer_id","store_id","issued_on","id");--> statement-breakpoint
CREATE INDEX "credits_by_day" ON "credits" USING btree ("producer_id","issued_on","id");--> statement-breakpoint
CREATE INDEX "credits_by_invoice" ON "credits" USING btree ("producer_id","invoice_id");--> statement-breakpoint
CREATE INDEX "credits_on_account" ON "credits" USING btree ("producer_id","store_id") WHERE settled_cents < total_cents;--> statement-breakpoint
CREATE INDEX "online_payment_parts_by_invoice" ON "online_payment_parts" USING btree ("producer_id","invoice_id");--> statement-breakpoint
CREATE INDEX "online_payments_by_store" ON "online_payments" USING btree ("producer_id","store_id","created_at");--> statement-breakpoint
CREATE INDEX "payment_returns_by_payment" ON "payment_returns" USING btree ("producer_id","payment_id");--> statement-breakpoint
CREATE INDEX "payment_returns_by_day" ON "payment_returns" USING btree ("producer_id","returned_on","id");--> statement-breakpoint
CREATE INDEX "payouts_by_day" ON "payouts" USING btree ("producer_id","arrived_on","id");--> statement-breakpoint
CREATE INDEX "settlements_by_invoice" ON "settlements" USING btree ("producer_id","invoice_id","settled_at");--> statement-breakpoint
CREATE INDEX "settlements_by_payment" ON "settlements" USING btree ("producer_id","payment_id");--> statement-breakpoint
CREATE INDEX "settlements_by_credit" ON "settlements" USING btree ("producer_id","credit_id");--> statement-breakpoint
CREATE INDEX "settlements_by_day" ON "settlements" USING btree ("producer_id","settled_on","id");--> statement-breakpoint
CREATE INDEX "stripe_differences_open" ON "stripe_differences" USING btree ("producer_id","found_at") WHERE settled_at is null;--> statement-breakpoint
CREATE INDEX "payment_promises_by_store" ON "payment_promises" USING btree ("producer_id","store_id","promised_on","id");--> statement-breakpoint
CREATE INDEX "payment_promises_open" ON "payment_promises" USING btree ("producer_id","promised_on","id") WHERE state = 'open';--> statement-breakpoint
ALTER TABLE "invoice_lines" ADD CONSTRAINT "invoice_lines_order_line" FOREIGN KEY ("producer_id","order_line_id") REFERENCES "public"."order_lines"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stores" ADD CONSTRAINT "stores_autopay_agreed_by_users_id_fk" FOREIGN KEY ("autopay_agreed_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "invoice_lines_by_product" ON "invoice_lines" USING btree ("producer_id","product_id","invoice_id");--> statement-breakpoint
CREATE INDEX "invoices_owed" ON "invoices" USING btree ("producer_id","due_on","id") WHERE open_cents > 0;--> statement-breakpoint
CREATE INDEX "invoices_owed_by_store" ON "invoices" USING btree ("producer_id","store_id","due_on","id") WHERE open_cents > 0;--> statement-breakpoint
CREATE INDEX "payments_by_day" ON "payments" USING btree ("producer_id","received_on","id");--> statement-breakpoint
CREATE INDEX "payments_on_account" ON "payments" USING btree ("producer_id","store_id") WHERE state = 'settled' and settled_cents + returned_cents < amount_cents;--> statement-breakpoint
CREATE INDEX "payments_by_store" ON "payments" USING btree ("producer_id","store_id","received_on","id");--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_made_once" UNIQUE("producer_id","once_key");--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_settled_within_total" CHECK ("invoices"."paid_cents" + "invoices"."credited_cents" + "invoices"."discount_cents" + "invoices"."written_off_cents" <= "invoices"."total_cents");--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_kind_known" CHECK ("invoices"."kind" in ('goods','finance-charge'));--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_discount_whole" CHECK (("invoices"."discount_until" is null) = ("invoices"."discount_basis_points" = 0));--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_money_not_negative" CHECK ("invoices"."lines_cents" >= 0 and "invoices"."delivery_cents" >= 0 and "invoices"."tax_cents" >= 0 and "invoices"."paid_cents" >= 0 and "invoices"."credited_cents" >= 0 and "invoices"."discount_cents" >= 0 and "invoices"."written_off_cents" >= 0);--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_method_known" CHECK ("payments"."method" in ('card','bank-debit','cheque','cash','transfer'));--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_state_known" CHECK ("payments"."state" in ('on-its-way','settled','returned'));--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_by_stripe_named" CHECK (("payments"."method" in ('card','bank-debit')) = ("payments"."stripe_payment_intent_id" is not null));--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_within_amount" CHECK ("payments"."settled_cents" >= 0 and "payments"."returned_cents" >= 0 and "payments"."settled_cents" + "payments"."returned_cents" <= "payments"."amount_cents");--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_settle_when_cleared" CHECK ("payments"."state" = 'settled' or "payments"."settled_cents" = 0);--> statement-breakpoint
ALTER TABLE "producer_settings" ADD CONSTRAINT "producer_settings_invoicing_sane" CHECK ("producer_settings"."breakage_days" between 0 and 60 and "producer_settings"."finance_charge_basis_points" between 0 and 1000 and "producer_settings"."finance_charge_after_days" between 0 and 365);--> statement-breakpoint
ALTER TABLE "stores" ADD CONSTRAINT "stores_invoicing_known" CHECK ("stores"."invoicing" in ('each-order','month-end'));--> statement-breakpoint
ALTER TABLE "stores" ADD CONSTRAINT "stores_credit_limit_not_negative" CHECK (coalesce("stores"."credit_limit_cents", 0) >= 0);--> statement-breakpoint
ALTER TABLE "stores" ADD CONSTRAINT "stores_autopay_agreed" CHECK (not "stores"."pays_automatically" or ("stores"."stripe_payment_method_id" is not null and "stores"."autopay_agreed_by" is not null and "stores"."autopay_agreed_at" is not null));--> statement-breakpoint

-- What is there goes over into the new tables. Row security binds the owner too, so it is lifted for the copying.
ALTER TABLE invoices NO FORCE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE payments NO FORCE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE payment_parts NO FORCE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE card_payments NO FORCE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE invoice_lines NO FORCE ROW LEVEL SECURITY;--> statement-breakpoint
UPDATE payments p SET received_on = (p.received_at AT TIME ZONE y.time_zone)::date,
	settled_cents = coalesce((SELECT sum(x.amount_cents) FROM payment_parts x
		WHERE x.producer_id = p.producer_id AND x.payment_id = p.id), 0)
FROM producers y WHERE y.id = p.producer_id;--> statement-breakpoint
ALTER TABLE payments ALTER COLUMN received_on SET NOT NULL;--> statement-breakpoint
INSERT INTO invoice_orders (producer_id, order_id, invoice_id) SELECT producer_id, order_id, id FROM invoices;--> statement-breakpoint
UPDATE invoice_lines l SET order_id = i.order_id FROM invoices i
WHERE i.producer_id = l.producer_id AND i.id = l.invoice_id;--> statement-breakpoint
INSERT INTO settlements (producer_id, invoice_id, kind, payment_id, amount_cents, settled_on, settled_at, entered_by)
SELECT x.producer_id, x.invoice_id, 'payment', x.payment_id, x.amount_cents, p.received_on, p.received_at, p.entered_by
FROM payment_parts x JOIN payments p ON p.producer_id = x.producer_id AND p.id = x.payment_id;--> statement-breakpoint
INSERT INTO online_payments (producer_id, id, store_id, amount_cents, state, stripe_session_id, stripe_payment_intent_id,
	decline_message, started_by, created_at)
SELECT c.producer_id, c.id, i.store_id, c.amount_cents, c.state, c.stripe_session_id, c.stripe_payment_intent_id,
	c.decline_message, c.started_by, c.created_at
FROM card_payments c JOIN invoices i ON i.producer_id = c.producer_id AND i.id = c.invoice_id;--> statement-breakpoint
INSERT INTO online_payment_parts (producer_id, online_payment_id, invoice_id, amount_cents)
SELECT producer_id, id, invoice_id, amount_cents FROM card_payments;--> statement-breakpoint
ALTER TABLE invoices FORCE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE payments FORCE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE payment_parts FORCE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE card_payments FORCE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE invoice_lines FORCE ROW LEVEL SECURITY;
