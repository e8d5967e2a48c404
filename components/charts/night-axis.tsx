import { STRIP_MINUTES } from '@/components/charts/scales'
import { clockOfMinute } from '@/components/time'

/** Hours under a night strip, each at its own place; the strip's ends and the quiet hours' edges by default. */
export function NightAxis({ minutes = [0, 240, 480, 780, 960] }: { minutes?: readonly number[] }) {
  return (
    <div className="relative h-5 text-note text-ink-2" aria-hidden="true">
      {minutes.map((minute) => (
        <span
          key={minute}
          className="figure absolute top-0.5"
          style={{
            left: `${(minute / STRIP_MINUTES) * 100}%`,
            transform: minute === 0 ? undefined : `translateX(${minute === STRIP_MINUTES ? -100 : -50}%)`,
          }}
        >
          {clockOfMinute(minute)}
        </span>
      ))}
    </div>
  )
}

/**
 * The quiet hours' own edges first, then the strip's ends and the middle of the night where their labels would
 * not touch: an end's label lies wholly inside the strip, so it needs more room than one centred on its place.
 */
export function axisMinutes(quiet: readonly [number, number], roomMinutes = 110): number[] {
  const room = (minute: number) => (minute === 0 || minute === STRIP_MINUTES ? 1.5 : 1) * roomMinutes
  const kept: number[] = []
  for (const minute of [quiet[0], quiet[1], 0, STRIP_MINUTES, (quiet[0] + quiet[1]) / 2]) {
    const inside = minute >= 0 && minute <= STRIP_MINUTES
    if (inside && kept.every((other) => Math.abs(other - minute) >= room(minute)))
      kept.push(Math.round(minute))
  }
  return kept.sort((a, b) => a - b)
}
