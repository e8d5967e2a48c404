import {
  acknowledgeSchema,
  doneSchema,
  listOf,
  messageSchema,
  messagesQuerySchema,
  noticeSchema,
  noticesQuerySchema,
  noticeWholeSchema,
  outboxSchema,
  snoozeSchema,
} from '@/shared/schemas'
import { operation } from '../operation'
import { byId } from './vessels'

const tag = 'Notices and messages'

export const listNotices = operation({
  method: 'get',
  path: '/api/notices',
  summary: 'Notices, open or closed, ascending by opening',
  tag,
  access: 'signed-in',
  query: noticesQuerySchema,
  output: listOf(noticeSchema),
})

export const getNotice = operation({
  method: 'get',
  path: '/api/notices/{id}',
  summary: 'A notice with what happened to it and who was told',
  tag,
  access: 'signed-in',
  params: byId,
  output: noticeWholeSchema,
})

export const snoozeNotice = operation({
  method: 'patch',
  path: '/api/notices/{id}',
  summary: 'Snooze a notice until an instant; null wakes it again',
  tag,
  access: 'signed-in',
  params: byId,
  body: snoozeSchema,
  output: noticeSchema,
})

export const acknowledgeNotice = operation({
  method: 'post',
  path: '/api/notices/{id}/acknowledge',
  summary: 'Acknowledge a notice, with a note if wished',
  tag,
  access: 'signed-in',
  params: byId,
  body: acknowledgeSchema,
  output: noticeSchema,
})

export const listMessages = operation({
  method: 'get',
  path: '/api/messages',
  summary: 'The message log of the manager’s shops, newest last',
  tag,
  access: 'signed-in',
  query: messagesQuerySchema,
  output: listOf(messageSchema),
})

export const resendMessage = operation({
  method: 'post',
  path: '/api/messages/{id}/resend',
  summary: 'Send a message again that was given up (manager)',
  tag,
  access: 'signed-in',
  params: byId,
  output: doneSchema,
})

export const getOutbox = operation({
  method: 'get',
  path: '/api/outbox',
  summary: 'What was sent, to read without a mailbox; in demo and test only',
  tag,
  access: 'demo',
  output: outboxSchema,
})

export const noticeOperations = [
  listNotices,
  getNotice,
  snoozeNotice,
  acknowledgeNotice,
  listMessages,
  resendMessage,
  getOutbox,
]
