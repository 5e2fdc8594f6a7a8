-- What placing an order asks of the database, from the guard's question to the commit. The bench holds this file against
-- the server's log before it measures: when the product asks otherwise, this file must follow it.
-- For pgbench, order_id, idempotency_key and once_key become an id of each transaction's own, and number the one taken.

-- Who asks, and what they are here.
select * from identify(:token_hash, :producer_slug, :store_slug);

begin; set local waxbill.producer_id = :producer_id;

-- The products' rows are locked, and priced.
with sold as materialized (
	select p.id, p.code, p.name, p.detail, p.piece_net_grams, p.pieces_per_case, p.break_family
	from products p
	where p.producer_id = :producer_id and p.is_active and p.id = any(:product_ids::uuid[])
	order by p.id for no key update
), in_force as (
	select distinct on (r.product_id, r.min_cases) r.product_id, r.min_cases, r.case_cents
	from stores s
	join prices r on r.producer_id = s.producer_id and r.tier_id = s.tier_id
	where s.producer_id = :producer_id and s.id = :store_id and r.valid_from <= :today
	order by r.product_id, r.min_cases, r.valid_from desc
), breaks as (
	select product_id, array_agg(min_cases order by min_cases) as min_cases,
		array_agg(case_cents order by min_cases) as case_cents
	from in_force group by product_id
)
select sold.*, breaks.min_cases, breaks.case_cents
from sold join breaks on breaks.product_id = sold.id
order by length(sold.code), sold.code;

-- The store, its producer, and whether this form was sent before.
select s.name as store_name, s.slug as store_slug, p.slug as producer_slug, p.time_zone,
	s.minimum_cents, s.delivery_charge_cents, s.free_above_cents,
	p.name as producer_name, ps.address, ps.email, ps.phone, ps.contact_name,
	o.id as earlier_id, o.number as earlier_number
from stores s
join producers p on p.id = s.producer_id
join producer_settings ps on ps.producer_id = s.producer_id
left join orders o on o.producer_id = s.producer_id and o.store_id = s.id
	and o.idempotency_key = :idempotency_key
where s.producer_id = :producer_id and s.id = :store_id;

-- When the van comes.
select r.weekday, r.cutoff_days_before, r.cutoff_time::text, array(
	select d.shut_on::text from shut_days d
	where d.producer_id = :producer_id and d.shut_on >= :shut_since
	order by d.shut_on
) as shut_days
from delivery_rounds r
join store_rounds s on s.producer_id = r.producer_id and s.round_id = r.id and s.store_id = :store_id
where r.producer_id = :producer_id
order by r.weekday;

-- What can be promised of each product.
select p.id, p.pieces_per_case, p.reserve_pieces from products p
where p.producer_id = :producer_id and p.id = any(:product_ids::uuid[]);

select l.product_id, case l.state when 'released' then 'free' else 'held' end as kind,
	case l.state when 'released' then :today::date else greatest(l.expected_release_on, :today::date) end::text as on,
	sum(b.pieces)::int as pieces
from lots l
join products p on p.producer_id = l.producer_id and p.id = l.product_id and p.id = any(:product_ids::uuid[])
join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
where l.producer_id = :producer_id and l.state in ('released', 'held') and l.best_before_on >= :today
	and b.place in ('cold-room', 'ready') and b.pieces > 0
group by 1, 2, 3
union all
select e.product_id, 'expected', e.expected_on::text, e.low_pieces
from expected_supplies e
join products p on p.producer_id = e.producer_id and p.id = e.product_id and p.id = any(:product_ids::uuid[])
where e.producer_id = :producer_id and e.expected_on >= :today and e.low_pieces > 0
union all
select ol.product_id, 'promised', greatest(o.delivery_on, :today::date)::text,
	sum(coalesce(ol.given_cases, case when ol.is_to_share then 0 else ol.asked_cases end) * ol.pieces_per_case)::int
from orders o
join order_lines ol on ol.producer_id = o.producer_id and ol.order_id = o.id
join products p on p.producer_id = ol.producer_id and p.id = ol.product_id and p.id = any(:product_ids::uuid[])
where o.producer_id = :producer_id and o.state in ('placed', 'confirmed')
group by 1, 3;

-- The order's number: from here on, others wait.
insert into counters (producer_id, series, year, last) values (:producer_id, :series, :year, 1)
on conflict (producer_id, series, year) do update set last = counters.last + 1
returning last;

with placed as (
	insert into orders (producer_id, id, number, store_id, delivery_on, po_number, note, delivery_cents, placed_by,
		placed_at, standing_order_id, standing_on, idempotency_key)
	values (:producer_id, :order_id, :number, :store_id, :delivery_on, :po_number,
		:note, :delivery_cents, :person_id, :placed_at,
		:standing_order_id, :standing_on, :idempotency_key)
), lines as (
	insert into order_lines (producer_id, order_id, product_id, asked_cases, is_to_share, promised_cases, least_cases,
		case_cents, pieces_per_case)
	select :producer_id::uuid, :order_id::uuid, line.* from unnest(
		:line_product_ids::uuid[],
		:asked_cases::smallint[],
		:is_to_share::boolean[],
		:promised_cases::smallint[],
		:least_cases::smallint[],
		:case_cents::integer[],
		:pieces_per_case::smallint[]
	) as line
), draft as (
	delete from order_drafts
	where producer_id = :producer_id and store_id = :store_id and delivery_on = :delivery_on and :is_by_hand
), event as (
	insert into order_events (producer_id, order_id, kind, at, user_id, detail)
	values (:producer_id, :order_id, 'placed', :placed_at, :person_id, :detail::jsonb)
)
insert into audit_entries (producer_id, at, user_id, action, subject_type, subject_id, detail)
values (:producer_id, :placed_at, :person_id, 'place-order', 'order', :order_id,
	:detail::jsonb);

-- The acknowledgement, and the job that sends it.
insert into "outbox_mails" ("producer_id", "id", "recipient", "template", "props", "once_key", "created_at", "sent_at",
	"attempts", "last_error")
values (:producer_id, default, :recipient, :template, :props, :once_key, default, default,
	default, default)
on conflict do nothing returning "id";

select jobs.enqueue('send-mail', :payload::json, now() + :delay_seconds * interval '1 second');

commit;
