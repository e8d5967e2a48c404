import { z } from 'zod'
import { loggerKeySchema, loggerSchema } from '@/shared/schemas/loggers'
import { listOf } from '@/shared/schemas/common'
import { createdSystemSchema, createdVesselSchema, fleetRowSchema } from '@/shared/schemas/vessels'
import { ApiError, type Session } from '@/simulator/client'
import type { ScenarioSystem, ScenarioVessel } from '@/simulator/scenario'

/** What is asked of the API for one system. */
const systemInput = (system: ScenarioSystem) => ({
  name: system.name,
  kind: system.kind,
  cutOutPa: system.boat.switch.cutOutPa,
  cutInPa: system.boat.switch.cutInPa,
  pumpAmps: system.pumpAmps,
  parts: system.parts,
})

export type CreatedVessel = { vesselId: string; systemIds: string[] }

/** Creates a vessel with its systems, or finds the one of that name that is already there. */
export async function createVessel(
  session: Session,
  vessel: ScenarioVessel,
  place: { timeZone: string; shopId: string | null },
): Promise<CreatedVessel> {
  const existing = await findVessel(session, vessel.name)
  const [first, ...further] = vessel.systems
  if (existing && existing.systemIds.length >= vessel.systems.length) return existing
  const created = await session.send(
    'POST',
    '/api/vessels',
    {
      name: vessel.name,
      timeZone: place.timeZone,
      harbour: vessel.harbour,
      berth: vessel.berth,
      ...(place.shopId === null ? {} : { shopId: place.shopId }),
      ...(vessel.ownerEmail === null ? {} : { ownerEmail: vessel.ownerEmail }),
      ...(first ? { system: systemInput(first) } : {}),
    },
    createdVesselSchema,
  )
  const systemIds = created.systems.map((system) => system.id)
  for (const system of further) {
    const { id } = await session.send(
      'POST',
      `/api/vessels/${created.id}/systems`,
      systemInput(system),
      createdSystemSchema,
    )
    systemIds.push(id)
  }
  return { vesselId: created.id, systemIds }
}

async function findVessel(session: Session, name: string): Promise<CreatedVessel | null> {
  const rows = await session.get(
    '/api/vessels?limit=5000',
    listOf(fleetRowSchema.pick({ vesselId: true, systemId: true, name: true })),
  )
  const own = rows.items.filter((row) => row.name === name)
  const [first] = own
  return first ? { vesselId: first.vesselId, systemIds: own.map((row) => row.systemId) } : null
}

/** Registers a logger as fitted since `fittedAt`; one that is there already gets a new key. */
export async function registerLogger(
  session: Session,
  systemId: string,
  logger: ScenarioSystem['logger'],
  fittedAt: number,
): Promise<z.infer<typeof loggerKeySchema>> {
  try {
    return await session.send(
      'POST',
      `/api/systems/${systemId}/loggers`,
      { ...logger, fittedAt: new Date(fittedAt).toISOString() },
      loggerKeySchema,
    )
  } catch (error) {
    if (!(error instanceof ApiError) || ![409, 422].includes(error.status)) throw error
    const known = await session.get(
      '/api/loggers?limit=5000',
      listOf(loggerSchema.pick({ id: true, serial: true })),
    )
    const same = known.items.find((each) => each.serial === logger.serial)
    if (!same) throw error
    return session.send('POST', `/api/loggers/${same.id}/key`, {}, loggerKeySchema)
  }
}
