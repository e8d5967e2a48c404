import { readFleet, readSeenVessels, type FleetSource } from '@/db/queries/fleet'
import { asIngest, asPerson } from '@/db/roles'
import { pageOf } from '@/lib/api/page-of'
import { movingWordSchema, type FleetRow, type HoldTime, type List, type State } from '@/shared/schemas'
import { z } from 'zod'
import { presentState } from './present-state'

/** Worst first: what wakes people, then what soon will, then what cannot be told, then what is well or set aside. */
const WORST_FIRST: State[] = [
  'running-on',
  'short-cycling',
  'leaking',
  'weeping',
  'off',
  'unheard',
  'learning',
  'tight',
  'worked-on',
  'laid-up',
]

/** Every system the person sees, worst first; `cursor` is the system after which the page begins. */
export async function listFleet(
  personId: string,
  page: { limit: number; cursor?: string | undefined; vessel?: string | undefined },
  now: Date,
): Promise<List<FleetRow>> {
  const seen = await asPerson(personId, readSeenVessels)
  const vesselIds = page.vessel === undefined ? seen.ids : seen.ids.filter((id) => id === page.vessel)
  const sources = await asIngest((trx) => readFleet(trx, now, vesselIds, seen.full))
  const rows = sources.map((source) => toRow(source, now)).sort(worstFirst)
  return pageOf(rows, page, (row) => row.systemId)
}

function toRow(source: FleetSource, now: Date): FleetRow {
  const { state, since } = presentState({
    state: source.state,
    since: source.sinceMs === null ? null : new Date(source.sinceMs),
    lastHeardAt: source.lastHeardAt,
    silenceSeconds: source.silenceSeconds,
    statement: source.statement && {
      value: source.statement.value,
      from: new Date(source.statement.from),
    },
    now,
  })
  return {
    vesselId: source.vesselId,
    systemId: source.systemId,
    name: source.name,
    systemName: source.systemName,
    harbour: source.harbour,
    berth: source.berth,
    timeZone: source.timeZone,
    utcOffsetSeconds: source.utcOffsetSeconds,
    state,
    since: since?.toISOString() ?? null,
    holdTime: source.holdTime && rounded(source.holdTime),
    limitSeconds: source.limitSeconds,
    aimSeconds: source.aimSeconds,
    moving: movingOf(source.moving),
    tonight: source.hasOutlook
      ? {
          chance: thousandth(source.chance),
          chanceIfFlushedLast: thousandth(source.chanceIfFlushedLast),
          expectedRuns: thousandth(source.expectedRuns),
        }
      : null,
    lastHeardAt: source.lastHeardAt?.toISOString() ?? null,
    openNotices: source.openNotices,
    nextVisitAt: source.nextVisitAt?.toISOString() ?? null,
    aboard: source.aboard,
  }
}

const storedMovingSchema = z.object({ word: movingWordSchema, since: z.number().nullable() })

/** How it moves, as the figures keep it; null where they don't say. */
function movingOf(stored: unknown): FleetRow['moving'] {
  const parsed = storedMovingSchema.safeParse(stored)
  if (!parsed.success) return null
  const { word, since } = parsed.data
  return { word, since: since === null ? null : new Date(since).toISOString() }
}

const rounded = (hold: HoldTime): HoldTime => ({
  seconds: Math.round(hold.seconds),
  low: hold.low === null ? null : Math.round(hold.low),
  high: hold.high === null ? null : Math.round(hold.high),
  bound: hold.bound,
  holds: hold.holds,
})
const thousandth = (value: number | null): number | null =>
  value === null ? null : Math.round(value * 1000) / 1000

/** Of two that are as bad, the one that wakes somebody comes first. */
const ashore = (row: FleetRow): number => (row.aboard === 'aboard' ? 0 : 1)

const worstFirst = (a: FleetRow, b: FleetRow): number =>
  WORST_FIRST.indexOf(a.state) - WORST_FIRST.indexOf(b.state) ||
  ashore(a) - ashore(b) ||
  (a.holdTime?.seconds ?? Infinity) - (b.holdTime?.seconds ?? Infinity) ||
  a.name.localeCompare(b.name) ||
  Number(a.systemId) - Number(b.systemId)
