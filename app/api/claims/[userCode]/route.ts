import { rederiveAt } from '@/ingest/rederive'
import { handle } from '@/lib/api/handle'
import { methods } from '@/lib/api/methods'
import * as operations from '@/lib/api/operations/loggers'
import { approve, deny, getClaim } from '@/lib/loggers/answer-claim'

export const { GET, POST, PUT, PATCH, DELETE } = methods({
  GET: handle(operations.getClaim, ({ person, params, now }) => getClaim(person, params.userCode, now)),
  POST: handle(operations.answerClaim, ({ person, params, body, now }) =>
    body.answer === 'deny'
      ? deny(person, params.userCode, now)
      : approve(person, params.userCode, body, now, rederiveAt(now)),
  ),
})
