CREATE TABLE "sale_line_lots" (
	"producer_id" uuid NOT NULL,
	"sale_id" uuid NOT NULL,
	"product_id" uuid NOT NULL,
	"lot_id" uuid NOT NULL,
	"pieces" integer NOT NULL,
	CONSTRAINT "sale_line_lots_pk" PRIMARY KEY("producer_id","sale_id","product_id","lot_id"),
	CONSTRAINT "sale_line_lots_positive" CHECK ("sale_line_lots"."pieces" > 0)
);
--> statement-breakpoint
ALTER TABLE "sale_line_lots" ADD CONSTRAINT "sale_line_lots_producer_id_producers_id_fk" FOREIGN KEY ("producer_id") REFERENCES "public"."producers"("id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sale_line_lots" ADD CONSTRAINT "sale_line_lots_line" FOREIGN KEY ("producer_id","sale_id","product_id") REFERENCES "public"."sale_lines"("producer_id","sale_id","product_id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
ALTER TABLE "sale_line_lots" ADD CONSTRAINT "sale_line_lots_lot" FOREIGN KEY ("producer_id","lot_id") REFERENCES "public"."lots"("producer_id","id") ON DELETE no action ON UPDATE no action;--> statement-breakpoint
CREATE INDEX "sale_line_lots_by_lot" ON "sale_line_lots" USING btree ("producer_id","lot_id");--> statement-breakpoint
SELECT protect_producer_table('public.sale_line_lots'::regclass);
