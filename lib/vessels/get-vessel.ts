import { readSettings, readSystems } from '@/db/queries/systems'
import { readVessel } from '@/db/queries/vessels'
import { asPerson } from '@/db/roles'
import { noSuch, requireRight } from '@/lib/access/require-right'
import { rightsOf } from '@/lib/access/rights'
import { presentState } from '@/lib/fleet/present-state'
import { settingsOnWire } from '@/lib/systems/settings-on-wire'
import type { Vessel } from '@/shared/schemas'

/** A vessel with all that is set up on it, as the person may see it. @throws Problem `not-found` */
export async function getVessel(personId: string, vesselId: string, now: Date): Promise<Vessel> {
  return asPerson(personId, async (trx) => {
    const standing = await requireRight(trx, vesselId, null)
    const vessel = await readVessel(trx, vesselId, now)
    if (vessel === null) throw noSuch('vessel')
    const systems = await readSystems(trx, vesselId, now)
    const settings = await readSettings(
      trx,
      systems.map((system) => system.id),
      now,
    )
    return {
      ...vessel,
      access: vessel.access.map((entry) => ({ ...entry, grantedAt: entry.grantedAt.toISOString() })),
      aboard: vessel.aboard && {
        value: vessel.aboard.value,
        until: vessel.aboard.until?.toISOString() ?? null,
      },
      systems: systems.map((system) => {
        const setting = settings.find((row) => row.systemId === system.id)
        if (setting === undefined) throw new Error(`system ${system.id} has no setting`)
        return {
          id: system.id,
          name: system.name,
          state: presentState({
            state: system.figures?.state ?? null,
            since: null,
            lastHeardAt: system.lastHeardAt,
            silenceSeconds: setting.silenceSeconds,
            statement: system.statement,
            now,
          }).state,
          settings: settingsOnWire(setting),
          statement: system.statement && {
            value: system.statement.value,
            from: system.statement.from.toISOString(),
            until: system.statement.until?.toISOString() ?? null,
          },
          parts: system.parts,
          logger: system.logger && {
            ...system.logger,
            fittedAt: system.logger.fittedAt.toISOString(),
            lastHeardAt: system.logger.lastHeardAt?.toISOString() ?? null,
          },
        }
      }),
      rights: rightsOf(standing),
    }
  })
}
