CREATE TABLE "freeze_proofs" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"load_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"is_accepted" boolean NOT NULL,
	"row_tenths_c" smallint,
	"required_minutes" integer,
	"held_minutes" integer NOT NULL,
	"allowance_minutes" integer DEFAULT 0 NOT NULL,
	"run_from" timestamp with time zone,
	"run_to" timestamp with time zone,
	"file_name" text DEFAULT '' NOT NULL,
	"report" jsonb DEFAULT '{}'::jsonb NOT NULL,
	"curve" jsonb DEFAULT '[]'::jsonb NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"entered_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "freeze_proofs_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "freeze_proofs_minutes_not_negative" CHECK ("freeze_proofs"."held_minutes" >= 0 and "freeze_proofs"."allowance_minutes" >= 0)
);
--> statement-breakpoint
CREATE TABLE "freezer_load_lots" (
	"producer_id" uuid NOT NULL,
	"load_id" uuid NOT NULL,
	"lot_id" uuid NOT NULL,
	"pieces" integer NOT NULL,
	CONSTRAINT "freezer_load_lots_pk" PRIMARY KEY("producer_id","load_id","lot_id"),
	CONSTRAINT "freezer_load_lots_positive" CHECK ("freezer_load_lots"."pieces" > 0)
);
--> statement-breakpoint
CREATE TABLE "freezer_loads" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"number" integer NOT NULL,
	"freezer" text NOT NULL,
	"loaded_at" timestamp with time zone NOT NULL,
	"proven_at" timestamp with time zone,
	"loaded_by" uuid,
	CONSTRAINT "freezer_loads_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "freezer_loads_number_once" UNIQUE("producer_id","number")
);
--> statement-breakpoint
CREATE TABLE "lot_releases" (
	"producer_id" uuid NOT NULL,
	"lot_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"reason" text DEFAULT '' NOT NULL,
	"freeze_proof_id" uuid,
	"net_check_id" uuid,
	"released_by" uuid,
	"released_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "lot_releases_pk" PRIMARY KEY("producer_id","lot_id"),
	CONSTRAINT "lot_releases_kind_known" CHECK ("lot_releases"."kind" in ('proven','by-hand')),
	CONSTRAINT "lot_releases_by_hand_has_reason" CHECK ("lot_releases"."kind" = 'proven' or length(trim("lot_releases"."reason")) >= 10),
	CONSTRAINT "lot_releases_proven_names_proofs" CHECK ("lot_releases"."kind" = 'by-hand' or ("lot_releases"."freeze_proof_id" is not null and "lot_releases"."net_check_id" is not null))
);
--> statement-breakpoint
CREATE TABLE "crop_forecasts" (
	"producer_id" uuid NOT NULL,
	"product_id" uuid NOT NULL,
	"made_on" date NOT NULL,
	"week_on" date NOT NULL,
	"low_pieces" integer NOT NULL,
	"likely_pieces" integer NOT NULL,
	"high_pieces" integer NOT NULL,
	CONSTRAINT "crop_forecasts_pk" PRIMARY KEY("producer_id","week_on","product_id","made_on"),
	CONSTRAINT "crop_forecasts_in_order" CHECK (0 <= "crop_forecasts"."low_pieces" and "crop_forecasts"."low_pieces" <= "crop_forecasts"."likely_pieces" and "crop_forecasts"."likely_pieces" <= "crop_forecasts"."high_pieces")
);
--> statement-breakpoint
CREATE TABLE "harvests" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"harvested_on" date NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"entered_by" uuid,
	"idempotency_key" uuid DEFAULT gen_random_uuid() NOT NULL,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "harvests_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "harvests_sent_once" UNIQUE("producer_id","idempotency_key")
);
--> statement-breakpoint
CREATE TABLE "hives" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"yard_id" uuid NOT NULL,
	"label" text NOT NULL,
	"is_active" boolean DEFAULT true NOT NULL,
	CONSTRAINT "hives_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "hives_label_once" UNIQUE("producer_id","label")
);
--> statement-breakpoint
CREATE TABLE "super_checks" (
	"producer_id" uuid NOT NULL,
	"id" uuid NOT NULL,
	"super_id" uuid NOT NULL,
	"checked_on" date NOT NULL,
	"filled_percent" smallint NOT NULL,
	"capped_percent" smallint NOT NULL,
	"sections" text DEFAULT '' NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"photo_id" uuid,
	"checked_by" uuid,
	"received_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "super_checks_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "super_checks_shares_sane" CHECK (0 <= "super_checks"."capped_percent" and "super_checks"."capped_percent" <= "super_checks"."filled_percent" and "super_checks"."filled_percent" <= 100),
	CONSTRAINT "super_checks_sections_form" CHECK ("super_checks"."sections" ~ '^[0-4]*$')
);
--> statement-breakpoint
CREATE TABLE "supers" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"hive_id" uuid NOT NULL,
	"product_id" uuid NOT NULL,
	"capacity_pieces" smallint DEFAULT 40 NOT NULL,
	"set_on" date NOT NULL,
	"level" smallint DEFAULT 1 NOT NULL,
	"state" text DEFAULT 'on' NOT NULL,
	"clearing_on" date,
	"off_on" date,
	"finished_pieces" smallint,
	"harvest_id" uuid,
	CONSTRAINT "supers_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "supers_state_known" CHECK ("supers"."state" in ('on','clearing','off')),
	CONSTRAINT "supers_capacity_sane" CHECK ("supers"."capacity_pieces" between 1 and 400 and "supers"."level" between 1 and 20),
	CONSTRAINT "supers_off_has_day" CHECK (("supers"."state" = 'off') = ("supers"."off_on" is not null)),
	CONSTRAINT "supers_dates_in_order" CHECK ("supers"."off_on" >= "supers"."set_on" and "supers"."clearing_on" >= "supers"."set_on"),
	CONSTRAINT "supers_finished_within_capacity" CHECK ("supers"."finished_pieces" between 0 and "supers"."capacity_pieces")
);
--> statement-breakpoint
CREATE TABLE "uploads" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"media_type" text NOT NULL,
	"content" "bytea" NOT NULL,
	"width" integer,
	"height" integer,
	"uploaded_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "uploads_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "uploads_size" CHECK (octet_length("uploads"."content") between 1 and 4194304)
);
--> statement-breakpoint
CREATE TABLE "yards" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"flora" text DEFAULT '' NOT NULL,
	"is_active" boolean DEFAULT true NOT NULL,
	CONSTRAINT "yards_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "yards_name_once" UNIQUE("producer_id","name")
);
--> statement-breakpoint
CREATE TABLE "grade_schemes" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"name" text NOT NULL,
	"scheme" jsonb NOT NULL,
	"is_active" boolean DEFAULT true NOT NULL,
	CONSTRAINT "grade_schemes_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "grade_schemes_name_once" UNIQUE("producer_id","name")
);
--> statement-breakpoint
CREATE TABLE "gradings" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"lot_id" uuid NOT NULL,
	"graded_on" date NOT NULL,
	"scheme_name" text NOT NULL,
	"scheme" jsonb NOT NULL,
	"facts" jsonb NOT NULL,
	"grade" text NOT NULL,
	"reasons" jsonb NOT NULL,
	"graded_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "gradings_pk" PRIMARY KEY("producer_id","id")
);
--> statement-breakpoint
CREATE TABLE "lot_links" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"from_lot_id" uuid NOT NULL,
	"to_lot_id" uuid NOT NULL,
	"kind" text NOT NULL,
	"pieces" integer NOT NULL,
	"pieces_made" integer NOT NULL,
	"loss_grams" integer DEFAULT 0 NOT NULL,
	"at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "lot_links_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "lot_links_kind_known" CHECK ("lot_links"."kind" in ('split','merge','cut-up')),
	CONSTRAINT "lot_links_another_lot" CHECK ("lot_links"."from_lot_id" <> "lot_links"."to_lot_id"),
	CONSTRAINT "lot_links_pieces_sane" CHECK ("lot_links"."pieces" > 0 and "lot_links"."pieces_made" >= 0 and "lot_links"."loss_grams" >= 0),
	CONSTRAINT "lot_links_regrouping_keeps_pieces" CHECK ("lot_links"."kind" = 'cut-up' or "lot_links"."pieces" = "lot_links"."pieces_made")
);
--> statement-breakpoint
CREATE TABLE "net_checks" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"lot_id" uuid NOT NULL,
	"checked_on" date NOT NULL,
	"input" jsonb NOT NULL,
	"worksheet" jsonb NOT NULL,
	"has_passed" boolean NOT NULL,
	"note" text DEFAULT '' NOT NULL,
	"checked_by" uuid,
	"created_at" timestamp with time zone DEFAULT now() NOT NULL,
	CONSTRAINT "net_checks_pk" PRIMARY KEY("producer_id","id")
);
--> statement-breakpoint
CREATE TABLE "stock_take_lines" (
	"producer_id" uuid NOT NULL,
	"stock_take_id" uuid NOT NULL,
	"lot_id" uuid NOT NULL,
	"counted_pieces" integer NOT NULL,
	"ledger_pieces" integer NOT NULL,
	CONSTRAINT "stock_take_lines_pk" PRIMARY KEY("producer_id","stock_take_id","lot_id"),
	CONSTRAINT "stock_take_lines_not_negative" CHECK ("stock_take_lines"."counted_pieces" >= 0 and "stock_take_lines"."ledger_pieces" >= 0)
);
--> statement-breakpoint
CREATE TABLE "stock_takes" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"place" text NOT NULL,
	"place_ref" uuid DEFAULT '00000000-0000-0000-0000-000000000000' NOT NULL,
	"taken_on" date NOT NULL,
	"taken_by" uuid,
	"posted_at" timestamp with time zone DEFAULT now() NOT NULL,
	"idempotency_key" uuid DEFAULT gen_random_uuid() NOT NULL,
	CONSTRAINT "stock_takes_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "stock_takes_sent_once" UNIQUE("producer_id","idempotency_key")
);
--> statement-breakpoint
CREATE TABLE "withdrawal_lots" (
	"producer_id" uuid NOT NULL,
	"withdrawal_id" uuid NOT NULL,
	"lot_id" uuid NOT NULL,
	"pieces_out" integer NOT NULL,
	CONSTRAINT "withdrawal_lots_pk" PRIMARY KEY("producer_id","withdrawal_id","lot_id"),
	CONSTRAINT "withdrawal_lots_once" UNIQUE("producer_id","lot_id")
);
--> statement-breakpoint
CREATE TABLE "withdrawal_notices" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"withdrawal_id" uuid NOT NULL,
	"store_id" uuid NOT NULL,
	"pieces" integer NOT NULL,
	"token_hash" text NOT NULL,
	"opened_at" timestamp with time zone,
	"answered_at" timestamp with time zone,
	"held_pieces" integer,
	"answer_note" text DEFAULT '' NOT NULL,
	CONSTRAINT "withdrawal_notices_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "withdrawal_notices_one_a_store" UNIQUE("producer_id","withdrawal_id","store_id"),
	CONSTRAINT "withdrawal_notices_token_once" UNIQUE("producer_id","token_hash"),
	CONSTRAINT "withdrawal_notices_sane" CHECK ("withdrawal_notices"."pieces" > 0 and "withdrawal_notices"."held_pieces" between 0 and "withdrawal_notices"."pieces"),
	CONSTRAINT "withdrawal_notices_answer_whole" CHECK (("withdrawal_notices"."answered_at" is null) = ("withdrawal_notices"."held_pieces" is null))
);
--> statement-breakpoint
CREATE TABLE "withdrawals" (
	"producer_id" uuid NOT NULL,
	"id" uuid DEFAULT gen_random_uuid() NOT NULL,
	"number" integer NOT NULL,
	"reason" text NOT NULL,
	"instructions" text NOT NULL,
	"started_by" uuid,
	"started_at" timestamp with time zone DEFAULT now() NOT NULL,
	"idempotency_key" uuid DEFAULT gen_random_uuid() NOT NULL,
	CONSTRAINT "withdrawals_pk" PRIMARY KEY("producer_id","id"),
	CONSTRAINT "withdrawals_number_once" UNIQUE("producer_id","number"),
	CONSTRAINT "withdrawals_sent_once" UNIQUE("producer_id","idempotency_key")
);
--> statement-breakpoint
ALTER TABLE "stock_moves" DROP CONSTRAINT "stock_moves_places_known";--> statement-breakpoint
ALTER TABLE "lots" ADD COLUMN "harvest_id" uuid;--> statement-breakpoint
ALTER TABLE "lots" ADD COLUMN "grade" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "lots" ADD COLUMN "flora" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "lots" ADD COLUMN "moisture_tenths" smallint;--> statement-breakpoint
ALTER TABLE "lots" ADD COLUMN "pfund_tenths" smallint;--> statement-breakpoint
ALTER TABLE "producer_settings" ADD COLUMN "ready_capped_percent" smallint DEFAULT 90 NOT NULL;--> statement-breakpoint
ALTER TABLE "producer_settings" ADD COLUMN "crop_figure" text DEFAULT 'low' NOT NULL;--> statement-breakpoint
ALTER TABLE "producer_settings" ADD COLUMN "lot_code_pattern" text DEFAULT '{product}{yy}-{nnn}' NOT NULL;--> statement-breakpoint
ALTER TABLE "producer_settings" ADD COLUMN "best_before_days" smallint DEFAULT 300 NOT NULL;--> statement-breakpoint
ALTER TABLE "producer_settings" ADD COLUMN "carrier" text DEFAULT 'own van' NOT NULL;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "phone" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "stores" ADD COLUMN "email" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "freeze_proofs" ADD CONSTRAINT "freeze_proofs_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "freeze_proofs" ADD CONSTRAINT "freeze_proofs_entered_by_users_id_fk" FOREIGN KEY ("entered_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "freeze_proofs" ADD CONSTRAINT "freeze_proofs_load" FOREIGN KEY ("producer_id","load_id") REFERENCES "public"."freezer_loads"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "freezer_load_lots" ADD CONSTRAINT "freezer_load_lots_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "freezer_load_lots" ADD CONSTRAINT "freezer_load_lots_load" FOREIGN KEY ("producer_id","load_id") REFERENCES "public"."freezer_loads"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "freezer_load_lots" ADD CONSTRAINT "freezer_load_lots_lot" FOREIGN KEY ("producer_id","lot_id") REFERENCES "public"."lots"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "freezer_loads" ADD CONSTRAINT "freezer_loads_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "freezer_loads" ADD CONSTRAINT "freezer_loads_loaded_by_users_id_fk" FOREIGN KEY ("loaded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_releases" ADD CONSTRAINT "lot_releases_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_releases" ADD CONSTRAINT "lot_releases_released_by_users_id_fk" FOREIGN KEY ("released_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_releases" ADD CONSTRAINT "lot_releases_lot" FOREIGN KEY ("producer_id","lot_id") REFERENCES "public"."lots"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "crop_forecasts" ADD CONSTRAINT "crop_forecasts_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "crop_forecasts" ADD CONSTRAINT "crop_forecasts_product" FOREIGN KEY ("producer_id","product_id") REFERENCES "public"."products"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "harvests" ADD CONSTRAINT "harvests_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "harvests" ADD CONSTRAINT "harvests_entered_by_users_id_fk" FOREIGN KEY ("entered_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "hives" ADD CONSTRAINT "hives_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "hives" ADD CONSTRAINT "hives_yard" FOREIGN KEY ("producer_id","yard_id") REFERENCES "public"."yards"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "super_checks" ADD CONSTRAINT "super_checks_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "super_checks" ADD CONSTRAINT "super_checks_checked_by_users_id_fk" FOREIGN KEY ("checked_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "super_checks" ADD CONSTRAINT "super_checks_super" FOREIGN KEY ("producer_id","super_id") REFERENCES "public"."supers"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "super_checks" ADD CONSTRAINT "super_checks_photo" FOREIGN KEY ("producer_id","photo_id") REFERENCES "public"."uploads"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "supers" ADD CONSTRAINT "supers_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "supers" ADD CONSTRAINT "supers_hive" FOREIGN KEY ("producer_id","hive_id") REFERENCES "public"."hives"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "supers" ADD CONSTRAINT "supers_product" FOREIGN KEY ("producer_id","product_id") REFERENCES "public"."products"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "supers" ADD CONSTRAINT "supers_harvest" FOREIGN KEY ("producer_id","harvest_id") REFERENCES "public"."harvests"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "uploads" ADD CONSTRAINT "uploads_uploaded_by_users_id_fk" FOREIGN KEY ("uploaded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "yards" ADD CONSTRAINT "yards_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "grade_schemes" ADD CONSTRAINT "grade_schemes_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "gradings" ADD CONSTRAINT "gradings_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "gradings" ADD CONSTRAINT "gradings_graded_by_users_id_fk" FOREIGN KEY ("graded_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "gradings" ADD CONSTRAINT "gradings_lot" FOREIGN KEY ("producer_id","lot_id") REFERENCES "public"."lots"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_links" ADD CONSTRAINT "lot_links_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_links" ADD CONSTRAINT "lot_links_from" FOREIGN KEY ("producer_id","from_lot_id") REFERENCES "public"."lots"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "lot_links" ADD CONSTRAINT "lot_links_to" FOREIGN KEY ("producer_id","to_lot_id") REFERENCES "public"."lots"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "net_checks" ADD CONSTRAINT "net_checks_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "net_checks" ADD CONSTRAINT "net_checks_checked_by_users_id_fk" FOREIGN KEY ("checked_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "net_checks" ADD CONSTRAINT "net_checks_lot" FOREIGN KEY ("producer_id","lot_id") REFERENCES "public"."lots"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_take_lines" ADD CONSTRAINT "stock_take_lines_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_take_lines" ADD CONSTRAINT "stock_take_lines_take" FOREIGN KEY ("producer_id","stock_take_id") REFERENCES "public"."stock_takes"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_take_lines" ADD CONSTRAINT "stock_take_lines_lot" FOREIGN KEY ("producer_id","lot_id") REFERENCES "public"."lots"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_takes" ADD CONSTRAINT "stock_takes_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "stock_takes" ADD CONSTRAINT "stock_takes_taken_by_users_id_fk" FOREIGN KEY ("taken_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "withdrawal_lots" ADD CONSTRAINT "withdrawal_lots_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "withdrawal_lots" ADD CONSTRAINT "withdrawal_lots_withdrawal" FOREIGN KEY ("producer_id","withdrawal_id") REFERENCES "public"."withdrawals"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "withdrawal_lots" ADD CONSTRAINT "withdrawal_lots_lot" FOREIGN KEY ("producer_id","lot_id") REFERENCES "public"."lots"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "withdrawal_notices" ADD CONSTRAINT "withdrawal_notices_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "withdrawal_notices" ADD CONSTRAINT "withdrawal_notices_withdrawal" FOREIGN KEY ("producer_id","withdrawal_id") REFERENCES "public"."withdrawals"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "withdrawal_notices" ADD CONSTRAINT "withdrawal_notices_store" FOREIGN KEY ("producer_id","store_id") REFERENCES "public"."stores"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "withdrawals" ADD CONSTRAINT "withdrawals_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "withdrawals" ADD CONSTRAINT "withdrawals_started_by_users_id_fk" FOREIGN KEY ("started_by") REFERENCES "public"."users"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "freeze_proofs_by_load" ON "freeze_proofs" USING btree ("producer_id","load_id","created_at","id");--> statement-breakpoint
CREATE INDEX "freezer_load_lots_by_lot" ON "freezer_load_lots" USING btree ("producer_id","lot_id");--> statement-breakpoint
CREATE INDEX "harvests_by_day" ON "harvests" USING btree ("producer_id","harvested_on","id");--> statement-breakpoint
CREATE INDEX "hives_by_yard" ON "hives" USING btree ("producer_id","yard_id","label");--> statement-breakpoint
CREATE INDEX "super_checks_by_super" ON "super_checks" USING btree ("producer_id","super_id","checked_on","received_at","id");--> statement-breakpoint
CREATE INDEX "supers_by_hive" ON "supers" USING btree ("producer_id","hive_id","level");--> statement-breakpoint
CREATE INDEX "supers_on_hives" ON "supers" USING btree ("producer_id","product_id","id") WHERE state <> 'off';--> statement-breakpoint
CREATE INDEX "supers_by_harvest" ON "supers" USING btree ("producer_id","harvest_id");--> statement-breakpoint
CREATE INDEX "supers_off" ON "supers" USING btree ("producer_id","off_on","id") WHERE state = 'off';--> statement-breakpoint
CREATE INDEX "gradings_by_lot" ON "gradings" USING btree ("producer_id","lot_id","created_at","id");--> statement-breakpoint
CREATE INDEX "lot_links_by_from" ON "lot_links" USING btree ("producer_id","from_lot_id");--> statement-breakpoint
CREATE INDEX "lot_links_by_to" ON "lot_links" USING btree ("producer_id","to_lot_id");--> statement-breakpoint
CREATE INDEX "net_checks_by_lot" ON "net_checks" USING btree ("producer_id","lot_id","created_at","id");--> statement-breakpoint
CREATE INDEX "stock_take_lines_by_lot" ON "stock_take_lines" USING btree ("producer_id","lot_id");--> statement-breakpoint
CREATE INDEX "stock_takes_by_time" ON "stock_takes" USING btree ("producer_id","posted_at","id");--> statement-breakpoint
CREATE INDEX "withdrawal_notices_by_store" ON "withdrawal_notices" USING btree ("producer_id","store_id");--> statement-breakpoint
ALTER TABLE "lots" ADD CONSTRAINT "lots_harvest" FOREIGN KEY ("producer_id","harvest_id") REFERENCES "public"."harvests"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "lots_by_harvest" ON "lots" USING btree ("producer_id","harvest_id");--> statement-breakpoint
CREATE INDEX "lots_by_harvest_day" ON "lots" USING btree ("producer_id","harvested_on","code");--> statement-breakpoint
ALTER TABLE "lots" ADD CONSTRAINT "lots_readings_sane" CHECK ("lots"."moisture_tenths" between 100 and 400 and "lots"."pfund_tenths" between 0 and 2000);--> statement-breakpoint
ALTER TABLE "producer_settings" ADD CONSTRAINT "producer_settings_crop_sane" CHECK ("producer_settings"."ready_capped_percent" between 1 and 100 and "producer_settings"."crop_figure" in ('low','likely'));--> statement-breakpoint
ALTER TABLE "producer_settings" ADD CONSTRAINT "producer_settings_best_before_sane" CHECK ("producer_settings"."best_before_days" between 1 and 1500);--> statement-breakpoint
ALTER TABLE "stock_moves" ADD CONSTRAINT "stock_moves_places_known" CHECK ("stock_moves"."to_place" in ('cold-room','ready','packed','van','market','sold','waste','cut-up','other-lot','missing') and coalesce("stock_moves"."from_place", 'ready') in ('cold-room','ready','packed','van','market','sold','waste','cut-up','other-lot','missing'));