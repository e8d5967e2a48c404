import { holdSecondsOf, ratePaPerHourAt, type LeakModel } from '../fit'
import type { CurrentReading } from '../figures/types'
import type { Instant, OpenRows } from '../fold/types'

const POINTS = 33

/** How far into a hold the vacuum is, in seconds of steady decay since the settled top. */
export interface PhaseScale {
  holdSeconds: number
  /** Null where no vacuum is known: phase then comes from the clock alone. */
  ofVacuum: ((vacuumPa: number) => number) | null
  vacuumAt: ((phaseSeconds: number) => number) | null
  /** Mean rate over the hold, Pa/s; null where unknown. */
  ratePaPerSecond: number | null
}

/** The scale of one boat's holds from its model. Linear in pressure where the law is not known. */
export function phaseScale(model: LeakModel): PhaseScale {
  const topPa = model.settledPa ?? model.cutOutPa
  const { cutInPa, law } = model
  const holdSeconds = model.observedHoldSeconds
  if (topPa === null || cutInPa === null || !(topPa > cutInPa)) {
    return { holdSeconds, ofVacuum: null, vacuumAt: null, ratePaPerSecond: null }
  }
  const spanPa = topPa - cutInPa
  const vacua = Array.from({ length: POINTS }, (_, i) => topPa - (spanPa * i) / (POINTS - 1))
  const leaks = law !== null && ratePaPerHourAt(law, cutInPa) > 0
  const whole = leaks ? holdSecondsOf(law, topPa, cutInPa) : 1
  const phases = vacua.map((vacuumPa, i) =>
    leaks ? (holdSecondsOf(law, topPa, vacuumPa) / whole) * holdSeconds : (holdSeconds * i) / (POINTS - 1),
  )
  const position = (vacuumPa: number) => ((topPa - vacuumPa) / spanPa) * (POINTS - 1)
  return {
    holdSeconds,
    ratePaPerSecond: spanPa / holdSeconds,
    ofVacuum: (vacuumPa) => interpolate(phases, position(vacuumPa)),
    vacuumAt: (phase) => {
      const at = phases.findIndex((each) => each > phase)
      if (at <= 0) return at === 0 ? topPa : cutInPa
      const before = phases[at - 1] ?? 0
      const share = (phase - before) / ((phases[at] ?? 1) - before)
      return topPa - (spanPa * (at - 1 + share)) / (POINTS - 1)
    },
  }
}

/** Linear between points and on beyond the last; nought before the first. */
function interpolate(values: readonly number[], position: number): number {
  if (position <= 0) return 0
  const at = Math.min(values.length - 2, Math.floor(position))
  const before = values[at] ?? 0
  return before + ((values[at + 1] ?? before) - before) * (position - at)
}

export interface PhaseNow {
  at: Instant
  /** Seconds of steady decay since the settled top. */
  phaseSeconds: number
  /** How sure that is, s (one standard deviation). */
  sigmaSeconds: number
}

/**
 * Where the hold stands: from the vacuum of the open leg's last half hour (a coarse gauge is averaged over its
 * steps), else from the last reading, else from when the hold began. With the pump on a hold is about to begin.
 * Null where nothing says.
 */
export function phaseNow(scale: PhaseScale, open: OpenRows, current: CurrentReading | null): PhaseNow | null {
  if (open.run !== null || current?.pumpOn === true) {
    return current === null
      ? null
      : { at: current.at, phaseSeconds: 0, sigmaSeconds: 0.01 * scale.holdSeconds }
  }
  const { ofVacuum } = scale
  const noise = 0.006 * scale.holdSeconds
  if (ofVacuum !== null && open.leg !== null) {
    const { offsetSeconds, vacuumPa } = open.leg.bins
    const lastSeconds = offsetSeconds.at(-1) ?? 0
    const reach = Math.min(1800, 0.1 * scale.holdSeconds)
    const near = offsetSeconds.flatMap((offset, i) => (offset >= lastSeconds - reach ? [i] : []))
    if (near.length >= 2) {
      const mean = (values: readonly number[]) =>
        near.reduce((sum, i) => sum + (values[i] ?? 0), 0) / near.length
      const at = open.leg.startedAt + lastSeconds * 1000
      const behind = lastSeconds - mean(offsetSeconds)
      return { at, phaseSeconds: ofVacuum(mean(vacuumPa)) + behind, sigmaSeconds: noise }
    }
  }
  if (ofVacuum !== null && current !== null && current.vacuumPa !== null) {
    return { at: current.at, phaseSeconds: ofVacuum(current.vacuumPa), sigmaSeconds: 2 * noise }
  }
  if (open.hold !== null && current !== null && ofVacuum === null) {
    const elapsed = Math.max(0, (current.at - open.hold.startedAt) / 1000)
    return { at: current.at, phaseSeconds: elapsed, sigmaSeconds: noise }
  }
  return null
}
