import { withHeaders } from '@/lib/api/handle'
import { Problem, problemResponse } from '@/lib/problem'

const nothing = (): Response =>
  withHeaders(problemResponse(new Problem('not-found', 'There is nothing at this address.')))

export {
  nothing as GET,
  nothing as POST,
  nothing as PUT,
  nothing as PATCH,
  nothing as DELETE,
  nothing as OPTIONS,
}
