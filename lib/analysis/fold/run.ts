import { CLOSE_SAMPLES_MS, FALL_WINDOW_MS, FLUSH_PA, INHG, RING_ENOUGH, SECOND } from './constants'
import { fallPa, noiseFloorPa, pushFlush } from './fall'
import { endHold, offLinePa, openHold, pushHold } from './hold'
import { leakSlope } from './leg'
import { learnedCutInPa, learnedCutOutPa, pushRing, ringMedian } from './rings'
import type { EndedHold, FoldState, OpenRun } from './state'
import { decideTrigger } from './trigger'
import type { Ending, Instant, Row, Trigger } from './types'

export interface Start {
  at: Instant
  seen: boolean
  startPa: number | null
  spacingMs: number
  edgeUncertaintySeconds: number
  /** Time of the item that shows it. */
  knownAt: Instant
}

/** The pump was seen to start (or found running): ends the hold, begins a run. */
export function startRun(state: FoldState, start: Start, rows: Row[]): void {
  const { hold, fall } = state
  const beforePa = fall?.fromPa ?? hold?.lastPa ?? null
  let sudden: number | null = null
  if (start.seen && start.startPa !== null && beforePa !== null) {
    const beforeAt = fall?.fromAt ?? hold?.lastAt ?? start.at
    const slope = fall?.slopePaPerSecond ?? leakSlope(state)
    sudden = beforePa - start.startPa - 1.2 * slope * ((start.at - beforeAt) / SECOND)
    if (fall !== null) sudden = Math.max(sudden, fallPa(fall))
  }
  const line = offLinePa(state)
  const isLow = start.startPa !== null && start.startPa < line
  const fellSuddenly = sudden !== null && sudden > Math.max(FLUSH_PA, noiseFloorPa(state))
  const wasLow =
    state.offSince !== null || (isLow && (state.lowSince !== null || hold === null || !start.seen))
  const fromOff = wasLow && !(fellSuddenly && state.offSince === null)
  if (fromOff && state.lowSince === null && hold !== null && isLow) state.lowSince = start.at
  endHold(state, start.at, start.startPa, start.knownAt, rows)
  state.offSince = null
  state.turn = null
  state.run = {
    startedAt: start.at,
    startSeen: start.seen,
    startPa: start.startPa,
    fallPa: sudden,
    beforePa,
    fromOff,
    setAside: state.statement !== null,
    startSpacingMs: start.spacingMs,
    edgeUncertaintySeconds: start.edgeUncertaintySeconds,
    lowPa: start.startPa,
    topPa: start.startPa,
    topAt: start.startPa === null ? null : start.at,
    underAt: null,
    underPa: null,
    crossedAt: null,
    risingAt: start.at,
    supplyV: null,
  }
}

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
  if (supplyV !== null) run.supplyV = supplyV
  if (vacuumPa === null) return
  const early = at - run.startedAt <= FALL_WINDOW_MS
  if (run.lowPa === null || (early && vacuumPa < run.lowPa)) run.lowPa = vacuumPa
  followCrossing(state, run, at, vacuumPa)
  if (run.topPa === null || vacuumPa > run.topPa) {
    if (run.topPa === null || vacuumPa > run.topPa + state.sigmaPa) run.risingAt = at
    run.topPa = vacuumPa
    run.topAt = at
  } else if (!early && run.topPa - vacuumPa > Math.max(FLUSH_PA, noiseFloorPa(state))) {
    pushFlush(state, { at, dropPa: run.topPa - vacuumPa, startedPump: false, knownAt: at }, rows)
    run.topPa = vacuumPa
    run.topAt = at
  } else if (early && run.topPa - vacuumPa > START_TOP_RESET_PA) {
    run.topPa = vacuumPa
    run.topAt = at
  }
}

/** A flush that goes on after the start takes the top with it. */
const START_TOP_RESET_PA = 0.15 * INHG

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

export interface Stop {
  at: Instant
  stopPa: number | null
  spacingMs: number
  edgeUncertaintySeconds: number
  knownAt: Instant
}

/** The pump was seen to stop: settles what began the run, teaches the rings, begins a hold. */
export function stopRun(state: FoldState, stop: Stop, rows: Row[]): void {
  const { run, ended } = state
  if (run === null) return
  const seconds = (stop.at - run.startedAt) / SECOND
  const uncertainty = Math.max(run.edgeUncertaintySeconds, stop.edgeUncertaintySeconds)
  const { trigger, byLength } = decideTrigger(state, run, { seconds, uncertaintySeconds: uncertainty })
  const peakPa = peakOf(run, stop.stopPa)
  const recharge = trigger === 'unknown' && !run.startSeen ? null : rechargeOf(state, run, stop, peakPa)
  if (ended !== null) pushEnded(state, ended, run, trigger, uncertainty, stop.knownAt, rows)
  rows.push({
    table: 'run',
    row: {
      startedAt: run.startedAt,
      stoppedAt: stop.at,
      trigger,
      vacuumAtStartPa: run.startPa,
      vacuumAtStopPa: peakPa,
      rechargePaPerSecond: recharge,
      supplyV: run.supplyV,
      edgeUncertaintySeconds: uncertainty,
      interrupted: false,
      knownAt: stop.knownAt,
    },
  })
  pushStartFlush(state, run, trigger, seconds, peakPa, stop.knownAt, rows)
  if (!run.setAside) learnFromRun(state, run, stop, { trigger, byLength, seconds, peakPa, recharge })
  state.run = null
  state.ended = null
  const depth = peakPa === null || run.lowPa === null ? 0 : peakPa - run.lowPa
  const usualDepth = learnedCutOutPa(state) - learnedCutInPa(state)
  const deep = run.fromOff || depth > 1.6 * usualDepth
  if (state.settings.kind !== 'on-demand') {
    openHold(state, stop.at, {
      seen: true,
      peakPa,
      deep,
      edgeUncertaintySeconds: stop.edgeUncertaintySeconds,
    })
  }
}

/** Missing data ends a run at the last sample before it. */
export function interruptRun(state: FoldState, lastAt: Instant, knownAt: Instant, rows: Row[]): void {
  const { run, ended } = state
  if (run === null) return
  const { trigger } = decideTrigger(state, run, { seconds: null, uncertaintySeconds: 0 })
  if (ended !== null) pushEnded(state, ended, run, trigger, run.edgeUncertaintySeconds, knownAt, rows)
  rows.push({
    table: 'run',
    row: {
      startedAt: run.startedAt,
      stoppedAt: Math.max(lastAt, run.startedAt),
      trigger,
      vacuumAtStartPa: run.startPa,
      vacuumAtStopPa: run.topPa,
      rechargePaPerSecond: null,
      supplyV: run.supplyV,
      edgeUncertaintySeconds: run.edgeUncertaintySeconds,
      interrupted: true,
      knownAt,
    },
  })
  pushStartFlush(state, run, trigger, null, null, knownAt, rows)
  state.run = null
  state.ended = null
}

function pushEnded(
  state: FoldState,
  ended: EndedHold,
  run: OpenRun,
  trigger: Trigger,
  uncertainty: number,
  knownAt: Instant,
  rows: Row[],
): void {
  const whole = {
    ...ended,
    edgeUncertaintySeconds: Math.max(ended.edgeUncertaintySeconds, run.edgeUncertaintySeconds),
  }
  void uncertainty
  pushHold(state, whole, endingOf(ended, run, trigger), knownAt, rows)
}

function endingOf(ended: EndedHold, run: OpenRun, trigger: Trigger): Ending {
  if (!ended.startSeen || trigger === 'startup') return 'interrupted'
  const hasVacuum = run.startPa !== null || run.fallPa !== null || run.topPa !== null
  return hasVacuum ? trigger : 'unknown'
}

function peakOf(run: OpenRun, stopPa: number | null): number | null {
  if (run.topPa === null) return stopPa
  return stopPa === null ? run.topPa : Math.max(run.topPa, stopPa)
}

/** Rise over the band between cut-in and cut-out by the time it took, Pa/s; null where it cannot be told. */
function rechargeOf(state: FoldState, run: OpenRun, stop: Stop, peakPa: number | null): number | null {
  if (peakPa === null || stop.spacingMs > CLOSE_SAMPLES_MS) {
    if (peakPa === null || stop.edgeUncertaintySeconds > 2) return null
  }
  const cutIn = learnedCutInPa(state)
  let from: number | null = null
  let fromPa = cutIn
  if (run.crossedAt !== null) from = run.crossedAt
  else if (
    run.startPa !== null &&
    run.edgeUncertaintySeconds <= 15 &&
    Math.abs(run.startPa - cutIn) < 0.4 * INHG
  ) {
    if (run.lowPa !== null && run.startPa - run.lowPa > START_TOP_RESET_PA) return null
    from = run.startedAt
    fromPa = run.startPa
  }
  if (from === null || stop.at - from < 3 * SECOND || peakPa - fromPa < 0.3 * INHG) return null
  return Math.round(((peakPa - fromPa) / ((stop.at - from) / SECOND)) * 100) / 100
}

/** The flush that started a run; its drop from what was seen, or from how much the pump had to restore. */
function pushStartFlush(
  state: FoldState,
  run: OpenRun,
  trigger: Trigger,
  seconds: number | null,
  peakPa: number | null,
  knownAt: Instant,
  rows: Row[],
): void {
  if (trigger !== 'flush') return
  const seen = run.beforePa !== null && run.lowPa !== null ? run.beforePa - run.lowPa : 0
  const usual = ringMedian(state.rings.rechargePaPerSecond)
  const restored =
    usual !== null && seconds !== null && peakPa !== null && run.beforePa !== null
      ? run.beforePa - (peakPa - usual * seconds)
      : 0
  const dropPa = Math.max(seen, restored, run.fallPa ?? 0, 0)
  pushFlush(state, { at: run.startedAt, dropPa, startedPump: true, knownAt }, rows)
}

function learnFromRun(
  state: FoldState,
  run: OpenRun,
  stop: Stop,
  seen: {
    trigger: Trigger
    byLength: boolean
    seconds: number
    peakPa: number | null
    recharge: number | null
  },
): void {
  const { rings } = state
  const stopIsClose = stop.spacingMs <= CLOSE_SAMPLES_MS || stop.edgeUncertaintySeconds <= 1
  if (seen.peakPa !== null && stopIsClose) pushRing(rings.cutOutPa, seen.peakPa)
  if (seen.recharge !== null) pushRing(rings.rechargePaPerSecond, seen.recharge)
  const startIsClose = run.startSpacingMs <= CLOSE_SAMPLES_MS
  if (run.startSeen && seen.trigger === 'leak' && startIsClose && run.startPa !== null) {
    pushRing(rings.cutInPa, run.startPa)
  }
  if (run.fromOff && run.startSeen && run.startPa !== null) learnLowStart(state, run.startPa)
  if (run.startPa === null || (seen.trigger === 'leak' && !seen.byLength)) {
    if (run.startSeen) pushRing(rings.runSeconds, seen.seconds)
    rings.longRunSeconds = []
  } else if (seen.byLength) learnLongRun(state, seen.seconds)
}

/** A breaker restarts anywhere, a switch at one level: five starts in a row alike are the switch moved. */
function learnLowStart(state: FoldState, startPa: number): void {
  const { rings } = state
  pushRing(rings.lowStartPa, startPa, RING_ENOUGH)
  if (rings.lowStartPa.length < RING_ENOUGH) return
  if (Math.max(...rings.lowStartPa) - Math.min(...rings.lowStartPa) > 0.2 * INHG) return
  rings.cutInPa = rings.lowStartPa
  rings.lowStartPa = []
}

/** Flushes differ in length: five over-long runs in a row alike are a slower pump. */
function learnLongRun(state: FoldState, seconds: number): void {
  const { rings } = state
  pushRing(rings.longRunSeconds, seconds, RING_ENOUGH)
  if (rings.longRunSeconds.length < RING_ENOUGH) return
  if (Math.max(...rings.longRunSeconds) > 1.08 * Math.min(...rings.longRunSeconds)) return
  rings.runSeconds = rings.longRunSeconds
  rings.longRunSeconds = []
}
