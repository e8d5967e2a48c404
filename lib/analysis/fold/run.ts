import { CLOSE_SAMPLES_MS, FLUSH_PA, INHG, MINUTE, RING_ENOUGH, SECOND, START_FALL_PA } from './constants'
import { fallPa, noiseFloorPa, pushFlush, settleFall, settlingPa } from './fall'
import { endHold, offLinePa, openHold, pushHold } from './hold'
import { leakSlope } from './leg'
import { learnedCutInPa, learnedCutOutPa, pushRing, ringMedian } from './rings'
import type { EndedHold, FoldState, OpenRun } from './state'
import { decideTrigger, isOverLong, type Decision } from './trigger'
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
  settleEarlierFall(state, start, rows)
  const { hold } = state
  const before = vacuumBefore(state)
  const beforePa = before?.pa ?? null
  const sudden = start.seen ? suddenFallPa(state, start, before) : null
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
    fall: null,
    fellMidRun: false,
    onCurve: false,
    topPa: start.startPa,
    topAt: start.startPa === null ? null : start.at,
    underAt: null,
    underPa: null,
    crossedAt: null,
    risingAt: start.at,
    risingPa: start.startPa,
    supplyV: null,
  }
}

/** A fall that had ended over the cut-in well before the start did not cause it. */
function settleEarlierFall(state: FoldState, start: Start, rows: Row[]): void {
  const { fall, hold } = state
  if (fall === null || hold === null || start.at - fall.lowAt <= 10 * SECOND) return
  if (fall.lowPa < learnedCutInPa(state) + 0.1 * INHG) return
  settleFall(state, hold, start.knownAt, rows)
  hold.lastAt = fall.lowAt
  hold.lastPa = fall.lowPa
}

/** Vacuum before the start: where a fall in progress came from, the last of the hold, or the stop before it. */
function vacuumBefore(state: FoldState): { at: Instant; pa: number } | null {
  const { hold, fall } = state
  if (fall !== null) return { at: fall.fromAt, pa: fall.fromPa }
  if (hold === null) return null
  if (hold.lastAt !== null && hold.lastPa !== null) return { at: hold.lastAt, pa: hold.lastPa }
  return hold.startSeen && hold.cutOutPa !== null ? { at: hold.startedAt, pa: hold.cutOutPa } : null
}

/** A leak may be so much faster than its slope was seen to be before it counts as a fall. */
const LEAK_MARGIN = 1.3

/** Fall to the start beyond what leak and settling explain, Pa; null where either end is unknown. */
function suddenFallPa(
  state: FoldState,
  start: Start,
  before: { at: Instant; pa: number } | null,
): number | null {
  if (before === null || start.startPa === null) return null
  const { hold, fall } = state
  const slope = fall?.slopePaPerSecond ?? leakSlope(state)
  const settled = hold === null ? 0 : settlingPa(hold, before.at, start.at)
  const suddenPa =
    before.pa - start.startPa - LEAK_MARGIN * slope * ((start.at - before.at) / SECOND) - settled
  return fall === null ? suddenPa : Math.max(suddenPa, fallPa(fall))
}

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
  if (supplyV !== null) run.supplyV = supplyV
  if (vacuumPa === null) return
  followCrossing(state, run, at, vacuumPa)
  if (run.risingPa === null || Math.abs(vacuumPa - run.risingPa) > Math.max(RISING_PA, 3 * state.sigmaPa)) {
    run.risingAt = at
    run.risingPa = vacuumPa
  }
  if (run.topPa === null) {
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
function endRunFall(state: FoldState, run: OpenRun, knownAt: Instant, rows: Row[]): void {
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
  const end = { seconds, uncertaintySeconds: uncertainty }
  const { trigger, only } = decideTrigger(state, run, end)
  endRunFall(state, run, stop.knownAt, rows)
  const peakPa = peakOf(run, stop.stopPa)
  const recharge = trigger === 'unknown' && !run.startSeen ? null : rechargeOf(state, run, stop, peakPa)
  if (ended !== null) pushEnded(state, ended, run, trigger, stop.knownAt, rows)
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
  if (!run.setAside)
    learnFromRun(state, run, stop, {
      trigger,
      only,
      overLong: isOverLong(state, end),
      seconds,
      peakPa,
      recharge,
    })
  state.run = null
  state.ended = null
  const depth = peakPa === null || run.lowPa === null ? 0 : peakPa - run.lowPa
  const usualDepth = Math.max(0.5 * INHG, learnedCutOutPa(state) - learnedCutInPa(state))
  if (state.settings.kind !== 'on-demand') {
    openHold(state, stop.at, {
      seen: true,
      peakPa,
      depth: depth / usualDepth,
      edgeUncertaintySeconds: stop.edgeUncertaintySeconds,
    })
  }
}

/** Missing data ends a run at the last sample before it. */
export function interruptRun(state: FoldState, lastAt: Instant, knownAt: Instant, rows: Row[]): void {
  const { run, ended } = state
  if (run === null) return
  const { trigger } = decideTrigger(state, run, { seconds: null, uncertaintySeconds: 0 })
  endRunFall(state, run, knownAt, rows)
  if (ended !== null) pushEnded(state, ended, run, trigger, knownAt, rows)
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
  knownAt: Instant,
  rows: Row[],
): void {
  const whole = {
    ...ended,
    edgeUncertaintySeconds: Math.max(ended.edgeUncertaintySeconds, run.edgeUncertaintySeconds),
  }
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
    if (run.lowPa !== null && run.startPa - run.lowPa > START_FALL_PA) return null
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
    only: Decision['only']
    overLong: boolean
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
  if (run.startSeen && seen.trigger === 'leak' && !startIsClose) learnSparseStart(state, run)
  if (seen.only === 'level' && run.beforePa !== null) learnHighStart(state, run.beforePa)
  if (run.startPa === null) {
    if (run.startSeen) pushRing(rings.runSeconds, seen.seconds)
  } else if (seen.trigger === 'leak' && !seen.overLong) {
    pushRing(rings.runSeconds, seen.seconds)
    rings.longRunSeconds = []
  } else if (seen.only === 'length') learnLongRun(state, seen.seconds)
}

/** Through samples up to two minutes apart: the level half way to the next, where the leak is slow enough. */
function learnSparseStart(state: FoldState, run: OpenRun): void {
  if (run.beforePa === null || run.startSpacingMs > 2 * MINUTE) return
  const lostPa = state.slopePaPerSecond * (run.startSpacingMs / SECOND)
  if (lostPa < 0.4 * INHG) pushRing(state.rings.sparseStartPa, run.beforePa - lostPa / 2)
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

/** Flushes come at any level: five starts in a row that look too high, all alike, are the switch moved up. */
function learnHighStart(state: FoldState, beforePa: number): void {
  const { rings } = state
  pushRing(rings.highStartPa, beforePa, RING_ENOUGH)
  if (rings.highStartPa.length < RING_ENOUGH) return
  if (Math.max(...rings.highStartPa) - Math.min(...rings.highStartPa) > 0.2 * INHG) return
  rings.cutInPa = rings.highStartPa
  rings.sparseStartPa = []
  rings.highStartPa = []
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
