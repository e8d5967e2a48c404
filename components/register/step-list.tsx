import Link from 'next/link'
import { OutcomeMark } from '@/components/register/outcome-mark'
import { stateOfStep, STEP_WORDS, stepHref, stepsOf, type Step } from '@/components/register/steps'
import type { Commissioning } from '@/shared/schemas'

/** All steps with how far each has come; any of them can be gone to. */
export function StepList({ commissioning, current }: { commissioning: Commissioning; current: Step }) {
  return (
    <nav aria-label="Steps" className="no-print">
      <ol>
        {stepsOf(commissioning).map((step) => (
          <li key={step} className="border-b border-line">
            <Link
              href={stepHref(commissioning.id, step)}
              aria-current={step === current ? 'step' : undefined}
              className={`flex min-h-11 items-center gap-3 no-underline hover:underline ${
                step === current ? 'font-bold text-ink' : 'text-ink-2'
              }`}
            >
              <OutcomeMark state={stateOfStep(commissioning, step)} />
              {STEP_WORDS[step]}
            </Link>
          </li>
        ))}
      </ol>
    </nav>
  )
}
