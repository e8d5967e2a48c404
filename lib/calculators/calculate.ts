import { isolate } from '@/lib/analysis/isolation'
import { judgeLeakDown } from '@/lib/analysis/leak-down'
import { Problem } from '@/lib/problem'
import type { Isolation, IsolationInput, LeakDown, LeakDownInput } from '@/shared/schemas'

/** The arithmetic refuses what has no answer with a RangeError; a reader is told it as their input. */
function refusing<T>(work: () => T): T {
  try {
    return work()
  } catch (error) {
    if (error instanceof RangeError)
      throw new Problem('invalid', `These readings have no answer: ${error.message}.`, { cause: error })
    throw error
  }
}

/** @throws Problem `invalid` */
export const calculateLeakDown = (input: LeakDownInput): LeakDown => refusing(() => judgeLeakDown(input))

/** @throws Problem `invalid` for a test of parts without volume */
export const calculateIsolation = (input: IsolationInput): Isolation => refusing(() => isolate(input))
