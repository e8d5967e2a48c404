import type { Trx } from '@/db/roles'

/** The head of a system's fold and what is marked on it. */
export interface SystemState {
  systemId: string
  deriverVersion: number
  /** Epoch milliseconds of the last item folded; null before the first. */
  headAtMs: number | null
  /** The state as stored JSON. */
  head: unknown
  sealedUntilMs: number | null
  rebuildWanted: boolean
  /** From when on a dated fact was changed since; -Infinity = from the beginning, null = nothing was. */
  refoldFromMs: number | null
}

const COLUMNS = `system_id, deriver_version, (extract(epoch from head_at) * 1000)::float8 as head_ms, head,
  (extract(epoch from sealed_until) * 1000)::float8 as sealed_ms, rebuild_wanted,
  (extract(epoch from refold_from) * 1000)::float8 as refold_ms`

/** How long a writer waits for another one of the same system before it asks to come again. */
export async function limitLockWait(trx: Trx): Promise<void> {
  await trx.raw("set local lock_timeout = '5s'")
}

/**
 * Locks the state rows of these systems in the order of their ids (so that two writers never wait for each other)
 * and answers them; makes a row where there is none yet.
 */
export async function lockStates(trx: Trx, systemIds: readonly string[]): Promise<SystemState[]> {
  const ids = [...new Set(systemIds)]
  if (ids.length === 0) return []
  const lock = () =>
    trx.raw<{ rows: RawState[] }>(
      `select ${COLUMNS}
       from system_state where system_id = any (?::bigint[]) order by system_id for no key update`,
      [ids],
    )
  let { rows } = await lock()
  if (rows.length < ids.length) {
    await trx.raw(
      `insert into system_state (system_id) select id from system where id = any (?::bigint[]) order by id
       on conflict do nothing`,
      [ids],
    )
    ;({ rows } = await lock())
  }
  return rows.map(toState)
}

interface RawState {
  system_id: string
  deriver_version: number
  head_ms: number | null
  head: unknown
  sealed_ms: number | null
  rebuild_wanted: boolean
  refold_ms: number | null
}

const toState = (row: RawState): SystemState => ({
  systemId: row.system_id,
  deriverVersion: row.deriver_version,
  headAtMs: row.head_ms,
  head: row.head,
  sealedUntilMs: row.sealed_ms,
  rebuildWanted: row.rebuild_wanted,
  refoldFromMs: row.refold_ms,
})

/** The state without a lock, for reading; null when the system has none. */
export async function readState(trx: Trx, systemId: string): Promise<SystemState | null> {
  const { rows } = await trx.raw<{ rows: RawState[] }>(
    `select ${COLUMNS}
     from system_state where system_id = ?`,
    [systemId],
  )
  return rows[0] === undefined ? null : toState(rows[0])
}

/** Writes the head; `text` is the state's canonical JSON, null when nothing was ever folded. */
export async function writeHead(
  trx: Trx,
  systemId: string,
  head: { atMs: number | null; text: string | null; deriverVersion: number },
): Promise<void> {
  await trx.raw(
    `update system_state set head_at = ?, head = ?, deriver_version = ?, rebuild_wanted = false where system_id = ?`,
    [head.atMs === null ? null : new Date(head.atMs), head.text, head.deriverVersion, systemId],
  )
}

/** The rows follow from the facts again, and the head stands as it was. */
export async function clearRefold(trx: Trx, systemId: string): Promise<void> {
  await trx.raw('update system_state set refold_from = null where system_id = ?', [systemId])
}

export async function markForRebuild(trx: Trx, systemId: string): Promise<void> {
  await trx.raw('update system_state set rebuild_wanted = true where system_id = ?', [systemId])
}

/**
 * Systems whose rows do not follow from samples and facts: marked, or derived by another version than this one.
 * In no order, so that one which fails does not stand before the others.
 */
export async function systemsToCatchUp(trx: Trx, deriverVersion: number, limit: number): Promise<string[]> {
  const { rows } = await trx.raw<{ rows: { system_id: string }[] }>(
    `select system_id from system_state
     where rebuild_wanted or refold_from is not null or (head is not null and deriver_version <> ?)
     order by random() limit ?`,
    [deriverVersion, limit],
  )
  return rows.map((row) => row.system_id)
}

export async function allSystemIds(trx: Trx): Promise<string[]> {
  const { rows } = await trx.raw<{ rows: { id: string }[] }>('select id from system order by id')
  return rows.map((row) => row.id)
}

/**
 * This system is heard of up to `heardAt`. After a gap or a backlog of more than six hours, how it moves is judged
 * anew instead of at its next turn.
 */
export async function noteSystemHeard(trx: Trx, systemId: string, heardAt: Date): Promise<void> {
  await trx.raw(
    `update system_state set last_heard_at = greatest(last_heard_at, :heardAt),
       moving_at = case when last_heard_at > cast(:heardAt as timestamptz) - interval '6 hours' then moving_at end
     where system_id = :systemId`,
    {
      heardAt,
      systemId,
    },
  )
}

export async function writeFigures(trx: Trx, systemId: string, figures: unknown, at: Date): Promise<void> {
  await trx.raw('update system_state set figures = ?, figures_at = ? where system_id = ?', [
    JSON.stringify(figures),
    at,
    systemId,
  ])
}

export async function seal(trx: Trx, systemId: string, until: Date): Promise<void> {
  await trx.raw('update system_state set sealed_until = greatest(sealed_until, ?) where system_id = ?', [
    until,
    systemId,
  ])
}
