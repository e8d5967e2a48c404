'use client'

import { useState } from 'react'
import type { KeyedMutator } from 'swr'
import { ApiProblem, send } from '@/components/data/request'
import { useApi } from '@/components/data/use-api'
import type { ChangeCommissioning, CheckKind, Commissioning, StepCheck } from '@/shared/schemas'

export interface Work {
  busy: boolean
  trouble: string | null
  /** Runs one thing, keeps what was typed on a refusal and says what was wrong. Answers whether it worked. */
  attempt: (work: () => Promise<unknown>) => Promise<boolean>
}

/** One thing at a time, and what went wrong with the last of them. */
export function useWork(): Work {
  const [busy, setBusy] = useState(false)
  const [trouble, setTrouble] = useState<string | null>(null)
  const attempt = async (work: () => Promise<unknown>) => {
    setBusy(true)
    setTrouble(null)
    try {
      await work()
      return true
    } catch (error) {
      setTrouble(error instanceof ApiProblem ? error.message : 'That did not work. Try again.')
      return false
    } finally {
      setBusy(false)
    }
  }
  return { busy, trouble, attempt }
}

/** A commissioning, kept on the server: left here, it is resumed anywhere. */
export const useCommissioning = (id: string) =>
  useApi<Commissioning>(`/api/commissionings/${id}`, { refreshMs: 15_000 })

/** Changes that answer the whole commissioning anew. */
export function commissioningActs(id: string, mutate: KeyedMutator<Commissioning>) {
  const keep = async (answer: Promise<Commissioning | null>) => {
    const fresh = await answer
    if (fresh !== null) await mutate(fresh, { revalidate: false })
  }
  return {
    change: (change: ChangeCommissioning) => keep(send('PATCH', `/api/commissionings/${id}`, change)),
    step: (kind: CheckKind, step: StepCheck) =>
      keep(send('POST', `/api/commissionings/${id}/checks/${kind}`, step)),
    finish: (note: string) =>
      keep(send('POST', `/api/commissionings/${id}/finish`, note.trim() === '' ? {} : { note })),
  }
}
export type Acts = ReturnType<typeof commissioningActs>
