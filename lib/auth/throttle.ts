import { RateLimiterMemory, RateLimiterPostgres, RateLimiterRes } from 'rate-limiter-flexible'
import { runThrottleStatement } from '@/db/queries/throttle'
import { asIngest } from '@/db/roles'
import { Problem } from '@/lib/problem'

/** A limit shared by all web processes; should its table be out of reach, each process counts for itself. */
function limiter(keyPrefix: string, points: number, durationSeconds: number): RateLimiterPostgres {
  return new RateLimiterPostgres({
    storeClient: {
      query: (statement: { text: string; values?: unknown[] }) =>
        asIngest((trx) => runThrottleStatement(trx, statement)),
    },
    storeType: 'pool',
    tableName: 'throttle',
    tableCreated: true,
    clearExpiredByTimeout: false,
    keyPrefix,
    points,
    duration: durationSeconds,
    insuranceLimiter: new RateLimiterMemory({ keyPrefix, points, duration: durationSeconds }),
  })
}

const QUARTER_HOUR = 900
/** Guesses at one account from one address; at one account from anywhere; from one address at anything. */
const pair = limiter('pair', 10, QUARTER_HOUR)
const account = limiter('account', 50, QUARTER_HOUR)
const address = limiter('address', 200, QUARTER_HOUR)

async function take(limit: RateLimiterPostgres, key: string): Promise<number> {
  try {
    await limit.consume(key)
    return 0
  } catch (refusal) {
    if (refusal instanceof RateLimiterRes) return Math.max(1, Math.ceil(refusal.msBeforeNext / 1000))
    throw refusal
  }
}

const keysOf = (email: string, from: string): [RateLimiterPostgres, string][] => {
  const name = email.trim().toLowerCase().slice(0, 120)
  return [
    [pair, `${name}|${from}`.slice(0, 200)],
    [account, name],
    [address, from.slice(0, 64)],
  ]
}

/**
 * Counts a try before its password is looked at, so that many at once don't slip through.
 * @returns seconds to wait, 0 when the try may go on. The same for addresses without an account.
 */
export async function countTry(email: string, from: string): Promise<number> {
  let wait = 0
  for (const [limit, key] of keysOf(email, from)) wait = Math.max(wait, await take(limit, key))
  return wait
}

/** A right password gives its try back and clears the account's count from this address. */
export async function forgiveTry(email: string, from: string): Promise<void> {
  const [own, ...others] = keysOf(email, from)
  if (own !== undefined) await own[0].delete(own[1])
  for (const [limit, key] of others) await limit.reward(key)
}

const guesses = limiter('guess', 30, QUARTER_HOUR)
const claims = limiter('claim', 120, QUARTER_HOUR)

/** Keeps one address from filling the table of claims; a whole harbour may share one. @throws Problem */
export async function countClaim(from: string): Promise<void> {
  const wait = await take(claims, from.slice(0, 64))
  if (wait > 0) throw tooMany(wait)
}

/** Stops the trying of codes and one-time secrets. @throws Problem `too-many-requests` */
export async function countGuess(what: string, from: string): Promise<void> {
  const wait = await take(guesses, `${what}|${from}`.slice(0, 200))
  if (wait > 0) throw tooMany(wait)
}

const HOUR = 3600
const mailsTo = limiter('mailto', 6, HOUR)
const mailsFrom = limiter('mailfrom', 40, HOUR)
const textsTo = limiter('textto', 5, HOUR)
const textsOf = limiter('textof', 10, 24 * HOUR)
const codes = limiter('code', 10, QUARTER_HOUR)

/** Keeps people from having mail sent to others without end; the same with and without an account. @throws Problem */
export async function countMail(email: string, from: string): Promise<void> {
  const to = email.trim().toLowerCase().slice(0, 200)
  const wait = Math.max(await take(mailsFrom, from.slice(0, 64)), await take(mailsTo, to))
  if (wait > 0) throw tooMany(wait)
}

/** Texts cost money and wake people: so many an hour to a number, so many a day for a person. @throws Problem */
export async function countText(number: string, personId: string): Promise<void> {
  const wait = Math.max(await take(textsOf, personId), await take(textsTo, number.slice(0, 32)))
  if (wait > 0) throw tooMany(wait)
}

/** Six digits are few: so many tries at a person's codes, from wherever. @throws Problem `too-many-requests` */
export async function countCode(personId: string): Promise<void> {
  const wait = await take(codes, personId)
  if (wait > 0) throw tooMany(wait)
}

/** A right code gives its try back. */
export const forgiveCode = async (personId: string): Promise<void> => {
  await codes.reward(personId)
}

export const tooMany = (waitSeconds: number): Problem =>
  new Problem('too-many-requests', `Too many tries. Try again in ${Math.ceil(waitSeconds / 60)} min.`, {
    headers: { 'retry-after': String(waitSeconds) },
  })
