import { z } from 'zod'
import type { Trx } from '@/db/roles'
import {
  unitChoiceSchema,
  contactSettingsSchema,
  type ContactSettings,
  type Units,
} from '@/shared/schemas/people'
import { noticeKindSchema, type NoticeKind } from '@/shared/schemas/words'
import { DEFAULT_UNITS } from '@/shared/units'
import type { Channel } from '@/db/queries/message-queue'

export interface ContactAddress {
  id: string
  channel: Channel
  address: string
  verified: boolean
  consented: boolean
  stopped: boolean
  settings: ContactSettings
}

/** Somebody who may be told about a vessel, in one of the two ways of standing to it. */
export interface Recipient {
  personId: string
  name: string
  email: string
  units: Units
  as: 'owner' | 'shop'
  /** Roles held in the shop; empty for owners. */
  roles: string[]
  /** The hours in which they are not to be disturbed, as wall time of a zone. */
  quiet: { timeZone: string; start: string; end: string }
  contacts: ContactAddress[]
  /** Kinds that every one of the shops in question chose to be told; null = the usual ones. Null for owners. */
  shopKinds: NoticeKind[] | null
  /** Of a shop's person: somebody is named to be called when nobody takes a notice up, and whether it is them. */
  onCall: 'nobody-named' | 'yes' | 'no'
}

interface Row {
  person_id: string
  name: string
  email: string
  units: unknown
  standing: 'owner' | 'shop'
  roles: string[]
  time_zone: string
  quiet_start: string
  quiet_end: string
  shop_kinds: string[] | null
  on_call: Recipient['onCall']
}

/** Owners of a vessel and the staff of every shop that its owner lets in or that keeps it. */
export async function recipientsOf(trx: Trx, vesselId: string): Promise<Recipient[]> {
  const { rows } = (await trx.raw(
    `select p.id as person_id, p.name, p.email::text as email, p.units, 'owner' as standing, '{}'::text[] as roles,
       v.time_zone, v.quiet_start::text, v.quiet_end::text, null::text[] as shop_kinds, 'nobody-named' as on_call
     from vessel v join vessel_owner o on o.vessel_id = v.id and o.ended_at is null
     join person p on p.id = o.person_id and p.deleted_at is null
     where v.id = :vessel
     union all
     select p.id, p.name, p.email::text, p.units, 'shop', array_agg(distinct m.role), min(s.time_zone), min(s.quiet_start)::text,
       min(s.quiet_end)::text,
       case when bool_or(s.told_kinds is null) then null else array(select distinct k from shop x, unnest(x.told_kinds) k
         where x.id = any (array_agg(s.id))) end,
       case when bool_or(s.on_call_id = p.id) then 'yes' when bool_and(s.on_call_id is not null) then 'no'
         else 'nobody-named' end
     from vessel v
     join shop s on s.id = v.kept_by_shop_id or s.id in
       (select shop_id from shop_access where vessel_id = v.id and withdrawn_at is null)
     join membership m on m.shop_id = s.id and m.ended_at is null
     join person p on p.id = m.person_id and p.deleted_at is null
     where v.id = :vessel group by p.id
     order by standing, person_id`,
    { vessel: vesselId },
  )) as { rows: Row[] }
  const contacts = await contactsOf(trx, [...new Set(rows.map((row) => row.person_id))])
  return rows.map((row) => ({
    personId: String(row.person_id),
    name: row.name,
    email: row.email,
    units: unitsOf(row.units),
    as: row.standing,
    roles: row.roles,
    quiet: { timeZone: row.time_zone, start: row.quiet_start, end: row.quiet_end },
    contacts: contacts.get(String(row.person_id)) ?? [],
    shopKinds: row.shop_kinds === null ? null : z.array(noticeKindSchema).parse(row.shop_kinds),
    onCall: row.on_call,
  }))
}

const unitsOf = (stored: unknown): Units => {
  const read = unitChoiceSchema.partial().safeParse(stored ?? {})
  return { ...DEFAULT_UNITS, clock: '24h', ...(read.success ? read.data : {}) }
}

async function contactsOf(trx: Trx, personIds: string[]): Promise<Map<string, ContactAddress[]>> {
  const rows = await trx('contact').whereIn('person_id', personIds).orderBy('id').select<
    {
      id: string
      person_id: string
      channel: Channel
      address: string
      verified_at: Date | null
      consented_at: Date | null
      stopped_at: Date | null
      settings: unknown
    }[]
  >()
  const byPerson = new Map<string, ContactAddress[]>()
  for (const row of rows) {
    const settings = contactSettingsSchema.safeParse(row.settings)
    const list = byPerson.get(String(row.person_id)) ?? []
    list.push({
      id: String(row.id),
      channel: row.channel,
      address: row.address,
      verified: row.verified_at !== null,
      consented: row.consented_at !== null,
      stopped: row.stopped_at !== null,
      settings: settings.success ? settings.data : {},
    })
    byPerson.set(String(row.person_id), list)
  }
  return byPerson
}

/** The end of the quiet hours that hold at `now` in somebody's zone, or null outside them. */
export async function quietUntil(
  trx: Trx,
  quiet: { timeZone: string; start: string; end: string },
  now: Date,
): Promise<Date | null> {
  const { rows } = (await trx.raw(
    `select (d + (case when :end::time <= :start::time then 1 else 0 end) + :end::time) at time zone :zone as until
     from (select (:now::timestamptz at time zone :zone)::date + n as d from generate_series(-1, 0) n) days
     where :now >= (d + :start::time) at time zone :zone
       and :now < (d + (case when :end::time <= :start::time then 1 else 0 end) + :end::time) at time zone :zone
     order by until desc limit 1`,
    { start: quiet.start, end: quiet.end, zone: quiet.timeZone, now },
  )) as { rows: { until: Date }[] }
  return rows[0]?.until ?? null
}

/** Has STOP been said from this number, by whoever it belongs to? */
export async function isStopped(trx: Trx, channel: Channel, address: string): Promise<boolean> {
  const row = await trx('contact').where({ channel, address }).whereNotNull('stopped_at').first('id')
  return row !== undefined
}

/** Who a message goes to, as far as writing it needs. */
export async function messagePerson(
  trx: Trx,
  messageId: string,
): Promise<{ name: string; units: Units; channel: Channel; linkCode: string } | null> {
  const row = await trx('message as m')
    .join('person as p', 'p.id', 'm.person_id')
    .where('m.id', messageId)
    .first<{ name: string; units: unknown; channel: Channel; link_code: string | null } | undefined>(
      'p.name',
      'p.units',
      'm.channel',
      'm.link_code',
    )
  return row === undefined
    ? null
    : { name: row.name, units: unitsOf(row.units), channel: row.channel, linkCode: row.link_code ?? '' }
}

/** Notes that a number or address wants nothing more, whoever it belongs to. @returns how many entries that were. */
export async function stopAddress(trx: Trx, channel: Channel, address: string, now: Date): Promise<number> {
  return trx('contact').where({ channel, address }).whereNull('stopped_at').update({ stopped_at: now })
}

/** START after STOP. Consent is given anew by it. */
export async function startAddress(trx: Trx, channel: Channel, address: string, now: Date): Promise<number> {
  return trx('contact')
    .where({ channel, address })
    .whereNotNull('stopped_at')
    .update({ stopped_at: null, consented_at: now })
}
