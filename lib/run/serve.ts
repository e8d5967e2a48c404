import { randomBytes } from 'node:crypto'
import { existsSync, mkdirSync, readFileSync, writeFileSync } from 'node:fs'
import { createServer } from 'node:net'
import path from 'node:path'
import { connect } from '@/db/knex'
import { freePort, startLocalServer, type LocalServer } from '@/db/local-server'
import { readEnvironment, type Environment } from '@/lib/env'
import { ensureBuild } from '@/lib/run/build'
import { startFamily } from '@/lib/run/family'
import { takeLock } from '@/lib/run/lock'
import { prepareDatabase } from '@/lib/run/prepare-database'

const ROOT = path.resolve(import.meta.dirname, '../..')
const DATA = path.join(ROOT, '.data')

/** Everything on one machine: database, pages, worker and, in the demo, the fakes and a live simulator. */
export async function serve(): Promise<void> {
  const startedAt = Date.now()
  const environment = checkedEnvironment()
  const { mode, port } = environment
  const host = process.env.HOST ?? '127.0.0.1'
  const undo: (() => Promise<void> | void)[] = []
  let stopping = false
  const stop = async (code: number) => {
    if (stopping) return
    stopping = true
    for (const step of undo.reverse())
      await Promise.resolve(step()).catch((error: unknown) => console.error(String(error)))
    process.exit(code)
  }
  process.once('SIGTERM', () => void stop(0))
  process.once('SIGINT', () => void stop(0))
  process.once('SIGHUP', () => void stop(0))

  try {
    await requireFreePort(host, port)
    const lock = takeLock(DATA)
    undo.push(() => lock.release())

    const databaseUrl = await openDatabase(undo)
    const building = new AbortController()
    undo.push(() => building.abort())
    await ensureBuild(ROOT, { onBuild: () => console.log('Building the pages …'), signal: building.signal })
    const env = { ...process.env, ...settings(mode, port, databaseUrl) }
    await prepareDatabase(databaseUrl, { demo: mode === 'demo', demoPassword: env.DEMO_PASSWORD })

    const family = startFamily(ROOT, () => lock.remember(family.pids()))
    undo.push(() => family.end())
    const entry = (file: string) => ['--import', 'tsx', file]
    if (mode === 'demo') {
      Object.assign(env, { SMTP_PORT: String(await freePort()), SMS_PORT: String(await freePort()) })
      Object.assign(env, {
        SMTP_URL: `smtp://127.0.0.1:${env.SMTP_PORT}`,
        TWILIO_API_URL: `http://127.0.0.1:${env.SMS_PORT}`,
      })
      await family.begin('fakes', entry('simulator/fakes/main.ts'), env, /ready/)
    }
    const next = ['node_modules/next/dist/bin/next', 'start', '-H', host, '-p', String(port)]
    await family.begin('web', next, { ...env, NODE_ENV: 'production' }, /Ready in/)
    await family.begin('worker', entry('lib/run/worker.ts'), env, /worker ready/)
    if (mode === 'demo' && environment.simulator) {
      await family.begin('simulator', [...entry('simulator/main.ts'), '--demo'], {
        ...env,
        SIM_STATE: path.join(DATA, 'simulator.json'),
      })
    }
    announce(mode, env, Math.round((Date.now() - startedAt) / 1000))
  } catch (error) {
    if (stopping) return
    console.error(`\nMiddlewatch: ${error instanceof Error ? error.message : String(error)}`)
    await stop(1)
  }
}

/** Wrong settings and default secrets end the start before anything is begun. */
function checkedEnvironment(): Environment {
  try {
    return readEnvironment(process.env)
  } catch (error) {
    console.error(`\nMiddlewatch: ${error instanceof Error ? error.message : String(error)}`)
    process.exit(1)
  }
}

/** The database of DATABASE_URL, or the private one with its data under `.data`. */
async function openDatabase(undo: (() => Promise<void> | void)[]): Promise<string> {
  const given = process.env.DATABASE_URL
  if (given) {
    const probe = connect(given)
    try {
      await probe.raw('select 1')
    } catch (error) {
      const { host } = new URL(given)
      throw new Error(
        `the database at ${host} (DATABASE_URL) does not answer: ${error instanceof Error ? error.message : ''}`,
      )
    } finally {
      await probe.destroy()
    }
    return given
  }
  console.log('Starting the private database …')
  const server: LocalServer = await startLocalServer({ dataFolder: path.join(DATA, 'postgres') })
  // The lock says that this is the only start here: a server left by one that was killed is ours to end too.
  undo.push(() => server.stop(true))
  const admin = connect(server.url)
  try {
    const { rowCount } = (await admin.raw("select 1 from pg_database where datname = 'middlewatch'")) as {
      rowCount: number
    }
    if (rowCount === 0) await admin.raw('create database middlewatch')
  } finally {
    await admin.destroy()
  }
  return server.urlOf('middlewatch')
}

/** What the processes need to know; secrets of a demo are made once and kept beside its data. */
function settings(mode: string, port: number, databaseUrl: string): Record<string, string> {
  const url = process.env.APP_URL ?? `http://127.0.0.1:${port}`
  const base = {
    MODE: mode,
    DATABASE_URL: databaseUrl,
    PORT: String(port),
    APP_URL: url,
    NEXTAUTH_URL: url,
    AUTH_TRUST_HOST: '1',
  }
  if (mode === 'production') return base
  const file = path.join(DATA, 'demo-secret')
  mkdirSync(DATA, { recursive: true })
  if (!existsSync(file)) writeFileSync(file, randomBytes(32).toString('hex'), { mode: 0o600 })
  return {
    ...base,
    NEXTAUTH_SECRET: process.env.NEXTAUTH_SECRET ?? readFileSync(file, 'utf8'),
    DEMO_PASSWORD: process.env.DEMO_PASSWORD ?? 'middle-watch-demo',
    // Shaped as the service's own, known to the fake alone.
    TWILIO_ACCOUNT_SID: `AC${'0'.repeat(32)}`,
    TWILIO_AUTH_TOKEN: 'demo-token-of-the-local-fake',
    TWILIO_FROM: '+12025550100',
    MAIL_FROM: 'Middlewatch <watch@middlewatch.example>',
  }
}

function requireFreePort(host: string, port: number): Promise<void> {
  return new Promise((resolve, reject) => {
    const probe = createServer()
    probe.once('error', () =>
      reject(new Error(`port ${port} is in use; stop what uses it, or choose another: PORT=3100 npm start`)),
    )
    probe.listen(port, host, () => probe.close(() => resolve()))
  })
}

function announce(mode: string, env: NodeJS.ProcessEnv, seconds: number): void {
  console.log(`\nMiddlewatch is ready after ${seconds} s: ${env.APP_URL}`)
  if (mode !== 'demo') return
  console.log(`
  manager     manager@saltern.example
  technician  technician@saltern.example
  installer   installer@saltern.example
  owner       owner@saltern.example
  strangers   manager@stranger.example, owner@stranger.example
  password    ${env.DEMO_PASSWORD}
  messages    ${env.APP_URL}/outbox
`)
}
