import { meSchema } from '@/shared/schemas/people'
import { randomBoat, type BoatSpec, type RandomBoatKind } from '@/simulator/boat'
import { signIn, waitUntilReady } from '@/simulator/client'
import { inParallel, keepPosting, paceClock } from '@/simulator/live'
import { eveningZone, type ScenarioVessel } from '@/simulator/scenario'
import { partsOf } from '@/simulator/scenario/plant'
import { createVessel, registerLogger } from '@/simulator/set-up'
import { loggerOf, type SimulatedLogger } from '@/simulator/uploader'

export type FleetOptions = {
  url: string
  email: string
  password: string
  vessels: number
  seed: number
  kind: Partial<RandomBoatKind>
  /** History before now. */
  days: number
  /** How much faster than real time that history is lived through; 1 posts it at once. */
  speed: number
  /** Ends when the history is posted. */
  once: boolean
  batchSeconds: number
  signal: AbortSignal
  cutOff: AbortSignal
  log: (line: string) => void
}

const WIDTH = 6

/** Creates a random fleet in the signed-in manager's shop and posts for it, for load. */
export async function runFleet(options: FleetOptions): Promise<void> {
  const { url, signal, log } = options
  await waitUntilReady(url, signal)
  const manager = await signIn(url, options.email, options.password, signal)
  const { shops } = await manager.get('/api/me', meSchema)
  const shopId = shops.find((shop) => shop.roles.includes('manager'))?.id ?? null
  const zone = eveningZone(Date.now())
  const from = Date.now() - options.days * 86_400_000
  const seeds = Array.from({ length: options.vessels }, (_, index) => options.seed + index)
  const loggers: SimulatedLogger[] = []
  await inParallel(seeds, WIDTH, async (seed) => {
    const boat = randomBoat(seed, { offsetSeconds: zone.offsetSeconds, ...options.kind })
    const vessel = fleetVessel(boat)
    const { systemIds } = await createVessel(manager, vessel, { timeZone: zone.timeZone, shopId })
    const [system] = vessel.systems
    const [systemId] = systemIds
    if (!system || systemId === undefined) return
    const { key } = await registerLogger(manager, systemId, system.logger, from)
    loggers.push(
      loggerOf(
        boat,
        { url, key, serial: system.logger.serial, signal, cutOff: options.cutOff },
        { postedTo: from, state: null },
      ),
    )
    if (loggers.length % 50 === 0) log(`${loggers.length} of ${options.vessels} vessels created`)
  })
  log(`${loggers.length} vessels created`)
  await postAll(loggers, from, options)
}

/** Posts history, then live, for loggers that the server knows. */
export async function postAll(
  loggers: readonly SimulatedLogger[],
  from: number,
  options: Pick<FleetOptions, 'speed' | 'once' | 'batchSeconds' | 'signal' | 'log'>,
): Promise<void> {
  let received = 0
  const startedAt = Date.now()
  const report = {
    onUpload: ({ samples }: { samples: { received: number } }) => {
      received += samples.received
    },
    onRefused: (error: Error) => options.log(error.message),
    onStop: (reason: string) => options.log(`no longer posting: ${reason}`),
  }
  const progress = (what: string): void => {
    const seconds = (Date.now() - startedAt) / 1000
    options.log(
      `${what}: ${received} samples in ${seconds.toFixed(1)} s (${Math.round(received / seconds)}/s)`,
    )
  }
  const clock = paceClock(options.speed > 1 ? from : Date.now(), options.speed)
  if (options.speed <= 1) {
    await inParallel(loggers, WIDTH, (logger) => logger.postTo(Date.now(), Date.now(), report))
    progress('history')
  }
  if (options.once && options.speed <= 1) return
  const caughtUp = new AbortController()
  const signal = AbortSignal.any([options.signal, caughtUp.signal])
  const telling = setInterval(() => progress('so far'), 10_000)
  const watching = setInterval(() => {
    if (options.once && clock.speed() === 1) caughtUp.abort()
  }, 500)
  try {
    await Promise.all(
      loggers.map((logger) => keepPosting(logger, clock, options.batchSeconds, signal, report)),
    )
  } finally {
    clearInterval(telling)
    clearInterval(watching)
    progress('in all')
  }
}

function fleetVessel(boat: BoatSpec): ScenarioVessel {
  const serial = `MW-F${boat.seed.toString(16).toUpperCase().padStart(7, '0')}`
  return {
    name: `Fleet ${boat.seed}`,
    story: 'drawn at random',
    berth: `F ${boat.seed}`,
    harbour: 'Port Averill',
    shop: 'saltern',
    ownerEmail: null,
    fullRecord: false,
    visits: [],
    systems: [
      {
        name: '',
        kind: 'pass-through',
        parts: partsOf(boat.volumeM3, ['Forward head', 'Aft head']),
        pumpAmps: boat.pump.amps,
        lowSupplyV: null,
        logger: { serial, channels: [...boat.logger.channels], intervalSeconds: boat.logger.intervalSeconds },
        boat,
        statements: [],
      },
    ],
  }
}
