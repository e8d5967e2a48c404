import { noteAudit } from '@/db/queries/audit'
import {
  correctSetting,
  readSettings,
  readSettingsAfter,
  renameSystem,
  writeSetting,
  type SettingRow,
} from '@/db/queries/systems'
import { asPerson } from '@/db/roles'
import { checkedWrite, type Rederive } from '@/lib/access/checked-write'
import { noSuch, requireSystemRight } from '@/lib/access/require-right'
import { Problem } from '@/lib/problem'
import type { ChangeSettings, Settings } from '@/shared/schemas'
import { settingsOnWire } from './settings-on-wire'

/** The figures in force. @throws Problem `not-found` */
export async function getSettings(personId: string, systemId: string, now: Date): Promise<Settings> {
  return asPerson(personId, async (trx) => {
    await requireSystemRight(trx, systemId, null)
    const [row] = await readSettings(trx, [systemId], now)
    if (row === undefined) throw noSuch('system')
    return settingsOnWire(row)
  })
}

/**
 * New figures from an instant on (default now), what is not named as it was then. A figure named for an earlier day
 * counts until it was next changed itself, whatever else was changed meanwhile. The record is derived anew
 * from there. @throws Problem `not-found`, `not-allowed`, `invalid` when the figures contradict each other
 */
export async function changeSettings(
  personId: string,
  systemId: string,
  change: ChangeSettings,
  now: Date,
  rederive: Rederive,
): Promise<Settings> {
  const from = change.inForceFrom === undefined ? now : new Date(change.inForceFrom)
  if (from > now)
    throw new Problem('invalid', 'Figures can be in force from now or from before, not from later.')
  return checkedWrite(
    personId,
    (trx) => requireSystemRight(trx, systemId, 'changeSettings'),
    async (trx, standing) => {
      const [before] = await readSettings(trx, [systemId], from)
      if (before === undefined) throw noSuch('system')
      const next = merged(before, change, from)
      await writeSetting(trx, next, personId, now)
      for (const later of carriedOn(await readSettingsAfter(trx, systemId, from), before, change))
        await correctSetting(trx, later)
      if (change.name !== undefined) await renameSystem(trx, systemId, change.name)
      await noteAudit(trx, {
        at: now,
        personId,
        vesselId: standing.vesselId,
        action: 'system.settings',
        detail: { systemId, ...change, before: namedBefore(before, change) },
      })
      await rederive(trx, systemId, from)
      return settingsOnWire(next)
    },
  )
}

/** Of the figures named in a change, what they were. */
const namedBefore = (before: SettingRow, change: ChangeSettings): Record<string, unknown> =>
  Object.fromEntries(
    Object.entries(settingsOnWire(before)).filter(([field]) => field !== 'inForceFrom' && field in change),
  )

/** Later figures with a change from before them carried on, each figure until somebody set it to something else. */
function carriedOn(
  laterRows: readonly SettingRow[],
  before: SettingRow,
  change: ChangeSettings,
): SettingRow[] {
  const FIGURES = [
    'kind',
    'cutOutPa',
    'cutInPa',
    'limitSeconds',
    'aimSeconds',
    'silenceSeconds',
    'pumpAmps',
    'lowSupplyV',
  ] as const
  let open = FIGURES.filter((field) => change[field] !== undefined)
  const corrected: SettingRow[] = []
  for (const later of laterRows) {
    open = open.filter((field) => later[field] === before[field])
    if (open.length === 0) break
    const carried = Object.fromEntries(open.map((field) => [field, change[field]]))
    corrected.push(merged(later, carried, later.inForceFrom))
  }
  return corrected
}

function merged(before: SettingRow, change: ChangeSettings, inForceFrom: Date): SettingRow {
  const pick = <T>(next: T | undefined, old: T): T => (next === undefined ? old : next)
  const next: SettingRow = {
    systemId: before.systemId,
    inForceFrom,
    kind: pick(change.kind, before.kind),
    cutOutPa: pick(change.cutOutPa, before.cutOutPa),
    cutInPa: pick(change.cutInPa, before.cutInPa),
    limitSeconds: pick(change.limitSeconds, before.limitSeconds),
    aimSeconds: pick(change.aimSeconds, before.aimSeconds),
    silenceSeconds: pick(change.silenceSeconds, before.silenceSeconds),
    pumpAmps: pick(change.pumpAmps, before.pumpAmps),
    lowSupplyV: pick(change.lowSupplyV, before.lowSupplyV),
  }
  if (next.cutOutPa !== null && next.cutInPa !== null && next.cutOutPa <= next.cutInPa)
    throw new Problem('invalid', 'The cut-out must be a deeper vacuum than the cut-in.')
  if (next.limitSeconds > next.aimSeconds)
    throw new Problem('invalid', 'The limit must not be longer than the aim.')
  return next
}
