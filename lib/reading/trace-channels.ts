import { TRACE_CHANNELS, type TraceBucket } from '@/db/queries/trace'
import type { Trace, TraceChannel } from '@/shared/schemas'

/** Decimals that were stored: 0.1 Pa, 0.01 °C, 0.1 Pa, 0.01 V; a mean is told no finer. */
const SCALE = { vacuum: 10, air: 100, barometer: 10, supply: 100 } as const

/** No sample for longer than this interrupts a hold, and is drawn as a gap. */
export const gapMs = (intervalSeconds: number): number => Math.max(600, 5 * intervalSeconds) * 1000

/**
 * Buckets as parallel arrays, one set a channel; where data are missing one bucket of nulls stands at the first
 * place after the last reading. A channel that was never measured is left out.
 */
export function traceChannels(
  buckets: readonly TraceBucket[],
  resolutionMs: number,
  gapAfterMs: number,
): Trace['channels'] {
  const channels: Trace['channels'] = {}
  for (const name of TRACE_CHANNELS) {
    const channel: TraceChannel = { at: [], min: [], max: [], mean: [] }
    const round = (value: number) => Math.round(value * SCALE[name]) / SCALE[name]
    let before: TraceBucket | undefined
    for (const bucket of buckets) {
      const figures = bucket[name]
      if (figures === null) continue
      if (before !== undefined) {
        const place = before.at + resolutionMs
        if (bucket.firstAt - before.lastAt > gapAfterMs && place < bucket.at) {
          channel.at.push(place)
          channel.min.push(null)
          channel.max.push(null)
          channel.mean.push(null)
        }
      }
      channel.at.push(bucket.at)
      channel.min.push(round(figures.min))
      channel.max.push(round(figures.max))
      channel.mean.push(round(figures.mean))
      before = bucket
    }
    if (channel.at.length > 0) channels[name] = channel
  }
  return channels
}
