SELECT protect_producer_table(format('public.%I', name)::regclass)
FROM unnest(ARRAY['yards', 'hives', 'supers', 'uploads', 'super_checks', 'crop_forecasts', 'harvests', 'grade_schemes', 'gradings',
	'freezer_loads', 'freezer_load_lots', 'freeze_proofs', 'lot_releases', 'net_checks', 'lot_links', 'stock_takes',
	'stock_take_lines', 'withdrawals', 'withdrawal_lots', 'withdrawal_notices']) AS name;--> statement-breakpoint

-- What proves something is written once: checks on hives, gradings, proofs, releases, weighings, counts, withdrawals.
REVOKE UPDATE, DELETE ON super_checks, gradings, freeze_proofs, lot_releases, net_checks, lot_links, stock_takes,
	stock_take_lines, withdrawals, withdrawal_lots, freezer_load_lots FROM waxbill_app;--> statement-breakpoint
REVOKE DELETE ON lots, supers, harvests, freezer_loads, withdrawal_notices, crop_forecasts FROM waxbill_app;--> statement-breakpoint

-- A held lot is released only with the words or proofs that stand for it, and a withdrawn lot stays withdrawn.
CREATE FUNCTION keep_lot_state() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
BEGIN
	IF OLD.state = 'withdrawn' THEN
		RAISE EXCEPTION USING ERRCODE = 'check_violation', CONSTRAINT = 'lots_withdrawn_for_good', TABLE = 'lots',
			MESSAGE = format('lot %s was withdrawn', NEW.code);
	END IF;
	IF NEW.state = 'released' AND NOT EXISTS (
		SELECT FROM lot_releases r WHERE r.producer_id = NEW.producer_id AND r.lot_id = NEW.id
	) THEN
		RAISE EXCEPTION USING ERRCODE = 'check_violation', CONSTRAINT = 'lots_released_with_proof', TABLE = 'lots',
			MESSAGE = format('lot %s has no release on record', NEW.code);
	END IF;
	RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER keep_lot_state BEFORE UPDATE OF state ON lots FOR EACH ROW WHEN (OLD.state IS DISTINCT FROM NEW.state) EXECUTE FUNCTION keep_lot_state();--> statement-breakpoint

-- Pieces leave the shelves for an order or a market only while their lot is released. The lot's row is held meanwhile, so
-- that a withdrawal and a packing cannot pass each other.
CREATE FUNCTION only_released_leaves() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
BEGIN
	PERFORM FROM lots l WHERE l.producer_id = NEW.producer_id AND l.id = NEW.lot_id AND l.state = 'released' FOR SHARE;
	IF NOT FOUND THEN
		RAISE EXCEPTION USING ERRCODE = 'check_violation', CONSTRAINT = 'stock_moves_only_released', TABLE = 'stock_moves',
			MESSAGE = format('lot %s is not released', NEW.lot_id);
	END IF;
	RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER only_released_leaves BEFORE INSERT ON stock_moves FOR EACH ROW
	WHEN (NEW.from_place IN ('cold-room', 'ready') AND NEW.to_place IN ('packed', 'van', 'market', 'sold'))
	EXECUTE FUNCTION only_released_leaves();--> statement-breakpoint

-- A harvest count that grows by a correction grows with its move: harvested = sum over places holds for every lot.
CREATE FUNCTION harvested_is_somewhere() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
DECLARE harvested integer; placed bigint;
BEGIN
	SELECT l.pieces_harvested INTO harvested FROM lots l WHERE l.producer_id = NEW.producer_id AND l.id = NEW.lot_id;
	SELECT coalesce(sum(b.pieces), 0) INTO placed FROM stock_balances b WHERE b.producer_id = NEW.producer_id AND b.lot_id = NEW.lot_id;
	IF harvested <> placed THEN
		RAISE EXCEPTION USING ERRCODE = 'check_violation', CONSTRAINT = 'lots_harvested_is_somewhere', TABLE = 'lots',
			MESSAGE = format('lot %s: %s harvested, %s in its places', NEW.lot_id, harvested, placed);
	END IF;
	RETURN NULL;
END $$;--> statement-breakpoint
CREATE CONSTRAINT TRIGGER harvested_is_somewhere AFTER INSERT ON stock_moves DEFERRABLE INITIALLY DEFERRED FOR EACH ROW
	WHEN (NEW.from_place IS NULL) EXECUTE FUNCTION harvested_is_somewhere();
