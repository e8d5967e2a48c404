import {
  messageByLink,
  noticesOfMessage,
  type ActableMessage,
  type ToldNotice,
} from '@/db/queries/message-acts'
import type { Trx } from '@/db/roles'
import { actOnMessage, type ActOutcome } from '@/lib/messages/act'
import type { ActWord } from '@/lib/messages/reply-words'

/** A link in a message acts for so long; afterwards one signs in. */
const LINK_DAYS = 14

export interface LinkedMessage extends ActableMessage {
  notices: ToldNotice[]
}

const since = (now: Date): Date => new Date(now.getTime() - LINK_DAYS * 86_400_000)

/**
 * What the link `/a/<code>` in a message shows. Changes nothing: mail scanners follow links.
 * @param trx under the service's role.
 * @returns null when there is no such link, or it has run out.
 */
export async function messageOfLink(trx: Trx, code: string, now: Date): Promise<LinkedMessage | null> {
  const message = await messageByLink(trx, code, since(now))
  return message === null ? null : { ...message, notices: await noticesOfMessage(trx, message) }
}

/**
 * What posting to the link does, in the name of the message's receiver.
 * @param trx under the service's role.
 * @param only one system, where the message tells of several.
 * @returns null when there is no such link, or it has run out.
 */
export async function actOnLink(
  trx: Trx,
  code: string,
  word: ActWord,
  now: Date,
  only?: { systemId: string },
): Promise<ActOutcome | null> {
  const message = await messageByLink(trx, code, since(now))
  return message === null ? null : actOnMessage(trx, message, word, now, only)
}
