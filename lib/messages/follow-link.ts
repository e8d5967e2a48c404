import { asIngest } from '@/db/roles'
import { countGuess } from '@/lib/auth/throttle'
import { actOnLink, messageOfLink } from '@/lib/messages/links'
import type { ActWord } from '@/lib/messages/reply-words'
import { Problem } from '@/lib/problem'

const RUN_OUT = 'This link has run out, or is not one of ours. Sign in to see your boats.'
const textOf = (date: Date | null): string | null => date?.toISOString() ?? null

/** Codes are short enough to be typed, so trying them is counted. */
async function refuseLink(from: string): Promise<never> {
  await countGuess('link', from)
  throw new Problem('not-found', RUN_OUT)
}

/**
 * What the message behind a link tells; holding it is the right to read it.
 * @param from the address of who asks.
 * @throws Problem `not-found`, `too-many-requests`
 */
export async function readLink(code: string, from: string, now: Date) {
  const message = await asIngest((trx) => messageOfLink(trx, code, now))
  if (message === null) return refuseLink(from)
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

/** Does what the holder of a link asks for. @throws Problem `not-found`, `too-many-requests` */
export async function followLink(
  code: string,
  act: { word: ActWord; systemId?: string | undefined },
  from: string,
  now: Date,
) {
  const only = act.systemId === undefined ? undefined : { systemId: act.systemId }
  const outcome = await asIngest((trx) => actOnLink(trx, code, act.word, now, only))
  if (outcome === null) return refuseLink(from)
  return outcome
}
