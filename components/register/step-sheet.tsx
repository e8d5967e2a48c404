'use client'

import { useRouter } from 'next/navigation'
import { useEffect, useRef } from 'react'
import { BoatStep } from '@/components/register/boat-step'
import { CheckStep } from '@/components/register/check-step'
import type { GaugeResolutions } from '@/components/register/gauge'
import { LoggerStep } from '@/components/register/logger-step'
import { RecordStep } from '@/components/register/record-step'
import { StepList } from '@/components/register/step-list'
import {
  progressWords,
  stepAfter,
  STEP_WORDS,
  stepHref,
  stepsOf,
  type Step,
} from '@/components/register/steps'
import { commissioningActs, useCommissioning } from '@/components/register/use-commissioning'
import { useUnits } from '@/components/shell/units-context'
import { Loading, Trouble } from '@/components/ui/sheet-states'
import { TitleBlock } from '@/components/ui/title-block'
import type { Commissioning } from '@/shared/schemas'

type Props = { id: string; step: Step; resolutions: GaugeResolutions }

/** One step of a registration, with all of them beside it. */
export function StepSheet({ id, step, resolutions }: Props) {
  const { data, error, mutate } = useCommissioning(id)
  const { units } = useUnits()
  const heading = useRef<HTMLHeadingElement>(null)
  const router = useRouter()
  const arrived = useRef(false)
  useEffect(() => {
    // A step that is gone on to is read out; the first page is not interrupted.
    if (arrived.current) heading.current?.focus()
    arrived.current = true
  }, [step])
  if (error && !data)
    return (
      <div className="sheet pt-7">
        <Trouble title={error.message} retry={() => void mutate()} />
      </div>
    )
  if (!data)
    return (
      <div className="sheet pt-7">
        <Loading what="the registration" />
      </div>
    )
  const acts = commissioningActs(id, mutate)
  const steps = stepsOf(data)
  const go = (to: Step) => router.push(stepHref(id, to))
  const onward = () => go(stepAfter(data, step) ?? 'record')
  return (
    <>
      <TitleBlock
        title={data.serial}
        datum={`${where(data)}. Vacuum in ${units.vacuum} below ambient.`}
        aside={[progressWords(data), `Begun by ${data.startedBy}`]}
      />
      <div className="sheet grid items-start gap-x-16 gap-y-10 lg:grid-cols-[minmax(0,1fr)_17rem]">
        <section aria-labelledby="step">
          <h2 id="step" ref={heading} tabIndex={-1} className="mb-3 text-finding outline-none">
            <span className="datum block font-normal">
              Step {steps.indexOf(step) + 1} of {steps.length}
            </span>
            {STEP_WORDS[step]}
          </h2>
          <Body
            data={data}
            step={step}
            acts={acts}
            resolutions={resolutions}
            onward={onward}
            refresh={() => mutate()}
          />
        </section>
        <StepList commissioning={data} current={step} />
      </div>
    </>
  )
}

function Body({
  data,
  step,
  acts,
  resolutions,
  onward,
  refresh,
}: {
  data: Commissioning
  step: Step
  acts: ReturnType<typeof commissioningActs>
  resolutions: GaugeResolutions
  onward: () => void
  refresh: () => Promise<unknown>
}) {
  if (step === 'record' || data.finishedAt !== null) return <RecordStep commissioning={data} acts={acts} />
  if (step === 'boat') return <BoatStep commissioning={data} acts={acts} onward={onward} />
  if (step === 'logger')
    return <LoggerStep commissioning={data} acts={acts} refresh={refresh} onward={onward} />
  return (
    <CheckStep
      key={step}
      commissioning={data}
      kind={step}
      acts={acts}
      resolutions={resolutions}
      onward={onward}
    />
  )
}

const where = (data: Commissioning): string =>
  data.system === null
    ? 'No boat chosen yet'
    : [data.system.vesselName, data.system.name].filter(Boolean).join(', ')
