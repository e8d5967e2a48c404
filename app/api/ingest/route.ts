import { ingest } from '@/ingest/ingest'
import { withHeaders } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import { now } from '@/lib/env'
import { log } from '@/lib/log'
import { answering } from '@/lib/problem'
import { ingestAnswerSchema } from '@/shared/schemas/loggers'

export const runtime = 'nodejs'

/** POST /api/ingest: a logger's upload. Answered only after everything that follows from it is committed. */
export const { GET, POST, PUT, PATCH, DELETE } = methods({
  POST: async (request) =>
    withHeaders(
      await answering(
        async () => Response.json(ingestAnswerSchema.parse(await ingest(request, now(request)))),
        (error) => log.error({ err: error, path: '/api/ingest' }, 'upload failed'),
      ),
    ),
})
