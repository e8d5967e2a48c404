import { withHeaders } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import { now } from '@/lib/env'
import { log } from '@/lib/log'
import { takeReply } from '@/lib/messages/webhooks'
import { answering } from '@/lib/problem'

export const runtime = 'nodejs'

/** POST /api/sms/inbound: the text service hands on what somebody answered. */
export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: async (request) =>
    withHeaders(
      await answering(
        () => takeReply(request, now(request)),
        (error) => log.error({ err: error, path: '/api/sms/inbound' }, 'reply failed'),
      ),
    ),
})
