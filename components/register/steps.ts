import { CHECK_TITLES } from '@/shared/commissioning-words'
import type { CheckKind, CheckOutcome, Commissioning, CommissioningCheck } from '@/shared/schemas'

/** Where one can be within a registration, as the address says it. */
export type Step = 'boat' | 'logger' | CheckKind | 'record'

export const STEP_WORDS: Record<Step, string> = {
  boat: 'Boat and system',
  logger: 'Logger and key',
  ...CHECK_TITLES,
  record: 'Record',
}

export const stepsOf = (commissioning: Commissioning): Step[] => [
  'boat',
  'logger',
  ...commissioning.needed,
  'record',
]

export const stepNamed = (word: string): Step | undefined =>
  (Object.keys(STEP_WORDS) as Step[]).find((step) => step === word) // the keys of a record are its type

/** The newest concluded attempt of a check, which counts. */
export const lastDone = (commissioning: Commissioning, kind: CheckKind): CommissioningCheck | undefined =>
  commissioning.checks.findLast((check) => check.kind === kind && check.doneAt !== null)

/** The attempt under way. */
export const underWay = (commissioning: Commissioning, kind: CheckKind): CommissioningCheck | undefined =>
  commissioning.checks.findLast((check) => check.kind === kind && check.doneAt === null)

export type StepState = CheckOutcome | 'under-way' | 'open'

const isCheck = (commissioning: Commissioning, step: Step): step is CheckKind =>
  commissioning.needed.some((kind) => kind === step)

/** How far a step has come. */
export function stateOfStep(commissioning: Commissioning, step: Step): StepState {
  if (step === 'boat') return commissioning.system === null ? 'open' : 'passed'
  if (step === 'logger') return commissioning.fittedAt === null ? 'open' : 'passed'
  if (step === 'record') return commissioning.finishedAt === null ? 'open' : 'passed'
  if (!isCheck(commissioning, step)) return 'open'
  if (underWay(commissioning, step)) return 'under-way'
  return lastDone(commissioning, step)?.outcome ?? 'open'
}

export const isSettled = (state: StepState): boolean => state === 'passed' || state === 'left-out'

/** Where to go on: the first step that is not settled. */
export const nextStep = (commissioning: Commissioning): Step =>
  stepsOf(commissioning).find((step) => !isSettled(stateOfStep(commissioning, step))) ?? 'record'

/** The step after this one, or null at the end. */
export function stepAfter(commissioning: Commissioning, step: Step): Step | null {
  const steps = stepsOf(commissioning)
  return steps[steps.indexOf(step) + 1] ?? null
}

export const stepHref = (id: string, step: Step): string => `/register/${id}/${step}`

/** `progressWords` → "3 of 10 steps done" */
export function progressWords(commissioning: Commissioning): string {
  const steps = stepsOf(commissioning)
  const done = steps.filter((step) => isSettled(stateOfStep(commissioning, step))).length
  return `${done} of ${steps.length} steps done`
}
