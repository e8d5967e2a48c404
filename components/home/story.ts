import type { StripNight } from '@/components/charts/night-strip'

/** One invented boat through a month: how long it held, until somebody tightened what was loose. */
type Evening = {
  label: string
  holdMinutes: number
  firstRun: number | null
  flushes: number[]
  repaired?: true
}

const MONTH: Evening[] = [
  { label: '1 Nov', holdMinutes: 900, firstRun: null, flushes: [76, 203, 815] },
  { label: '6 Nov', holdMinutes: 700, firstRun: null, flushes: [92, 221, 790, 871] },
  { label: '11 Nov', holdMinutes: 480, firstRun: 690, flushes: [88, 150, 212, 802] },
  { label: '16 Nov', holdMinutes: 312, firstRun: 41, flushes: [119, 226, 811] },
  { label: '20 Nov', holdMinutes: 204, firstRun: 128, flushes: [61, 118, 798] },
  { label: '24 Nov', holdMinutes: 126, firstRun: 70, flushes: [158, 230, 806] },
  { label: '27 Nov', holdMinutes: 78, firstRun: 66, flushes: [32, 201, 795, 902] },
  { label: 'repaired', holdMinutes: 900, firstRun: null, flushes: [101, 215, 812], repaired: true },
  { label: '30 Nov', holdMinutes: 900, firstRun: null, flushes: [74, 208, 799] },
]

export type StoryNight = { label: string; night: StripNight; repaired: boolean }

/** A hold is never the same twice; the small sway keeps the drawing honest without a random number. */
const SWAY = [1, 0.97, 1.04, 1.01, 0.95, 1.03]

/** The month as night strips. After a flush the pump has just run, so the hold starts again there. */
export function storyNights(): StoryNight[] {
  return MONTH.map(({ label, holdMinutes, firstRun, flushes, repaired }) => {
    const runs: number[] = []
    let minute = firstRun
    let turn = 0
    while (minute !== null && minute < 960) {
      runs.push(Math.round(minute))
      const from: number = minute
      const next = from + holdMinutes * (SWAY[turn % SWAY.length] ?? 1)
      const flushed = flushes.find((at) => at > from && at < next)
      minute = flushed === undefined ? next : flushed + holdMinutes
      turn += 1
    }
    return { label, repaired: repaired === true, night: { quiet: [240, 780], runs, flushes } }
  })
}
