SELECT protect_producer_table(format('public.%I', name)::regclass)
FROM unnest(ARRAY['store_prices', 'promotions', 'order_drafts', 'order_messages', 'order_proposals', 'standing_order_changes',
	'sharing_runs', 'sharing_shares']) AS name;--> statement-breakpoint

-- A run stays as it was shared; only that it was undone is noted. What was said is not unsaid.
REVOKE UPDATE, DELETE ON sharing_shares, order_messages, sharing_runs FROM waxbill_app;--> statement-breakpoint
GRANT UPDATE (state) ON sharing_runs TO waxbill_app;--> statement-breakpoint
REVOKE DELETE ON order_proposals FROM waxbill_app;--> statement-breakpoint
-- What was packed, loaded or taken to market before its lot was withdrawn goes no further either.
CREATE FUNCTION withdrawn_stays() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
BEGIN
	PERFORM FROM lots l WHERE l.producer_id = NEW.producer_id AND l.id = NEW.lot_id AND l.state <> 'withdrawn' FOR SHARE;
	IF NOT FOUND THEN
		RAISE EXCEPTION USING ERRCODE = 'check_violation', CONSTRAINT = 'stock_moves_withdrawn_stays', TABLE = 'stock_moves',
			MESSAGE = format('lot %s was withdrawn', NEW.lot_id);
	END IF;
	RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER withdrawn_stays BEFORE INSERT ON stock_moves FOR EACH ROW
	WHEN (NEW.from_place IN ('packed', 'van', 'market') AND NEW.to_place IN ('van', 'sold'))
	EXECUTE FUNCTION withdrawn_stays();
