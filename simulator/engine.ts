import { AFTER_FLUSH_MS, closeBowl, finishFlush, openBowl } from '@/simulator/bowls'
import type { BoatAtWork } from '@/simulator/boat-at-work'
import { openingEvents, type OpeningEvent } from '@/simulator/habits'
import { isRecording, loggerClock, takeReading, type SimSample } from '@/simulator/logger'
import { MS_PER_SECOND } from '@/simulator/physics/constants'
import { airAmount } from '@/simulator/physics/gas'
import {
  gasRates,
  rungeKuttaStep,
  vacuumOf,
  type Gas,
  type StepConditions,
} from '@/simulator/physics/integrate'
import { areaForFlow } from '@/simulator/physics/leak-flow'
import { freshCondition, inSpans, leakLawOf } from '@/simulator/physics/leaks'
import { pumpingSpeed, supplyVoltage, wearFactor } from '@/simulator/physics/pump'
import { crossing } from '@/simulator/physics/crossing'
import { surroundingsOf } from '@/simulator/physics/surroundings'
import { weatherOf } from '@/simulator/physics/weather'
import { hash32, randomState } from '@/simulator/random'
import { boundariesOf, type BoatSpec } from '@/simulator/spec'
import { newState, type BoatState } from '@/simulator/state'
import { operateSwitch } from '@/simulator/switch-and-pump'
import { gasVolumeM3, switchPointsAt } from '@/simulator/truth'

const LONGEST_STEP_SECONDS = 15
const SHORTEST_STEP_SECONDS = 0.25
/** A step is cut so that the pressure moves by about so much in it. */
const PRESSURE_STEP_PA = 150
const SEARCH_AHEAD_MS = 6 * 3_600_000
/** A vent stands open like a hole of some 6 mm. */
const VENT_AREA_M2 = areaForFlow(500)

/** Moves one boat forward from event to event. Its steps never depend on how far it is asked to go. */
export function createEngine(spec: BoatSpec, fromMs: number, resumed: BoatState | null) {
  const weather = weatherOf(spec.weather, spec.weatherSeed ?? spec.seed, spec.offsetSeconds)
  const nextOpening = openingEvents(spec.habits, spec.seed, spec.offsetSeconds)
  const lawOfLeaks = leakLawOf(spec.leaks)
  const boundaries = boundariesOf(spec)
  const clock = loggerClock(spec.logger)
  const intervalMs = spec.logger.intervalSeconds * MS_PER_SECOND
  const phaseMs = (hash32(spec.seed, 41) % spec.logger.intervalSeconds) * MS_PER_SECOND
  const sampleTime = (index: number): number => clock.trueAt(index * intervalMs + phaseMs)
  const sampleAfter = (at: number): number => Math.ceil((clock.says(at) - phaseMs) / intervalMs)

  const {
    wallTargetC,
    wallAfter,
    around: surroundings,
  } = surroundingsOf(weather, { ...spec.gas, meanC: spec.weather.meanC })

  // --- state --------------------------------------------------------------------------------------

  const state: BoatState = resumed ?? startingState()
  if (state.intervalSeconds !== spec.logger.intervalSeconds) {
    // The logger was asked for another rhythm since.
    state.nextSample = sampleAfter(state.t)
    state.intervalSeconds = spec.logger.intervalSeconds
  }
  let around = surroundings(state.t, state.wallC)
  let upcoming: OpeningEvent | null = null
  let searchedTo = state.eventCursor

  function startingState(): BoatState {
    const wallC = wallTargetC(fromMs)
    const start = surroundings(fromMs, wallC)
    const dryPa = start.outsidePa - spec.initialVacuumPa - start.vapourPa
    const volume = gasVolumeM3(spec, spec.tank.filledAtStartM3)
    const fresh = newState(fromMs, {
      amount: airAmount(dryPa, volume, start.wallK),
      wallC,
      filledM3: spec.tank.filledAtStartM3,
      conditions: spec.leaks.map(() => freshCondition()),
      nextSample: sampleAfter(fromMs),
      intervalSeconds: spec.logger.intervalSeconds,
      random: {
        switch: randomState(spec.seed, 1),
        seats: randomState(spec.seed, 2),
        sensor: randomState(spec.seed, 3),
      },
    })
    fresh.cutInPa = switchPointsAt(spec.switch, fromMs).cutInPa
    fresh.openHold = {
      startedAt: fromMs,
      vacuumAtStartPa: spec.initialVacuumPa,
      flushes: 0,
      settledPa: null,
      interrupted: false,
    }
    return fresh
  }

  const volumeNow = (): number => gasVolumeM3(spec, state.filledM3)
  const gasNow = (): Gas => ({ amount: state.amount, excessK: state.excessK })
  const vacuumNow = (): number => vacuumOf(gasNow(), volumeNow(), around)
  const ventedAt = (at: number): boolean =>
    inSpans(spec.vented, at) ||
    spec.tank.pumpOuts.some((out) => at >= out.at && at < out.at + out.minutes * 60_000)
  const supplyAt = (at: number): number =>
    supplyVoltage(spec.supply, spec.seed, spec.offsetSeconds, state.pumpOn, at)

  function noteChange(): void {
    state.pending.snapshots.push({
      at: state.t,
      conditions: state.conditions.map((condition) => ({ ...condition })),
      filledM3: state.filledM3,
    })
  }

  const boat: BoatAtWork = {
    spec,
    state,
    startedAt: resumed ? null : fromMs,
    vacuumNow,
    ventedAt,
    noteChange,
    emitEdge: () => emitSample(state.t, true),
  }

  function findUpcoming(): OpeningEvent | null {
    while (!upcoming && searchedTo < state.t + SEARCH_AHEAD_MS) {
      const found = nextOpening(searchedTo, searchedTo + SEARCH_AHEAD_MS)
      if (found && !inSpans(spec.layUp, found.at)) upcoming = found
      searchedTo = found ? found.at : searchedTo + SEARCH_AHEAD_MS - 1
    }
    return upcoming
  }

  // --- samples ------------------------------------------------------------------------------------

  function emitSample(at: number, isEdge: boolean): void {
    if (isEdge && !spec.logger.channels.includes('pump')) return
    const said = Math.round(clock.says(at))
    if (said <= state.lastSaidAt || !isRecording(spec.logger, at)) return
    const truth = {
      vacuumPa: vacuumNow(),
      pumpOn: state.pumpOn,
      airC: weather.airC(at),
      barometerPa: around.outsidePa,
      supplyV: supplyAt(at),
    }
    const stuck = inSpans(spec.logger.stuck, at) ? state.lastVacuumReadPa : null
    const slow = spec.logger.slowChannelSeconds
    const sample: SimSample = takeReading(spec.logger, state.random.sensor, said, truth, {
      stuckVacuumPa: stuck,
      withSlowChannels:
        slow <= 0 ||
        (!isEdge && (state.nextSample * spec.logger.intervalSeconds) % slow < spec.logger.intervalSeconds),
    })
    state.lastSaidAt = said
    if (sample.vacuumPa !== null) state.lastVacuumReadPa = sample.vacuumPa
    state.pending.samples.push({ trueAt: at, sample })
  }

  // --- one step -----------------------------------------------------------------------------------

  /** The next instant that a step must not pass. */
  function nextStop(): number {
    let stop = Math.min(state.t + LONGEST_STEP_SECONDS * MS_PER_SECOND, sampleTime(state.nextSample))
    const event = findUpcoming()
    if (event && event.at > state.t && event.at < stop) stop = event.at
    const flushStop = state.flush ? state.flush.closesAt + (state.flush.open ? 0 : AFTER_FLUSH_MS) : Infinity
    stop = Math.min(stop, flushStop)
    for (const boundary of boundaries) {
      if (boundary > state.t) return Math.min(stop, boundary)
    }
    return stop
  }

  function advance(): void {
    operateSwitch(boat)
    const start = state.t
    const stop = nextStop()
    const wear = wearFactor(spec.pump, start)
    const supplyV = supplyAt(start)
    const middleOfStep = (start + stop) / 2
    const law = lawOfLeaks(state.conditions, middleOfStep)
    if (state.flush?.open) law.areaM2 += state.flush.areaM2
    if (ventedAt(start)) law.areaM2 += VENT_AREA_M2
    const conditions: StepConditions = {
      law,
      volumeM3: volumeNow(),
      heatShare: spec.gas.heatShare,
      settleSeconds: spec.gas.settleSeconds,
      speed: state.pumpOn ? (vacuumPa) => pumpingSpeed(spec.pump, vacuumPa, supplyV, wear) : null,
    }
    const gas = gasNow()
    const first = gasRates(gas, conditions, around)
    const temperature = around.wallK + gas.excessK
    const paPerSecond = (first.amount * temperature + gas.amount * first.excessK) / conditions.volumeM3
    const quiet = PRESSURE_STEP_PA / Math.max(1e-9, Math.abs(paPerSecond))
    const seconds = Math.min((stop - start) / MS_PER_SECOND, Math.max(SHORTEST_STEP_SECONDS, quiet))

    const startVacuum = vacuumOf(gas, conditions.volumeM3, around)
    const attempt = (duration: number) => {
      const wallMiddle = wallAfter(state.wallC, start, duration / 2)
      const wallC = wallAfter(state.wallC, start, duration)
      const middle = surroundings(start + duration * 500, wallMiddle)
      const end = surroundings(start + duration * MS_PER_SECOND, wallC)
      const after = rungeKuttaStep(gas, first, duration, conditions, middle, end)
      return { duration, gas: after, wallC, end, vacuum: vacuumOf(after, conditions.volumeM3, end) }
    }
    let result = attempt(seconds)
    const thresholdPa = state.switchClosed ? state.cutOutPa : state.cutInPa
    const past = (vacuum: number): number =>
      state.switchClosed ? vacuum - thresholdPa : thresholdPa - vacuum
    if (past(startVacuum) < 0 && past(result.vacuum) > 0) {
      result = crossing(attempt, past, past(startVacuum), result)
    }
    state.t =
      result.duration >= (stop - start) / MS_PER_SECOND ? stop : start + result.duration * MS_PER_SECOND
    state.wallC = result.wallC
    around = result.end
    state.amount = result.gas.amount
    state.excessK = result.gas.excessK
    const leaks = law.areaM2 + law.conductance > 0
    if (leaks && !state.pumpOn && startVacuum * result.vacuum < 0) {
      // Large openings reach the outside pressure within a step; they stay there instead of overshooting.
      state.amount = airAmount(around.outsidePa - around.vapourPa, conditions.volumeM3, around.wallK)
      state.excessK = 0
    }
    arrive()
  }

  /** What is due at the instant just reached. */
  function arrive(): void {
    const hold = state.openHold
    if (hold && hold.settledPa === null && hold.flushes === 0 && state.t - hold.startedAt >= 180_000) {
      hold.settledPa = vacuumNow()
    }
    if (state.flush) {
      if (state.flush.open && state.t >= state.flush.closesAt) closeBowl(boat)
      else if (!state.flush.open && state.t >= state.flush.closesAt + AFTER_FLUSH_MS) finishFlush(boat)
    }
    for (const out of spec.tank.pumpOuts) {
      if (state.t !== out.at + out.minutes * 60_000) continue
      const before = volumeNow()
      state.filledM3 = 0
      state.amount *= volumeNow() / before
      noteChange()
    }
    operateSwitch(boat)
    if (upcoming && state.t >= upcoming.at) {
      const event = upcoming
      upcoming = null
      openBowl(boat, event)
    }
    while (sampleTime(state.nextSample) <= state.t + 1e-3) {
      emitSample(state.t, false)
      state.nextSample += 1
    }
  }

  return {
    state,
    /** Moves on until the boat's time is at or past `toMs`. */
    runTo: (toMs: number): void => {
      while (state.t < toMs) advance()
    },
  }
}
