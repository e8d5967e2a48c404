import type { Trx } from '@/db/roles'

export interface DeletionRows {
  vessels: { id: string; name: string }[]
  shared: { id: string; name: string }[]
  blocked: { id: string; name: string }[]
  closing: { id: string; name: string }[]
  visitsKept: number
}

/** What the end of an account would mean for vessels and shops. Under the service's role. */
export async function readDeletion(trx: Trx, personId: string): Promise<DeletionRows> {
  const { rows: owned } = await trx.raw<{
    rows: { id: string; name: string; alone: boolean; visits: number }[]
  }>(
    `select v.id, v.name,
       not exists (select 1 from vessel_owner x where x.vessel_id = v.id and x.person_id <> o.person_id
         and x.ended_at is null) as alone,
       (select count(*)::int from visit where vessel_id = v.id) as visits
     from vessel_owner o join vessel v on v.id = o.vessel_id
     where o.person_id = ? and o.ended_at is null order by v.name, v.id`,
    [personId],
  )
  const { rows: shops } = await trx.raw<{
    rows: { id: string; name: string; others: number; managers: number }[]
  }>(
    `select s.id, s.name,
       (select count(distinct person_id)::int from membership x where x.shop_id = s.id and x.ended_at is null
         and x.person_id <> :person) as others,
       (select count(*)::int from membership x where x.shop_id = s.id and x.ended_at is null
         and x.person_id <> :person and x.role = 'manager') as managers
     from shop s where s.id in (select shop_id from membership where person_id = :person and ended_at is null)
     order by s.name`,
    { person: personId },
  )
  const named = ({ id, name }: { id: string; name: string }) => ({ id, name })
  return {
    vessels: owned.filter((vessel) => vessel.alone).map(named),
    shared: owned.filter((vessel) => !vessel.alone).map(named),
    blocked: shops.filter((shop) => shop.others > 0 && shop.managers === 0).map(named),
    closing: shops.filter((shop) => shop.others === 0).map(named),
    visitsKept: owned.filter((vessel) => vessel.alone).reduce((sum, vessel) => sum + vessel.visits, 0),
  }
}

/** Derived and recorded rows of a system that tell of its people and its readings. */
const BY_SYSTEM = [
  'cup_test',
  'flush',
  'hold',
  'leg',
  'run',
  'fault',
  'checkpoint',
  'system_day',
  'outlook',
  'system_state',
  'notice',
] as const

/**
 * Erases the record of a vessel that nobody owns any more: consent ends, its loggers retire, samples and all that
 * was derived of them go. The vessel's name and the visits stay with the shops that did them.
 */
export async function eraseRecord(trx: Trx, vesselId: string, at: Date): Promise<void> {
  await trx('shop_access')
    .where({ vessel_id: vesselId })
    .whereNull('withdrawn_at')
    .update({ withdrawn_at: trx.raw('greatest(cast(? as timestamptz), granted_at)', [at]) })
  await trx('invitation')
    .where({ vessel_id: vesselId })
    .whereNull('accepted_at')
    .whereNull('withdrawn_at')
    .update({ withdrawn_at: at })
  const systems = await trx('system')
    .where({ vessel_id: vesselId })
    .orderBy('id')
    .select<{ id: string }[]>('id')
  const ids = systems.map((system) => system.id)
  // The order in which an upload takes them, so that none is folded in between.
  await trx('system_state').whereIn('system_id', ids).orderBy('system_id').forUpdate().select('system_id')
  const bind = { ids, at }
  const ofSystems = 'f.system_id = any (cast(:ids as bigint[]))'
  for (const [table, column] of [
    ['sample', 'at'],
    ['sample_hour', 'hour'],
  ] as const)
    await trx.raw(
      `delete from ${table} s using logger_fitting f where ${ofSystems} and s.logger_id = f.logger_id
         and s.${column} >= lower(f.span) - interval '1 hour' and s.${column} < coalesce(upper(f.span), 'infinity')`,
      bind,
    )
  await trx.raw(
    `update logger set retired_at = coalesce(retired_at, :at), key_hash = null
     where id in (select f.logger_id from logger_fitting f where ${ofSystems} and upper_inf(f.span))`,
    bind,
  )
  await trx.raw(
    `update logger_fitting f set span = tstzrange(lower(span), greatest(cast(:at as timestamptz), lower(span) + interval '1 second'))
     where ${ofSystems} and upper_inf(f.span)`,
    bind,
  )
  for (const table of BY_SYSTEM) await trx(table).whereIn('system_id', ids).delete()
  await trx('statement').where({ vessel_id: vesselId }).delete()
}

/** Ends a shop that nobody is in any more; the visits it did stay with the boats' owners. */
export async function closeShop(trx: Trx, shopId: string, at: Date): Promise<void> {
  await trx('shop_access')
    .where({ shop_id: shopId })
    .whereNull('withdrawn_at')
    .update({ withdrawn_at: trx.raw('greatest(cast(? as timestamptz), granted_at)', [at]) })
  await trx('invitation')
    .where({ shop_id: shopId })
    .whereNull('accepted_at')
    .whereNull('withdrawn_at')
    .update({ withdrawn_at: at })
}

/**
 * Takes everything personal off a person and ends what they were part of. The row stays, without a name, so that
 * "set by" and "acknowledged by" in the records of others still point at somebody.
 */
export async function anonymise(trx: Trx, personId: string, at: Date): Promise<void> {
  const person = await trx('person').where({ id: personId }).first<{ email: string }>('email')
  await trx('membership')
    .where({ person_id: personId })
    .whereNull('ended_at')
    .update({ ended_at: trx.raw('greatest(cast(? as timestamptz), since)', [at]) })
  await trx('vessel_owner').where({ person_id: personId }).whereNull('ended_at').update({ ended_at: at })
  await trx('session').where({ person_id: personId }).delete()
  await trx('token').where({ person_id: personId }).delete()
  await trx('recovery_code').where({ person_id: personId }).delete()
  await trx('invitation').where({ email: person?.email }).delete()
  await trx('sign_up').where({ email: person?.email }).delete()
  await trx.raw(
    `update inbound_text set address = '', person_id = null where person_id = :person
       or address in (select address from contact where person_id = :person and channel = 'sms')`,
    { person: personId },
  )
  await trx('message')
    .where({ person_id: personId })
    .orWhere((which) => {
      void which.whereNull('person_id').whereRaw('lower(address) = lower(?)', [person?.email ?? ''])
    })
    .update({
      address: '',
      subject: null,
      body_text: '',
      body_html: null,
      link_code: null,
      cancelled_at: trx.raw(
        'case when accepted_at is null and failed_at is null then coalesce(cancelled_at, ?) else cancelled_at end',
        [at],
      ),
    })
  await trx('contact').where({ person_id: personId }).delete()
  await trx('shop').where({ on_call_id: personId }).update({ on_call_id: null })
  await trx('audit_entry')
    .whereRaw("detail ->> 'personId' = ?", [personId])
    .orWhereRaw("lower(detail ->> 'email') = lower(?)", [person?.email ?? ''])
    .update({ detail: trx.raw("detail - 'name' - 'email'") })
  await trx('person')
    .where({ id: personId })
    .update({
      email: `person-${personId}@deleted.invalid`,
      name: 'Somebody who left',
      password_hash: null,
      email_confirmed_at: null,
      totp_secret: null,
      totp_pending: null,
      totp_on_since: null,
      totp_last_step: null,
      units: JSON.stringify({}),
      deleted_at: at,
    })
}
