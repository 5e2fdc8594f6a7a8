ALTER TABLE "invoices" ADD COLUMN "terms_words" text DEFAULT '' NOT NULL;--> statement-breakpoint
ALTER TABLE "invoices" ADD COLUMN "is_for_resale" boolean DEFAULT false NOT NULL;