import type { Knex } from 'knex'

export async function up(knex: Knex): Promise<void> {
  await knex.raw(`
-- A shop keeps the visits it did after it lost sight of the boat, and a visit names what it was about. Nothing for
-- visits that the person does not see.
create function visit_names(p_visit bigint)
returns table (vessel_name text, system_name text, shop_name text, asked_by text, assigned_to text)
language sql stable security definer set search_path = public as $$
  select b.name, s.name, h.name, a.name, w.name
  from visit v join vessel b on b.id = v.vessel_id join shop h on h.id = v.shop_id
  left join system s on s.id = v.system_id left join person a on a.id = v.asked_by
  left join person w on w.id = v.assigned_to
  where v.id = p_visit and (current_person() is null or v.shop_id in (select my_shops())
    or v.vessel_id in (select owned_vessels()))
$$;
revoke execute on function visit_names(bigint) from public;
grant execute on function visit_names(bigint) to mw_person, mw_ingest;
`)
}

export async function down(knex: Knex): Promise<void> {
  await knex.raw('drop function visit_names(bigint)')
}
