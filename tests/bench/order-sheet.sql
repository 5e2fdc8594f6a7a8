-- What the order sheet asks of the database for one answer, in the order in which it is asked. The bench holds this file
-- against the server's log before it measures: when the product asks otherwise, this file must follow it.

-- Who asks, and what they are here.
select * from identify(:token_hash, :producer_slug, :store_slug);

begin isolation level repeatable read read only; set local waxbill.producer_id = :producer_id;

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

-- On which terms.
select "address", "receiving_note", "minimum_cents", "delivery_charge_cents", "free_above_cents", "is_stopped", "credit_limit_cents"
from "stores" where ("stores"."producer_id" = :producer_id and "stores"."id" = :store_id);

-- What the store may buy, and its prices.
with sold as materialized (
	select p.id, p.code, p.name, p.detail, p.piece_net_grams, p.pieces_per_case, p.break_family
	from products p
	where p.producer_id = :producer_id and p.is_active
	order by p.id
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

-- What is usual: the middle of the last five orders with a product.
select product_id as "productId", percentile_disc(0.5) within group (order by asked_cases)::int as cases
from (
	select l.product_id, l.asked_cases,
		row_number() over (partition by l.product_id order by o.delivery_on desc, o.number desc) as place
	from (
		select id, delivery_on, number from orders
		where producer_id = :producer_id and store_id = :store_id and state <> 'cancelled'
			and delivery_on < :delivery_on
		order by delivery_on desc, id desc limit 30
	) o
	join order_lines l on l.producer_id = :producer_id and l.order_id = o.id
) asked
where place <= :last_orders
group by product_id;

-- What the store has ordered on the days of the ribbon, and the last time before.
select o.number, o.delivery_on::text, o.state, l.product_id, coalesce(l.given_cases, l.asked_cases)::int as cases
from orders o
join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
where o.producer_id = :producer_id and o.store_id = :store_id and o.state <> 'cancelled' and (
	o.delivery_on between :ribbon_from and :ribbon_to
	or o.delivery_on = (
		select max(e.delivery_on) from orders e
		where e.producer_id = :producer_id and e.store_id = :store_id and e.state <> 'cancelled'
			and e.delivery_on < :delivery_on))
order by o.delivery_on, o.number;

-- What all stores together want shared out.
select l.product_id, sum(l.asked_cases - l.promised_cases)::int as cases
from orders o
join order_lines l on l.producer_id = o.producer_id and l.order_id = o.id
where o.producer_id = :producer_id and o.delivery_on = :delivery_on
	and o.state in ('placed', 'confirmed') and l.is_to_share and l.given_cases is null
group by l.product_id;

-- What was begun for that day and not sent yet.
select "order_drafts"."fields", "users"."id", "users"."name", "order_drafts"."updated_at"
from "order_drafts" inner join "users" on "users"."id" = "order_drafts"."updated_by"
where ("order_drafts"."producer_id" = :producer_id and "order_drafts"."store_id" = :store_id
	and "order_drafts"."delivery_on" = :delivery_on);

commit;
