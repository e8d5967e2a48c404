import type { BoatAtWork } from '@/simulator/boat-at-work'
import { reseat } from '@/simulator/bowls'
import { PA_PER_INHG } from '@/simulator/physics/constants'
import { inSpans } from '@/simulator/physics/leaks'
import { nextNormal } from '@/simulator/random'
import type { BoatSpec } from '@/simulator/spec'
import { switchPointsAt, type TrueRun } from '@/simulator/truth'

const poweredAt = (spec: BoatSpec, at: number): boolean =>
  !inSpans(spec.breakerOff, at) && !inSpans(spec.layUp, at) && !inSpans(spec.pumpFails, at)

/** Lets the switch do what the vacuum asks for, and the pump what switch and supply allow. */
export function operateSwitch(boat: BoatAtWork): void {
  const { spec, state } = boat
  const scattered = (pa: number): number => pa + spec.switch.scatterPa * nextNormal(state.random.switch)
  const vacuum = boat.vacuumNow()
  if (!state.switchClosed && vacuum <= state.cutInPa) {
    state.switchClosed = true
    state.cutOutPa = scattered(switchPointsAt(spec.switch, state.t).cutOutPa)
  } else if (state.switchClosed && vacuum >= state.cutOutPa) {
    state.switchClosed = false
    const cutInPa = scattered(switchPointsAt(spec.switch, state.t).cutInPa)
    state.cutInPa = Math.min(cutInPa, state.cutOutPa - 0.1 * PA_PER_INHG)
  }
  const powered = poweredAt(spec, state.t)
  if (!powered && state.openHold) state.openHold.interrupted = true
  const on = state.switchClosed && powered
  if (on && !state.pumpOn) startPump(boat, vacuum)
  else if (!on && state.pumpOn) stopPump(boat, vacuum)
}

function triggerOf({ spec, state, startedAt, ventedAt }: BoatAtWork, vacuumPa: number): TrueRun['trigger'] {
  if (state.flush) return 'flush'
  const { cutInPa } = switchPointsAt(spec.switch, state.t)
  const fromFarBelow = vacuumPa < cutInPa - PA_PER_INHG
  return fromFarBelow || ventedAt(state.t) || state.t === startedAt ? 'startup' : 'leak'
}

function startPump(boat: BoatAtWork, vacuumPa: number): void {
  const { state } = boat
  const trigger = triggerOf(boat, vacuumPa)
  if (state.flush) state.flush.startedPump = true
  const hold = state.openHold
  if (hold) {
    state.pending.holds.push({
      startedAt: hold.startedAt,
      endedAt: state.t,
      ending: hold.interrupted ? 'off' : trigger,
      flushes: hold.flushes,
      vacuumAtStartPa: hold.vacuumAtStartPa,
      vacuumAtEndPa: vacuumPa,
      settledPa: hold.settledPa,
    })
  }
  state.openHold = null
  state.openRun = { startedAt: state.t, trigger, vacuumAtStartPa: vacuumPa }
  state.pumpOn = true
  boat.emitEdge()
}

function stopPump(boat: BoatAtWork, vacuumPa: number): void {
  const { state } = boat
  if (state.openRun) {
    state.pending.runs.push({ ...state.openRun, stoppedAt: state.t, vacuumAtStopPa: vacuumPa })
  }
  state.openRun = null
  state.openHold = {
    startedAt: state.t,
    vacuumAtStartPa: vacuumPa,
    flushes: 0,
    settledPa: null,
    interrupted: false,
  }
  state.pumpOn = false
  reseat(boat, (leak) => leak.reseatsAtRun)
  boat.emitEdge()
}
