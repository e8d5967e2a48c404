import type { Trx } from '@/db/roles'
import type { Aboard } from '@/shared/schemas/words'

/** A system and the people whose evening it belongs to. */
export interface NightCandidate {
  systemId: string
  vesselId: string
  vesselName: string
  timeZone: string
  ownerIds: string[]
}

/**
 * Systems something was heard of since `heardSince`: only of these can anything be said tonight. Those on
 * demand have no standing vacuum and no hold time, and are left out.
 */
export async function systemsHeardSince(trx: Trx, heardSince: Date): Promise<NightCandidate[]> {
  const { rows } = (await trx.raw(
    `select s.id as system_id, v.id as vessel_id, v.name as vessel_name, v.time_zone,
       array(select person_id from vessel_owner o where o.vessel_id = v.id and o.ended_at is null order by 1)
         as owner_ids
     from system_state t join system s on s.id = t.system_id join vessel v on v.id = s.vessel_id
     where t.last_heard_at >= ? order by s.id`,
    [heardSince],
  )) as {
    rows: {
      system_id: string
      vessel_id: string
      vessel_name: string
      time_zone: string
      owner_ids: string[]
    }[]
  }
  return rows.map((row) => ({
    systemId: String(row.system_id),
    vesselId: String(row.vessel_id),
    vesselName: row.vessel_name,
    timeZone: row.time_zone,
    ownerIds: row.owner_ids.map(String),
  }))
}

/** What was said of a night so far. */
export interface GivenOutlook {
  systemId: string
  night: string
  givenAt: Date
  /** The named reason of the decision. */
  reason: string
  heardAt: Date | null
}

export async function givenOutlooks(
  trx: Trx,
  nights: { systemId: string; night: string }[],
): Promise<GivenOutlook[]> {
  const { rows } = (await trx.raw(
    `select o.system_id, o.night, o.given_at, o.detail->>'reason' as reason, o.detail->>'heardAt' as heard_at
     from unnest(?::bigint[], ?::date[]) as n (system_id, night)
     join outlook o on o.system_id = n.system_id and o.night = n.night`,
    [nights.map((n) => n.systemId), nights.map((n) => n.night)],
  )) as {
    rows: { system_id: string; night: string; given_at: Date; reason: string; heard_at: string | null }[]
  }
  return rows.map((row) => ({
    systemId: String(row.system_id),
    night: row.night,
    givenAt: row.given_at,
    reason: row.reason,
    heardAt: row.heard_at === null ? null : new Date(row.heard_at),
  }))
}

export interface OutlookAsGiven {
  systemId: string
  night: string
  givenAt: Date
  quietFrom: Date
  quietTo: Date
  chance: number | null
  chanceIfFlushedLast: number | null
  expectedRuns: number | null
  aboard: Aboard
  detail: Record<string, unknown>
}

/** Writes down what is said of a night; said again the same evening, the newer word stands. */
export async function writeOutlook(trx: Trx, outlook: OutlookAsGiven): Promise<void> {
  await trx('outlook')
    .insert({
      system_id: outlook.systemId,
      night: outlook.night,
      given_at: outlook.givenAt,
      quiet_from: outlook.quietFrom,
      quiet_to: outlook.quietTo,
      chance: outlook.chance,
      chance_if_flushed_last: outlook.chanceIfFlushedLast,
      expected_runs: outlook.expectedRuns,
      aboard: outlook.aboard,
      detail: JSON.stringify(outlook.detail),
    })
    .onConflict(['system_id', 'night'])
    .merge()
}

/** The night warning last sent for a system: when, and how many runs it told. */
export async function lastNightWarning(
  trx: Trx,
  systemId: string,
): Promise<{ at: Date; expectedRuns: number } | null> {
  const row = await trx('notice')
    .where({ system_id: systemId, kind: 'night-warning' })
    .orderBy('opened_at', 'desc')
    .first<{ opened_at: Date; expected: string | null } | undefined>(
      'opened_at',
      trx.raw("evidence->>'expectedRuns' as expected"),
    )
  return row === undefined ? null : { at: row.opened_at, expectedRuns: Number(row.expected ?? 0) }
}

/** An outlook whose night is over and that can be scored. */
export interface UnscoredOutlook {
  id: string
  systemId: string
  vesselId: string
  quietFrom: Date
  quietTo: Date
  chance: number | null
  chanceIfFlushedLast: number | null
  warned: boolean
}

/**
 * Outlooks that nobody has scored yet, oldest first: their night is over and its end was heard of, or it was over
 * before `givenUpBefore` and nothing will be heard of it any more.
 */
export async function unscoredOutlooks(
  trx: Trx,
  now: Date,
  givenUpBefore: Date,
  limit: number,
): Promise<UnscoredOutlook[]> {
  const { rows } = (await trx.raw(
    `select o.id, o.system_id, s.vessel_id, o.quiet_from, o.quiet_to, o.chance, o.chance_if_flushed_last,
       exists (select 1 from notice n where n.system_id = o.system_id and n.night = o.night) as warned
     from outlook o join system s on s.id = o.system_id left join system_state t on t.system_id = o.system_id
     where o.scored_at is null and o.quiet_to < ? and (t.last_heard_at > o.quiet_to or o.quiet_to < ?)
     order by o.quiet_to, o.id limit ?`,
    [now, givenUpBefore, limit],
  )) as {
    rows: {
      id: string
      system_id: string
      vessel_id: string
      quiet_from: Date
      quiet_to: Date
      chance: number | null
      chance_if_flushed_last: number | null
      warned: boolean
    }[]
  }
  return rows.map((row) => ({
    id: String(row.id),
    systemId: String(row.system_id),
    vesselId: String(row.vessel_id),
    quietFrom: row.quiet_from,
    quietTo: row.quiet_to,
    chance: row.chance,
    chanceIfFlushedLast: row.chance_if_flushed_last,
    warned: row.warned,
  }))
}

export async function writeScore(
  trx: Trx,
  id: string,
  score: { outcome: string; runs: number | null },
  at: Date,
): Promise<void> {
  await trx('outlook').where({ id }).update({ outcome: score.outcome, runs: score.runs, scored_at: at })
}

/** Wall-clock text `22:00` of instants in a zone, in their order. */
export async function localClocks(trx: Trx, timeZone: string, instants: Date[]): Promise<string[]> {
  const { rows } = (await trx.raw(
    `select to_char(t at time zone ?, 'HH24:MI') as clock from unnest(?::timestamptz[]) with ordinality as u (t, n)
     order by n`,
    [timeZone, instants],
  )) as { rows: { clock: string }[] }
  return rows.map((row) => row.clock)
}

/** Wall-clock text with the day, `Tue 10 Nov, 14:10`, of instants in a zone. */
export async function localMoments(trx: Trx, timeZone: string, instants: Date[]): Promise<string[]> {
  const { rows } = (await trx.raw(
    `select to_char(t at time zone ?, 'Dy FMDD Mon, HH24:MI') as moment from unnest(?::timestamptz[]) with ordinality as u (t, n)
     order by n`,
    [timeZone, instants],
  )) as { rows: { moment: string }[] }
  return rows.map((row) => row.moment)
}

/**
 * Systems heard of lately whose coming night nothing was said of yet, or only in passing and a while ago.
 * @param saidBefore what was said in passing before this instant is old.
 */
export async function systemsToForetell(
  trx: Trx,
  heardSince: Date,
  saidBefore: Date,
  now: Date,
  limit: number,
): Promise<{ systemId: string; vesselId: string }[]> {
  const { rows } = (await trx.raw(
    `select s.id as system_id, s.vessel_id from system_state t join system s on s.id = t.system_id
     where t.last_heard_at >= :heardSince and not exists (
       select 1 from outlook o where o.system_id = s.id and o.quiet_to > :now
         and (o.detail->>'reason' <> 'provisional' or o.given_at > :saidBefore))
     order by s.id limit :limit`,
    { heardSince, saidBefore, now, limit },
  )) as { rows: { system_id: string; vessel_id: string }[] }
  return rows.map((row) => ({ systemId: String(row.system_id), vesselId: String(row.vessel_id) }))
}
