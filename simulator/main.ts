import { parseArgs } from 'node:util'
import { randomBoat, type RandomBoatKind } from '@/simulator/boat'
import { runDemo } from '@/simulator/demo'
import { postAll, runFleet } from '@/simulator/fleet'
import { loggerOf } from '@/simulator/uploader'

const USAGE = `Posts simulated boats to a Middlewatch server, until told to end.

  --demo                    the demo harbour: 30 days of history, then live
  --vessels N               a random fleet, created as the signed-in manager
  --key KEY                 one random boat with a logger key that you already have
  --url URL                 the server (default: APP_URL, else http://127.0.0.1:3000)

  --serial TEXT             with --key: the logger's serial, used in the names of its records
  --seed N                  which random boats (default 1)
  --days N                  history before now, days (default 1; 0 with --key)
  --speed N                 live through the history N times faster than real time instead of posting it at once
  --once                    end after the history
  --interval SECONDS        of random boats (default 60)
  --batch SECONDS           live: how often each boat posts (default 30)
  --logger KIND             both, vacuum-only or pump-only (default both)
  --hold SECONDS            pins the hold time of random boats
  --email, --password       who creates the fleet (default: the demo manager, DEMO_PASSWORD)
  --state FILE              with --demo: where to remember how far it has come (default: SIM_STATE)
`

const options = {
  demo: { type: 'boolean' },
  vessels: { type: 'string' },
  key: { type: 'string' },
  url: { type: 'string' },
  serial: { type: 'string' },
  seed: { type: 'string' },
  days: { type: 'string' },
  speed: { type: 'string' },
  once: { type: 'boolean' },
  interval: { type: 'string' },
  batch: { type: 'string' },
  logger: { type: 'string' },
  hold: { type: 'string' },
  email: { type: 'string' },
  password: { type: 'string' },
  state: { type: 'string' },
  help: { type: 'boolean' },
} as const

const LOGGERS = ['both', 'vacuum-only', 'pump-only'] as const

function numberOf(text: string | undefined, fallback: number, name: string): number {
  const value = text === undefined ? fallback : Number(text)
  if (!Number.isFinite(value) || value < 0) throw new Error(`--${name} must be a number, not "${text}"`)
  return value
}

const GRACE_MS = 3000

/** The first signal ends everything between two uploads; what is still in hand three seconds later is cut. */
function untilToldToEnd(): { signal: AbortSignal; cutOff: AbortSignal } {
  const ending = new AbortController()
  const cutting = new AbortController()
  const end = (): void => {
    ending.abort()
    setTimeout(() => cutting.abort(), GRACE_MS).unref()
  }
  process.once('SIGTERM', end)
  process.once('SIGINT', end)
  return { signal: ending.signal, cutOff: cutting.signal }
}

async function main(): Promise<void> {
  const { values } = parseArgs({ options, allowPositionals: false })
  const chosen = [values.demo, values.vessels, values.key].filter((each) => each !== undefined)
  if (values.help || chosen.length !== 1) {
    console.log(USAGE)
    process.exitCode = values.help ? 0 : 2
    return
  }
  const { signal, cutOff } = untilToldToEnd()
  const log = (line: string): void => console.log(line)
  const url = values.url ?? process.env.APP_URL ?? 'http://127.0.0.1:3000'
  const password = values.password ?? process.env.DEMO_PASSWORD ?? 'middle-watch-demo'
  const pace = {
    speed: Math.max(1, numberOf(values.speed, 1, 'speed')),
    once: values.once ?? false,
    batchSeconds: Math.max(1, numberOf(values.batch, 30, 'batch')),
    signal,
    cutOff,
    log,
  }
  const logger = LOGGERS.find((each) => each === (values.logger ?? 'both'))
  if (!logger) throw new Error(`--logger must be one of ${LOGGERS.join(', ')}`)
  const kind: Partial<RandomBoatKind> = {
    logger,
    intervalSeconds: Math.max(1, numberOf(values.interval, 60, 'interval')),
    ...(values.hold === undefined ? {} : { holdSeconds: numberOf(values.hold, 0, 'hold') }),
  }
  const seed = numberOf(values.seed, 1, 'seed')

  try {
    if (values.demo) {
      await runDemo({
        url,
        password,
        stateFile: values.state ?? process.env.SIM_STATE ?? null,
        signal,
        cutOff,
        log,
      })
    } else if (values.vessels !== undefined) {
      const email = values.email ?? 'manager@saltern.example'
      const vessels = numberOf(values.vessels, 1, 'vessels')
      await runFleet({
        ...pace,
        url,
        email,
        password,
        vessels,
        seed,
        kind,
        days: numberOf(values.days, 1, 'days'),
      })
    } else {
      const from = Date.now() - numberOf(values.days, 0, 'days') * 86_400_000
      const target = { url, key: values.key ?? '', serial: values.serial ?? `MW-${seed}`, signal, cutOff }
      await postAll([loggerOf(randomBoat(seed, kind), target, { postedTo: from, state: null })], from, pace)
    }
  } catch (error) {
    if (!signal.aborted) throw error
  }
}

main().then(
  // Sockets that are kept alive would hold the process for some seconds more.
  () => process.exit(),
  (error: unknown) => {
    console.error(error instanceof Error ? error.message : String(error))
    process.exit(1)
  },
)
