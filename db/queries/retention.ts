import type { Trx } from '@/db/roles'

/** Systems whose record before an instant is not final yet, and has samples there. */
export async function systemsToSeal(trx: Trx, until: Date, limit: number): Promise<string[]> {
  const { rows } = await trx.raw<{ rows: { id: string }[] }>(
    `select s.system_id as id from system_state s
     where (s.sealed_until is null or s.sealed_until < :until::timestamptz)
       and exists (select 1 from logger_fitting f join sample p on p.logger_id = f.logger_id and f.span @> p.at
         where f.system_id = s.system_id and p.at < :until::timestamptz)
     order by s.system_id limit :limit`,
    { until, limit },
  )
  return rows.map((row) => row.id)
}

/** Drops the months of samples that end at or before an instant; needs the owner of the tables. @returns how many. */
export async function dropSamplesBefore(trx: Trx, until: Date): Promise<number> {
  const { rows } = await trx.raw<{ rows: { name: string }[] }>(
    `select c.relname as name from pg_inherits i join pg_class c on c.oid = i.inhrelid
     where i.inhparent = 'sample'::regclass
       and to_timestamp(substring(c.relname from 'sample_(\\d{4}_\\d{2})'), 'YYYY_MM') + interval '1 month'
         <= ?::timestamptz`,
    [until],
  )
  for (const { name } of rows) {
    await trx.raw('alter table sample detach partition ??', [name])
    await trx.raw('drop table ??', [name])
  }
  return rows.length
}
