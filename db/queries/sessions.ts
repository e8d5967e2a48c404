import { randomUUID } from 'node:crypto'
import type { Trx } from '@/db/roles'

export interface SessionPerson {
  sessionId: string
  personId: string
  name: string
  email: string
  units: Record<string, unknown>
  memberships: { shopId: string; role: string }[]
  ownsVessels: boolean
}

/** The live session with who it belongs to and what they are in which shop, read anew at each request. */
export async function readSession(trx: Trx, sessionId: string, at: Date): Promise<SessionPerson | null> {
  const { rows } = await trx.raw<{ rows: (SessionPerson & { stale: boolean })[] }>(
    `select s.id as "sessionId", p.id as "personId", p.name, p.email::text as email, p.units,
       coalesce((select json_agg(json_build_object('shopId', m.shop_id::text, 'role', m.role) order by m.shop_id, m.role)
         from membership m where m.person_id = p.id and m.ended_at is null), '[]') as memberships,
       exists (select 1 from vessel_owner o where o.person_id = p.id and o.ended_at is null) as "ownsVessels",
       s.last_seen_at < cast(:at as timestamptz) - interval '5 minutes' as stale
     from session s join person p on p.id = s.person_id
     where s.id = :session and s.ended_at is null and s.expires_at > :at and p.deleted_at is null`,
    { session: sessionId, at },
  )
  const row = rows[0]
  if (row === undefined) return null
  if (row.stale) await trx('session').where({ id: sessionId }).update({ last_seen_at: at })
  const { sessionId: id, personId, name, email, units, memberships, ownsVessels } = row
  return { sessionId: id, personId, name, email, units, memberships, ownsVessels }
}

/** Opens a session; answers its id. */
export async function openSession(
  trx: Trx,
  session: { personId: string; at: Date; expiresAt: Date; userAgent: string | null },
): Promise<string> {
  const id = randomUUID()
  await trx('session').insert({
    id,
    person_id: session.personId,
    created_at: session.at,
    last_seen_at: session.at,
    expires_at: session.expiresAt,
    user_agent: session.userAgent?.slice(0, 400) ?? null,
  })
  return id
}

export async function endSession(trx: Trx, sessionId: string, at: Date): Promise<void> {
  await trx('session').where({ id: sessionId }).whereNull('ended_at').update({ ended_at: at })
}

/** Ends every session of a person but the one named: after a change of password. */
export async function endOtherSessions(
  trx: Trx,
  personId: string,
  keepSessionId: string | null,
  at: Date,
): Promise<void> {
  const others = trx('session').where({ person_id: personId }).whereNull('ended_at')
  if (keepSessionId !== null) others.whereNot({ id: keepSessionId })
  await others.update({ ended_at: at })
}
