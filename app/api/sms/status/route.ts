import { withHeaders } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import { now } from '@/lib/env'
import { log } from '@/lib/log'
import { takeReceipt } from '@/lib/messages/webhooks'
import { answering } from '@/lib/problem'

export const runtime = 'nodejs'

/** POST /api/sms/status: the text service reports what became of a message. */
export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: async (request) =>
    withHeaders(
      await answering(
        () => takeReceipt(request, now(request)),
        (error) => log.error({ err: error, path: '/api/sms/status' }, 'receipt failed'),
      ),
    ),
})
