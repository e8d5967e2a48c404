import type { Trx } from '@/db/roles'
import type { StatementValue, SystemKind } from '@/shared/schemas/words'

export interface SaidOfSystem {
  value: StatementValue
  from: Date
}

/** What people say of a system, in force at an instant; said last, it stands. */
export async function statementInForce(trx: Trx, systemId: string, at: Date): Promise<SaidOfSystem | null> {
  const row = await trx('statement')
    .where({ system_id: systemId })
    .where('from_at', '<=', at)
    .andWhere((open) => void open.whereNull('until_at').orWhere('until_at', '>', at))
    .orderBy('from_at', 'desc')
    .orderBy('id', 'desc')
    .first<{ value: StatementValue; from_at: Date } | undefined>('value', 'from_at')
  return row === undefined ? null : { value: row.value, from: row.from_at }
}

/** Who is aboard a vessel by the owner's word or the calendar, in force at an instant; null = nothing said. */
export async function saidAboard(
  trx: Trx,
  vesselId: string,
  at: Date,
): Promise<{ value: 'aboard' | 'away'; from: Date } | null> {
  const row = await trx('statement')
    .where({ vessel_id: vesselId })
    .whereNull('system_id')
    .where('from_at', '<=', at)
    .andWhere((open) => void open.whereNull('until_at').orWhere('until_at', '>', at))
    .orderBy('from_at', 'desc')
    .orderBy('id', 'desc')
    .first<{ value: 'aboard' | 'away'; from_at: Date } | undefined>('value', 'from_at')
  return row === undefined ? null : { value: row.value, from: row.from_at }
}

export interface JudgedSystem {
  systemId: string
  vesselId: string
  vesselName: string
  timeZone: string
  harbour: string | null
  altitudeM: number
}

export async function judgedSystem(trx: Trx, systemId: string): Promise<JudgedSystem | null> {
  const row = await trx('system as s')
    .join('vessel as v', 'v.id', 's.vessel_id')
    .where('s.id', systemId)
    .first<
      | {
          system_id: string
          vessel_id: string
          name: string
          time_zone: string
          harbour: string | null
          altitude_m: number
        }
      | undefined
    >('s.id as system_id', 'v.id as vessel_id', 'v.name', 'v.time_zone', 'v.harbour', 'v.altitude_m')
  return row === undefined
    ? null
    : {
        systemId: String(row.system_id),
        vesselId: String(row.vessel_id),
        vesselName: row.name,
        timeZone: row.time_zone,
        harbour: row.harbour,
        altitudeM: row.altitude_m,
      }
}

/** The set-up's figures in force at an instant; the defaults of the table where nothing was set. */
export interface SettingInForce {
  kind: SystemKind
  cutOutPa: number | null
  cutInPa: number | null
  limitSeconds: number
  aimSeconds: number
  silenceSeconds: number
  lowSupplyV: number | null
}

export async function settingInForce(trx: Trx, systemId: string, at: Date): Promise<SettingInForce> {
  const row = await trx('setting')
    .where({ system_id: systemId })
    .where('in_force_from', '<=', at)
    .orderBy('in_force_from', 'desc')
    .first<
      | {
          kind: SystemKind
          cut_out_pa: number | null
          cut_in_pa: number | null
          limit_seconds: number
          aim_seconds: number
          silence_seconds: number
          low_supply_v: number | null
        }
      | undefined
    >()
  return row === undefined
    ? {
        kind: 'pass-through',
        cutOutPa: null,
        cutInPa: null,
        limitSeconds: 10_800,
        aimSeconds: 28_800,
        silenceSeconds: 21_600,
        lowSupplyV: null,
      }
    : {
        kind: row.kind,
        cutOutPa: row.cut_out_pa,
        cutInPa: row.cut_in_pa,
        limitSeconds: row.limit_seconds,
        aimSeconds: row.aim_seconds,
        silenceSeconds: row.silence_seconds,
        lowSupplyV: row.low_supply_v,
      }
}
