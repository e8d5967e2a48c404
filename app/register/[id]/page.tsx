import { redirect } from 'next/navigation'
import { requireCommissioningSeen } from '@/app/register/seen'
import { nextStep, stepHref } from '@/components/register/steps'

/** Goes on where it was left. */
export default async function ResumePage({ params }: { params: Promise<{ id: string }> }) {
  const { id } = await params
  redirect(stepHref(id, nextStep(await requireCommissioningSeen(id))))
}
