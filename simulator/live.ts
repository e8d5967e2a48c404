import { setTimeout as pause } from 'node:timers/promises'
import type { SimulatedLogger, UploadReport } from '@/simulator/uploader'

/** Wall time, or a faster one that starts in the past and joins wall time when it has caught up. */
export type PaceClock = { now: () => number; speed: () => number }

export function paceClock(startsAt: number, speed: number): PaceClock {
  const realStart = Date.now()
  const now = (): number => Math.min(Date.now(), startsAt + (Date.now() - realStart) * speed)
  return { now, speed: () => (speed > 1 && now() < Date.now() - 1000 ? speed : 1) }
}

/**
 * Keeps one boat posting until aborted: a batch each `batchSeconds` of its time, or each sample as soon as
 * the server asks for a finer rhythm.
 */
export async function keepPosting(
  logger: SimulatedLogger,
  clock: PaceClock,
  batchSeconds: number,
  signal: AbortSignal,
  report: UploadReport & { onStop?: (reason: string) => void } = {},
): Promise<void> {
  try {
    while (!signal.aborted) {
      await logger.postTo(clock.now(), Date.now(), report)
      const seconds = Math.min(batchSeconds, logger.intervalSeconds()) / clock.speed()
      await pause(Math.max(500, seconds * 1000), undefined, { signal })
    }
  } catch (error) {
    if (signal.aborted) return
    report.onStop?.(error instanceof Error ? error.message : String(error))
  }
}

/** Runs tasks a few at a time, in order. */
export async function inParallel<Item>(
  items: readonly Item[],
  width: number,
  work: (item: Item) => Promise<void>,
): Promise<void> {
  const queue = [...items]
  const worker = async (): Promise<void> => {
    for (let item = queue.shift(); item !== undefined; item = queue.shift()) await work(item)
  }
  await Promise.all(Array.from({ length: width }, worker))
}
