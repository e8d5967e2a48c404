import { noteAudit } from '@/db/queries/audit'
import { insertSystem, replaceParts, writeSetting } from '@/db/queries/systems'
import type { Trx } from '@/db/roles'
import { checkedWrite } from '@/lib/access/checked-write'
import { requireRight } from '@/lib/access/require-right'
import { Problem } from '@/lib/problem'
import type { SystemInput } from '@/shared/schemas'

export const DEFAULT_FIGURES = {
  kind: 'pass-through',
  cutOutPa: null,
  cutInPa: null,
  limitSeconds: 10_800,
  aimSeconds: 28_800,
  silenceSeconds: 21_600,
  pumpAmps: null,
  lowSupplyV: null,
} as const

/** A system with its parts and first figures; what is not said takes the usual figure. Answers its id. */
export async function insertSystemWithSetting(
  trx: Trx,
  vesselId: string,
  input: SystemInput,
  personId: string,
  now: Date,
): Promise<string> {
  const systemId = await insertSystem(trx, vesselId, input.name ?? '')
  const said = Object.fromEntries(Object.entries(input).filter(([, value]) => value !== undefined))
  const figures = { ...DEFAULT_FIGURES, ...(said as SystemInput) }
  // A limit alone moves an aim that was never said, rather than being refused for it.
  const aimSeconds = Math.max(figures.aimSeconds, input.aimSeconds ?? figures.limitSeconds)
  const limitSeconds = Math.min(figures.limitSeconds, aimSeconds)
  await writeSetting(
    trx,
    {
      systemId,
      inForceFrom: now,
      kind: figures.kind,
      cutOutPa: figures.cutOutPa ?? null,
      cutInPa: figures.cutInPa ?? null,
      limitSeconds,
      aimSeconds: input.aimSeconds ?? aimSeconds,
      silenceSeconds: figures.silenceSeconds,
      pumpAmps: figures.pumpAmps ?? null,
      lowSupplyV: figures.lowSupplyV,
    },
    personId,
    now,
  )
  await replaceParts(trx, systemId, input.parts ?? [])
  return systemId
}

/** A further system on a vessel. @throws Problem `not-found`, `not-allowed`, `conflict` when the name is taken */
export async function addSystem(
  personId: string,
  vesselId: string,
  input: SystemInput,
  now: Date,
): Promise<{ id: string }> {
  return checkedWrite(
    personId,
    (trx) => requireRight(trx, vesselId, 'changeSettings'),
    async (trx) => {
      const taken = await trx('system')
        .where({ vessel_id: vesselId, name: input.name ?? '' })
        .first('id')
      if (taken !== undefined)
        throw new Problem('conflict', 'The boat has a system of that name already: give this one another.')
      const id = await insertSystemWithSetting(trx, vesselId, input, personId, now)
      await noteAudit(trx, {
        at: now,
        personId,
        vesselId,
        action: 'system.created',
        detail: { systemId: id },
      })
      return { id }
    },
  )
}
