ALTER TABLE "card_payments" DISABLE ROW LEVEL SECURITY;--> statement-breakpoint
ALTER TABLE "payment_parts" DISABLE ROW LEVEL SECURITY;--> statement-breakpoint
DROP TABLE "card_payments" CASCADE;--> statement-breakpoint
DROP TABLE "payment_parts" CASCADE;--> statement-breakpoint
ALTER TABLE "invoices" DROP CONSTRAINT "invoices_once_per_order";--> statement-breakpoint
ALTER TABLE "invoices" DROP CONSTRAINT "invoices_order";
--> statement-breakpoint
ALTER TABLE "invoices" DROP COLUMN "order_id";--> statement-breakpoint

SELECT protect_producer_table(format('public.%I', name)::regclass)
FROM unnest(ARRAY['invoice_orders', 'invoice_runs', 'invoice_run_orders', 'tax_rates', 'exemption_certificates', 'payment_returns',
	'credits', 'credit_lines', 'settlements', 'online_payments', 'online_payment_parts', 'payouts', 'stripe_differences',
	'breakage_reports', 'breakage_lines', 'breakage_photos', 'reminder_steps', 'reminders_sent', 'payment_promises',
	'book_accounts', 'book_closings']) AS name;--> statement-breakpoint

-- What was issued, paid, settled or closed stays as it is; only how it stands is noted.
REVOKE UPDATE ON invoices, payments FROM waxbill_app;--> statement-breakpoint
GRANT UPDATE (paid_cents) ON invoices TO waxbill_app;--> statement-breakpoint
GRANT UPDATE (state, received_on, fee_cents, stripe_payout_id) ON payments TO waxbill_app;--> statement-breakpoint
REVOKE UPDATE, DELETE ON settlements, credits, credit_lines, payment_returns, invoice_orders, book_closings, reminders_sent,
	exemption_certificates, breakage_reports, breakage_lines, breakage_photos FROM waxbill_app;--> statement-breakpoint
-- Whoever locks a row must be allowed to change something of it; a trigger below refuses the change itself.
GRANT UPDATE (settled_cents) ON credits TO waxbill_app;--> statement-breakpoint
GRANT UPDATE (state) ON payment_returns TO waxbill_app;--> statement-breakpoint
GRANT UPDATE (number, valid_until, state, answer, decided_by, decided_at) ON exemption_certificates TO waxbill_app;--> statement-breakpoint
GRANT UPDATE (state, answer, credit_id, answered_by, answered_at) ON breakage_reports TO waxbill_app;--> statement-breakpoint
GRANT UPDATE (accepted_pieces) ON breakage_lines TO waxbill_app;--> statement-breakpoint
REVOKE DELETE ON online_payments, online_payment_parts, payouts, stripe_differences, payment_promises FROM waxbill_app;--> statement-breakpoint

-- The sums on invoice, payment and credit follow from the ledger of settlements; their checks refuse what is too much.
CREATE FUNCTION keep_settled() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
BEGIN
	UPDATE invoices SET
		paid_cents = paid_cents + CASE WHEN NEW.kind = 'payment' THEN NEW.amount_cents ELSE 0 END,
		credited_cents = credited_cents + CASE WHEN NEW.kind = 'credit' THEN NEW.amount_cents ELSE 0 END,
		discount_cents = discount_cents + CASE WHEN NEW.kind = 'discount' THEN NEW.amount_cents ELSE 0 END,
		written_off_cents = written_off_cents + CASE WHEN NEW.kind = 'write-off' THEN NEW.amount_cents ELSE 0 END
	WHERE producer_id = NEW.producer_id AND id = NEW.invoice_id;
	IF NEW.kind = 'payment' THEN
		UPDATE payments SET settled_cents = settled_cents + NEW.amount_cents
		WHERE producer_id = NEW.producer_id AND id = NEW.payment_id;
	ELSIF NEW.kind = 'credit' THEN
		UPDATE credits SET settled_cents = settled_cents + NEW.amount_cents
		WHERE producer_id = NEW.producer_id AND id = NEW.credit_id;
	END IF;
	RETURN NULL;
END $$;--> statement-breakpoint
CREATE TRIGGER keep_settled AFTER INSERT ON settlements FOR EACH ROW EXECUTE FUNCTION keep_settled();--> statement-breakpoint

-- Nobody but the ledger writes them: inside its function the owner acts, and not the application.
CREATE FUNCTION sums_by_ledger_alone() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
	RAISE EXCEPTION USING ERRCODE = 'check_violation', CONSTRAINT = TG_TABLE_NAME || '_sums_by_ledger_alone', TABLE = TG_TABLE_NAME,
		MESSAGE = 'what is settled follows from the settlements';
END $$;--> statement-breakpoint
CREATE TRIGGER sums_by_ledger_alone BEFORE UPDATE ON invoices FOR EACH ROW WHEN (current_user = 'waxbill_app')
	EXECUTE FUNCTION sums_by_ledger_alone();--> statement-breakpoint
CREATE TRIGGER sums_by_ledger_alone BEFORE UPDATE ON credits FOR EACH ROW WHEN (current_user = 'waxbill_app')
	EXECUTE FUNCTION sums_by_ledger_alone();--> statement-breakpoint

-- Only what is done of a return counts; a refund that failed or a dispute that was won gives it back.
CREATE FUNCTION keep_returned() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
DECLARE was integer := 0; is_now integer := 0;
BEGIN
	IF TG_OP = 'UPDATE' AND OLD.state = 'done' THEN was := OLD.amount_cents; END IF;
	IF NEW.state = 'done' THEN is_now := NEW.amount_cents; END IF;
	IF was <> is_now THEN
		UPDATE payments SET returned_cents = returned_cents + is_now - was
		WHERE producer_id = NEW.producer_id AND id = NEW.payment_id;
	END IF;
	RETURN NULL;
END $$;--> statement-breakpoint
CREATE TRIGGER keep_returned AFTER INSERT OR UPDATE OF state ON payment_returns FOR EACH ROW EXECUTE FUNCTION keep_returned();--> statement-breakpoint

-- Whoever writes a new invoice, payment or credit writes it with nothing settled: the ledger alone says otherwise.
CREATE FUNCTION begin_unsettled() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
	RAISE EXCEPTION USING ERRCODE = 'check_violation', CONSTRAINT = TG_TABLE_NAME || '_begin_unsettled', TABLE = TG_TABLE_NAME,
		MESSAGE = 'nothing is settled before it is there';
END $$;--> statement-breakpoint
CREATE TRIGGER begin_unsettled BEFORE INSERT ON invoices FOR EACH ROW
	WHEN (NEW.paid_cents <> 0 OR NEW.credited_cents <> 0 OR NEW.discount_cents <> 0 OR NEW.written_off_cents <> 0)
	EXECUTE FUNCTION begin_unsettled();--> statement-breakpoint
CREATE TRIGGER begin_unsettled BEFORE INSERT ON payments FOR EACH ROW
	WHEN (NEW.settled_cents <> 0 OR NEW.returned_cents <> 0) EXECUTE FUNCTION begin_unsettled();--> statement-breakpoint
CREATE TRIGGER begin_unsettled BEFORE INSERT ON credits FOR EACH ROW
	WHEN (NEW.settled_cents <> 0) EXECUTE FUNCTION begin_unsettled();--> statement-breakpoint

-- A payment moves forward once: what is on its way clears or comes back, and stays so.
CREATE FUNCTION keep_payment_state() RETURNS trigger LANGUAGE plpgsql AS $$
BEGIN
	RAISE EXCEPTION USING ERRCODE = 'check_violation', CONSTRAINT = 'payments_state_stays', TABLE = 'payments',
		MESSAGE = format('payment %s is %s already', OLD.id, OLD.state);
END $$;--> statement-breakpoint
CREATE TRIGGER keep_payment_state BEFORE UPDATE OF state, received_on ON payments FOR EACH ROW
	WHEN (OLD.state <> 'on-its-way' AND (OLD.state <> NEW.state OR OLD.received_on <> NEW.received_on))
	EXECUTE FUNCTION keep_payment_state();--> statement-breakpoint

-- Closed books stay closed: what is dated on the last closed day or before it is refused. The lock of a transaction keeps a
-- closing and an entry from passing each other; entries do not wait for one another.
CREATE FUNCTION refuse_closed_day() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
DECLARE dated date; closed date;
BEGIN
	dated := (to_jsonb(NEW) ->> TG_ARGV[0])::date;
	PERFORM pg_advisory_xact_lock_shared(hashtextextended('books ' || NEW.producer_id, 0));
	SELECT max(closed_until) INTO closed FROM book_closings WHERE producer_id = NEW.producer_id;
	IF dated <= closed THEN
		RAISE EXCEPTION USING ERRCODE = 'check_violation', CONSTRAINT = 'books_closed', TABLE = TG_TABLE_NAME,
			MESSAGE = format('the books are closed until %s', closed);
	END IF;
	RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER refuse_closed_day BEFORE INSERT ON invoices FOR EACH ROW EXECUTE FUNCTION refuse_closed_day('issued_on');--> statement-breakpoint
CREATE TRIGGER refuse_closed_day BEFORE INSERT ON credits FOR EACH ROW EXECUTE FUNCTION refuse_closed_day('issued_on');--> statement-breakpoint
CREATE TRIGGER refuse_closed_day BEFORE INSERT OR UPDATE OF state, received_on ON payments
	FOR EACH ROW EXECUTE FUNCTION refuse_closed_day('received_on');--> statement-breakpoint
CREATE TRIGGER refuse_closed_day BEFORE INSERT ON payment_returns FOR EACH ROW EXECUTE FUNCTION refuse_closed_day('returned_on');--> statement-breakpoint
CREATE TRIGGER refuse_closed_day BEFORE INSERT ON settlements FOR EACH ROW EXECUTE FUNCTION refuse_closed_day('settled_on');--> statement-breakpoint
CREATE FUNCTION close_forward() RETURNS trigger LANGUAGE plpgsql SECURITY DEFINER SET search_path = public, pg_temp AS $$
BEGIN
	PERFORM pg_advisory_xact_lock(hashtextextended('books ' || NEW.producer_id, 0));
	IF EXISTS (SELECT FROM book_closings c WHERE c.producer_id = NEW.producer_id AND c.closed_until >= NEW.closed_until) THEN
		RAISE EXCEPTION USING ERRCODE = 'check_violation', CONSTRAINT = 'book_closings_go_forward', TABLE = 'book_closings',
			MESSAGE = 'the books are closed that far already';
	END IF;
	RETURN NEW;
END $$;--> statement-breakpoint
CREATE TRIGGER close_forward BEFORE INSERT ON book_closings FOR EACH ROW EXECUTE FUNCTION close_forward();
