import {
  flushesKnown,
  holdsKnown,
  legsKnown,
  runsKnown,
  setUpAt,
  type FiguresSetUp,
} from '@/db/queries/record-rows'
import type { Trx } from '@/db/roles'
import {
  figuresInput,
  figuresOf,
  LEG_DAYS,
  LEG_LIMIT,
  RECORD_DAYS,
  type AboardWord,
  type Figures,
  type FiguresInput,
  type RecordRows,
} from '@/lib/analysis/figures'
import type { Instant } from '@/lib/analysis/fold'
import { statementAt } from '@/lib/figures/facts'
import { stateAt } from '@/lib/figures/state-at'

const DAY_MS = 86_400_000

/** Everything the figures of a system rest on, as known at `at`. */
export interface FiguresBasis {
  input: FiguresInput
  setUp: FiguresSetUp
  aboard: AboardWord
}

/**
 * Loads what the figures of a system are computed from, as known at `at`.
 * @param trx under the service's role: samples and checkpoints are read.
 * @returns null when there is no such system.
 */
export async function figuresBasis(trx: Trx, systemId: string, at: Instant): Promise<FiguresBasis | null> {
  const setUp = await setUpAt(trx, systemId, at)
  if (setUp === null) return null
  const { state, facts } = await stateAt(trx, systemId, at)
  const rows = await recordRowsAt(trx, systemId, at)
  const input = figuresInput(state, {
    at,
    rows,
    settings: { ...setUp, channels: channelsOf(setUp) },
    lastHeardAt: setUp.lastHeardMs,
  })
  // What was said since the last sample is in force as well, though the fold has not come to it yet.
  return { input: { ...input, statement: statementAt(facts, at) }, setUp, aboard: aboardAt(setUp, rows) }
}

/** The figures of a system as of `at`; null when there is no such system. */
export async function figuresAt(trx: Trx, systemId: string, at: Instant): Promise<Figures | null> {
  const basis = await figuresBasis(trx, systemId, at)
  return basis === null ? null : figuresOf(basis.input)
}

/** The rows that figures and outlook look back on, as known at `at`. */
export async function recordRowsAt(trx: Trx, systemId: string, at: Instant): Promise<RecordRows> {
  const span = { atMs: at, fromMs: at - RECORD_DAYS * DAY_MS }
  return {
    runs: await runsKnown(trx, systemId, span),
    holds: await holdsKnown(trx, systemId, span),
    flushes: await flushesKnown(trx, systemId, span),
    legs: await legsKnown(trx, systemId, { atMs: at, fromMs: at - LEG_DAYS * DAY_MS }, LEG_LIMIT),
  }
}

const channelsOf = ({ channels }: FiguresSetUp) => ({
  pump: channels.includes('pump'),
  vacuum: channels.includes('vacuum'),
})

/** Somebody flushed since 17:00 by the boat's clock: somebody is aboard. The owner's word goes before. */
function aboardAt(setUp: FiguresSetUp, rows: RecordRows): AboardWord {
  if (setUp.said !== null) return setUp.said
  return rows.flushes.some((flush) => flush.at >= setUp.eveningMs) ? 'aboard' : 'unknown'
}
