import { randomUUID } from 'node:crypto'
import { z } from 'zod'
import { meSchema } from '@/shared/schemas/people'
import { createdVisitSchema } from '@/shared/schemas/visits'
import type { Session } from '@/simulator/client'
import type { ScenarioVessel, ScenarioVisit } from '@/simulator/scenario'

const anything = z.unknown()
const iso = (at: number): string => new Date(at).toISOString()

export type Cast = { manager: Session; technician: Session; owner: Session | null; shopId: string }
export type Told = { vesselId: string; systemIds: readonly string[] }

/**
 * What people have said and done about a vessel: aboard or laid up, who may see it, and the visits. Each part
 * is tried by itself; `onTrouble` hears of those that were not taken.
 */
export async function tellStory(
  vessel: ScenarioVessel,
  told: Told,
  cast: Cast,
  onTrouble: (what: string, error: unknown) => void,
): Promise<void> {
  const attempt = async (what: string, work: () => Promise<unknown>): Promise<void> => {
    try {
      await work()
    } catch (error) {
      onTrouble(`${vessel.name}: ${what}`, error)
    }
  }
  const speaker = cast.owner ?? cast.manager
  if (vessel.fullRecord && cast.owner) {
    const { owner } = cast
    await attempt('full record', () =>
      owner.send('PUT', `/api/vessels/${told.vesselId}/access/${cast.shopId}`, { level: 'full' }, anything),
    )
  }
  for (const [index, system] of vessel.systems.entries()) {
    for (const { kind, value, until } of system.statements) {
      const path =
        kind === 'aboard'
          ? `/api/vessels/${told.vesselId}/aboard`
          : `/api/systems/${told.systemIds[index]}/statement`
      const body = { value, until: until === null ? null : iso(until) }
      await attempt(kind, () => speaker.send('PUT', path, body, anything))
    }
  }
  for (const visit of vessel.visits) {
    await attempt('visit', () => tellVisit(visit, told, cast, speaker))
  }
}

async function tellVisit(visit: ScenarioVisit, told: Told, cast: Cast, speaker: Session): Promise<void> {
  const systemId = told.systemIds[visit.system]
  const { id } = await speaker.send(
    'POST',
    `/api/vessels/${told.vesselId}/visits`,
    { complaint: visit.complaint, shopId: cast.shopId, ...(systemId === undefined ? {} : { systemId }) },
    createdVisitSchema,
  )
  const change = (session: Session, body: unknown) =>
    session.send('PATCH', `/api/visits/${id}`, body, anything)
  const { person } = await cast.technician.get('/api/me', meSchema)
  if (visit.status === 'asked' || visit.plannedFor === null) return
  await change(cast.manager, { status: 'planned', plannedFor: iso(visit.plannedFor), assignedTo: person.id })
  if (visit.startedAt === null) return
  await change(cast.technician, { status: 'under-way', startedAt: iso(visit.startedAt) })
  for (const { startedAt, endedAt, ...test } of visit.gaugeTests) {
    await cast.technician.send(
      'POST',
      `/api/visits/${id}/gauge-tests`,
      { id: randomUUID(), startedAt: iso(startedAt), endedAt: iso(endedAt), ...test },
      anything,
    )
  }
  for (const { at, ...part } of visit.partChanges) {
    await cast.technician.send(
      'POST',
      `/api/visits/${id}/part-changes`,
      { id: randomUUID(), at: iso(at), ...part },
      anything,
    )
  }
  if (visit.finishedAt === null) return
  await change(cast.technician, {
    status: 'proving',
    finishedAt: iso(visit.finishedAt),
    summary: visit.summary,
  })
  if (visit.status === 'closed') await change(cast.technician, { status: 'closed', verdict: visit.verdict })
}
