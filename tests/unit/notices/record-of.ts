import type { StoredHold, StoredRun } from '@/db/queries/record-rows'
import type { Figures } from '@/lib/analysis/figures'
import type { JudgedRecord } from '@/lib/notices/record'

export const NOW = Date.parse('2026-03-10T12:00:00Z')
export const MINUTE = 60_000
export const HOUR = 60 * MINUTE

const SIGNS = { ratePaPerSecond: null, rechargePaPerSecond: null, differentialPa: null, ratio: null }

/** Figures of a system that holds for hours and of which nothing else is known. */
export function figures(changes: Partial<Figures> = {}): Figures {
  return {
    at: NOW,
    state: 'tight',
    reason: 'holds 12 h',
    since: null,
    leakRate: null,
    holdTime: { seconds: 43_200, low: 40_000, high: 47_000, bound: null, holds: 3 },
    method: 'legs',
    cutOutPa: 33_864,
    settledPa: 33_300,
    cutInPa: 27_091,
    recharge: null,
    signs: { now: { ...SIGNS }, usual: { ...SIGNS } },
    cause: null,
    current: { at: NOW - MINUTE, vacuumPa: 30_000, pumpOn: false, holdSoFarSeconds: 60 },
    pump: null,
    lastHeardAt: NOW - MINUTE,
    rank: 1,
    model: null,
    ...changes,
  }
}

/** A record with nothing in it but what is said. */
export function record(
  changes: Partial<Omit<JudgedRecord, 'figures'>> & { figures?: Partial<Figures> } = {},
): JudgedRecord {
  return {
    now: NOW,
    settings: { limitSeconds: 10_800, cutOutPa: 33_864, cutInPa: 27_091, lowSupplyV: 11.8 },
    runs: [],
    holds: [],
    flushes: [],
    faults: [],
    supply: null,
    air: null,
    ...changes,
    figures: figures(changes.figures),
  }
}

/** Holds of these lengths in minutes, one after the other, the last just over; negative = ended by a flush. */
export function holdsOf(minutes: number[], until = NOW - 2 * MINUTE): StoredHold[] {
  let end = until
  return [...minutes]
    .reverse()
    .map((length) => {
      const hold: StoredHold = {
        startedAt: end - Math.abs(length) * MINUTE,
        endedAt: end,
        ending: length < 0 ? 'flush' : 'leak',
        flushes: 0,
        cutOutPa: 33_864,
        settledPa: 33_300,
        endPa: 27_091,
        learnedCutOutPa: null,
        learnedSettledPa: null,
        learnedCutInPa: null,
        setAside: false,
        edgeUncertaintySeconds: 1,
        knownAt: end,
      }
      end = hold.startedAt - MINUTE
      return hold
    })
    .reverse()
}

/** Runs with these recharge rates, Pa/s, the last one just over. */
export function runsOf(rates: (number | null)[]): StoredRun[] {
  return rates.map((rate, index) => {
    const stoppedAt = NOW - (rates.length - index) * HOUR
    return {
      startedAt: stoppedAt - MINUTE,
      stoppedAt,
      trigger: 'leak',
      vacuumAtStartPa: 27_091,
      vacuumAtStopPa: 33_864,
      rechargePaPerSecond: rate,
      supplyV: null,
      edgeUncertaintySeconds: 1,
      interrupted: false,
      knownAt: stoppedAt,
    }
  })
}
