import NextAuth from 'next-auth'
import type { NextRequest } from 'next/server'
import { addressOf } from '@/lib/auth/address'
import { sessionCookieName } from '@/lib/auth/cookie'
import { authOptions } from '@/lib/auth/options'
import { countTry, tooMany } from '@/lib/auth/throttle'
import { log } from '@/lib/log'
import { answering, Problem, problemResponse } from '@/lib/problem'

type Context = { params: Promise<{ nextauth: string[] }> }

const nextAuth = async (request: NextRequest, context: Context): Promise<Response> =>
  NextAuth(request, context, authOptions())

export const GET = nextAuth

export async function POST(request: NextRequest, context: Context): Promise<Response> {
  const { nextauth } = await context.params
  if (nextauth.join('/') !== 'callback/credentials') return nextAuth(request, context)
  return answering(
    async () => {
      const form = await request
        .clone()
        .formData()
        .catch(() => null)
      const email = form?.get('email')
      const wait = await countTry(typeof email === 'string' ? email : '', addressOf(request.headers))
      if (wait > 0) return problemResponse(tooMany(wait))
      const answer = await nextAuth(request, context)
      // Without a valid CSRF token the flow answers 200 and sends to its own page; to a program that is no sign-in.
      const signedIn = answer.headers
        .getSetCookie()
        .some((line) => line.startsWith(`${sessionCookieName()}=`))
      if (answer.status === 200 && !signedIn)
        return problemResponse(
          new Problem('not-signed-in', 'The form was out of date: fetch a new CSRF token and try again.'),
        )
      return answer
    },
    (error) => log.error({ err: error }, 'sign-in failed'),
  )
}
