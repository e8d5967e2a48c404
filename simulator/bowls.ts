import type { BoatAtWork } from '@/simulator/boat-at-work'
import type { OpeningEvent } from '@/simulator/habits'
import { MS_PER_SECOND } from '@/simulator/physics/constants'
import { areaForFlow } from '@/simulator/physics/leak-flow'
import type { LeakSpec } from '@/simulator/physics/leaks'
import { nextNormal } from '@/simulator/random'

/** A pump start so soon after the bowl valve closed is still that flush's. */
export const AFTER_FLUSH_MS = 2000
/** A tap opens the valve for less of a flush's time. */
const TAP_SHARE = 0.4

/** Valves that seat anew: `deviationOf` says how differently, for those concerned. */
export function reseat(
  { spec, state, noteChange }: BoatAtWork,
  deviationOf: (leak: LeakSpec) => number | undefined,
): void {
  let changed = false
  spec.leaks.forEach((leak, index) => {
    const deviation = deviationOf(leak)
    const condition = state.conditions[index]
    if (!deviation || !condition) return
    condition.seat = Math.exp(deviation * nextNormal(state.random.seats))
    changed = true
  })
  if (changed) noteChange()
}

/** Water in a bowl wets its seal. */
function wet({ spec, state, noteChange }: BoatAtWork, headKey: string): void {
  let changed = false
  spec.leaks.forEach((leak, index) => {
    const condition = state.conditions[index]
    if (!leak.wetting || leak.part !== headKey || !condition) return
    condition.wettedAt = state.t
    condition.wetSeconds = leak.wetting.wetSeconds * Math.exp(0.3 * nextNormal(state.random.seats))
    changed = true
  })
  if (changed) noteChange()
}

/** A flush or tap begins, or a cup of water is poured. */
export function openBowl(boat: BoatAtWork, event: OpeningEvent): void {
  const { spec, state } = boat
  finishFlush(boat)
  state.eventCursor = event.at
  const head = spec.habits.heads[event.headIndex]
  if (!head) return
  if (event.kind === 'cup') return wet(boat, head.key)
  const seconds = spec.habits.flushSeconds * (event.kind === 'tap' ? TAP_SHARE : 1)
  const meanFlow = (head.airLitres * event.airFactor * 101.325) / seconds
  state.flush = {
    at: state.t,
    head: head.key,
    kind: event.kind,
    areaM2: areaForFlow(meanFlow),
    closesAt: state.t + seconds * MS_PER_SECOND,
    open: true,
    vacuumBeforePa: boat.vacuumNow(),
    dropPa: 0,
    startedPump: false,
  }
  if (state.openHold) state.openHold.flushes += 1
}

/** The bowl valve closes: the liquid has gone through, the seal is wet, the valve sits as it sits. */
export function closeBowl(boat: BoatAtWork): void {
  const { spec, state } = boat
  const flush = state.flush
  if (!flush) return
  flush.open = false
  const head = spec.habits.heads.find((each) => each.key === flush.head)
  if (spec.tank.collects && head && flush.kind === 'flush') {
    state.filledM3 += head.waterLitres / 1000
    boat.noteChange()
  }
  flush.dropPa = flush.vacuumBeforePa - boat.vacuumNow()
  reseat(boat, (leak) => (leak.part === flush.head ? leak.reseatsAtFlush : undefined))
  wet(boat, flush.head)
}

/** Writes a flush down once it is clear whether it started the pump. */
export function finishFlush(boat: BoatAtWork): void {
  const { state } = boat
  const flush = state.flush
  if (!flush) return
  if (flush.open) closeBowl(boat)
  const { at, head, kind, dropPa, startedPump } = flush
  state.pending.flushes.push({ at, head, kind, dropPa, startedPump })
  state.flush = null
}
