import { z } from 'zod'
import { meSchema } from '@/shared/schemas/people'
import { ApiError, signIn, waitUntilReady, type Session } from '@/simulator/client'
import { inParallel, keepPosting, paceClock } from '@/simulator/live'
import { loadState, saveState, type Saved, type SavedVessel } from '@/simulator/saved-state'
import {
  demoScenario,
  eveningZone,
  type DemoScenario,
  type ScenarioVessel,
  type ShopKey,
} from '@/simulator/scenario'
import { createVessel, registerLogger } from '@/simulator/set-up'
import { tellStory } from '@/simulator/tell-story'
import { loggerOf } from '@/simulator/uploader'

export type DemoOptions = {
  url: string
  password: string
  /** Where it remembers how far it has come; null forgets. */
  stateFile: string | null
  signal: AbortSignal
  cutOff: AbortSignal
  log: (line: string) => void
}

const BATCH_SECONDS = 15
const SAVE_EVERY_MS = 20_000

/** Sets the demo harbour up, posts its month of history, and goes on live until aborted. */
export async function runDemo(options: DemoOptions): Promise<void> {
  const { url, signal, log } = options
  await waitUntilReady(url, signal)
  const managers = {
    saltern: await signIn(url, 'manager@saltern.example', options.password, signal),
    stranger: await signIn(url, 'manager@stranger.example', options.password, signal),
  }
  const saved = (await stillTrue(loadState(options.stateFile), managers.saltern)) ?? freshState(Date.now())
  const scenario = demoScenario(saved)
  const shopIds = { saltern: await ownShop(managers.saltern), stranger: await ownShop(managers.stranger) }
  const save = (): void => saveState(options.stateFile, saved)
  save()

  const setUp = async (vessel: ScenarioVessel): Promise<SavedVessel> => {
    const known = saved.vessels[vessel.name]
    if (known && known.systems.length === vessel.systems.length) return known
    const made = await fitOut(vessel, managers[vessel.shop], scenario, shopIds[vessel.shop])
    saved.vessels[vessel.name] = made
    save()
    return made
  }
  const backfill = async (vessel: ScenarioVessel): Promise<void> => {
    const made = await setUp(vessel)
    const startedAt = Date.now()
    let taken = 0
    let isLive = false
    const loggers = vessel.systems.flatMap((system, index) => {
      const progress = made.systems[index]
      if (!progress) return []
      const target = {
        url,
        key: progress.key,
        serial: system.logger.serial,
        signal,
        cutOff: options.cutOff,
        onRetry: (reason: string, waitMs: number) => {
          if (waitMs >= 4000) log(`${vessel.name}: ${reason}, trying again in ${Math.round(waitMs / 1000)} s`)
        },
      }
      return [loggerOf(system.boat, target, progress)]
    })
    const report = {
      onUpload: ({ samples }: { samples: { received: number } }) => {
        taken += samples.received
        if (isLive && samples.received > 1000) log(`${vessel.name}: back with ${samples.received} samples`)
      },
      onRefused: (error: Error) => log(`${vessel.name}: ${error.message}`),
      onStop: (reason: string) => log(`${vessel.name}: no longer posting, ${reason}`),
    }
    for (const logger of loggers) await logger.postTo(Date.now(), Date.now(), report)
    log(
      `${vessel.name}: ${taken} samples in ${((Date.now() - startedAt) / 1000).toFixed(1)} s (${vessel.story})`,
    )
    isLive = true
    for (const logger of loggers) {
      live.push(keepPosting(logger, paceClock(Date.now(), 1), BATCH_SECONDS, signal, report))
    }
    await tell(vessel, made)
    save()
  }
  const tell = async (vessel: ScenarioVessel, made: SavedVessel): Promise<void> => {
    if (made.storyTold) return
    await tellStory(
      vessel,
      { vesselId: made.vesselId, systemIds: made.systems.map((system) => system.systemId) },
      await castFor(vessel, options, managers, shopIds),
      (what, error) => log(`${what}: ${error instanceof Error ? error.message : String(error)}`),
    )
    made.storyTold = true
  }

  const live: Promise<void>[] = []
  const saving = setInterval(save, SAVE_EVERY_MS)
  try {
    const [first, ...others] = scenario.vessels
    if (first) await backfill(first)
    for (const vessel of others) await setUp(vessel)
    let done = 1
    await inParallel(others, 2, async (vessel) => {
      await backfill(vessel)
      done += 1
      log(`history ${done} of ${scenario.vessels.length}`)
    })
    log(`all ${scenario.vessels.length} vessels are live`)
    await Promise.all(live)
  } finally {
    clearInterval(saving)
    save()
  }
}

function freshState(nowMs: number): Saved {
  return { version: 1, anchorMs: nowMs, ...eveningZone(nowMs), vessels: {} }
}

/** A remembered harbour that the server does not know (another database) is forgotten. */
async function stillTrue(saved: Saved | null, manager: Session): Promise<Saved | null> {
  const [any] = saved ? Object.values(saved.vessels) : []
  if (!saved || !any) return saved
  try {
    await manager.get(`/api/vessels/${any.vesselId}`, z.unknown())
    return saved
  } catch (error) {
    if (error instanceof ApiError && error.status === 404) return null
    throw error
  }
}

async function fitOut(
  vessel: ScenarioVessel,
  manager: Session,
  scenario: DemoScenario,
  shopId: string,
): Promise<SavedVessel> {
  const { vesselId, systemIds } = await createVessel(manager, vessel, { timeZone: scenario.timeZone, shopId })
  const systems: SavedVessel['systems'] = []
  for (const [index, system] of vessel.systems.entries()) {
    const systemId = systemIds[index]
    if (systemId === undefined) throw new Error(`${vessel.name} lacks its system ${index + 1}`)
    const { id, key } = await registerLogger(manager, systemId, system.logger, scenario.historyFromMs)
    systems.push({ systemId, loggerId: id, key, postedTo: scenario.historyFromMs, state: null })
  }
  return { vesselId, storyTold: false, systems }
}

async function ownShop(manager: Session): Promise<string> {
  const { shops } = await manager.get('/api/me', meSchema)
  const shop = shops.find((each) => each.roles.includes('manager'))
  if (!shop) throw new Error('the demo manager has no shop')
  return shop.id
}

async function castFor(
  vessel: ScenarioVessel,
  { url, password, signal }: DemoOptions,
  managers: Record<ShopKey, Session>,
  shopIds: Record<ShopKey, string>,
) {
  const manager = managers[vessel.shop]
  return {
    manager,
    technician:
      vessel.shop === 'saltern' ? await signIn(url, 'technician@saltern.example', password, signal) : manager,
    owner: vessel.ownerEmail === null ? null : await signIn(url, vessel.ownerEmail, password, signal),
    shopId: shopIds[vessel.shop],
  }
}
