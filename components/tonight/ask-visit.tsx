'use client'

import { useForm } from 'react-hook-form'
import { useSWRConfig } from 'swr'
import { ApiProblem, send } from '@/components/data/request'
import { Button } from '@/components/ui/button'
import { Trouble } from '@/components/ui/sheet-states'
import type { AskVisit as Asked, List, Vessel, Visit } from '@/shared/schemas'
import { useApi } from '@/components/data/use-api'

const STATUS_WORDS: Record<Visit['status'], string> = {
  asked: 'You have asked for a visit; the shop will name a day.',
  planned: 'A visit is planned.',
  'under-way': 'A technician is at work.',
  proving: 'The repair is being proved by the nights that follow.',
  closed: '',
}

/** Asks the shop that looks after the boat to come; says so when it has been asked already. `folded` for a calm boat. */
export function AskVisit({ vessel, folded = false }: { vessel: Vessel; folded?: boolean }) {
  const { mutate } = useSWRConfig()
  const visits = useApi<List<Visit>>(`/api/visits?vessel=${vessel.id}`)
  const { register, handleSubmit, formState, setError, reset } = useForm<{ complaint: string }>({
    defaultValues: { complaint: '' },
  })
  const shop = vessel.access[0]
  const open = visits.data?.items.find((visit) => visit.status !== 'closed')
  const submit = handleSubmit(async ({ complaint }) => {
    const body: Partial<Asked> = { complaint, shopId: shop?.shopId }
    try {
      await send('POST', `/api/vessels/${vessel.id}/visits`, body)
      reset()
      await mutate((key) => typeof key === 'string' && key.startsWith('/api/visits'))
    } catch (error) {
      const message = error instanceof ApiProblem ? error.message : 'That did not reach the shop. Try again.'
      setError('root', { message })
    }
  })
  if (!vessel.rights.askVisit) return null
  if (!shop) {
    return (
      <div>
        <h2>A visit</h2>
        <p className="mt-1 text-ink-2">
          No shop may see this boat yet. Let one in under the boat’s Set-up, then it can be asked to come.
        </p>
      </div>
    )
  }
  if (open) {
    return (
      <div>
        <h2>A visit from {shop.shopName}</h2>
        <p className="mt-1">{STATUS_WORDS[open.status]}</p>
      </div>
    )
  }
  const form = (
    <form onSubmit={(event) => void submit(event)} className="max-w-[38em]">
      {folded ? null : <h2>A visit from {shop.shopName}</h2>}
      <label className="mt-2 grid gap-1">
        <span className="datum">What you noticed, if anything; the readings go along by themselves.</span>
        <textarea
          rows={2}
          maxLength={4000}
          className="rounded-sm border border-field bg-water px-3 py-2"
          {...register('complaint')}
        />
      </label>
      <Button type="submit" className="mt-2 w-full sm:w-auto" disabled={formState.isSubmitting}>
        {formState.isSubmitting ? 'Asking …' : `Ask ${shop.shopName} for a visit`}
      </Button>
      {formState.errors.root?.message ? <Trouble title={formState.errors.root.message} /> : null}
    </form>
  )
  if (!folded) return form
  return (
    <details>
      <summary>Ask {shop.shopName} for a visit</summary>
      {form}
    </details>
  )
}
