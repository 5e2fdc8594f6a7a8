-- The two roles that run the product. Neither owns a table nor may pass row security; both are entered by `SET ROLE`
-- from the login that owns the schema. Roles belong to the cluster, so another database may have made them already.
DO $$ BEGIN CREATE ROLE waxbill_app NOLOGIN; EXCEPTION WHEN duplicate_object OR unique_violation THEN NULL; END $$;--> statement-breakpoint
DO $$ BEGIN CREATE ROLE waxbill_queue NOLOGIN; EXCEPTION WHEN duplicate_object OR unique_violation THEN NULL; END $$;--> statement-breakpoint
-- From PostgreSQL 16 on, having made a role does not mean that one may enter it. Where another login made it, that login
-- grants it, and entering it fails in plain words if it did not.
DO $$ BEGIN EXECUTE format('GRANT waxbill_app, waxbill_queue TO %I', current_user); EXCEPTION WHEN insufficient_privilege THEN NULL; END $$;--> statement-breakpoint
GRANT USAGE ON SCHEMA public TO waxbill_app;--> statement-breakpoint
GRANT SELECT, INSERT, UPDATE, DELETE ON ALL TABLES IN SCHEMA public TO waxbill_app;--> statement-breakpoint
ALTER DEFAULT PRIVILEGES IN SCHEMA public GRANT SELECT, INSERT, UPDATE, DELETE ON TABLES TO waxbill_app;--> statement-breakpoint
GRANT USAGE ON SCHEMA drizzle TO waxbill_app;--> statement-breakpoint
GRANT SELECT ON ALL TABLES IN SCHEMA drizzle TO waxbill_app;--> statement-breakpoint

-- The job queue keeps its own schema and functions, owned by its role; the application only ever calls `jobs.enqueue`.
DO $$ BEGIN EXECUTE format('GRANT CREATE ON DATABASE %I TO waxbill_queue', current_database()); END $$;--> statement-breakpoint
CREATE SCHEMA jobs AUTHORIZATION waxbill_queue;--> statement-breakpoint
GRANT USAGE ON SCHEMA jobs TO waxbill_app;--> statement-breakpoint

-- Whom the transaction acts for. Unset means nobody: no row of any producer is seen.
CREATE FUNCTION current_producer() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
AS $$ SELECT nullif(current_setting('waxbill.producer_id', true), '')::uuid $$;--> statement-breakpoint
CREATE FUNCTION current_person() RETURNS uuid LANGUAGE sql STABLE PARALLEL SAFE
AS $$ SELECT nullif(current_setting('waxbill.user_id', true), '')::uuid $$;--> statement-breakpoint

-- Every table that belongs to a producer is put under the one rule by this call.
CREATE FUNCTION protect_producer_table(name regclass) RETURNS void LANGUAGE plpgsql AS $$
BEGIN
	EXECUTE format('ALTER TABLE %s ENABLE ROW LEVEL SECURITY', name);
	EXECUTE format('ALTER TABLE %s FORCE ROW LEVEL SECURITY', name);
	EXECUTE format('CREATE POLICY own_producer ON %s USING (producer_id = current_producer()) WITH CHECK (producer_id = current_producer())', name);
END $$;--> statement-breakpoint
REVOKE ALL ON FUNCTION protect_producer_table(regclass) FROM PUBLIC;--> statement-breakpoint
SELECT protect_producer_table(format('public.%I', c.table_name)::regclass)
FROM information_schema.columns c
WHERE c.table_schema = 'public' AND c.column_name = 'producer_id';--> statement-breakpoint

-- A person may always read their own memberships, to find where they are at home.
CREATE POLICY own_memberships ON memberships FOR SELECT USING (user_id = current_person());--> statement-breakpoint

-- Anyone may find a producer by its name in the URL; only its own people change it.
ALTER TABLE producers ENABLE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE producers FORCE ROW LEVEL SECURITY;--> statement-breakpoint
CREATE POLICY anyone_reads ON producers FOR SELECT USING (true);--> statement-breakpoint
CREATE POLICY own_producer_inserts ON producers FOR INSERT WITH CHECK (id = current_producer());--> statement-breakpoint
CREATE POLICY own_producer_updates ON producers FOR UPDATE USING (id = current_producer()) WITH CHECK (id = current_producer());--> statement-breakpoint

-- What is written once stays: moves, the audit trail, timelines. Balances are the database's own.
REVOKE UPDATE, DELETE ON stock_moves, audit_entries, order_events FROM waxbill_app;--> statement-breakpoint
REVOKE INSERT, UPDATE, DELETE ON stock_balances, shop_versions FROM waxbill_app;--> statement-breakpoint
REVOKE DELETE ON invoices, invoice_lines, payments, payment_parts, orders FROM waxbill_app;--> statement-breakpoint

-- An issued invoice never changes but for what has been paid on it.
REVOKE UPDATE ON invoices, invoice_lines, payments, payment_parts FROM waxbill_app;--> statement-breakpoint
GRANT UPDATE (paid_cents) ON invoices TO waxbill_app;--> statement-breakpoint

CREATE FUNCTION keep_stock_balance() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
BEGIN
	IF NEW.from_place IS NOT NULL THEN
		UPDATE stock_balances SET pieces = pieces - NEW.pieces
		WHERE producer_id = NEW.producer_id AND lot_id = NEW.lot_id AND place = NEW.from_place AND place_ref = NEW.from_ref;
		IF NOT FOUND THEN
			RAISE EXCEPTION USING ERRCODE = 'check_violation', CONSTRAINT = 'stock_balances_not_negative', TABLE = 'stock_balances',
				MESSAGE = format('lot %s has nothing in %s', NEW.lot_id, NEW.from_place);
		END IF;
	END IF;
	INSERT INTO stock_balances (producer_id, lot_id, place, place_ref, pieces)
	VALUES (NEW.producer_id, NEW.lot_id, NEW.to_place, NEW.to_ref, NEW.pieces)
	ON CONFLICT (producer_id, lot_id, place, place_ref) DO UPDATE SET pieces = stock_balances.pieces + excluded.pieces;
	RETURN NULL;
END $$;--> statement-breakpoint
CREATE TRIGGER keep_stock_balance AFTER INSERT ON stock_moves FOR EACH ROW EXECUTE FUNCTION keep_stock_balance();--> statement-breakpoint

-- One rise of the shop's version for each transaction that changed what the shop shows, at its very end: the row's lock is
-- held for the commit alone. The setting remembers, within the transaction, that the rise is done.
CREATE FUNCTION raise_shop_version() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
DECLARE changed uuid;
BEGIN
	-- One statement for each case: in a single expression PL/pgSQL would look up every column named, also of the other tables.
	IF TG_TABLE_NAME = 'producers' THEN changed := NEW.id;
	ELSIF TG_OP = 'DELETE' THEN changed := OLD.producer_id;
	ELSE changed := NEW.producer_id;
	END IF;
	IF current_setting('waxbill.shop_raised', true) = changed::text THEN RETURN NULL; END IF;
	INSERT INTO shop_versions (producer_id) VALUES (changed)
	ON CONFLICT (producer_id) DO UPDATE SET version = shop_versions.version + 1;
	PERFORM set_config('waxbill.shop_raised', changed::text, true);
	RETURN NULL;
END $$;--> statement-breakpoint
DO $$
DECLARE name text;
BEGIN
	FOREACH name IN ARRAY ARRAY['producer_settings', 'products', 'lots', 'stock_moves', 'expected_supplies', 'orders', 'order_lines', 'markets', 'market_days', 'shut_days']
	LOOP
		EXECUTE format('CREATE CONSTRAINT TRIGGER raise_shop_version AFTER INSERT OR UPDATE OR DELETE ON %I DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION raise_shop_version()', name);
	END LOOP;
	CREATE CONSTRAINT TRIGGER raise_shop_version AFTER INSERT OR UPDATE ON producers DEFERRABLE INITIALLY DEFERRED FOR EACH ROW EXECUTE FUNCTION raise_shop_version();
END $$;
--> statement-breakpoint

-- Who is signed in with this token, and what they are at the producer and store that the URL names: one round trip for
-- every guarded page. Runs with the caller's rights: the settings it makes end with the statement.
CREATE FUNCTION identify(token text, producer_slug text, store_slug text) RETURNS TABLE (
	session_id uuid, last_seen_at timestamptz, user_id uuid, user_name text, user_email text,
	producer_id uuid, producer_name text, county text, time_zone text, roles text[],
	store_id uuid, store_name text, store_roles text[]
) LANGUAGE plpgsql AS $$
BEGIN
	SELECT s.id, s.last_seen_at, u.id, u.name, u.email INTO session_id, last_seen_at, user_id, user_name, user_email
	FROM sessions s JOIN users u ON u.id = s.user_id
	WHERE s.token_hash = token AND s.ended_at IS NULL AND s.expires_at > now();
	SELECT p.id, p.name, p.county, p.time_zone INTO producer_id, producer_name, county, time_zone
	FROM producers p WHERE p.slug = producer_slug;
	roles := '{}';
	store_roles := '{}';
	IF user_id IS NOT NULL AND producer_id IS NOT NULL THEN
		PERFORM set_config('waxbill.user_id', user_id::text, true);
		SELECT coalesce(array_agg(DISTINCT m.role) FILTER (WHERE m.producer_id = identify.producer_id), '{}') INTO roles
		FROM memberships m WHERE m.user_id = identify.user_id AND m.ended_at IS NULL;
		IF store_slug IS NOT NULL AND roles && ARRAY['buyer', 'payer'] THEN
			PERFORM set_config('waxbill.producer_id', producer_id::text, true);
			SELECT s.id, s.name, array_agg(m.role) INTO store_id, store_name, store_roles
			FROM stores s JOIN memberships m ON m.producer_id = s.producer_id AND m.store_id = s.id
			WHERE s.producer_id = identify.producer_id AND s.slug = store_slug
				AND m.user_id = identify.user_id AND m.ended_at IS NULL
			GROUP BY s.id, s.name;
			store_roles := coalesce(store_roles, '{}');
			PERFORM set_config('waxbill.producer_id', '', true);
		END IF;
		PERFORM set_config('waxbill.user_id', '', true);
	END IF;
	RETURN NEXT;
END $$;
--> statement-breakpoint

-- What the public shop goes by now: its version and the day there. Null for an unknown name.
CREATE FUNCTION shop_stamp(producer_slug text) RETURNS text LANGUAGE plpgsql AS $$
DECLARE found producers; stamp text;
BEGIN
	SELECT * INTO found FROM producers p WHERE p.slug = producer_slug;
	IF found.id IS NULL THEN RETURN NULL; END IF;
	PERFORM set_config('waxbill.producer_id', found.id::text, true);
	SELECT v.version || ' ' || (now() AT TIME ZONE found.time_zone)::date INTO stamp FROM shop_versions v WHERE v.producer_id = found.id;
	PERFORM set_config('waxbill.producer_id', '', true);
	RETURN coalesce(stamp, '0 ' || (now() AT TIME ZONE found.time_zone)::date);
END $$;
