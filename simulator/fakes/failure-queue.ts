/**
 * How the next messages fail. `refuse`: a passing error (SMTP 451, HTTP 503). `reject`: a lasting one (550, 400).
 * `time-out`: never answered. `drop`: taken, then the connection is cut before the answer.
 */
export type FailureMode = 'refuse' | 'reject' | 'time-out' | 'drop'

/** Failures asked for and not yet spent, first in first out. */
export function failureQueue() {
  const planned: FailureMode[] = []
  return {
    plan: (mode: FailureMode, count = 1): void => {
      for (let i = 0; i < count; i++) planned.push(mode)
    },
    take: (): FailureMode | null => planned.shift() ?? null,
    clear: (): void => {
      planned.length = 0
    },
  }
}
