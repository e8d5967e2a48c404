import { env } from '@/lib/env'
import { deliver } from '@/lib/messages/deliver'
import { openServices } from '@/lib/messages/services'
import { nobody } from './client'
import { serverDatabase } from './database'

interface Mail {
  to: string
  subject: string | null
  text: string
  channel: 'email' | 'sms'
}

/** Sends what waits for an address, as the worker would, and answers what the outbox then holds of it, newest last. */
export async function mailTo(address: string): Promise<Mail[]> {
  const database = serverDatabase()
  const services = openServices(env())
  try {
    const waiting = await database('message')
      .whereRaw('lower(address) = lower(?)', [address])
      .whereNull('accepted_at')
      .whereNull('failed_at')
      .orderBy('id')
      .select<{ id: string }[]>('id')
    for (const { id } of waiting) await deliver(id, new Date(), services)
  } finally {
    services.close()
    await database.destroy()
  }
  const { body } = await nobody().get<{ items: Mail[] }>('/api/outbox')
  return body.items.filter((mail) => mail.to.toLowerCase() === address.toLowerCase())
}

/** The newest mail to an address. @throws Error when there is none */
export async function lastMailTo(address: string): Promise<Mail> {
  const mail = (await mailTo(address)).at(-1)
  if (mail === undefined) throw new Error(`no mail went to ${address}`)
  return mail
}

/** The path of the one link in a mail, such as `/invitation/…`. */
export function linkIn(mail: Mail): string {
  const found = /https?:\/\/[^/\s]+(\/\S+)/.exec(mail.text)?.[1]
  if (found === undefined) throw new Error(`there is no link in “${mail.subject}”`)
  return found
}

/** The secret at the end of the link in a mail. */
export const secretIn = (mail: Mail): string => linkIn(mail).split('/').at(-1) ?? ''
