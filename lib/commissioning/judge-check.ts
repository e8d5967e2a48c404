import { readLoggerHeard, type CommissioningRow } from '@/db/queries/commissioning'
import type { Trx } from '@/db/roles'
import { DEFAULT_DIFFERENTIAL_PA, GAUGE_RESOLUTION_PA } from '@/lib/analysis/leak-down'
import { summaryAt } from '@/lib/figures'
import { Problem } from '@/lib/problem'
import type { CheckKind, StepCheck } from '@/shared/schemas'
import { inHgToPa } from '@/shared/units'
import { judgeBreakerOff } from './checks/breaker-off'
import { judgeFirstReading } from './checks/first-reading'
import { judgeLeakDownAfter, judgeLeakDownBefore, type RateInterval } from './checks/leak-down'
import { judgePumpChannel } from './checks/pump-channel'
import { judgeTwoPoint, type Correction } from './checks/two-point'
import type { Judged } from './checks/types'
import { judgeZero } from './checks/zero'
import { lastDone } from './on-wire'
import { channelsSeen, readingsSince, runsSince } from './seen'

export interface Concluded extends Judged {
  /** It can still become clear by waiting: the check goes on from where it began. */
  keepsOpen: boolean
  /** To be written as a calibration, from the nought's check on. */
  correction: Correction | null
  correctFrom: Date | null
  /** Kept beside what was given, for a later check. */
  keeps: Record<string, unknown>
}

interface Asked {
  kind: CheckKind
  began: Date
  step: Extract<StepCheck, { step: 'done' }>
  now: Date
}

/** Common practice, no source: where the pump starts when nobody said it. */
const USUAL_CUT_OUT_PA = inHgToPa(10)

const plain = (judged: Judged): Concluded => ({
  ...judged,
  keepsOpen: true,
  correction: null,
  correctFrom: null,
  keeps: {},
})

/**
 * The verdict of a check from what was sent since it began.
 * @param trx under the service's role: samples are read
 * @throws Problem `invalid` when a reading of the hand gauge is missing
 */
export async function judgeCheck(trx: Trx, row: CommissioningRow, asked: Asked): Promise<Concluded> {
  const { kind, step, began, now } = asked
  const { system, logger } = row
  if (system === null) throw new Problem('conflict', 'Choose the boat and its system first.')
  const differentialPa =
    system.cutOutPa !== null && system.cutInPa !== null ? system.cutOutPa - system.cutInPa : null

  if (kind === 'leak-down-before') {
    if (step.leakDown === undefined) throw missing('leakDown', 'the two readings and the time between them')
    const resolutionPa = step.resolutionPa ?? GAUGE_RESOLUTION_PA.dial
    const { rate, ...judged } = judgeLeakDownBefore({
      ...step.leakDown,
      resolutionPa,
      differentialPa,
      limitSeconds: system.limitSeconds,
    })
    return { ...plain(judged), keeps: { rate } }
  }
  if (logger === null) throw new Problem('conflict', 'Fit the logger first: the check reads what it sends.')
  const hasVacuum = logger.channels.includes('vacuum')
  // What came before the step was opened counts as heard; what the logger sent from another boat does not.
  const since = kind === 'first-reading' ? (row.fittedAt ?? began) : began
  const { raw, corrected } = await readingsSince(trx, logger.id, since, now)
  const runs = await runsSince(trx, system.id, began, now)
  const beganMs = began.getTime()

  switch (kind) {
    case 'first-reading': {
      const heard = await readLoggerHeard(trx, logger.id)
      const samples = raw.length
      const { clockOffsetSeconds } = heard
      return plain(
        judgeFirstReading({
          channels: logger.channels,
          seen: channelsSeen(raw),
          samples,
          clockOffsetSeconds,
        }),
      )
    }
    case 'zero': {
      const judged = judgeZero(raw, beganMs)
      return { ...plain(judged), keeps: { zeroPa: judged.figures[0]?.value ?? null } }
    }
    case 'two-point': {
      if (step.gaugePa === undefined) throw missing('gaugePa', 'what the hand gauge reads')
      const zero = lastDone(row.checks, 'zero')
      const zeroPa = zero?.outcome === 'passed' ? numberIn(zero.given, 'zeroPa') : null
      const { correction, ...judged } = judgeTwoPoint({
        readings: raw,
        nowMs: now.getTime(),
        freshSeconds: Math.max(90, logger.intervalSeconds + 30),
        zeroPa,
        gaugePa: step.gaugePa,
        resolutionPa: step.resolutionPa ?? GAUGE_RESOLUTION_PA.dial,
      })
      const correctFrom = zero === undefined ? null : new Date(zero.beganAt)
      return { ...plain(judged), correction, correctFrom }
    }
    case 'pump-channel':
      return plain(judgePumpChannel(runs, raw, { hasVacuum }))
    case 'breaker-off':
      return plain(
        judgeBreakerOff({
          readings: corrected,
          runs,
          beganMs,
          nowMs: now.getTime(),
          intervalSeconds: logger.intervalSeconds,
          cutInPa: hasVacuum ? await cutInOf(trx, system, now) : null,
        }),
      )
    case 'leak-down-after': {
      const before = lastDone(row.checks, 'leak-down-before')
      const judged = judgeLeakDownAfter({
        readings: corrected,
        runs,
        beganMs,
        before: before?.outcome === 'passed' ? rateIn(before.given) : null,
        differentialPa,
        limitSeconds: system.limitSeconds,
      })
      return plain(judged)
    }
  }
}

/** As learned, else as set up, else the usual. */
async function cutInOf(
  trx: Trx,
  system: NonNullable<CommissioningRow['system']>,
  now: Date,
): Promise<number> {
  const learned = await summaryAt(trx, system.id, now.getTime())
  return system.cutInPa ?? learned?.cutInPa ?? (system.cutOutPa ?? USUAL_CUT_OUT_PA) - DEFAULT_DIFFERENTIAL_PA
}

const missing = (path: string, what: string): Problem =>
  new Problem('invalid', `Enter ${what}.`, { extensions: { errors: [{ path, message: 'is missing' }] } })

function numberIn(given: Record<string, unknown>, key: string): number | null {
  const value = given[key]
  return typeof value === 'number' ? value : null
}

function rateIn(given: Record<string, unknown>): RateInterval | null {
  const rate = given.rate
  if (typeof rate !== 'object' || rate === null) return null
  const figures = new Map(Object.entries(rate))
  const [paPerHour, low, high] = ['paPerHour', 'low', 'high'].map((key) => figures.get(key))
  return typeof paPerHour === 'number' && typeof low === 'number' && typeof high === 'number'
    ? { paPerHour, low, high }
    : null
}
