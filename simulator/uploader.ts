import type { IngestAnswer } from '@/shared/schemas/loggers'
import { simulateBoat, type BoatSpec, type BoatState } from '@/simulator/boat'
import { loggerClock } from '@/simulator/logger'
import { postSamples, SAMPLES_PER_UPLOAD, UploadRefused, type UploadTarget } from '@/simulator/post'

/** How far a boat has been posted: everything before `postedTo` (true time) is with the server. */
export type Progress = { postedTo: number; state: BoatState | null }

export type UploadReport = {
  onUpload?: (answer: IngestAnswer) => void
  onRefused?: (error: UploadRefused) => void
}

const WHOLE_UPLOAD_MS = 40 * 86_400_000

/**
 * One boat's logger: simulates and posts, stretch by stretch. Its copy of what is not yet taken is the state
 * before it, from which the same samples come again; it moves on only with the upload's id.
 */
export function loggerOf(boat: BoatSpec, target: UploadTarget, progress: Progress) {
  let intervalSeconds = boat.logger.intervalSeconds
  let finerUntil = 0

  /** A logger out of reach keeps what it has until its span is over. */
  const reachableTo = (toMs: number): number =>
    boat.logger.late.find((span) => toMs >= span.from && toMs < span.to)?.from ?? toMs

  /** Back in reach, all that waited goes in one request as far as it fits. */
  const stretchMs = (fromMs: number): number => {
    const back = boat.logger.late.find((span) => fromMs >= span.from && fromMs < span.to)
    return back ? WHOLE_UPLOAD_MS : SAMPLES_PER_UPLOAD * boat.logger.intervalSeconds * 1000
  }

  return {
    progress,
    intervalSeconds: (): number => intervalSeconds,
    /**
     * Posts up to `toMs`, oldest first. What the server will never take is told of and left behind.
     * @throws UploadRefused when the logger itself is no longer welcome (403).
     */
    postTo: async (toMs: number, nowMs: number, report: UploadReport = {}): Promise<void> => {
      const end = reachableTo(toMs)
      const finer = finerUntil > nowMs && intervalSeconds < boat.logger.intervalSeconds
      const spec = finer ? { ...boat, logger: { ...boat.logger, intervalSeconds } } : boat
      while (progress.postedTo < end) {
        const from = progress.postedTo
        const until = Math.min(end, from + stretchMs(from))
        const stretch = simulateBoat(spec, from, until, progress.state ? { resume: progress.state } : {})
        if (stretch.samples.length > 0) {
          // The clock was as far off when these were due; later uploads are judged by their own offset.
          const clockOffsetMs = loggerClock(boat.logger).says(until) - until
          try {
            const answer = await postSamples(target, stretch.samples, clockOffsetMs)
            intervalSeconds = Math.min(boat.logger.intervalSeconds, Math.max(1, answer.next.intervalSeconds))
            finerUntil = answer.next.until === null ? 0 : Date.parse(answer.next.until)
            report.onUpload?.(answer)
          } catch (error) {
            if (!(error instanceof UploadRefused) || error.status === 403) throw error
            report.onRefused?.(error)
          }
        }
        progress.postedTo = until
        progress.state = stretch.end
      }
    },
  }
}
export type SimulatedLogger = ReturnType<typeof loggerOf>
