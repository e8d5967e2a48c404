import { dayAndClock } from '@/components/time'
import type { CupTestResult } from '@/shared/schemas'

interface Props {
  tests: readonly CupTestResult[]
  offsetSeconds: number
  nowMs: number
}

/** Cup tests done before, the newest first: nobody wets the same bowl twice for nothing. */
export function CupTestPast({ tests, offsetSeconds, nowMs }: Props) {
  if (tests.length === 0) return null
  return (
    <details className="mt-2">
      <summary className="py-2.5">Cup tests done before</summary>
      <ul className="mt-1 grid gap-3">
        {tests.map((test) => (
          <li key={test.id}>
            <span className="datum">
              {test.headName}, {dayAndClock(test.waterAt, offsetSeconds, nowMs)}
            </span>
            <br />
            {test.sentence}
          </li>
        ))}
      </ul>
    </details>
  )
}
