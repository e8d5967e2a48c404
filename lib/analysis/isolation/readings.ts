import { compensatedPressurePa, laminarDrive } from '@/lib/analysis/gas'
import { GAUGE_RESOLUTION_PA } from '@/lib/analysis/leak-down'
import { median } from '@/lib/analysis/statistics'
import { STANDARD_PRESSURE_PA } from '@/shared/units'
import type { IsolationPart, IsolationTest } from './types'

/** One test as an equation: the flows of its parts together are `flow`, give or take `sigma` (Pa·m³/s). */
export type Reading = {
  keys: ReadonlySet<string>
  flow: number
  sigma: number
  /** The vacuum was used up before the second reading: the flow is at least this. */
  isBound: boolean
  volumeM3: number
  resolutionPa: number
  seconds: number
}

/** Stopwatch and eye, s. */
const TIMING_SIGMA_SECONDS = 1
/** Volumes, fittings and all else that is not the gauge, relative (judged). */
const FLOOR = 0.03

/** Gas volume of some parts, m³. Throws a RangeError for a key that is not a part, or where there is no gas. */
export function volumeOf(parts: readonly IsolationPart[], keys: Iterable<string>): number {
  let volumeM3 = 0
  for (const key of keys) {
    const part = parts.find((candidate) => candidate.key === key)
    if (part === undefined) throw new RangeError(`no part "${key}"`)
    volumeM3 += part.volumeM3
  }
  if (!(volumeM3 > 0)) throw new RangeError('a test needs parts with a gas volume')
  return volumeM3
}

/**
 * Tests as equations V(S)·rate = sum of flows, corrected for temperature and barometer where measured.
 * A leak slows as the vacuum falls, by how much depends on its kind: readings are brought to the middle
 * vacuum of all tests by half of what a laminar leak would change, the rest being doubt.
 * Throws a RangeError for an impossible test.
 */
export function readTests(parts: readonly IsolationPart[], tests: readonly IsolationTest[]): Reading[] {
  const referencePa = median(tests.map(middleVacuumPa)) ?? 0
  return tests.map((test) => readTest(parts, test, referencePa))
}

const middleVacuumPa = (test: IsolationTest) => (test.startPa + test.endPa) / 2

function readTest(parts: readonly IsolationPart[], test: IsolationTest, referencePa: number): Reading {
  const keys = new Set(test.parts)
  const volumeM3 = volumeOf(parts, keys)
  if (!(test.seconds > 0) || !(test.startPa > 0))
    throw new RangeError('a test starts with vacuum and takes time')
  const resolutionPa = test.resolutionPa ?? GAUGE_RESOLUTION_PA.digital
  const isBound = test.endPa <= resolutionPa
  const rise = correctedRisePa(test)
  const scale = isBound ? { factor: 1, doubt: 0 } : vacuumScale(test, referencePa)
  const flow = ((volumeM3 * rise.pa) / test.seconds) * scale.factor
  // Two readings, each off by up to half a step either way.
  const gaugeSigma = (volumeM3 * Math.hypot(resolutionPa / Math.sqrt(6), rise.sigmaPa)) / test.seconds
  const relative = Math.hypot(FLOOR, scale.doubt, TIMING_SIGMA_SECONDS / test.seconds)
  return {
    keys,
    flow,
    sigma: Math.hypot(scale.factor * gaugeSigma, relative * flow),
    isBound,
    volumeM3,
    resolutionPa,
    seconds: test.seconds,
  }
}

function correctedRisePa(test: IsolationTest): { pa: number; sigmaPa: number } {
  const rise = (vapourFraction: number) => {
    const both = test.barometerStartPa !== undefined && test.barometerEndPa !== undefined
    const air = test.airStartCel !== undefined && test.airEndCel !== undefined
    const at = (vacuumPa: number, barometerPa?: number, airCel?: number) =>
      compensatedPressurePa(
        { vacuumPa, barometerPa: both ? barometerPa : null, gasTempC: air ? airCel : null },
        { vapourFraction },
      )
    return (
      at(test.endPa, test.barometerEndPa, test.airEndCel) -
      at(test.startPa, test.barometerStartPa, test.airStartCel)
    )
  }
  // Vapour anywhere from none to saturated: a uniform doubt.
  return { pa: rise(0.5), sigmaPa: Math.abs(rise(1) - rise(0)) / Math.sqrt(12) }
}

/**
 * What a test's mean flow is multiplied by to stand for the middle vacuum of all tests, and how doubtful that
 * is: anything from one (a leak that does not slow) to a laminar leak's, whose mean is over a vacuum that
 * decays by its own share. A test that nearly fell to nought comes near to a bound.
 */
function vacuumScale(test: IsolationTest, referencePa: number): { factor: number; doubt: number } {
  const drive = (pa: number) => laminarDrive(STANDARD_PRESSURE_PA, STANDARD_PRESSURE_PA - pa)
  const { startPa, endPa } = test
  const falls = endPa > 0 && endPa < startPa
  const decayingPa = falls ? (startPa - endPa) / Math.log(startPa / endPa) : middleVacuumPa(test)
  const laminar = referencePa > 0 ? drive(referencePa) / drive(decayingPa) : 1
  const factor = (1 + laminar) / 2
  return { factor, doubt: Math.abs(laminar - 1) / Math.sqrt(12) / factor }
}
