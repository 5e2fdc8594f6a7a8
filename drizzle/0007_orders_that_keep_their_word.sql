CREATE TABLE "order_drafts" (
	"producer_id" uuid NOT NULL,
	"store_id" uuid NOT NULL,
	"delivery_on" date NOT NULL,
	"fields" jsonb NOT NULL,
	"updated_by" uuid NOT NULL,
	"updated_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "order_drafts_pk" PRIMARY KEY("producer_id","store_id","delivery_on")
);
--> statement-breakpoint
CREATE TABLE "order_messages" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"order_id" uuid NOT NULL,
	"side" text NOT NULL,
	"body" text NOT NULL,
	"written_by" uuid NOT NULL,
	"written_at" timestamp with time zone DEFAULT now() NOT NULL,
	"idempotency_key" uuid DEFAULT gen_random_uuid() NOT NULL,
	CONSTRAINT "order_messages_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "order_messages_sent_once" UNIQUE("producer_id","idempotency_key"),
	CONSTRAINT "order_messages_say_something" CHECK (length(trim("order_messages"."body")) between 1 and 2000)
);
--> statement-breakpoint
CREATE TABLE "order_proposals" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"order_id" uuid NOT NULL,
	"lines" jsonb NOT NULL,
	"reason" text NOT NULL,
	"state" text DEFAULT 'open' NOT NULL,
	"proposed_by" uuid NOT NULL,
	"proposed_at" timestamp with time zone DEFAULT now() NOT NULL,
	"answered_by" uuid,
	"answered_at" timestamp with time zone,
	CONSTRAINT "order_proposals_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "order_proposals_state_known" CHECK ("order_proposals"."state" in ('open','accepted','declined','taken-back')),
	CONSTRAINT "order_proposals_answer_whole" CHECK (("order_proposals"."state" = 'open') = ("order_proposals"."answered_at" is null))
);
--> statement-breakpoint
CREATE TABLE "sharing_runs" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"product_id" uuid NOT NULL,
	"delivery_on" date NOT NULL,
	"rule" text NOT NULL,
	"supply_cases" integer NOT NULL,
	"claims" jsonb NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"state" text DEFAULT 'told' NOT NULL,
	"shared_by" uuid NOT NULL,
	"shared_at" timestamp with time zone DEFAULT now() NOT NULL,
	"idempotency_key" uuid DEFAULT gen_random_uuid() NOT NULL,
	CONSTRAINT "sharing_runs_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "sharing_runs_sent_once" UNIQUE("producer_id","idempotency_key"),
	CONSTRAINT "sharing_runs_rule_known" CHECK ("sharing_runs"."rule" in ('equal-shares','in-proportion','equal-shortfall')),
	CONSTRAINT "sharing_runs_state_known" CHECK ("sharing_runs"."state" in ('told','undone')),
	CONSTRAINT "sharing_runs_supply_not_negative" CHECK ("sharing_runs"."supply_cases" >= 0)
);
--> statement-breakpoint
CREATE TABLE "sharing_shares" (
	"producer_id" uuid NOT NULL,
	"run_id" uuid NOT NULL,
	"order_line_id" uuid NOT NULL,
	"store_id" uuid NOT NULL,
	"asked_cases" smallint NOT NULL,
	"rule_cases" smallint NOT NULL,
	"given_cases" smallint NOT NULL,
	"sentence" text NOT NULL,
	CONSTRAINT "sharing_shares_pk" PRIMARY KEY("producer_id","run_id","order_line_id"),
	CONSTRAINT "sharing_shares_within_asked" CHECK ("sharing_shares"."rule_cases" between 0 and "sharing_shares"."asked_cases" and "sharing_shares"."given_cases" between 0 and "sharing_shares"."asked_cases")
);
--> statement-breakpoint
CREATE TABLE "standing_order_changes" (
	"producer_id" uuid NOT NULL,
	"standing_order_id" uuid NOT NULL,
	"change_on" date NOT NULL,
	"product_id" uuid NOT NULL,
	"cases" smallint NOT NULL,
	CONSTRAINT "standing_order_changes_pk" PRIMARY KEY("producer_id","standing_order_id","change_on","product_id"),
	CONSTRAINT "standing_order_changes_sane" CHECK ("standing_order_changes"."cases" between 0 and 999)
);
--> statement-breakpoint
CREATE TABLE "promotions" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"product_id" uuid NOT NULL,
	"tier_id" uuid,
	"basis_points" integer NOT NULL,
	"starts_on" date NOT NULL,
	"ends_on" date NOT NULL,
	CONSTRAINT "promotions_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "promotions_sane" CHECK ("promotions"."basis_points" between 1 and 10000 and "promotions"."starts_on" <= "promotions"."ends_on")
);
--> statement-breakpoint
CREATE TABLE "store_prices" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"store_id" uuid NOT NULL,
	"product_id" uuid NOT NULL,
	"min_cases" smallint DEFAULT 1 NOT NULL,
	"case_cents" integer NOT NULL,
	"pound_cents" integer,
	"valid_from" date NOT NULL,
	"valid_until" date,
	CONSTRAINT "store_prices_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "store_prices_break_once" UNIQUE("producer_id","store_id","product_id","min_cases","valid_from"),
	CONSTRAINT "store_prices_sane" CHECK ("store_prices"."min_cases" > 0 and "store_prices"."case_cents" >= 0 and coalesce("store_prices"."pound_cents", 0) >= 0),
	CONSTRAINT "store_prices_dates_in_order" CHECK ("store_prices"."valid_until" >= "store_prices"."valid_from")
);
--> statement-breakpoint
ALTER TABLE "order_lines" DROP CONSTRAINT "order_lines_money_not_negative";--> statement-breakpoint
ALTER TABLE "prices" DROP CONSTRAINT "prices_sane";--> statement-breakpoint
ALTER TABLE "order_lines" ADD COLUMN "promised_cases" smallint DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "order_lines" ADD COLUMN "least_cases" smallint DEFAULT 0 NOT NULL;--> statement-breakpoint
ALTER TABLE "order_lines" ADD COLUMN "substitute_ids" uuid[] DEFAULT '{}' NOT NULL;--> statement-breakpoint
ALTER TABLE "order_lines" ADD COLUMN "pound_cents" integer;--> statement-breakpoint
ALTER TABLE "order_lines" ADD COLUMN "weighed_grams" integer;--> statement-breakpoint
ALTER TABLE "memberships" ADD COLUMN "letters_off" text[] DEFAULT '{}' NOT NULL;--> statement-breakpoint
ALTER TABLE "prices" ADD COLUMN "pound_cents" integer;--> statement-breakpoint
ALTER TABLE "standing_order_lines" ADD COLUMN "substitute_ids" uuid[] DEFAULT '{}' NOT NULL;--> statement-breakpoint
ALTER TABLE "standing_orders" ADD COLUMN "paused_until" date;--> statement-breakpoint
ALTER TABLE "standing_orders" ADD COLUMN "is_commitment" boolean DEFAULT false NOT NULL;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "sharing_weight_percent" smallint DEFAULT 100 NOT NULL;--> statement-breakpoint
ALTER TABLE "order_drafts" ADD CONSTRAINT "order_drafts_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_drafts" ADD CONSTRAINT "order_drafts_updated_by_users_id_fk" FOREIGN KEY ("updated_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_drafts" ADD CONSTRAINT "order_drafts_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_messages" ADD CONSTRAINT "order_messages_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_messages" ADD CONSTRAINT "order_messages_written_by_users_id_fk" FOREIGN KEY ("written_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_messages" ADD CONSTRAINT "order_messages_order" FOREIGN KEY ("producer_id","order_id") REFERENCES "public"."orders"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_proposals" ADD CONSTRAINT "order_proposals_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_proposals" ADD CONSTRAINT "order_proposals_proposed_by_users_id_fk" FOREIGN KEY ("proposed_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_proposals" ADD CONSTRAINT "order_proposals_answered_by_users_id_fk" FOREIGN KEY ("answered_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "order_proposals" ADD CONSTRAINT "order_proposals_order" FOREIGN KEY ("producer_id","order_id") REFERENCES "public"."orders"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sharing_runs" ADD CONSTRAINT "sharing_runs_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sharing_runs" ADD CONSTRAINT "sharing_runs_shared_by_users_id_fk" FOREIGN KEY ("shared_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sharing_runs" ADD CONSTRAINT "sharing_runs_product" FOREIGN KEY ("producer_id","product_id") REFERENCES "public"."products"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sharing_shares" ADD CONSTRAINT "sharing_shares_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sharing_shares" ADD CONSTRAINT "sharing_shares_run" FOREIGN KEY ("producer_id","run_id") REFERENCES "public"."sharing_runs"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sharing_shares" ADD CONSTRAINT "sharing_shares_line" FOREIGN KEY ("producer_id","order_line_id") REFERENCES "public"."order_lines"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sharing_shares" ADD CONSTRAINT "sharing_shares_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "standing_order_changes" ADD CONSTRAINT "standing_order_changes_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "standing_order_changes" ADD CONSTRAINT "standing_order_changes_line" FOREIGN KEY ("producer_id","standing_order_id","product_id") REFERENCES "public"."standing_order_lines"("producer_id","standing_order_id","product_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "promotions" ADD CONSTRAINT "promotions_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "promotions" ADD CONSTRAINT "promotions_product" FOREIGN KEY ("producer_id","product_id") REFERENCES "public"."products"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "promotions" ADD CONSTRAINT "promotions_tier" FOREIGN KEY ("producer_id","tier_id") REFERENCES "public"."price_tiers"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "store_prices" ADD CONSTRAINT "store_prices_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "store_prices" ADD CONSTRAINT "store_prices_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "store_prices" ADD CONSTRAINT "store_prices_product" FOREIGN KEY ("producer_id","product_id") REFERENCES "public"."products"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "order_messages_by_order" ON "order_messages" USING btree ("producer_id","order_id","written_at","id");--> statement-breakpoint
CREATE INDEX "order_proposals_by_order" ON "order_proposals" USING btree ("producer_id","order_id","proposed_at");--> statement-breakpoint
CREATE UNIQUE INDEX "order_proposals_one_open" ON "order_proposals" USING btree ("producer_id","order_id") WHERE state = 'open';--> statement-breakpoint
CREATE INDEX "sharing_runs_by_product" ON "sharing_runs" USING btree ("producer_id","product_id","delivery_on");--> statement-breakpoint
CREATE INDEX "sharing_runs_by_time" ON "sharing_runs" USING btree ("producer_id","shared_at","id");--> statement-breakpoint
CREATE INDEX "sharing_shares_by_store" ON "sharing_shares" USING btree ("producer_id","store_id","run_id");--> statement-breakpoint
CREATE INDEX "sharing_shares_by_line" ON "sharing_shares" USING btree ("producer_id","order_line_id");--> statement-breakpoint
CREATE INDEX "promotions_by_product" ON "promotions" USING btree ("producer_id","product_id","ends_on");--> statement-breakpoint
CREATE INDEX "store_prices_by_product" ON "store_prices" USING btree ("producer_id","product_id");--> statement-breakpoint
ALTER TABLE "order_lines" ADD CONSTRAINT "order_lines_parts_within_asked" CHECK ("order_lines"."promised_cases" between 0 and "order_lines"."asked_cases" and "order_lines"."least_cases" between 0 and "order_lines"."asked_cases");--> statement-breakpoint
ALTER TABLE "order_lines" ADD CONSTRAINT "order_lines_weighed_by_weight" CHECK ("order_lines"."weighed_grams" is null or ("order_lines"."pound_cents" is not null and "order_lines"."weighed_grams" >= 0));--> statement-breakpoint
ALTER TABLE "order_lines" ADD CONSTRAINT "order_lines_money_not_negative" CHECK ("order_lines"."case_cents" >= 0 and "order_lines"."pieces_per_case" > 0 and coalesce("order_lines"."pound_cents", 0) >= 0);--> statement-breakpoint
ALTER TABLE "prices" ADD CONSTRAINT "prices_sane" CHECK ("prices"."min_cases" > 0 and "prices"."case_cents" >= 0 and coalesce("prices"."pound_cents", 0) >= 0);--> statement-breakpoint
ALTER TABLE "standing_orders" ADD CONSTRAINT "standing_orders_pause_in_order" CHECK ("standing_orders"."paused_until" is null or "standing_orders"."paused_until" >= "standing_orders"."paused_from");--> statement-breakpoint
ALTER TABLE "stores" ADD CONSTRAINT "stores_sharing_weight_sane" CHECK ("stores"."sharing_weight_percent" between 10 and 1000);