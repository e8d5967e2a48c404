'use client'

import { useSearchParams } from 'next/navigation'
import { useApi } from '@/components/data/use-api'
import type { ApiProblem } from '@/components/data/request'
import type { System, Vessel } from '@/shared/schemas'

type Answer =
  | { vessel: Vessel; system: System; error: undefined }
  | { vessel: undefined; system: undefined; error: ApiProblem | undefined }

/** The vessel and the system of it that the address names, else its first. */
export function useVessel(id: string): Answer {
  const chosen = useSearchParams().get('system')
  const { data: vessel, error } = useApi<Vessel>(`/api/vessels/${id}`, { refreshMs: 60_000 })
  if (!vessel) return { vessel: undefined, system: undefined, error }
  const system = vessel.systems.find((candidate) => candidate.id === chosen) ?? vessel.systems[0]
  return system ? { vessel, system, error: undefined } : { vessel: undefined, system: undefined, error }
}
