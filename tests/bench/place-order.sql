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
), own as (
	select product_id, min_cases, case_cents, pound_cents from (
		select distinct on (r.product_id, r.min_cases) r.product_id, r.min_cases, r.case_cents, r.pound_cents, r.valid_until
		from store_prices r
		where r.producer_id = :producer_id and r.store_id = :store_id and r.valid_from <= :today
		order by r.product_id, r.min_cases, r.valid_from desc
	) latest where valid_until is null or valid_until >= :today
), of_tier as (
	select distinct on (r.product_id, r.min_cases) r.product_id, r.min_cases, r.case_cents, r.pound_cents
	from stores s
	join prices r on r.producer_id = s.producer_id and r.tier_id = s.tier_id
	where s.producer_id = :producer_id and s.id = :store_id and r.valid_from <= :today
	order by r.product_id, r.min_cases, r.valid_from desc
), in_force as (
	select * from own
	union all
	select * from of_tier where not exists (select from own where own.product_id = of_tier.product_id)
), breaks as (
	select product_id, array_agg(min_cases order by min_cases) as min_cases,
		array_agg(case_cents order by min_cases) as case_cents,
		array_agg(pound_cents order by min_cases) as pound_cents
	from in_force group by product_id
), offs as (
	select o.product_id, max(o.basis_points) as off
	from promotions o
	join stores s on s.producer_id = o.producer_id and s.id = :store_id
	where o.producer_id = :producer_id and (o.tier_id is null or o.tier_id = s.tier_id)
		and :today::date between o.starts_on and o.ends_on
	group by o.product_id
)
select sold.*, breaks.min_cases, breaks.case_cents, breaks.pound_cents, coalesce(offs.off, 0) as off
from sold join breaks on breaks.product_id = sold.id left join offs on offs.product_id = sold.id
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
with p as (
	select p.id, p.code, p.pieces_per_case, p.reserve_pieces from products p where p.producer_id = :producer_id and p.id = any(:product_ids::uuid[])
), entries as (
	select l.product_id, case l.state when 'released' then 'free' else 'held' end as kind,
		case l.state when 'released' then :today::date else greatest(l.expected_release_on, :today::date) end as on_day,
		l.best_before_on as until, sum(b.pieces)::int as pieces
	from lots l
	join stock_balances b on b.producer_id = l.producer_id and b.lot_id = l.id
	where l.producer_id = :producer_id and l.product_id = any(:product_ids::uuid[]) and l.state in ('released', 'held')
		and l.best_before_on >= :today and l.grade <> :culls
		and b.place in ('cold-room', 'ready') and b.place_ref = '00000000-0000-0000-0000-000000000000' and b.pieces > 0
	group by 1, 2, 3, 4
	union all
	select e.product_id, 'expected', e.expected_on, e.expected_on + coalesce(s.best_before_days, 300)::int,
		case s.crop_figure when 'likely' then e.likely_pieces else e.low_pieces end
	from expected_supplies e
	left join producer_settings s on s.producer_id = e.producer_id
	where e.producer_id = :producer_id and e.product_id = any(:product_ids::uuid[]) and e.expected_on >= :today
		and case s.crop_figure when 'likely' then e.likely_pieces else e.low_pieces end > 0
	union all
	select ol.product_id, 'promised', greatest(o.delivery_on, :today::date), null,
		sum(coalesce(ol.given_cases, case when ol.is_to_share then ol.promised_cases else ol.asked_cases end) * ol.pieces_per_case)::int
	from orders o
	join order_lines ol on ol.producer_id = o.producer_id and ol.order_id = o.id
	where o.producer_id = :producer_id and ol.product_id = any(:product_ids::uuid[]) and o.state in ('placed', 'confirmed')
	group by 1, 3
)
select p.id as "productId", p.pieces_per_case as "piecesPerCase", p.reserve_pieces as reserve,
	e.kind, e.on_day::text as on, e.until::text as until, e.pieces
from p left join entries e on e.product_id = p.id
order by p.code, e.on_day, e.until;

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
		case_cents, pound_cents, pieces_per_case)
	select :producer_id::uuid, :order_id::uuid, line.* from unnest(
		:line_product_ids::uuid[],
		:asked_cases::smallint[],
		:is_to_share::boolean[],
		:promised_cases::smallint[],
		:least_cases::smallint[],
		:case_cents::integer[],
		:pound_cents::integer[],
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
