import { fromPa, toPa, type VacuumUnit } from '@/shared/units'

/**
 * Alignment chart of hold = differential × minutes / loss: three parallel logarithmic scales. The outer two run
 * with the same modulus, the loss upside down, so that the middle one stands half-way with half the modulus,
 * and a straight line across reads the answer.
 */
export const MINUTES = [5, 60] as const
const LOSS_INHG = [0.05, 3] as const
const HEIGHT_PER_DECADE = 250
const TOP = 64

export type Tick = { value: number; y: number; strong: boolean; label: string }
export type Alignment = {
  height: number
  minuteTicks: Tick[]
  lossTicks: Tick[]
  hourTicks: Tick[]
  yOfMinutes: (minutes: number) => number
  yOfLoss: (lossPa: number) => number
  yOfHours: (hours: number) => number
  hourSpan: [number, number]
}

/** Graduations of the middle scale, hours, those that are kept first before those that give way. */
const HOURS = [3, 8, 24, 1, 2, 5, 12, 0.5, 0.25, 1 / 6, 0.1, 1 / 20, 1 / 30, 0.75, 1 / 3, 48, 72]
const LABEL_HEIGHT = 14

/** A hundredth of a pixel: engines differ in the last digit of a logarithm, and a page must not. */
const rounded = (y: number): number => Math.round(y * 100) / 100

/** Leaves out what would be printed over something kept before it; in order of size. */
function apart(values: readonly number[], yOf: (value: number) => number): number[] {
  const kept: number[] = []
  for (const value of values)
    if (kept.every((other) => Math.abs(yOf(other) - yOf(value)) >= LABEL_HEIGHT)) kept.push(value)
  return kept.sort((a, b) => a - b)
}

/** 1, 2, 3, 5, 7 times powers of ten within a span: the graduations of a logarithmic scale. */
export function logTicks(low: number, high: number): number[] {
  const ticks: number[] = []
  for (let power = Math.floor(Math.log10(low)); power <= Math.ceil(Math.log10(high)); power += 1) {
    for (const digit of [1, 2, 3, 5, 7]) {
      const value = Number((digit * 10 ** power).toPrecision(6))
      if (value >= low * 0.999 && value <= high * 1.001) ticks.push(value)
    }
  }
  return ticks
}

/** The chart for a differential, its loss scale in the reader's unit. */
export function alignmentOf(differentialPa: number, unit: VacuumUnit): Alignment {
  const lossPa = [toPa(LOSS_INHG[0], 'inHg'), toPa(LOSS_INHG[1], 'inHg')] as const
  const decades = Math.log10(lossPa[1] / lossPa[0])
  const foot = TOP + decades * HEIGHT_PER_DECADE
  const yOfMinutes = (minutes: number) => rounded(foot - HEIGHT_PER_DECADE * Math.log10(minutes / MINUTES[0]))
  const yOfLoss = (pa: number) => rounded(foot + HEIGHT_PER_DECADE * Math.log10(pa / lossPa[1]))
  const yOfHours = (hours: number) => rounded((yOfMinutes(60) + yOfLoss(differentialPa / hours)) / 2)
  const hoursOf = (minutes: number, pa: number) => (differentialPa * minutes) / 60 / pa
  const hourSpan: [number, number] = [hoursOf(MINUTES[0], lossPa[1]), hoursOf(MINUTES[1], lossPa[0])]
  const hours = HOURS.filter((value) => value >= hourSpan[0] && value <= hourSpan[1])
  return {
    height: rounded(foot + 40),
    yOfMinutes,
    yOfLoss,
    yOfHours,
    hourSpan,
    minuteTicks: [5, 10, 15, 20, 30, 45, 60].map((value) => ({
      value,
      y: yOfMinutes(value),
      strong: value === 30,
      label: String(value),
    })),
    lossTicks: logTicks(fromPa(lossPa[0], unit), fromPa(lossPa[1], unit)).map((value) => ({
      value,
      y: yOfLoss(toPa(value, unit)),
      strong: false,
      label: String(value),
    })),
    hourTicks: apart(hours, yOfHours).map((value) => ({
      value,
      y: yOfHours(value),
      strong: value === 3 || value === 8,
      label: hourLabel(value),
    })),
  }
}

function hourLabel(hours: number): string {
  const name = hours === 3 ? ' limit' : hours === 8 ? ' aim' : ''
  return hours < 1 ? `${Number((hours * 60).toPrecision(2))} min` : `${hours} h${name}`
}
