import type { Trx } from '@/db/roles'

type Rows = Record<string, unknown>[]

/** Everything kept of a person, by subject; under the service's role, for the person themselves. */
export async function readExport(trx: Trx, personId: string): Promise<Record<string, Rows>> {
  const OWN = `(select vessel_id from vessel_owner where person_id = :person and ended_at is null)`
  const SYSTEMS = `(select id from system where vessel_id in ${OWN})`
  const QUERIES: Record<string, string> = {
    person: `select id::text, email::text, name, units, created_at, email_confirmed_at, totp_on_since
      from person where id = :person`,
    contacts: `select channel, address, verified_at, consented_at, stopped_at, settings from contact
      where person_id = :person order by id`,
    sessions: `select created_at, last_seen_at, ended_at, user_agent from session where person_id = :person
      order by created_at`,
    memberships: `select s.name as shop, m.role, m.since, m.ended_at from membership m join shop s on s.id = m.shop_id
      where m.person_id = :person order by m.id`,
    vessels: `select v.id::text, v.name, v.time_zone, v.harbour, v.berth, v.altitude_m, v.quiet_start, v.quiet_end,
      o.since as own_since from vessel_owner o join vessel v on v.id = o.vessel_id
      where o.person_id = :person and o.ended_at is null order by v.id`,
    systems: `select id::text, vessel_id::text, name, created_at from system where vessel_id in ${OWN} order by id`,
    parts: `select system_id::text, key, kind, name, volume_m3, parent_key from part where system_id in ${SYSTEMS}
      order by id`,
    settings: `select system_id::text, in_force_from, kind, cut_out_pa, cut_in_pa, limit_seconds, aim_seconds, pump_amps
      from setting where system_id in ${SYSTEMS} order by id`,
    consents: `select a.vessel_id::text, s.name as shop, a.level, a.granted_at, a.withdrawn_at from shop_access a
      join shop s on s.id = a.shop_id where a.vessel_id in ${OWN} order by a.id`,
    statements: `select vessel_id::text, system_id::text, value, from_at, until_at, said_at from statement
      where vessel_id in ${OWN} or said_by = :person order by id`,
    days: `select to_jsonb(d) as day from system_day d where system_id in ${SYSTEMS} order by 1`,
    runs: `select to_jsonb(r) as run from run r where system_id in ${SYSTEMS}`,
    flushes: `select to_jsonb(f) as flush from flush f where system_id in ${SYSTEMS}`,
    cupTests: `select system_id::text, part_key, head_name, water_at, said_at, taken_back_at from cup_test
      where system_id in ${SYSTEMS} or said_by = :person order by id`,
    notices: `select id::text, system_id::text, kind, opened_at, closed_at, reason, acknowledged_at, acknowledged_note
      from notice where vessel_id in ${OWN} order by id`,
    messages: `select channel, address, subject, case when purpose = 'account' then null else body_text end as text,
      purpose, queued_at, accepted_at, delivered_at from message where person_id = :person order by id`,
    visits: `select v.id::text, v.vessel_id::text, s.name as shop, v.status, v.complaint, v.asked_at, v.planned_for,
      v.started_at, v.closed_at, v.verdict, v.summary from visit v join shop s on s.id = v.shop_id
      where v.vessel_id in ${OWN} order by v.id`,
    log: `select at, action, detail, vessel_id::text from audit_entry
      where person_id = :person or vessel_id in ${OWN} order by id`,
  }
  const found: Record<string, Rows> = {}
  for (const [subject, sql] of Object.entries(QUERIES)) {
    const { rows } = await trx.raw<{ rows: Rows }>(sql, { person: personId })
    found[subject] = rows
  }
  return found
}
