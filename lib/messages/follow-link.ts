import { asIngest } from '@/db/roles'
import { actOnLink, messageOfLink } from '@/lib/messages/links'
import type { ActWord } from '@/lib/messages/reply-words'
import { Problem } from '@/lib/problem'

const RUN_OUT = 'This link has run out, or is not one of ours. Sign in to see your boats.'
const textOf = (date: Date | null): string | null => date?.toISOString() ?? null

/** What the message behind a link tells; holding it is the right to read it. @throws Problem not-found */
export async function readLink(code: string, now: Date) {
  const message = await asIngest((trx) => messageOfLink(trx, code, now))
  if (message === null) throw new Problem('not-found', RUN_OUT)
  return {
    notices: message.notices.map((notice) => ({
      kind: notice.kind,
      systemId: notice.systemId,
      vesselId: notice.vesselId,
      vesselName: notice.vesselName,
      systemName: notice.systemName,
      reason: notice.reason,
      openedAt: notice.openedAt.toISOString(),
      closedAt: textOf(notice.closedAt),
      acknowledgedAt: textOf(notice.acknowledgedAt),
      snoozedUntil: textOf(notice.snoozedUntil),
    })),
  }
}

/** Does what the holder of a link asks for. @throws Problem not-found */
export async function followLink(
  code: string,
  act: { word: ActWord; systemId?: string | undefined },
  now: Date,
) {
  const only = act.systemId === undefined ? undefined : { systemId: act.systemId }
  const outcome = await asIngest((trx) => actOnLink(trx, code, act.word, now, only))
  if (outcome === null) throw new Problem('not-found', RUN_OUT)
  return outcome
}
