import { afterAll, beforeAll, describe, expect, it } from 'vitest'
import type { Knex } from '@/db/knex'
import { asPerson, type Trx } from '@/db/roles'
import type { Person } from '../support/access/actors'
import { makeWorld, type World } from '../support/access/world'
import { testDatabase, useDatabase, type TestDatabase } from '../support/database'

/* What the database itself shows a person who asks it for everything: no service, no check, no `where`. */

let database: TestDatabase
let knex: Knex
let world: World
beforeAll(async () => {
  database = await testDatabase()
  knex = database.knex
  await useDatabase(database.url)
  world = await makeWorld(knex)
})
afterAll(() => database.drop())

const STRANGERS = ['strangeOwner', 'strangeManager', 'lapsed', 'withdrawn'] as const

/** Every table, partition and view that could be read, in every schema but the system's. */
async function relations(): Promise<{ schema: string; name: string }[]> {
  const { rows } = await knex.raw<{ rows: { schema: string; name: string }[] }>(
    `select n.nspname as schema, c.relname as name from pg_class c join pg_namespace n on n.oid = c.relnamespace
     where c.relkind in ('r', 'p', 'v', 'm') and n.nspname not in ('pg_catalog', 'information_schema')
       and n.nspname not like 'pg\\_toast%' and not exists (
         select 1 from pg_depend d where d.objid = c.oid and d.deptype = 'e')
     order by 1, 2`,
  )
  return rows
}

/** The columns the person may read; none where the table is closed to them. */
async function readable(trx: Trx, relation: { schema: string; name: string }): Promise<string[]> {
  const { rows } = await trx.raw<{ rows: { column: string }[] }>(
    `select a.attname as column from pg_attribute a join pg_class c on c.oid = a.attrelid
       join pg_namespace n on n.oid = c.relnamespace
     where n.nspname = :schema and c.relname = :name and a.attnum > 0 and not a.attisdropped
       and has_schema_privilege(n.oid, 'usage') and has_column_privilege(c.oid, a.attnum, 'select')
     order by a.attnum`,
    relation,
  )
  return rows.map((row) => row.column)
}

/** All rows that the person is shown, as JSON text, by table. */
async function everythingSeenBy(person: Person): Promise<Map<string, string[]>> {
  const seen = new Map<string, string[]>()
  for (const relation of await relations()) {
    const rows = await asPerson(world.people[person].id, async (trx) => {
      const columns = await readable(trx, relation)
      if (columns.length === 0) return null
      const { rows: found } = await trx.raw<{ rows: object[] }>(
        `select ${columns.map(() => '??').join(', ')} from ??.??`,
        [...columns, relation.schema, relation.name],
      )
      return found.map((row) => JSON.stringify(row))
    })
    if (rows !== null) seen.set(`${relation.schema}.${relation.name}`, rows)
  }
  return seen
}

/** What may be seen of the boat all the same, and why. */
const KEPT: Record<(typeof STRANGERS)[number], string[]> = {
  strangeOwner: [],
  strangeManager: [],
  lapsed: [],
  // The shop keeps the visits it did, and remembers that it once had access.
  withdrawn: ['public.visit', 'public.shop_access'],
}

describe('row-level security', () => {
  it('is on for every table that a person may read, and forced by a policy', async () => {
    const { rows } = await knex.raw<{ rows: { name: string }[] }>(
      `select c.relname as name from pg_class c join pg_namespace n on n.oid = c.relnamespace
       where n.nspname = 'public' and c.relkind in ('r', 'p') and not c.relrowsecurity
         and (has_table_privilege('mw_person', c.oid, 'select') or has_any_column_privilege('mw_person', c.oid, 'select'))`,
    )
    expect(rows).toEqual([])
  })

  it('leaves neither role a way around it', async () => {
    const { rows } = await knex.raw<{ rows: object[] }>(
      `select rolname, rolsuper, rolbypassrls, rolcanlogin, rolcreaterole, rolcreatedb from pg_roles
       where rolname in ('mw_person', 'mw_ingest')
         and (rolsuper or rolbypassrls or rolcanlogin or rolcreaterole or rolcreatedb)`,
    )
    expect(rows).toEqual([])
    const owned = await knex.raw<{ rows: object[] }>(
      `select relname from pg_class c join pg_roles r on r.oid = c.relowner where r.rolname in ('mw_person', 'mw_ingest')`,
    )
    expect(owned.rows).toEqual([])
  })

  it('keeps samples, queues, tokens and secrets from people altogether', async () => {
    const seen = await everythingSeenBy('owner')
    for (const closed of [
      'public.sample',
      'public.sample_hour',
      'public.checkpoint',
      'public.token',
      'public.device_claim',
      'public.delivery_attempt',
      'public.upload',
      'public.sign_up',
      'public.recovery_code',
      'public.throttle',
      'public.inbound_text',
      'public.tick',
    ])
      expect(seen.has(closed), closed).toBe(false)
    expect([...seen.keys()].filter((name) => !name.startsWith('public.'))).toEqual([])
    expect([...seen.keys()].filter((name) => /sample_\d/.test(name))).toEqual([])
    const columns = await asPerson(world.people.owner.id, async (trx) => {
      const found: string[] = []
      for (const name of ['person', 'logger', 'invitation', 'session'])
        found.push(...(await readable(trx, { schema: 'public', name })))
      return found
    })
    expect(columns.filter((name) => /hash|secret|totp|key$|token/.test(name))).toEqual([])
  })

  it('shows the owner the boat in every table of it', async () => {
    const seen = await everythingSeenBy('owner')
    const holds = (table: string) => (seen.get(`public.${table}`) ?? []).length > 0
    for (const table of [
      'vessel',
      'vessel_owner',
      'shop_access',
      'system',
      'setting',
      'part',
      'statement',
      'system_state',
      'run',
      'hold',
      'leg',
      'flush',
      'fault',
      'system_day',
      'outlook',
      'notice',
      'notice_event',
      'message',
      'message_subject',
      'visit',
      'visit_entry',
      'gauge_test',
      'part_change',
      'photo',
      'report_version',
      'logger',
      'logger_fitting',
      'calibration',
      'commissioning',
      'commissioning_check',
      'audit_entry',
      'invitation',
      'contact',
      'session',
    ])
      expect(holds(table), table).toBe(true)
  })

  it.each(STRANGERS)('shows %s no row of it, whatever is asked', async (person) => {
    const own = new Map<string, string>()
    const { vesselId, systemId, loggerId, leftLoggerId, visitId, noticeId, messageId } = world
    for (const [column, ids] of Object.entries({
      vessel_id: [vesselId],
      system_id: [systemId],
      logger_id: [loggerId, leftLoggerId],
      visit_id: [visitId],
      notice_id: [noticeId],
      message_id: [messageId],
    }))
      for (const id of ids) own.set(`"${column}":"${id}"`, column).set(`"${column}":${id},`, column)
    const told: string[] = []
    for (const [table, rows] of await everythingSeenBy(person)) {
      if (KEPT[person].includes(table)) continue
      for (const row of rows) {
        const found = row.includes(world.marker) || [...own.keys()].some((text) => row.includes(text))
        if (found) told.push(`${table}: ${row.slice(0, 200)}`)
      }
    }
    expect(told).toEqual([])
  })

  it('hides after the first consent what tells when people are aboard', async () => {
    const seen = await everythingSeenBy('figures')
    const of = (table: string) =>
      (seen.get(`public.${table}`) ?? []).filter((row) => row.includes(`"system_id":"${world.systemId}"`))
    expect(of('flush')).toEqual([])
    expect(of('run').filter((row) => row.includes('"flush"'))).toEqual([])
    expect(of('run').length).toBe(1)
    expect(of('hold').length).toBe(1)
    expect((seen.get('public.statement') ?? []).filter((row) => row.includes('"aboard"'))).toEqual([])
  })
})

describe('functions', () => {
  /** The functions that look around the policies, each with its own check inside. */
  it('that run as their owner are known, have a fixed search path and are not everybody’s', async () => {
    const { rows } = await knex.raw<{ rows: { name: string; config: string[] | null; open: boolean }[] }>(
      `select p.oid::regprocedure::text as name, p.proconfig as config,
         coalesce((select bool_or(a.grantee = 0) from aclexplode(coalesce(p.proacl, acldefault('f', p.proowner))) a
           where a.privilege_type = 'EXECUTE'), false) as open
       from pg_proc p join pg_namespace n on n.oid = p.pronamespace
       where p.prosecdef and n.nspname = 'public' and p.prorettype <> 'trigger'::regtype order by 1`,
    )
    expect(rows.length).toBeGreaterThan(10)
    for (const { name, config, open } of rows) {
      expect(
        (config ?? []).some((entry) => entry.startsWith('search_path=')),
        name,
      ).toBe(true)
      expect(open, `${name} may be called by anybody`).toBe(false)
    }
  })

  it.each(STRANGERS)('of samples answer %s nothing', async (person) => {
    const span = [world.systemId, new Date(Date.now() - 86_400_000), new Date()]
    await asPerson(world.people[person].id, async (trx) => {
      for (const call of [
        'system_samples(?, ?, ?)',
        'system_sample_hours(?, ?, ?)',
        "system_trace(?, ?, ?, interval '1 minute')",
      ]) {
        const { rows } = await trx.raw<{ rows: object[] }>(`select * from ${call}`, span)
        expect(rows, call).toEqual([])
      }
    })
    await asPerson(world.people.owner.id, async (trx) => {
      const { rows } = await trx.raw<{ rows: object[] }>('select * from system_samples(?, ?, ?)', span)
      expect(rows.length).toBe(1)
    })
  })

  it('of loggers’ health leave out boats out of sight, the shop’s own loggers on them too', async () => {
    for (const person of STRANGERS)
      await asPerson(world.people[person].id, async (trx) => {
        const { rows } = await trx.raw<{ rows: { logger_id: number }[] }>(
          'select logger_id from logger_health()',
        )
        const ids = rows.map((row) => String(row.logger_id))
        expect(ids, person).not.toContain(world.loggerId)
        expect(ids, person).not.toContain(world.leftLoggerId)
      })
  })
})

describe('writing as a person', () => {
  const change = (person: Person, text: string, values: (string | number)[]) =>
    asPerson(world.people[person].id, async (trx) => {
      const { rowCount } = await trx.raw<{ rowCount: number }>(text, values)
      return rowCount
    }).catch((error: unknown) => (error instanceof Error && 'code' in error ? String(error.code) : 'error'))

  it('alters nothing of a boat that one does not see', async () => {
    for (const person of STRANGERS)
      for (const [text, values] of [
        ['update vessel set berth = ? where id = ?', ['x', world.vesselId]],
        ['update notice set acknowledged_note = ? where id = ?', ['x', world.noticeId]],
        ['update part set name = ? where system_id = ?', ['x', world.systemId]],
        ['update visit set complaint = ? where id = ?', ['x', world.visitId]],
        ['update shop_access set level = ? where vessel_id = ?', ['full', world.vesselId]],
        ['update session set user_agent = ? where id = ?', ['x', world.sessionId]],
        ['update contact set address = ? where id = ?', ['x', world.contactId]],
        ['update person set name = ? where id = ?', ['x', world.people.owner.id]],
        [
          'update statement set value = ? where vessel_id = ? and system_id is null',
          ['away', world.vesselId],
        ],
        ['update commissioning set note = ? where id = ?', ['x', world.commissioningId]],
      ] as const)
        expect([0, '42501'], `${person}: ${text}`).toContain(await change(person, text, [...values]))
  })

  it('adds nothing to it, and nobody to one’s own shop', async () => {
    for (const person of STRANGERS)
      for (const [text, values] of [
        [
          'insert into shop_access (vessel_id, shop_id, level) values (?, ?, ?)',
          [world.vesselId, world.strangeShopId, 'full'],
        ],
        ['insert into visit (vessel_id, shop_id) values (?, ?)', [world.vesselId, world.shopId]],
        ['insert into setting (system_id, in_force_from) values (?, now())', [world.systemId]],
        [
          'insert into part (system_id, key, kind, name) values (?, ?, ?, ?)',
          [world.systemId, 'x', 'tank', 'x'],
        ],
        ['insert into statement (vessel_id, value, from_at) values (?, ?, now())', [world.vesselId, 'away']],
        [
          'insert into membership (shop_id, person_id, role) values (?, ?, ?)',
          [world.shopId, world.people[person].id, 'manager'],
        ],
        [
          'insert into vessel_owner (vessel_id, person_id) values (?, ?)',
          [world.vesselId, world.people[person].id],
        ],
        [
          'insert into logger_fitting (logger_id, system_id, span) values (?, ?, tstzrange(now(), null))',
          [world.loggerId, world.systemId],
        ],
      ] as const)
        expect(await change(person, text, [...values]), `${person}: ${text}`).toBe('42501')
  })
})
