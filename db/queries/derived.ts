import { arrayLiteral } from '@/db/array-literal'
import type { Trx } from '@/db/roles'

/** The five tables that the fold writes. */
export const DERIVED_TABLES = ['run', 'hold', 'leg', 'flush', 'fault'] as const
export type DerivedTable = (typeof DERIVED_TABLES)[number]

interface Layout {
  /** Column, its PostgreSQL type, and the field of the row it is taken from; `~` marks epoch milliseconds. */
  columns: readonly (readonly [column: string, type: string, field: string])[]
  key: readonly string[]
}

const LAYOUT: Record<DerivedTable, Layout> = {
  run: {
    key: ['started_at'],
    columns: [
      ['started_at', 'timestamptz', 'startedAt'],
      ['stopped_at', 'timestamptz', 'stoppedAt'],
      ['trigger', 'text', 'trigger'],
      ['vacuum_at_start_pa', 'float8', 'vacuumAtStartPa'],
      ['vacuum_at_stop_pa', 'float8', 'vacuumAtStopPa'],
      ['recharge_pa_per_second', 'float8', 'rechargePaPerSecond'],
      ['supply_v', 'float8', 'supplyV'],
      ['edge_uncertainty_seconds', 'float8', 'edgeUncertaintySeconds'],
      ['interrupted', 'bool', 'interrupted'],
      ['known_at', 'timestamptz', 'knownAt'],
    ],
  },
  hold: {
    key: ['started_at'],
    columns: [
      ['started_at', 'timestamptz', 'startedAt'],
      ['ended_at', 'timestamptz', 'endedAt'],
      ['ending', 'text', 'ending'],
      ['flushes', 'int', 'flushes'],
      ['cut_out_pa', 'float8', 'cutOutPa'],
      ['settled_pa', 'float8', 'settledPa'],
      ['end_pa', 'float8', 'endPa'],
      ['learned_cut_out_pa', 'float8', 'learnedCutOutPa'],
      ['learned_settled_pa', 'float8', 'learnedSettledPa'],
      ['learned_cut_in_pa', 'float8', 'learnedCutInPa'],
      ['set_aside', 'bool', 'setAside'],
      ['edge_uncertainty_seconds', 'float8', 'edgeUncertaintySeconds'],
      ['known_at', 'timestamptz', 'knownAt'],
    ],
  },
  leg: {
    key: ['started_at'],
    columns: [
      ['started_at', 'timestamptz', 'startedAt'],
      ['hold_started_at', 'timestamptz', 'holdStartedAt'],
      ['ended_at', 'timestamptz', 'endedAt'],
      ['since_flush_seconds', 'float8', 'sinceFlushSeconds'],
      ['bins', 'jsonb', 'bins'],
      ['rate_pa_per_hour', 'float8', 'rate.paPerHour'],
      ['rate_low', 'float8', 'rate.low'],
      ['rate_high', 'float8', 'rate.high'],
      ['compensated', 'bool', 'rate.compensated'],
      ['set_aside', 'bool', 'setAside'],
      ['known_at', 'timestamptz', 'knownAt'],
    ],
  },
  flush: {
    key: ['at'],
    columns: [
      ['at', 'timestamptz', 'at'],
      ['drop_pa', 'float8', 'dropPa'],
      ['started_pump', 'bool', 'startedPump'],
      ['known_at', 'timestamptz', 'knownAt'],
    ],
  },
  fault: {
    key: ['kind', 'started_at'],
    columns: [
      ['kind', 'text', 'kind'],
      ['started_at', 'timestamptz', 'startedAt'],
      ['ended_at', 'timestamptz', 'endedAt'],
      ['detail', 'text', 'detail'],
      ['known_at', 'timestamptz', 'knownAt'],
    ],
  },
}

/**
 * Writes rows of one table, a row of the same key being replaced. `rows` are the fold's own objects: times in epoch
 * milliseconds under the field names of `lib/analysis/fold/types`.
 */
export async function writeRows(
  trx: Trx,
  systemId: string,
  table: DerivedTable,
  rows: readonly object[],
): Promise<void> {
  if (rows.length === 0) return
  const { columns, key } = LAYOUT[table]
  const names = columns.map(([column]) => `"${column}"`)
  const others = names.filter((name) => !key.includes(name.slice(1, -1)))
  await trx.raw(
    `insert into "${table}" (system_id, ${names.join(', ')})
     select ?, ${columns.map(([column, type]) => (type === 'jsonb' ? `"${column}"::jsonb` : `"${column}"`)).join(', ')}
     from unnest(${columns.map(([, type]) => `?::${type === 'jsonb' ? 'text' : type}[]`).join(', ')}) as n (${names.join(', ')})
     on conflict (system_id, ${key.map((name) => `"${name}"`).join(', ')})
     do update set ${others.map((name) => `${name} = excluded.${name}`).join(', ')}`,
    [systemId, ...columns.map(([, type, field]) => arrayLiteral(rows.map((row) => cell(row, type, field))))],
  )
}

function cell(row: object, type: string, field: string): string | number | boolean | null {
  let value: unknown = row
  for (const part of field.split('.'))
    value = typeof value === 'object' && value !== null ? Reflect.get(value, part) : null
  if (value === undefined || value === null) return null
  if (type === 'timestamptz') return typeof value === 'number' ? new Date(value).toISOString() : null
  if (type === 'jsonb') return JSON.stringify(value)
  return typeof value === 'string' || typeof value === 'number' || typeof value === 'boolean' ? value : null
}

/**
 * Deletes rows that became known in (afterMs, throughMs]; answers the span of time that they covered, or null.
 */
export async function deleteKnown(
  trx: Trx,
  systemId: string,
  afterMs: number,
  throughMs: number,
): Promise<{ fromMs: number; toMs: number } | null> {
  const remove = (table: DerivedTable, from: string, to: string) =>
    `${table}_gone as (delete from "${table}" where system_id = :systemId and known_at > :after and known_at <= :through
       returning ${from} as f, ${to} as t)`
  const { rows } = await trx.raw<{ rows: { from_ms: number | null; to_ms: number | null }[] }>(
    `with ${[
      remove('run', 'started_at', 'stopped_at'),
      remove('hold', 'started_at', 'ended_at'),
      remove('leg', 'started_at', 'ended_at'),
      remove('flush', 'at', 'at'),
      remove('fault', 'started_at', 'ended_at'),
    ].join(', ')}
     select (extract(epoch from min(f)) * 1000)::float8 as from_ms,
       (extract(epoch from max(t)) * 1000)::float8 as to_ms
     from (${DERIVED_TABLES.map((table) => `select f, t from ${table}_gone`).join(' union all ')}) gone`,
    { systemId, after: bound(afterMs), through: bound(throughMs) },
  )
  const row = rows[0]
  return row === undefined || row.from_ms === null || row.to_ms === null
    ? null
    : { fromMs: row.from_ms, toMs: row.to_ms }
}

const bound = (ms: number): string =>
  ms === Infinity ? 'infinity' : ms === -Infinity ? '-infinity' : new Date(ms).toISOString()

export interface Checkpoint {
  atMs: number
  /** The state as stored JSON. */
  state: unknown
}

interface RawCheckpoint {
  at_ms: number
  state: unknown
}
const toCheckpoint = (row: RawCheckpoint): Checkpoint => ({ atMs: row.at_ms, state: row.state })

/** The last checkpoint before an instant (at it too with `inclusive`), or null. */
export async function checkpointBefore(
  trx: Trx,
  systemId: string,
  ms: number,
  inclusive = false,
): Promise<Checkpoint | null> {
  const { rows } = await trx.raw<{ rows: RawCheckpoint[] }>(
    `select (extract(epoch from at) * 1000)::float8 as at_ms, state from checkpoint
     where system_id = ? and at ${inclusive ? '<=' : '<'} ? order by at desc limit 1`,
    [systemId, bound(ms)],
  )
  return rows[0] === undefined ? null : toCheckpoint(rows[0])
}

/** Times of the checkpoints after an instant, ascending. */
export async function checkpointTimesAfter(trx: Trx, systemId: string, ms: number): Promise<number[]> {
  const { rows } = await trx.raw<{ rows: { at_ms: number }[] }>(
    `select (extract(epoch from at) * 1000)::float8 as at_ms from checkpoint
     where system_id = ? and at > ? order by at`,
    [systemId, bound(ms)],
  )
  return rows.map((row) => row.at_ms)
}

export async function checkpointAt(trx: Trx, systemId: string, ms: number): Promise<Checkpoint | null> {
  const { rows } = await trx.raw<{ rows: RawCheckpoint[] }>(
    `select (extract(epoch from at) * 1000)::float8 as at_ms, state from checkpoint where system_id = ? and at = ?`,
    [systemId, bound(ms)],
  )
  return rows[0] === undefined ? null : toCheckpoint(rows[0])
}

/** Deletes the checkpoints in (afterMs, throughMs]. */
export async function deleteCheckpoints(
  trx: Trx,
  systemId: string,
  afterMs: number,
  throughMs: number,
): Promise<void> {
  await trx.raw('delete from checkpoint where system_id = ? and at > ? and at <= ?', [
    systemId,
    bound(afterMs),
    bound(throughMs),
  ])
}

const BLOCK_MS = 6 * 3_600_000

/** Writes checkpoints; `text` is the state's canonical JSON. */
export async function writeCheckpoints(
  trx: Trx,
  systemId: string,
  checkpoints: readonly { atMs: number; text: string }[],
): Promise<void> {
  if (checkpoints.length === 0) return
  await trx.raw(
    `insert into checkpoint (system_id, at, block, state)
     select ?, n.at, n.block, n.state::jsonb
     from unnest(?::timestamptz[], ?::timestamptz[], ?::text[]) as n (at, block, state)
     on conflict (system_id, at) do update set state = excluded.state`,
    [
      systemId,
      arrayLiteral(checkpoints.map(({ atMs }) => bound(atMs))),
      arrayLiteral(checkpoints.map(({ atMs }) => bound(Math.floor(atMs / BLOCK_MS) * BLOCK_MS))),
      arrayLiteral(checkpoints.map(({ text }) => text)),
    ],
  )
}
