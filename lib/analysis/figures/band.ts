import { PA_PER_INHG } from '@/shared/units'
import { median, quantile } from '../statistics'
import type { FiguresInput } from './types'

export interface Band {
  cutOutPa: number | null
  cutInPa: number | null
  /** Relative doubt (one standard deviation) of their difference. */
  doubt: number
}

interface SwitchPoint {
  pa: number
  sigmaPa: number
}

/** A usual switch starts the pump about 2 inHg under its cut-out (common practice, no source). */
const USUAL_DIFFERENTIAL_PA = 2 * PA_PER_INHG
/** How sure each source is (judged): the switch's scatter, an installer's rounding, the ends of holds seen sparsely. */
const READING_SIGMA_PA = 0.016 * PA_PER_INHG
/** Without a pump channel the turning points lie between two samples. */
const TURNING_SIGMA_PA = 0.04 * PA_PER_INHG
const SET_SIGMA_PA = 0.031 * PA_PER_INHG
const SEEN_SIGMA_PA = 0.1 * PA_PER_INHG
const USUAL_SIGMA_PA = 0.24 * PA_PER_INHG
const FEWEST = 3

/**
 * Cut-out and cut-in: taught by the switch's own edges, else the installer's figures, else what the holds show
 * at their ends, else a usual differential under the cut-out. No vacuum and no figures: null.
 */
export function bandOf({ learned, settings, rows }: FiguresInput): Band {
  const holds = rows.holds.filter((hold) => !hold.setAside)
  const tops = holds.flatMap((hold) => hold.cutOutPa ?? [])
  const ends = holds.flatMap((hold) => (hold.ending === 'leak' ? (hold.endPa ?? []) : []))
  const edgeSigmaPa = Math.hypot(0.29 * learned.stepPa, settings.channels.pump ? 0 : TURNING_SIGMA_PA)
  const taughtSigma = (readings: number) =>
    Math.hypot(READING_SIGMA_PA / Math.sqrt(Math.max(1, readings)), edgeSigmaPa)
  const cutOut =
    point(learned.cutOutPa, taughtSigma(learned.readings.cutOut)) ??
    point(settings.cutOutPa, SET_SIGMA_PA) ??
    point(tops.length < FEWEST ? null : quantile(tops, 0.75), SEEN_SIGMA_PA)
  const cutIn =
    point(learned.cutInPa, taughtSigma(learned.readings.cutIn)) ??
    point(settings.cutInPa, SET_SIGMA_PA) ??
    point(ends.length < FEWEST ? null : median(ends), SEEN_SIGMA_PA) ??
    usualCutIn(cutOut, rows.legs)
  if (cutOut === null || cutIn === null) {
    return { cutOutPa: cutOut?.pa ?? null, cutInPa: cutIn?.pa ?? null, doubt: 0 }
  }
  const doubt = Math.hypot(cutOut.sigmaPa, cutIn.sigmaPa) / Math.max(1, cutOut.pa - cutIn.pa)
  return { cutOutPa: cutOut.pa, cutInPa: cutIn.pa, doubt: Math.min(0.5, doubt) }
}

function point(pa: number | null, sigmaPa: number): SwitchPoint | null {
  return pa === null ? null : { pa, sigmaPa }
}

/** A hold that went on below the usual cut-in shows that this switch starts later. */
function usualCutIn(cutOut: SwitchPoint | null, legs: FiguresInput['rows']['legs']): SwitchPoint | null {
  if (cutOut === null) return null
  const lowest = Math.min(cutOut.pa, ...legs.flatMap((leg) => leg.bins.vacuumPa.at(-1) ?? []))
  return { pa: Math.min(cutOut.pa - USUAL_DIFFERENTIAL_PA, lowest), sigmaPa: USUAL_SIGMA_PA }
}
