import type { StoredFacts } from '@/db/queries/facts'
import { pageOfSamples, type SampleTuple } from '@/db/queries/samples'
import type { Trx } from '@/db/roles'
import type { FoldItem, Instant, Sample } from '@/lib/analysis/fold/types'
import { factItems } from '@/lib/figures/facts'

/** Samples read at once: a year of a quick logger is never in memory as a whole. */
const PAGE_SAMPLES = 10_000
/** The first page is short: most folds take one sample on, or end at the next checkpoint. */
const FIRST_PAGE_SAMPLES = 2_000

/**
 * The items of a system's fold with times in (afterMs, throughMs], page by page: its loggers' samples as stored,
 * corrected by calibration, with the dated facts before those of the same instant. Facts later than the last
 * sample are left for when a later sample comes, so that the head never runs ahead of what was measured.
 * @example for await (const items of foldItems(trx, await factsOf(trx, id), -Infinity, Infinity)) …
 */
export async function* foldItems(
  trx: Trx,
  stored: StoredFacts,
  afterMs: Instant,
  throughMs: Instant,
): AsyncGenerator<FoldItem[]> {
  const facts = factItems(stored).filter((item) => item.fact.at > afterMs)
  let nextFact = 0
  let pageSize = FIRST_PAGE_SAMPLES
  for (const fitting of stored.fittings) {
    const correct = corrector(stored, fitting.loggerId)
    const span = { beforeMs: Math.ceil(fitting.toMs), lastMs: throughMs }
    let fromMs = Math.max(Math.ceil(fitting.fromMs), afterMs + 1)
    for (;;) {
      if (fromMs > throughMs || fromMs >= fitting.toMs) break
      const rows = await pageOfSamples(trx, fitting.loggerId, { ...span, fromMs }, pageSize)
      const items: FoldItem[] = []
      for (const row of rows) {
        let fact = facts[nextFact]
        while (fact !== undefined && fact.fact.at <= row[0]) {
          items.push(fact)
          nextFact += 1
          fact = facts[nextFact]
        }
        items.push({ type: 'sample', sample: correct(row) })
        fromMs = row[0] + 1
      }
      if (items.length > 0) yield items
      if (rows.length < pageSize) break
      pageSize = PAGE_SAMPLES
    }
  }
}

/** A logger's samples as the fold takes them: vacuum corrected by the calibration in force at their time. */
export function corrector(stored: StoredFacts, loggerId: string): (row: SampleTuple) => Sample {
  const calibrations = stored.calibrations.filter((entry) => entry.loggerId === loggerId)
  let next = 0
  let offsetPa = 0
  let gain = 1
  return ([at, vacuumPa, pumpOn, airC, barometerPa, supplyV]) => {
    let calibration = calibrations[next]
    while (calibration !== undefined && calibration.fromMs <= at) {
      offsetPa = calibration.vacuumOffsetPa
      gain = calibration.vacuumGain
      next += 1
      calibration = calibrations[next]
    }
    const vacuum = vacuumPa === null ? null : (vacuumPa - offsetPa) * gain
    return { at, vacuumPa: vacuum, pumpOn, airC, barometerPa, supplyV }
  }
}
