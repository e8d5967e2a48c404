/** The hold axis: logarithmic, from a minute to two days, shared by every boat so that one outlier is seen. */
export const HOLD_AXIS_SECONDS = [60, 172_800] as const
export const HOLD_TICKS: readonly { seconds: number; label: string }[] = [
  { seconds: 60, label: '1 min' },
  { seconds: 600, label: '10 min' },
  { seconds: 3600, label: '1 h' },
  { seconds: 10_800, label: '3' },
  { seconds: 28_800, label: '8' },
  { seconds: 86_400, label: '24 h' },
]

/**
 * Place of a value on a logarithmic axis, 0 to 1, held to the axis's ends.
 * `logPosition(100, 10, 1000) // 0.5`. Not finite or not above nought: 0.
 */
export function logPosition(value: number, low: number, high: number): number {
  if (!(value > 0)) return 0
  if (value === Infinity) return 1
  return Math.min(1, Math.max(0, Math.log(value / low) / Math.log(high / low)))
}

/** Place of a hold time on the hold axis, 0 (a minute) to 1 (two days). */
export const holdPosition = (seconds: number): number => logPosition(seconds, ...HOLD_AXIS_SECONDS)

/** The night strip runs from 18:00 to 10:00, in minutes after 18:00. */
export const STRIP_MINUTES = 960

/** Minutes after 18:00 held to the strip. */
export const onStrip = (minute: number): number => Math.min(STRIP_MINUTES, Math.max(0, minute))

/** Is this minute in the quiet hours? From the start on, up to but not at the end. */
export const inQuiet = (minute: number, quiet: readonly [number, number]): boolean =>
  minute >= quiet[0] && minute < quiet[1]

/**
 * One SVG path with a vertical stroke at each minute: a hundred ticks cost one element.
 * Minutes outside the strip are left out. `tickPath([60], 2, 20) // "M60 2V20"`
 */
export function tickPath(minutes: readonly number[], top: number, bottom: number): string {
  return minutes
    .filter((minute) => minute >= 0 && minute <= STRIP_MINUTES)
    .map((minute) => `M${Math.round(minute)} ${top}V${bottom}`)
    .join('')
}

/** Round steps for a linear axis: at most `most` ticks, on 1, 2 or 5 times a power of ten. */
export function linearTicks(low: number, high: number, most = 6): number[] {
  const spanned = high - low
  if (!(spanned > 0)) return [low]
  const rough = spanned / most
  const power = 10 ** Math.floor(Math.log10(rough))
  const step = [1, 2, 5, 10].map((m) => m * power).find((s) => spanned / s <= most) ?? 10 * power
  const first = Math.ceil(low / step - 1e-9)
  const ticks: number[] = []
  for (let i = first; i * step <= high + step * 1e-9; i += 1) ticks.push(Number((i * step).toPrecision(12)))
  return ticks
}
