import type { Metadata } from 'next'
import { notFound } from 'next/navigation'
import { requireCommissioningSeen } from '@/app/register/seen'
import { StepSheet } from '@/components/register/step-sheet'
import { stepNamed, STEP_WORDS } from '@/components/register/steps'
import { GAUGE_RESOLUTION_PA } from '@/lib/analysis/leak-down'

type Props = { params: Promise<{ id: string; step: string }> }

export async function generateMetadata({ params }: Props): Promise<Metadata> {
  const step = stepNamed((await params).step)
  return { title: step === undefined ? 'Register a logger' : STEP_WORDS[step] }
}

export default async function StepPage({ params }: Props) {
  const { id, step: word } = await params
  const step = stepNamed(word)
  if (step === undefined) notFound()
  await requireCommissioningSeen(id)
  const { dial, digital } = GAUGE_RESOLUTION_PA
  return <StepSheet id={id} step={step} resolutions={{ dial, digital }} />
}
