import {
  checkpointAt,
  checkpointBefore,
  checkpointTimesAfter,
  deleteCheckpoints,
  deleteKnown,
  writeCheckpoints,
  writeRows,
  DERIVED_TABLES,
  type DerivedTable,
} from '@/db/queries/derived'
import { factsOf } from '@/db/queries/facts'
import { clearRefold, markForRebuild, writeHead, type SystemState } from '@/db/queries/system-state'
import type { Trx } from '@/db/roles'
import {
  checkpointDue,
  DERIVER_VERSION,
  initialState,
  parseState,
  serialiseState,
  step,
  type FoldState,
  type Instant,
  type Row,
} from '@/lib/analysis/fold'
import { foldItems } from '@/lib/figures/fold-items'

/** What changed in the input of a fold: every sample and fact outside [fromMs, toMs] is as it was. */
export interface Change {
  fromMs: Instant
  toMs: Instant
}

export interface Derived {
  /** Items that were folded to take the change in. */
  items: number
  /** What the new and the replaced rows cover; null when no row changed. */
  span: { fromMs: Instant; toMs: Instant } | null
}

/** Over this (some sixty days of record) a changed fact is left to the worker: a request should not fold a year. */
const INLINE_CHECKPOINTS = 240

/**
 * Takes a change of the input into a system's rows, checkpoints and head: folds on from the head when everything
 * changed lies after it, else from the last checkpoint before the change to the first after it whose state comes
 * out equal. Marks of changed facts are taken in along the way.
 * @param locked the system's state row, locked by this transaction.
 * @param patient true takes in marks however far they reach back; else those that reach too far stay marked.
 */
export async function derive(
  trx: Trx,
  locked: SystemState,
  change: Change | null,
  patient = false,
): Promise<Derived> {
  const { systemId, refoldFromMs: mark } = locked
  if (locked.rebuildWanted || isOfAnotherVersion(locked)) {
    // Rows of another version must not be mixed with new ones: the worker derives the system anew.
    await markForRebuild(trx, systemId)
    return NOTHING
  }
  if (mark === null) return change === null ? NOTHING : refold(trx, locked, change, false)
  if (!patient && (await checkpointTimesAfter(trx, systemId, mark)).length > INLINE_CHECKPOINTS)
    return change === null ? NOTHING : refold(trx, locked, change, true)
  // How far a fact reaches is not known, so what was changed reaches to the head.
  const fromMs = Math.min(mark, change?.fromMs ?? Infinity)
  const toMs = Math.max(locked.headAtMs ?? -Infinity, change?.toMs ?? -Infinity)
  return refold(trx, locked, { fromMs, toMs }, false)
}

const NOTHING: Derived = { items: 0, span: null }

/** True when the head was folded by a deriver that would have made other rows. */
export const isOfAnotherVersion = (state: SystemState): boolean =>
  state.head !== null && state.deriverVersion !== DERIVER_VERSION

/** Derives a system anew from its seal, or from its first sample. */
export async function rebuild(trx: Trx, locked: SystemState): Promise<Derived> {
  const from = locked.sealedUntilMs ?? -Infinity
  const fresh = { ...locked, head: null, headAtMs: null }
  return refold(trx, fresh, { fromMs: from, toMs: Infinity }, false)
}

async function refold(trx: Trx, locked: SystemState, change: Change, keepMark: boolean): Promise<Derived> {
  const { systemId } = locked
  const fromMs = Math.max(change.fromMs, locked.sealedUntilMs ?? -Infinity)
  const append = locked.headAtMs !== null && fromMs > locked.headAtMs
  const start = append ? headOf(locked) : await lastCheckpoint(trx, systemId, fromMs)
  const { state } = start
  const kept = new Set(append ? [] : await checkpointTimesAfter(trx, systemId, start.atMs))
  const writer = new RowWriter(trx, systemId, start.atMs, !append)
  let items = 0
  let atMs = start.atMs
  for await (const page of foldItems(trx, await factsOf(trx, systemId), start.atMs, Infinity)) {
    for (const item of page) {
      items += 1
      writer.take(step(state, item))
      if (item.type === 'fact') continue
      atMs = item.sample.at
      if (!checkpointDue(state)) continue
      const text = serialiseState(state)
      writer.checkpoint(atMs, text)
      if (atMs > change.toMs && kept.has(atMs) && (await isSame(trx, systemId, atMs, text))) {
        await writer.flush(atMs)
        if (!keepMark) await clearRefold(trx, systemId)
        return { items, span: writer.span }
      }
    }
    await writer.flush(atMs)
  }
  await writer.flush(Infinity)
  const head = atMs === -Infinity ? { atMs: null, text: null } : { atMs, text: serialiseState(state) }
  await writeHead(trx, systemId, { ...head, deriverVersion: DERIVER_VERSION })
  if (!keepMark) await clearRefold(trx, systemId)
  return { items, span: writer.span }
}

interface Start {
  atMs: Instant
  state: FoldState
}

function headOf(locked: SystemState): Start {
  return { atMs: locked.headAtMs ?? -Infinity, state: parseState(JSON.stringify(locked.head)) }
}

async function lastCheckpoint(trx: Trx, systemId: string, beforeMs: Instant): Promise<Start> {
  const found = await checkpointBefore(trx, systemId, beforeMs)
  return found === null
    ? { atMs: -Infinity, state: initialState() }
    : { atMs: found.atMs, state: parseState(JSON.stringify(found.state)) }
}

async function isSame(trx: Trx, systemId: string, atMs: Instant, text: string): Promise<boolean> {
  const stored = await checkpointAt(trx, systemId, atMs)
  // The database keeps keys in an order of its own, so both sides are put into the canonical one.
  return stored !== null && serialiseState(parseState(JSON.stringify(stored.state))) === text
}

/** Collects the fold's output and writes it a page at a time, old rows of the same stretch first taken out. */
class RowWriter {
  span: { fromMs: Instant; toMs: Instant } | null = null
  private rows = new Map<DerivedTable, object[]>()
  private checkpoints: { atMs: Instant; text: string }[] = []

  constructor(
    private readonly trx: Trx,
    private readonly systemId: string,
    private flushedMs: Instant,
    private readonly replacing: boolean,
  ) {}

  take(rows: Row[]): void {
    for (const { table, row } of rows) {
      const list = this.rows.get(table)
      if (list === undefined) this.rows.set(table, [row])
      else list.push(row)
      if ('at' in row) this.cover(row.at, row.at)
      else this.cover(row.startedAt, 'stoppedAt' in row ? row.stoppedAt : row.endedAt)
    }
  }

  checkpoint(atMs: Instant, text: string): void {
    this.checkpoints.push({ atMs, text })
  }

  /** Everything known up to and with `throughMs` is as the fold says now. */
  async flush(throughMs: Instant): Promise<void> {
    if (this.replacing) {
      const gone = await deleteKnown(this.trx, this.systemId, this.flushedMs, throughMs)
      if (gone !== null) this.cover(gone.fromMs, gone.toMs)
      await deleteCheckpoints(this.trx, this.systemId, this.flushedMs, throughMs)
    }
    for (const table of DERIVED_TABLES) {
      await writeRows(this.trx, this.systemId, table, this.rows.get(table) ?? [])
    }
    await writeCheckpoints(this.trx, this.systemId, this.checkpoints)
    this.rows.clear()
    this.checkpoints = []
    this.flushedMs = throughMs
  }

  private cover(fromMs: Instant, toMs: Instant): void {
    this.span = {
      fromMs: Math.min(fromMs, this.span?.fromMs ?? Infinity),
      toMs: Math.max(toMs, this.span?.toMs ?? -Infinity),
    }
  }
}
