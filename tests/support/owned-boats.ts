import { createHash } from 'node:crypto'
import type { Knex } from '@/db/knex'
import { ingest } from '@/ingest/ingest'
import {
  defaultBoat,
  flowForBoatHold,
  simulateBoat,
  type BoatOverrides,
  type BoatState,
  type SimSample,
} from '@/simulator/boat'

export interface Boat {
  vesselId: string
  systemId: string
  ownerId: string
  loggerId: string
}

export interface BoatOptions {
  name: string
  timeZone?: string
  harbour?: string
  quiet?: { start: string; end: string }
  ownerId?: string
  shopId?: string
  heardAt?: Date
}

let serial = 0

/** Somebody with a mail address and, if given, a verified number. */
export async function makePerson(
  knex: Knex,
  person: { name: string; email: string; phone?: string; units?: object; settings?: object },
): Promise<string> {
  const [row] = await knex('person')
    .insert({
      name: person.name,
      email: person.email,
      units: JSON.stringify(person.units ?? {}),
      email_confirmed_at: new Date('2026-01-01T00:00:00Z'),
    })
    .returning<{ id: string }[]>('id')
  const id = String(row?.id)
  if (person.phone !== undefined) {
    await knex('contact').insert({
      person_id: id,
      channel: 'sms',
      address: person.phone,
      verified_at: new Date('2026-01-01T00:00:00Z'),
      consented_at: new Date('2026-01-01T00:00:00Z'),
      settings: JSON.stringify(person.settings ?? {}),
    })
  }
  return id
}

export async function makeShop(knex: Knex, name: string, timeZone = 'Europe/London'): Promise<string> {
  const [row] = await knex('shop')
    .insert({ name, harbour: 'Port Averill', time_zone: timeZone })
    .returning<{ id: string }[]>('id')
  return String(row?.id)
}

export async function joinShop(knex: Knex, shopId: string, personId: string, role: string): Promise<void> {
  await knex('membership').insert({ shop_id: shopId, person_id: personId, role })
}

/** A vessel with one system, a fitted logger, its owner, and a shop that may see its figures. */
export async function makeBoat(knex: Knex, options: BoatOptions): Promise<Boat> {
  serial += 1
  const number = serial
  const ownerId =
    options.ownerId ??
    (await makePerson(knex, {
      name: `Owner of ${options.name}`,
      email: `owner${number}.${process.pid}@boats.example`,
    }))
  const [vessel] = await knex('vessel')
    .insert({
      name: options.name,
      time_zone: options.timeZone ?? 'Europe/London',
      harbour: options.harbour ?? null,
      quiet_start: options.quiet?.start ?? '22:00',
      quiet_end: options.quiet?.end ?? '07:00',
    })
    .returning<{ id: string }[]>('id')
  const vesselId = String(vessel?.id)
  await knex('vessel_owner').insert({ vessel_id: vesselId, person_id: ownerId })
  const [system] = await knex('system')
    .insert({ vessel_id: vesselId, name: 'Main' })
    .returning<{ id: string }[]>('id')
  const systemId = String(system?.id)
  await knex('setting').insert({
    system_id: systemId,
    in_force_from: '2026-01-01T00:00:00Z',
    cut_out_pa: 33_864,
    cut_in_pa: 27_091,
    low_supply_v: 11.8,
  })
  const [logger] = await knex('logger')
    .insert({
      serial: `T${process.pid}-${number}`,
      interval_seconds: 60,
      channels: knex.raw("array['pump','vacuum','air','barometer','supply']"),
    })
    .returning<{ id: number }[]>('id')
  const loggerId = String(logger?.id)
  await knex('logger_fitting').insert({
    logger_id: loggerId,
    system_id: systemId,
    span: knex.raw("tstzrange('2026-01-01T00:00:00Z', null)"),
  })
  await knex('system_state')
    .insert({ system_id: systemId, last_heard_at: options.heardAt ?? null })
    .onConflict('system_id')
    .merge()
  if (options.shopId !== undefined) {
    await knex('shop_access').insert({
      vessel_id: vesselId,
      shop_id: options.shopId,
      level: 'figures',
      granted_by: ownerId,
    })
  }
  return { vesselId, systemId, ownerId, loggerId }
}

/** Days of a boat's life as its logger sends it, a reading a minute and one at each edge of the pump. */
export interface Life {
  /** How long the pump rests when nobody flushes; null = no leak at all. */
  holdHours: number | null
  fromMs: number
  toMs: number
  overrides?: BoatOverrides
}

/** How each boat's last stretch ended, for a next one that begins there. */
const lives = new Map<string, { toMs: number; end: BoatState }>()

/** Simulates a life (going on where the last one ended) and takes it in as an upload received at its end (or later). */
export async function live(
  knex: Knex,
  boat: Boat,
  life: Life,
  receivedAt = new Date(life.toMs),
): Promise<void> {
  const plain = defaultBoat({ seed: Number(boat.systemId), ...life.overrides })
  const leaks =
    life.holdHours === null
      ? []
      : [
          {
            part: 'hose-1',
            kind: 'orifice' as const,
            flowPaM3PerS: flowForBoatHold(plain, 'orifice', life.holdHours * 3600),
          },
        ]
  const spec = { ...plain, leaks: [...plain.leaks, ...leaks] }
  const before = lives.get(boat.systemId)
  const resume = before?.toMs === life.fromMs ? before.end : undefined
  const { samples, end } = simulateBoat(spec, life.fromMs, life.toMs, resume === undefined ? {} : { resume })
  lives.set(boat.systemId, { toMs: life.toMs, end })
  await upload(knex, boat, samples, receivedAt)
}

/** Takes samples in as the boat's own logger sends them. */
export async function upload(
  knex: Knex,
  boat: Boat,
  samples: readonly SimSample[],
  receivedAt: Date,
): Promise<void> {
  const key = `key-of-${boat.loggerId}-${process.pid}`
  const hash = createHash('sha256').update(key, 'utf8').digest()
  await knex('logger').where({ id: boat.loggerId }).update({ key_hash: hash })
  const lines = samples.map((sample) =>
    [
      new Date(sample.at).toISOString(),
      sample.vacuumPa ?? '',
      sample.pumpOn === null ? '' : Number(sample.pumpOn),
      sample.airC ?? '',
      sample.barometerPa ?? '',
      sample.supplyV ?? '',
    ].join(','),
  )
  const request = new Request('http://boats.example/api/ingest', {
    method: 'POST',
    headers: { authorization: `Bearer ${key}`, 'content-type': 'text/csv' },
    body: ['time,vacuum_pa,pump,air_cel,barometer_pa,supply_v', ...lines].join('\n'),
  })
  await ingest(request, receivedAt)
}
