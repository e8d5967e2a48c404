import { inboundCount, insertInbound, lastTextTo, noteInbound } from '@/db/queries/message-acts'
import { startAddress, stopAddress } from '@/db/queries/recipients'
import type { Trx } from '@/db/roles'
import { actOnMessage } from '@/lib/messages/act'
import { firstThatFits } from '@/lib/messages/gsm'
import { queueText } from '@/lib/messages/queue-mail'
import { replyWord, type ReplyWord } from '@/lib/messages/reply-words'

const DAY_MS = 86_400_000
/** A reply is about the last text of two weeks. */
const ABOUT_MS = 14 * DAY_MS
/** A machine that answers our answers is left alone after so many a day. */
const ANSWERS_A_DAY = 20

export interface InboundText {
  /** The service's id: handed in twice, it is done once. */
  serviceId: string
  from: string
  body: string
}

const HELP =
  'Middlewatch. Reply OK to acknowledge, VISIT to ask your shop, MUTE for 7 days, OFF or LAIDUP for the system, STOP to end texts.'

/**
 * Does what a text from a receiver asks for, and answers it by a text (STOP by none: the service confirms that).
 * @param trx under the service's role.
 * @returns what was done, by name.
 */
export async function receiveText(trx: Trx, text: InboundText, now: Date): Promise<string> {
  const word = replyWord(text.body)
  const about = await lastTextTo(trx, text.from, new Date(now.getTime() - ABOUT_MS))
  const isNew = await insertInbound(trx, {
    serviceId: text.serviceId,
    at: now,
    address: text.from,
    word,
    personId: about?.personId ?? null,
  })
  if (!isNew) return 'received-before'
  const { did, answer } = await doWord(trx, word, text.from, about, now)
  await noteInbound(trx, text.serviceId, did)
  const isTalkative = (await inboundCount(trx, text.from, new Date(now.getTime() - DAY_MS))) > ANSWERS_A_DAY
  if (answer !== null && !isTalkative) {
    const personId = about?.personId ?? null
    await queueText(trx, { personId, to: text.from, body: firstThatFits([answer]), purpose: 'reply' }, now)
  }
  return did
}

async function doWord(
  trx: Trx,
  word: ReplyWord | null,
  from: string,
  about: Awaited<ReturnType<typeof lastTextTo>>,
  now: Date,
): Promise<{ did: string; answer: string | null }> {
  switch (word) {
    case null:
      return { did: 'not-understood', answer: HELP }
    case 'HELP':
      return { did: 'helped', answer: HELP }
    case 'STOP':
      await stopAddress(trx, 'sms', from, now)
      return { did: 'stopped', answer: null }
    case 'START':
      await startAddress(trx, 'sms', from, now)
      return {
        did: 'started',
        answer: 'Texts from Middlewatch are on again. Reply STOP to end them, HELP for more.',
      }
    default: {
      if (about === null)
        return { did: 'nothing-there', answer: 'There is no message to answer to. Reply HELP for more.' }
      const outcome = await actOnMessage(trx, about, word, now)
      return { did: outcome.did, answer: outcome.sentence }
    }
  }
}
