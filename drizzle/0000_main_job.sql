CREATE TABLE "delivery_rounds" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"weekday" smallint NOT NULL,
	"cutoff_days_before" smallint NOT NULL,
	"cutoff_time" time NOT NULL,
	CONSTRAINT "delivery_rounds_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "delivery_rounds_one_a_weekday" UNIQUE("producer_id","weekday"),
	CONSTRAINT "delivery_rounds_sane" CHECK ("delivery_rounds"."weekday" between 1 and 7 and "delivery_rounds"."cutoff_days_before" between 0 and 14)
);
--> statement-breakpoint
CREATE TABLE "shut_days" (
	"producer_id" uuid NOT NULL,
	"shut_on" date NOT NULL,
	"reason" text DEFAULT '' NOT NULL,
	CONSTRAINT "shut_days_pk" PRIMARY KEY("producer_id","shut_on")
);
--> statement-breakpoint
CREATE TABLE "store_rounds" (
	"producer_id" uuid NOT NULL,
	"store_id" uuid NOT NULL,
	"round_id" uuid NOT NULL,
	CONSTRAINT "store_rounds_pk" PRIMARY KEY("producer_id","store_id","round_id")
);
--> statement-breakpoint
CREATE TABLE "invoice_lines" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"invoice_id" uuid NOT NULL,
	"position" smallint NOT NULL,
	"product_id" uuid NOT NULL,
	"code" text NOT NULL,
	"name" text NOT NULL,
	"detail" text NOT NULL,
	"lot_codes" text DEFAULT '' NOT NULL,
	"net_grams" integer NOT NULL,
	"asked_cases" smallint NOT NULL,
	"sent_cases" smallint NOT NULL,
	"case_cents" integer NOT NULL,
	"line_cents" integer NOT NULL,
	"tax_cents" integer DEFAULT 0 NOT NULL,
	CONSTRAINT "invoice_lines_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "invoice_lines_position_once" UNIQUE("producer_id","invoice_id","position"),
	CONSTRAINT "invoice_lines_sane" CHECK ("invoice_lines"."sent_cases" between 0 and "invoice_lines"."asked_cases" and "invoice_lines"."line_cents" >= 0 and "invoice_lines"."net_grams" >= 0)
);
--> statement-breakpoint
CREATE TABLE "invoices" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"year" smallint NOT NULL,
	"sequence" integer NOT NULL,
	"store_id" uuid NOT NULL,
	"order_id" uuid NOT NULL,
	"issued_on" date NOT NULL,
	"due_on" date NOT NULL,
	"lines_cents" integer NOT NULL,
	"delivery_cents" integer NOT NULL,
	"tax_cents" integer NOT NULL,
	"total_cents" integer NOT NULL,
	"paid_cents" integer DEFAULT 0 NOT NULL,
	"short_note" text DEFAULT '' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "invoices_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "invoices_number_once" UNIQUE("producer_id","year","sequence"),
	CONSTRAINT "invoices_once_per_order" UNIQUE("producer_id","order_id"),
	CONSTRAINT "invoices_sum" CHECK ("invoices"."total_cents" = "invoices"."lines_cents" + "invoices"."delivery_cents" + "invoices"."tax_cents"),
	CONSTRAINT "invoices_money_not_negative" CHECK ("invoices"."lines_cents" >= 0 and "invoices"."delivery_cents" >= 0 and "invoices"."tax_cents" >= 0 and "invoices"."paid_cents" >= 0),
	CONSTRAINT "invoices_paid_within_total" CHECK ("invoices"."paid_cents" <= "invoices"."total_cents"),
	CONSTRAINT "invoices_dates_in_order" CHECK ("invoices"."due_on" >= "invoices"."issued_on")
);
--> statement-breakpoint
CREATE TABLE "payment_parts" (
	"producer_id" uuid NOT NULL,
	"payment_id" uuid NOT NULL,
	"invoice_id" uuid NOT NULL,
	"amount_cents" integer NOT NULL,
	CONSTRAINT "payment_parts_pk" PRIMARY KEY("producer_id","payment_id","invoice_id"),
	CONSTRAINT "payment_parts_positive" CHECK ("payment_parts"."amount_cents" > 0)
);
--> statement-breakpoint
CREATE TABLE "payments" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"store_id" uuid NOT NULL,
	"method" text NOT NULL,
	"amount_cents" integer NOT NULL,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL,
	"stripe_payment_intent_id" text,
	"entered_by" uuid,
	CONSTRAINT "payments_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "payments_card_payment_once" UNIQUE("producer_id","stripe_payment_intent_id"),
	CONSTRAINT "payments_amount_positive" CHECK ("payments"."amount_cents" > 0),
	CONSTRAINT "payments_card_names_its_payment" CHECK (("payments"."method" = 'card') = ("payments"."stripe_payment_intent_id" is not null))
);
--> statement-breakpoint
CREATE TABLE "expected_supplies" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"product_id" uuid NOT NULL,
	"expected_on" date NOT NULL,
	"low_pieces" integer NOT NULL,
	"likely_pieces" integer NOT NULL,
	"high_pieces" integer NOT NULL,
	CONSTRAINT "expected_supplies_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "expected_supplies_once_a_day" UNIQUE("producer_id","product_id","expected_on"),
	CONSTRAINT "expected_supplies_in_order" CHECK (0 <= "expected_supplies"."low_pieces" and "expected_supplies"."low_pieces" <= "expected_supplies"."likely_pieces" and "expected_supplies"."likely_pieces" <= "expected_supplies"."high_pieces")
);
--> statement-breakpoint
CREATE TABLE "lots" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"code" text NOT NULL,
	"product_id" uuid NOT NULL,
	"state" text DEFAULT 'held' NOT NULL,
	"harvested_on" date NOT NULL,
	"expected_release_on" date NOT NULL,
	"best_before_on" date NOT NULL,
	"pieces_harvested" integer NOT NULL,
	"yard" text DEFAULT '' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "lots_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "lots_code_once" UNIQUE("producer_id","code"),
	CONSTRAINT "lots_state_known" CHECK ("lots"."state" in ('held','released','withdrawn')),
	CONSTRAINT "lots_pieces_positive" CHECK ("lots"."pieces_harvested" > 0),
	CONSTRAINT "lots_dates_in_order" CHECK ("lots"."harvested_on" <= "lots"."expected_release_on" and "lots"."expected_release_on" <= "lots"."best_before_on")
);
--> statement-breakpoint
CREATE TABLE "order_events" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"order_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"user_id" uuid,
	"detail" jsonb DEFAULT '{}'::jsonb NOT NULL,
	CONSTRAINT "order_events_pk" PRIMARY KEY("producer_id","id")
);
--> statement-breakpoint
CREATE TABLE "order_line_lots" (
	"producer_id" uuid NOT NULL,
	"order_line_id" uuid NOT NULL,
	"lot_id" uuid NOT NULL,
	"pieces" integer NOT NULL,
	CONSTRAINT "order_line_lots_pk" PRIMARY KEY("producer_id","order_line_id","lot_id"),
	CONSTRAINT "order_line_lots_positive" CHECK ("order_line_lots"."pieces" > 0)
);
--> statement-breakpoint
CREATE TABLE "order_lines" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"order_id" uuid NOT NULL,
	"product_id" uuid NOT NULL,
	"asked_cases" smallint NOT NULL,
	"is_to_share" boolean DEFAULT false NOT NULL,
	"given_cases" smallint,
	"case_cents" integer NOT NULL,
	"pieces_per_case" smallint NOT NULL,
	CONSTRAINT "order_lines_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "order_lines_product_once" UNIQUE("producer_id","order_id","product_id"),
	CONSTRAINT "order_lines_asked_positive" CHECK ("order_lines"."asked_cases" > 0),
	CONSTRAINT "order_lines_given_within_asked" CHECK ("order_lines"."given_cases" between 0 and "order_lines"."asked_cases"),
	CONSTRAINT "order_lines_money_not_negative" CHECK ("order_lines"."case_cents" >= 0 and "order_lines"."pieces_per_case" > 0)
);
--> statement-breakpoint
CREATE TABLE "orders" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"number" integer NOT NULL,
	"store_id" uuid NOT NULL,
	"delivery_on" date NOT NULL,
	"state" text DEFAULT 'placed' NOT NULL,
	"po_number" text DEFAULT '' NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"delivery_cents" integer DEFAULT 0 NOT NULL,
	"placed_by" uuid,
	"placed_at" timestamp with time zone DEFAULT now() NOT NULL,
	"standing_order_id" uuid,
	"standing_on" date,
	"idempotency_key" uuid DEFAULT gen_random_uuid() NOT NULL,
	CONSTRAINT "orders_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "orders_number_once" UNIQUE("producer_id","number"),
	CONSTRAINT "orders_one_per_standing_date" UNIQUE("producer_id","standing_order_id","standing_on"),
	CONSTRAINT "orders_sent_once" UNIQUE("producer_id","store_id","idempotency_key"),
	CONSTRAINT "orders_state_known" CHECK ("orders"."state" in ('placed','confirmed','packed','sent','received','cancelled')),
	CONSTRAINT "orders_standing_date_whole" CHECK (("orders"."standing_order_id" is null) = ("orders"."standing_on" is null)),
	CONSTRAINT "orders_money_not_negative" CHECK ("orders"."delivery_cents" >= 0)
);
--> statement-breakpoint
CREATE TABLE "card_payments" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"invoice_id" uuid NOT NULL,
	"amount_cents" integer NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"stripe_session_id" text,
	"stripe_payment_intent_id" text,
	"decline_message" text DEFAULT '' NOT NULL,
	"started_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "card_payments_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "card_payments_amount_positive" CHECK ("card_payments"."amount_cents" > 0),
	CONSTRAINT "card_payments_state_known" CHECK ("card_payments"."state" in ('open','paid','declined','expired'))
);
--> statement-breakpoint
CREATE TABLE "outbox_mails" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"recipient" text NOT NULL,
	"template" text NOT NULL,
	"props" jsonb NOT NULL,
	"once_key" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"sent_at" timestamp with time zone,
	"attempts" integer DEFAULT 0 NOT NULL,
	"last_error" text DEFAULT '' NOT NULL,
	CONSTRAINT "outbox_mails_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "outbox_mails_once" UNIQUE("producer_id","once_key","recipient")
);
--> statement-breakpoint
CREATE TABLE "stripe_events" (
	"id" text PRIMARY KEY NOT NULL,
	"type" text NOT NULL,
	"is_live" boolean NOT NULL,
	"payload" jsonb NOT NULL,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL,
	"applied_at" timestamp with time zone,
	"deliveries" integer DEFAULT 1 NOT NULL
);
--> statement-breakpoint
CREATE TABLE "audit_entries" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	"user_id" uuid,
	"action" text NOT NULL,
	"subject_type" text NOT NULL,
	"subject_id" uuid NOT NULL,
	"detail" jsonb DEFAULT '{}'::jsonb NOT NULL,
	CONSTRAINT "audit_entries_pk" PRIMARY KEY("producer_id","id")
);
--> statement-breakpoint
CREATE TABLE "invitations" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"role" text NOT NULL,
	"store_id" uuid,
	"token_hash" text NOT NULL,
	"invited_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"accepted_at" timestamp with time zone,
	CONSTRAINT "invitations_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "invitations_token_once" UNIQUE("producer_id","token_hash"),
	CONSTRAINT "invitations_email_lower_case" CHECK ("invitations"."email" = lower("invitations"."email")),
	CONSTRAINT "invitations_store_roles_name_a_store" CHECK (("invitations"."role" in ('buyer','payer')) = ("invitations"."store_id" is not null))
);
--> statement-breakpoint
CREATE TABLE "kept_posts" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"path" text NOT NULL,
	"fields" jsonb NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL
);
--> statement-breakpoint
CREATE TABLE "login_codes" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"email" text NOT NULL,
	"code_hash" text NOT NULL,
	"link_hash" text NOT NULL,
	"attempts" integer DEFAULT 0 NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"used_at" timestamp with time zone,
	CONSTRAINT "login_codes_link_once" UNIQUE("link_hash"),
	CONSTRAINT "login_codes_five_tries" CHECK ("login_codes"."attempts" between 0 and 5)
);
--> statement-breakpoint
CREATE TABLE "memberships" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"user_id" uuid NOT NULL,
	"role" text NOT NULL,
	"store_id" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"ended_at" timestamp with time zone,
	CONSTRAINT "memberships_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "memberships_role_once" UNIQUE NULLS NOT DISTINCT("producer_id","user_id","role","store_id"),
	CONSTRAINT "memberships_role_known" CHECK ("memberships"."role" in ('owner','desk','packer','stall','buyer','payer')),
	CONSTRAINT "memberships_store_roles_name_a_store" CHECK (("memberships"."role" in ('buyer','payer')) = ("memberships"."store_id" is not null))
);
--> statement-breakpoint
CREATE TABLE "rate_limits" (
	"key" varchar(255) PRIMARY KEY NOT NULL,
	"points" integer DEFAULT 0 NOT NULL,
	"expire" bigint
);
--> statement-breakpoint
CREATE TABLE "sessions" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"user_id" uuid NOT NULL,
	"token_hash" text NOT NULL,
	"user_agent" text DEFAULT '' NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"last_seen_at" timestamp with time zone DEFAULT now() NOT NULL,
	"expires_at" timestamp with time zone NOT NULL,
	"ended_at" timestamp with time zone,
	CONSTRAINT "sessions_token_once" UNIQUE("token_hash")
);
--> statement-breakpoint
CREATE TABLE "users" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"email" text NOT NULL,
	"name" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "users_email_once" UNIQUE("email"),
	CONSTRAINT "users_email_lower_case" CHECK ("users"."email" = lower("users"."email"))
);
--> statement-breakpoint
CREATE TABLE "price_tiers" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	CONSTRAINT "price_tiers_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "price_tiers_name_once" UNIQUE("producer_id","name")
);
--> statement-breakpoint
CREATE TABLE "prices" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"tier_id" uuid NOT NULL,
	"product_id" uuid NOT NULL,
	"min_cases" smallint DEFAULT 1 NOT NULL,
	"case_cents" integer NOT NULL,
	"valid_from" date NOT NULL,
	CONSTRAINT "prices_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "prices_break_once" UNIQUE("producer_id","tier_id","product_id","min_cases","valid_from"),
	CONSTRAINT "prices_sane" CHECK ("prices"."min_cases" > 0 and "prices"."case_cents" >= 0)
);
--> statement-breakpoint
CREATE TABLE "products" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"code" text NOT NULL,
	"name" text NOT NULL,
	"form" text NOT NULL,
	"grade" text DEFAULT '' NOT NULL,
	"flora" text DEFAULT '' NOT NULL,
	"colour" text NOT NULL,
	"detail" text DEFAULT '' NOT NULL,
	"piece_net_grams" integer NOT NULL,
	"pieces_per_case" smallint NOT NULL,
	"priced_by" text DEFAULT 'case' NOT NULL,
	"break_family" text NOT NULL,
	"piece_cents" integer,
	"reserve_pieces" integer DEFAULT 0 NOT NULL,
	"is_taxable" boolean DEFAULT false NOT NULL,
	"is_active" boolean DEFAULT true NOT NULL,
	CONSTRAINT "products_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "products_code_once" UNIQUE("producer_id","code"),
	CONSTRAINT "products_form_known" CHECK ("products"."form" in ('round','basswood','clear-box','cut-comb','half-piece','chunk','frame')),
	CONSTRAINT "products_sizes_positive" CHECK ("products"."piece_net_grams" > 0 and "products"."pieces_per_case" > 0),
	CONSTRAINT "products_money_not_negative" CHECK (coalesce("products"."piece_cents", 0) >= 0 and "products"."reserve_pieces" >= 0)
);
--> statement-breakpoint
CREATE TABLE "counters" (
	"producer_id" uuid NOT NULL,
	"series" text NOT NULL,
	"year" integer NOT NULL,
	"last" integer DEFAULT 0 NOT NULL,
	CONSTRAINT "counters_pk" PRIMARY KEY("producer_id","series","year")
);
--> statement-breakpoint
CREATE TABLE "producer_settings" (
	"producer_id" uuid PRIMARY KEY NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"email" text NOT NULL,
	"phone" text DEFAULT '' NOT NULL,
	"shop_headline" text DEFAULT '' NOT NULL,
	"shop_words" text DEFAULT '' NOT NULL,
	"invoice_note" text DEFAULT '' NOT NULL,
	"contact_name" text DEFAULT '' NOT NULL
);
--> statement-breakpoint
CREATE TABLE "producers" (
	"id" uuid PRIMARY KEY DEFAULT gen_random_uuid() NOT NULL,
	"slug" text NOT NULL,
	"name" text NOT NULL,
	"county" text DEFAULT '' NOT NULL,
	"time_zone" text NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "producers_slug_once" UNIQUE("slug"),
	CONSTRAINT "producers_slug_form" CHECK ("producers"."slug" ~ '^[a-z0-9]+(-[a-z0-9]+)*$')
);
--> statement-breakpoint
CREATE TABLE "shop_versions" (
	"producer_id" uuid PRIMARY KEY NOT NULL,
	"version" bigint DEFAULT 1 NOT NULL
);
--> statement-breakpoint
CREATE TABLE "market_day_people" (
	"producer_id" uuid NOT NULL,
	"market_day_id" uuid NOT NULL,
	"user_id" uuid NOT NULL,
	CONSTRAINT "market_day_people_pk" PRIMARY KEY("producer_id","market_day_id","user_id")
);
--> statement-breakpoint
CREATE TABLE "market_days" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"market_id" uuid NOT NULL,
	"market_on" date NOT NULL,
	"state" text DEFAULT 'planned' NOT NULL,
	"float_cents" integer DEFAULT 0 NOT NULL,
	CONSTRAINT "market_days_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "market_days_once" UNIQUE("producer_id","market_id","market_on"),
	CONSTRAINT "market_days_state_known" CHECK ("market_days"."state" in ('planned','open','closed')),
	CONSTRAINT "market_days_float_not_negative" CHECK ("market_days"."float_cents" >= 0)
);
--> statement-breakpoint
CREATE TABLE "markets" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"opens_at" time NOT NULL,
	"closes_at" time NOT NULL,
	"reader_id" text DEFAULT '' NOT NULL,
	CONSTRAINT "markets_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "markets_name_once" UNIQUE("producer_id","name")
);
--> statement-breakpoint
CREATE TABLE "sale_lines" (
	"producer_id" uuid NOT NULL,
	"sale_id" uuid NOT NULL,
	"product_id" uuid NOT NULL,
	"pieces" integer NOT NULL,
	"piece_cents" integer NOT NULL,
	CONSTRAINT "sale_lines_pk" PRIMARY KEY("producer_id","sale_id","product_id"),
	CONSTRAINT "sale_lines_sane" CHECK ("sale_lines"."pieces" > 0 and "sale_lines"."piece_cents" >= 0)
);
--> statement-breakpoint
CREATE TABLE "sales" (
	"producer_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"market_day_id" uuid NOT NULL,
	"method" text NOT NULL,
	"state" text NOT NULL,
	"total_cents" integer NOT NULL,
	"given_cents" integer,
	"decline_message" text DEFAULT '' NOT NULL,
	"attempt" integer DEFAULT 1 NOT NULL,
	"stripe_payment_intent_id" text,
	"sold_by" uuid NOT NULL,
	"sold_at" timestamp with time zone DEFAULT now() NOT NULL,
	"paid_at" timestamp with time zone,
	CONSTRAINT "sales_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "sales_card_payment_once" UNIQUE("producer_id","stripe_payment_intent_id"),
	CONSTRAINT "sales_method_known" CHECK ("sales"."method" in ('card','cash')),
	CONSTRAINT "sales_state_known" CHECK ("sales"."state" in ('open','paid','given-up')),
	CONSTRAINT "sales_total_not_negative" CHECK ("sales"."total_cents" >= 0),
	CONSTRAINT "sales_cash_covers_total" CHECK ("sales"."method" <> 'cash' or "sales"."given_cents" >= "sales"."total_cents")
);
--> statement-breakpoint
CREATE TABLE "standing_order_lines" (
	"producer_id" uuid NOT NULL,
	"standing_order_id" uuid NOT NULL,
	"product_id" uuid NOT NULL,
	"cases" smallint NOT NULL,
	"least_cases" smallint DEFAULT 0 NOT NULL,
	CONSTRAINT "standing_order_lines_pk" PRIMARY KEY("producer_id","standing_order_id","product_id"),
	CONSTRAINT "standing_order_lines_sane" CHECK ("standing_order_lines"."cases" > 0 and "standing_order_lines"."least_cases" between 0 and "standing_order_lines"."cases")
);
--> statement-breakpoint
CREATE TABLE "standing_order_skips" (
	"producer_id" uuid NOT NULL,
	"standing_order_id" uuid NOT NULL,
	"skip_on" date NOT NULL,
	CONSTRAINT "standing_order_skips_pk" PRIMARY KEY("producer_id","standing_order_id","skip_on")
);
--> statement-breakpoint
CREATE TABLE "standing_orders" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"store_id" uuid NOT NULL,
	"rule" text NOT NULL,
	"starts_on" date NOT NULL,
	"ends_on" date,
	"paused_from" date,
	"created_by" uuid NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	"ended_at" timestamp with time zone,
	"idempotency_key" uuid DEFAULT gen_random_uuid() NOT NULL,
	CONSTRAINT "standing_orders_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "standing_orders_sent_once" UNIQUE("producer_id","store_id","idempotency_key"),
	CONSTRAINT "standing_orders_dates_in_order" CHECK ("standing_orders"."ends_on" is null or "standing_orders"."ends_on" >= "standing_orders"."starts_on")
);
--> statement-breakpoint
CREATE TABLE "stock_balances" (
	"producer_id" uuid NOT NULL,
	"lot_id" uuid NOT NULL,
	"place" text NOT NULL,
	"place_ref" uuid DEFAULT '00000000-0000-0000-0000-000000000000' NOT NULL,
	"pieces" integer NOT NULL,
	CONSTRAINT "stock_balances_pk" PRIMARY KEY("producer_id","lot_id","place","place_ref"),
	CONSTRAINT "stock_balances_not_negative" CHECK ("stock_balances"."pieces" >= 0)
);
--> statement-breakpoint
CREATE TABLE "stock_moves" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"lot_id" uuid NOT NULL,
	"from_place" text,
	"from_ref" uuid DEFAULT '00000000-0000-0000-0000-000000000000' NOT NULL,
	"to_place" text NOT NULL,
	"to_ref" uuid DEFAULT '00000000-0000-0000-0000-000000000000' NOT NULL,
	"pieces" integer NOT NULL,
	"reason" text NOT NULL,
	"moved_by" uuid,
	"moved_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "stock_moves_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "stock_moves_pieces_positive" CHECK ("stock_moves"."pieces" > 0),
	CONSTRAINT "stock_moves_places_known" CHECK ("stock_moves"."to_place" in ('cold-room','ready','packed','van','market','sold','waste','cut-up') and coalesce("stock_moves"."from_place", 'ready') in ('cold-room','ready','packed','van','market','sold','waste','cut-up')),
	CONSTRAINT "stock_moves_go_somewhere" CHECK ("stock_moves"."from_place" is distinct from "stock_moves"."to_place" or "stock_moves"."from_ref" <> "stock_moves"."to_ref")
);
--> statement-breakpoint
CREATE TABLE "stores" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"slug" text NOT NULL,
	"name" text NOT NULL,
	"tier_id" uuid NOT NULL,
	"address" text DEFAULT '' NOT NULL,
	"receiving_note" text DEFAULT '' NOT NULL,
	"minimum_cents" integer DEFAULT 0 NOT NULL,
	"delivery_charge_cents" integer DEFAULT 0 NOT NULL,
	"free_above_cents" integer,
	"terms_kind" text DEFAULT 'net' NOT NULL,
	"terms_days" smallint DEFAULT 14 NOT NULL,
	"terms_discount_basis_points" integer DEFAULT 0 NOT NULL,
	"terms_discount_days" smallint DEFAULT 0 NOT NULL,
	"resale_certificate_until" date,
	"is_active" boolean DEFAULT true NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "stores_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "stores_slug_once" UNIQUE("producer_id","slug"),
	CONSTRAINT "stores_slug_form" CHECK ("stores"."slug" ~ '^[a-z0-9]+(-[a-z0-9]+)*$'),
	CONSTRAINT "stores_money_not_negative" CHECK ("stores"."minimum_cents" >= 0 and "stores"."delivery_charge_cents" >= 0 and coalesce("stores"."free_above_cents", 0) >= 0),
	CONSTRAINT "stores_terms_known" CHECK ("stores"."terms_kind" in ('on-receipt','net','end-of-month')),
	CONSTRAINT "stores_terms_sane" CHECK ("stores"."terms_days" between 0 and 365 and "stores"."terms_discount_basis_points" between 0 and 10000 and "stores"."terms_discount_days" between 0 and 365)
);
--> statement-breakpoint
ALTER TABLE "delivery_rounds" ADD CONSTRAINT "delivery_rounds_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shut_days" ADD CONSTRAINT "shut_days_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "store_rounds" ADD CONSTRAINT "store_rounds_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "store_rounds" ADD CONSTRAINT "store_rounds_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "store_rounds" ADD CONSTRAINT "store_rounds_round" FOREIGN KEY ("producer_id","round_id") REFERENCES "public"."delivery_rounds"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_lines" ADD CONSTRAINT "invoice_lines_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_lines" ADD CONSTRAINT "invoice_lines_invoice" FOREIGN KEY ("producer_id","invoice_id") REFERENCES "public"."invoices"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoice_lines" ADD CONSTRAINT "invoice_lines_product" FOREIGN KEY ("producer_id","product_id") REFERENCES "public"."products"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invoices" ADD CONSTRAINT "invoices_order" FOREIGN KEY ("producer_id","order_id") REFERENCES "public"."orders"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payment_parts" ADD CONSTRAINT "payment_parts_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payment_parts" ADD CONSTRAINT "payment_parts_payment" FOREIGN KEY ("producer_id","payment_id") REFERENCES "public"."payments"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payment_parts" ADD CONSTRAINT "payment_parts_invoice" FOREIGN KEY ("producer_id","invoice_id") REFERENCES "public"."invoices"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_entered_by_users_id_fk" FOREIGN KEY ("entered_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "payments" ADD CONSTRAINT "payments_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "expected_supplies" ADD CONSTRAINT "expected_supplies_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "expected_supplies" ADD CONSTRAINT "expected_supplies_product" FOREIGN KEY ("producer_id","product_id") REFERENCES "public"."products"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lots" ADD CONSTRAINT "lots_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lots" ADD CONSTRAINT "lots_product" FOREIGN KEY ("producer_id","product_id") REFERENCES "public"."products"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_events" ADD CONSTRAINT "order_events_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_events" ADD CONSTRAINT "order_events_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_events" ADD CONSTRAINT "order_events_order" FOREIGN KEY ("producer_id","order_id") REFERENCES "public"."orders"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_line_lots" ADD CONSTRAINT "order_line_lots_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_line_lots" ADD CONSTRAINT "order_line_lots_line" FOREIGN KEY ("producer_id","order_line_id") REFERENCES "public"."order_lines"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_line_lots" ADD CONSTRAINT "order_line_lots_lot" FOREIGN KEY ("producer_id","lot_id") REFERENCES "public"."lots"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_lines" ADD CONSTRAINT "order_lines_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_lines" ADD CONSTRAINT "order_lines_order" FOREIGN KEY ("producer_id","order_id") REFERENCES "public"."orders"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_lines" ADD CONSTRAINT "order_lines_product" FOREIGN KEY ("producer_id","product_id") REFERENCES "public"."products"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "orders" ADD CONSTRAINT "orders_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "orders" ADD CONSTRAINT "orders_placed_by_users_id_fk" FOREIGN KEY ("placed_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "orders" ADD CONSTRAINT "orders_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "orders" ADD CONSTRAINT "orders_standing_order" FOREIGN KEY ("producer_id","standing_order_id") REFERENCES "public"."standing_orders"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "card_payments" ADD CONSTRAINT "card_payments_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "card_payments" ADD CONSTRAINT "card_payments_started_by_users_id_fk" FOREIGN KEY ("started_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "card_payments" ADD CONSTRAINT "card_payments_invoice" FOREIGN KEY ("producer_id","invoice_id") REFERENCES "public"."invoices"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "outbox_mails" ADD CONSTRAINT "outbox_mails_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "audit_entries" ADD CONSTRAINT "audit_entries_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_invited_by_users_id_fk" FOREIGN KEY ("invited_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "invitations" ADD CONSTRAINT "invitations_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "memberships" ADD CONSTRAINT "memberships_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sessions" ADD CONSTRAINT "sessions_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE cascade ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "price_tiers" ADD CONSTRAINT "price_tiers_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "prices" ADD CONSTRAINT "prices_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "prices" ADD CONSTRAINT "prices_tier" FOREIGN KEY ("producer_id","tier_id") REFERENCES "public"."price_tiers"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "prices" ADD CONSTRAINT "prices_product" FOREIGN KEY ("producer_id","product_id") REFERENCES "public"."products"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "products" ADD CONSTRAINT "products_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "counters" ADD CONSTRAINT "counters_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "producer_settings" ADD CONSTRAINT "producer_settings_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "shop_versions" ADD CONSTRAINT "shop_versions_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "market_day_people" ADD CONSTRAINT "market_day_people_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "market_day_people" ADD CONSTRAINT "market_day_people_user_id_users_id_fk" FOREIGN KEY ("user_id") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "market_day_people" ADD CONSTRAINT "market_day_people_day" FOREIGN KEY ("producer_id","market_day_id") REFERENCES "public"."market_days"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "market_days" ADD CONSTRAINT "market_days_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "market_days" ADD CONSTRAINT "market_days_market" FOREIGN KEY ("producer_id","market_id") REFERENCES "public"."markets"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "markets" ADD CONSTRAINT "markets_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sale_lines" ADD CONSTRAINT "sale_lines_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sale_lines" ADD CONSTRAINT "sale_lines_sale" FOREIGN KEY ("producer_id","sale_id") REFERENCES "public"."sales"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sale_lines" ADD CONSTRAINT "sale_lines_product" FOREIGN KEY ("producer_id","product_id") REFERENCES "public"."products"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sales" ADD CONSTRAINT "sales_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sales" ADD CONSTRAINT "sales_sold_by_users_id_fk" FOREIGN KEY ("sold_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sales" ADD CONSTRAINT "sales_market_day" FOREIGN KEY ("producer_id","market_day_id") REFERENCES "public"."market_days"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "standing_order_lines" ADD CONSTRAINT "standing_order_lines_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "standing_order_lines" ADD CONSTRAINT "standing_order_lines_order" FOREIGN KEY ("producer_id","standing_order_id") REFERENCES "public"."standing_orders"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "standing_order_lines" ADD CONSTRAINT "standing_order_lines_product" FOREIGN KEY ("producer_id","product_id") REFERENCES "public"."products"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "standing_order_skips" ADD CONSTRAINT "standing_order_skips_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "standing_order_skips" ADD CONSTRAINT "standing_order_skips_order" FOREIGN KEY ("producer_id","standing_order_id") REFERENCES "public"."standing_orders"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "standing_orders" ADD CONSTRAINT "standing_orders_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "standing_orders" ADD CONSTRAINT "standing_orders_created_by_users_id_fk" FOREIGN KEY ("created_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "standing_orders" ADD CONSTRAINT "standing_orders_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_balances" ADD CONSTRAINT "stock_balances_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_balances" ADD CONSTRAINT "stock_balances_lot" FOREIGN KEY ("producer_id","lot_id") REFERENCES "public"."lots"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_moves" ADD CONSTRAINT "stock_moves_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_moves" ADD CONSTRAINT "stock_moves_moved_by_users_id_fk" FOREIGN KEY ("moved_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_moves" ADD CONSTRAINT "stock_moves_lot" FOREIGN KEY ("producer_id","lot_id") REFERENCES "public"."lots"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stores" ADD CONSTRAINT "stores_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stores" ADD CONSTRAINT "stores_tier" FOREIGN KEY ("producer_id","tier_id") REFERENCES "public"."price_tiers"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "store_rounds_by_round" ON "store_rounds" USING btree ("producer_id","round_id");--> statement-breakpoint
CREATE INDEX "invoices_by_store" ON "invoices" USING btree ("producer_id","store_id","issued_on","id");--> statement-breakpoint
CREATE INDEX "invoices_by_day" ON "invoices" USING btree ("producer_id","issued_on","id");--> statement-breakpoint
CREATE INDEX "invoices_open" ON "invoices" USING btree ("producer_id","due_on","id") WHERE paid_cents < total_cents;--> statement-breakpoint
CREATE INDEX "payment_parts_by_invoice" ON "payment_parts" USING btree ("producer_id","invoice_id");--> statement-breakpoint
CREATE INDEX "payments_by_store" ON "payments" USING btree ("producer_id","store_id","received_at","id");--> statement-breakpoint
CREATE INDEX "lots_by_product" ON "lots" USING btree ("producer_id","product_id","state","best_before_on");--> statement-breakpoint
CREATE INDEX "order_events_by_order" ON "order_events" USING btree ("producer_id","order_id","at");--> statement-breakpoint
CREATE INDEX "order_line_lots_by_lot" ON "order_line_lots" USING btree ("producer_id","lot_id");--> statement-breakpoint
CREATE INDEX "order_lines_by_product" ON "order_lines" USING btree ("producer_id","product_id","order_id");--> statement-breakpoint
CREATE INDEX "orders_by_store" ON "orders" USING btree ("producer_id","store_id","delivery_on","id");--> statement-breakpoint
CREATE INDEX "orders_by_day" ON "orders" USING btree ("producer_id","delivery_on","id");--> statement-breakpoint
CREATE INDEX "orders_open" ON "orders" USING btree ("producer_id","delivery_on","id") WHERE state in ('placed','confirmed');--> statement-breakpoint
CREATE INDEX "card_payments_by_invoice" ON "card_payments" USING btree ("producer_id","invoice_id","created_at");--> statement-breakpoint
CREATE INDEX "outbox_mails_waiting" ON "outbox_mails" USING btree ("producer_id","created_at") WHERE sent_at is null;--> statement-breakpoint
CREATE INDEX "stripe_events_waiting" ON "stripe_events" USING btree ("received_at") WHERE applied_at is null;--> statement-breakpoint
CREATE INDEX "audit_entries_by_time" ON "audit_entries" USING btree ("producer_id","at","id");--> statement-breakpoint
CREATE INDEX "audit_entries_by_subject" ON "audit_entries" USING btree ("producer_id","subject_type","subject_id","at");--> statement-breakpoint
CREATE INDEX "kept_posts_by_expiry" ON "kept_posts" USING btree ("expires_at");--> statement-breakpoint
CREATE INDEX "login_codes_by_email" ON "login_codes" USING btree ("email","created_at");--> statement-breakpoint
CREATE INDEX "memberships_by_user" ON "memberships" USING btree ("user_id");--> statement-breakpoint
CREATE INDEX "sessions_by_user" ON "sessions" USING btree ("user_id","created_at");--> statement-breakpoint
CREATE INDEX "prices_by_product" ON "prices" USING btree ("producer_id","product_id");--> statement-breakpoint
CREATE INDEX "market_day_people_by_user" ON "market_day_people" USING btree ("producer_id","user_id");--> statement-breakpoint
CREATE INDEX "market_days_by_day" ON "market_days" USING btree ("producer_id","market_on","id");--> statement-breakpoint
CREATE INDEX "sales_by_market_day" ON "sales" USING btree ("producer_id","market_day_id","sold_at","id");--> statement-breakpoint
CREATE INDEX "standing_orders_by_store" ON "standing_orders" USING btree ("producer_id","store_id","created_at");--> statement-breakpoint
CREATE INDEX "stock_balances_by_place" ON "stock_balances" USING btree ("producer_id","place","place_ref");--> statement-breakpoint
CREATE INDEX "stock_moves_by_lot" ON "stock_moves" USING btree ("producer_id","lot_id","moved_at","id");--> statement-breakpoint
CREATE INDEX "stock_moves_by_ref" ON "stock_moves" USING btree ("producer_id","to_ref") WHERE to_ref <> '00000000-0000-0000-0000-000000000000';--> statement-breakpoint
CREATE INDEX "stores_by_name" ON "stores" USING btree ("producer_id","name","id");