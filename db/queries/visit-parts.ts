import type { Trx } from '@/db/roles'
import type { GaugeTest, PartChange, VisitEntry } from '@/shared/schemas'

/** What was entered on a visit, oldest first, instants as they cross the wire. */
export interface VisitParts {
  gaugeTests: GaugeTest[]
  entries: VisitEntry[]
  partChanges: PartChange[]
  photos: {
    id: string
    at: string
    mediaType: 'image/jpeg' | 'image/png' | 'image/webp'
    caption: string | null
  }[]
  reports: { version: number; madeAt: string; signedAt: string | null; signedBy: string | null }[]
}

const UTC = (column: string): string =>
  `to_char(${column} at time zone 'UTC', 'YYYY-MM-DD"T"HH24:MI:SS.MS"Z"')`

export async function readVisitParts(trx: Trx, visitId: string): Promise<VisitParts> {
  const list = async <Row>(sql: string): Promise<Row[]> => {
    const { rows } = await trx.raw<{ rows: Row[] }>(sql, [visitId])
    return rows
  }
  return {
    gaugeTests: await list(
      `select id, ${UTC('started_at')} as "startedAt", ${UTC('ended_at')} as "endedAt", part_keys as "partKeys",
         start_pa as "startPa", end_pa as "endPa", resolution_pa as "resolutionPa", air_start_c as "airStartCel",
         air_end_c as "airEndCel", barometer_start_pa as "barometerStartPa", barometer_end_pa as "barometerEndPa"
       from gauge_test where visit_id = ? order by started_at`,
    ),
    entries: await list(
      `select id, ${UTC('at')} as at, kind, body from visit_entry where visit_id = ? order by visit_entry.at`,
    ),
    partChanges: await list(
      `select id, part_key as "partKey", ${UTC('at')} as at, action, detail from part_change
       where visit_id = ? order by part_change.at`,
    ),
    photos: await list(
      `select id, ${UTC('at')} as at, media_type as "mediaType", caption from photo where visit_id = ? order by photo.at`,
    ),
    reports: await list(
      `select r.version, ${UTC('r.made_at')} as "madeAt", ${UTC('r.signed_at')} as "signedAt", p.name as "signedBy"
       from report_version r left join person p on p.id = r.signed_by where r.visit_id = ? order by r.version`,
    ),
  }
}

export async function insertGaugeTest(
  trx: Trx,
  test: GaugeTest & { visitId: string; systemId: string; enteredBy: string },
): Promise<void> {
  await trx('gauge_test')
    .insert({
      id: test.id,
      visit_id: test.visitId,
      system_id: test.systemId,
      started_at: test.startedAt,
      ended_at: test.endedAt,
      part_keys: test.partKeys,
      start_pa: test.startPa,
      end_pa: test.endPa,
      resolution_pa: test.resolutionPa ?? null,
      air_start_c: test.airStartCel ?? null,
      air_end_c: test.airEndCel ?? null,
      barometer_start_pa: test.barometerStartPa ?? null,
      barometer_end_pa: test.barometerEndPa ?? null,
      entered_by: test.enteredBy,
    })
    .onConflict('id')
    .ignore()
}

export async function insertVisitEntry(
  trx: Trx,
  entry: VisitEntry & { visitId: string; enteredBy: string },
): Promise<void> {
  await trx('visit_entry')
    .insert({
      id: entry.id,
      visit_id: entry.visitId,
      at: entry.at,
      entered_by: entry.enteredBy,
      kind: entry.kind,
      body: JSON.stringify(entry.body),
    })
    .onConflict('id')
    .ignore()
}

export async function insertPartChange(trx: Trx, change: PartChange & { visitId: string }): Promise<void> {
  await trx('part_change')
    .insert({
      id: change.id,
      visit_id: change.visitId,
      part_key: change.partKey,
      at: change.at,
      action: change.action,
      detail: change.detail ?? null,
    })
    .onConflict('id')
    .ignore()
}
