import type { SettingRow } from '@/db/queries/systems'
import type { Settings } from '@/shared/schemas'

/** Pressures are stored as single-precision numbers; a tenth of a pascal is more than was ever entered. */
const tenth = (pa: number | null): number | null => (pa === null ? null : Math.round(pa * 10) / 10)

export const settingsOnWire = (row: SettingRow): Settings => ({
  inForceFrom: row.inForceFrom.toISOString(),
  kind: row.kind,
  cutOutPa: tenth(row.cutOutPa),
  cutInPa: tenth(row.cutInPa),
  limitSeconds: row.limitSeconds,
  aimSeconds: row.aimSeconds,
  silenceSeconds: row.silenceSeconds,
  pumpAmps: row.pumpAmps === null ? null : Math.round(row.pumpAmps * 1000) / 1000,
  lowSupplyV: row.lowSupplyV === null ? null : Math.round(row.lowSupplyV * 1000) / 1000,
})
