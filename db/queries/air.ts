import type { Trx } from '@/db/roles'

export interface AirReading {
  /** Epoch milliseconds: the middle of the readings it stands for. */
  at: number
  airC: number | null
  barometerPa: number | null
}

/** A system's air and barometer in [from, to] as means over half hours, oldest first. */
export async function airPoints(trx: Trx, systemId: string, from: Date, to: Date): Promise<AirReading[]> {
  const { rows } = await trx.raw<{ rows: { at: number; air: number | null; barometer: number | null }[] }>(
    `select (avg(extract(epoch from at)) * 1000)::float8 as at, avg(air_c)::float8 as air,
       avg(barometer_pa)::float8 as barometer
     from system_samples(?, ?, ?) where air_c is not null or barometer_pa is not null
     group by floor(extract(epoch from at) / 1800) order by 1`,
    [systemId, from, to],
  )
  return rows.map((row) => ({ at: row.at, airC: row.air, barometerPa: row.barometer }))
}
