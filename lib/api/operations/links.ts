import { z } from 'zod'
import { linkActSchema, linkCodeSchema, linkedMessageSchema, linkOutcomeSchema } from '@/shared/schemas'
import { operation } from '../operation'

const tag = 'Notices and messages'
const byCode = z.object({ code: linkCodeSchema })

export const readLink = operation({
  method: 'get',
  path: '/api/links/{code}',
  summary: 'What the message behind a link tells; changes nothing',
  tag,
  access: 'everybody',
  params: byCode,
  output: linkedMessageSchema,
})

export const followLink = operation({
  method: 'post',
  path: '/api/links/{code}',
  summary: 'Acknowledge, mute, ask for a visit, or say that the system is off, by the link in a message',
  tag,
  access: 'everybody',
  params: byCode,
  body: linkActSchema,
  output: linkOutcomeSchema,
})

export const linkOperations = [readLink, followLink]
