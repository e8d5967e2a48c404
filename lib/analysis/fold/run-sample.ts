import { CLOSE_SAMPLES_MS, FLUSH_PA, INHG, SECOND, START_FALL_PA } from './constants'
import { noiseFloorPa, pushFlush } from './fall'
import { learnedCutInPa, ringMedian } from './rings'
import { LEAK_MARGIN } from './run-start'
import type { FoldState, OpenRun } from './state'
import type { Instant, Row } from './types'

/** Less than this is no rise. */
const RISING_PA = 0.02 * INHG

/** Takes in a sample while the pump is on. */
export function runSample(
  state: FoldState,
  run: OpenRun,
  at: Instant,
  vacuumPa: number | null,
  supplyV: number | null,
  rows: Row[],
): void {
  run.setAside ||= state.statement !== null
  if (supplyV !== null) run.supplyV = supplyV + 0
  if (vacuumPa === null) return
  followCrossing(state, run, at, vacuumPa)
  if (run.risingPa === null || Math.abs(vacuumPa - run.risingPa) > Math.max(RISING_PA, 3 * state.sigmaPa)) {
    run.risingAt = at
    run.risingPa = vacuumPa
  }
  if (run.topPa === null) {
    noteLateStart(state, run, at, vacuumPa)
    run.lowPa = vacuumPa
    raiseTop(run, at, vacuumPa)
  } else if (run.fall !== null) followFall(state, run, run.fall, at, vacuumPa, rows)
  else if (vacuumPa > run.topPa) {
    raiseTop(run, at, vacuumPa)
    run.onCurve ||= isOnCurve(state, run, at, vacuumPa)
  } else if (run.topPa - vacuumPa > Math.max(START_FALL_PA, noiseFloorPa(state))) {
    const rose = run.lowPa !== null && run.topPa - run.lowPa > Math.max(0.04 * INHG, 3 * state.sigmaPa)
    if (rose) {
      run.fellMidRun = true
      run.fall = { at, fromPa: run.topPa, lowPa: vacuumPa }
    } else {
      run.lowPa = vacuumPa
      raiseTop(run, at, vacuumPa)
    }
  } else if (run.lowPa !== null && vacuumPa < run.lowPa) run.lowPa = vacuumPa
}

/** An edge record without the vacuum: the first reading of the run shows at least so much of the fall. */
function noteLateStart(state: FoldState, run: OpenRun, at: Instant, vacuumPa: number): void {
  if (!run.startSeen || run.beforePa === null) return
  const seconds = (at - run.startedAt + run.startSpacingMs) / SECOND
  run.fallPa = run.beforePa - vacuumPa - LEAK_MARGIN * state.slopePaPerSecond * seconds
}

function raiseTop(run: OpenRun, at: Instant, vacuumPa: number): void {
  run.topPa = vacuumPa
  run.topAt = at
}

/** A flush during the run: it is over when the vacuum rises again. */
function followFall(
  state: FoldState,
  run: OpenRun,
  fall: { at: Instant; fromPa: number; lowPa: number },
  at: Instant,
  vacuumPa: number,
  rows: Row[],
): void {
  if (vacuumPa < fall.lowPa) {
    fall.lowPa = vacuumPa
    return
  }
  endRunFall(state, run, at, rows)
  raiseTop(run, at, vacuumPa)
}

/** Writes the flush that fell during the run, if one did. */
export function endRunFall(state: FoldState, run: OpenRun, knownAt: Instant, rows: Row[]): void {
  const { fall } = run
  run.fall = null
  if (fall === null) return
  const dropPa = fall.fromPa - fall.lowPa
  if (dropPa >= FLUSH_PA) pushFlush(state, { at: fall.at, dropPa, startedPump: false, knownAt }, rows)
}

/** Risen from its start as fast as this pump does it. */
function isOnCurve(state: FoldState, run: OpenRun, at: Instant, vacuumPa: number): boolean {
  const usual = ringMedian(state.rings.rechargePaPerSecond)
  const seconds = (at - run.startedAt) / SECOND
  if (usual === null || run.startPa === null || seconds < 3) return false
  const expectedPa = 0.92 * usual * seconds
  return expectedPa > 0.15 * INHG && run.startPa + expectedPa - vacuumPa <= 0.12 * INHG
}

function followCrossing(state: FoldState, run: OpenRun, at: Instant, vacuumPa: number): void {
  const cutIn = learnedCutInPa(state)
  if (vacuumPa < cutIn) {
    run.underAt = at
    run.underPa = vacuumPa
    run.crossedAt = null
  } else if (run.crossedAt === null && run.underAt !== null && run.underPa !== null) {
    const share = (cutIn - run.underPa) / (vacuumPa - run.underPa)
    if (at - run.underAt <= CLOSE_SAMPLES_MS) run.crossedAt = run.underAt + share * (at - run.underAt)
    else run.underAt = null
  }
}
