import type { FiguresInput, PumpDay } from './types'

const DAY_SECONDS = 86_400

/**
 * What the pump did in the 24 hours up to `at`, scaled to a day from the hours that were heard. Interrupted
 * holds are hours not heard. Under an hour heard: null.
 */
export function pumpDayOf({ at, rows, open, settings, lastHeardAt }: FiguresInput): PumpDay | null {
  const from = at - DAY_SECONDS * 1000
  const until = Math.min(at, lastHeardAt ?? at)
  const within = (startedAt: number, endedAt: number): number =>
    Math.max(0, Math.min(endedAt, until) - Math.max(startedAt, from)) / 1000
  const sum = (values: readonly number[]): number => values.reduce((total, value) => total + value, 0)
  const runs = rows.runs.filter((run) => run.stoppedAt > from && run.startedAt < until)
  const openRunSeconds = open.run === null ? 0 : within(open.run.startedAt, until)
  const runSeconds = sum(runs.map((run) => within(run.startedAt, run.stoppedAt))) + openRunSeconds
  const holds = rows.holds.filter((hold) => hold.ending !== 'interrupted')
  const holdSeconds = sum(holds.map((hold) => within(hold.startedAt, hold.endedAt)))
  const openHoldSeconds = open.hold === null ? 0 : within(open.hold.startedAt, until)
  const heardSeconds = runSeconds + holdSeconds + openHoldSeconds
  if (heardSeconds < 3600) return null
  const scale = DAY_SECONDS / heardSeconds
  const started = runs.filter((run) => run.startedAt >= from)
  const pumpSecondsPerDay = runSeconds * scale
  return {
    runsPerDay: started.length * scale,
    leakRunsPerDay: started.filter((run) => run.trigger === 'leak').length * scale,
    pumpSecondsPerDay,
    ampHoursPerDay: settings.pumpAmps === null ? null : (pumpSecondsPerDay / 3600) * settings.pumpAmps,
    hoursObserved: heardSeconds / 3600,
  }
}
