import { z } from 'zod'
import { withHeaders } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import { whoAsks } from '@/lib/auth/who'
import { getRecordPdf } from '@/lib/commissioning/get-record-pdf'
import { now } from '@/lib/env'
import { log } from '@/lib/log'
import { answering, Problem } from '@/lib/problem'
import { idSchema } from '@/shared/schemas'

export const runtime = 'nodejs'

const unitsSchema = z.enum(['inHg', 'kPa', 'mbar']).catch('inHg')

/** GET /api/loggers/{id}/commissioning/pdf: the record to print, send or file. */
export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: async (request, context) =>
    withHeaders(
      await answering(
        async () => {
          const who = await whoAsks(request)
          if (who === null) throw new Problem('not-signed-in', 'Sign in first.')
          const id = idSchema.safeParse((await context.params).id)
          if (!id.success) throw new Problem('not-found', 'There is nothing at this address.')
          const unit = unitsSchema.parse(new URL(request.url).searchParams.get('units'))
          const pdf = await getRecordPdf(who, id.data, unit, now(request))
          return new Response(new Uint8Array(pdf), {
            headers: {
              'content-type': 'application/pdf',
              'content-disposition': `attachment; filename="commissioning-${id.data}.pdf"`,
            },
          })
        },
        (error) => log.error({ err: error, path: '/api/loggers/{id}/commissioning/pdf' }, 'record failed'),
      ),
    ),
})
