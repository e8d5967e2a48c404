import { spawn, type ChildProcess } from 'node:child_process'
import path from 'node:path'
import type { TestProject } from 'vitest/node'
import { connect } from '@/db/knex'
import { freePort, startLocalServer } from '@/db/local-server'
import { ensureBuild } from '@/lib/run/build'
import { prepareDatabase } from '@/lib/run/prepare-database'
import { startMailFake } from '@/simulator/fakes/mail'
import { startSmsFake } from '@/simulator/fakes/sms'
import { SMS_TOKEN, testEnvironment, type TestSettings } from './settings'

const ROOT = path.resolve(import.meta.dirname, '../..')

declare module 'vitest' {
  export interface ProvidedContext {
    settings: TestSettings
  }
}

/** Once for all server tests: a private database, a template with schema and demo people, the built pages, one server. */
export default async function setup(project: TestProject): Promise<() => Promise<void>> {
  const [database] = await Promise.all([
    startLocalServer({ dataFolder: path.join(ROOT, '.data', 'test-postgres'), fast: true }),
    ensureBuild(ROOT),
  ])
  const admin = connect(database.url, { max: 1 })
  for (const { datname } of await admin('pg_database').where('datname', 'like', 'mw\\_%').select('datname')) {
    await admin.raw('drop database ?? with (force)', [datname])
  }
  await admin.raw('create database mw_template')
  await prepareDatabase(database.urlOf('mw_template'), { demo: true })
  await admin.raw('create database mw_server template mw_template')

  const mail = await startMailFake({ port: await freePort() })
  const sms = await startSmsFake({ port: await freePort(), authToken: SMS_TOKEN })
  const port = await freePort()
  const settings: TestSettings = {
    url: `http://127.0.0.1:${port}`,
    port,
    adminUrl: database.url,
    databaseUrl: database.urlOf('mw_server'),
    smtpPort: mail.port,
    smsPort: sms.port,
  }
  const web = startWeb(settings)
  await answering(`${settings.url}/api/openapi.json`, web)
  project.provide('settings', settings)

  return async () => {
    const gone = new Promise((resolve) => web.once('exit', resolve))
    web.kill('SIGTERM')
    await gone
    await Promise.all([mail.stop(), sms.stop()])
    await admin.destroy()
    await database.stop(true)
  }
}

function startWeb(settings: TestSettings): ChildProcess {
  const child = spawn(
    process.execPath,
    ['node_modules/next/dist/bin/next', 'start', '-H', '127.0.0.1', '-p', String(settings.port)],
    {
      cwd: ROOT,
      env: { ...process.env, ...testEnvironment(settings), NODE_ENV: 'production' },
      stdio: ['ignore', 'pipe', 'pipe'],
    },
  )
  const show = (chunk: Buffer) => {
    if (process.env.SHOW_SERVER) process.stderr.write(chunk)
    else if (/error/i.test(chunk.toString())) process.stderr.write(`web: ${chunk.toString()}`)
  }
  child.stdout?.on('data', show)
  child.stderr?.on('data', show)
  return child
}

async function answering(url: string, web: ChildProcess): Promise<void> {
  const until = Date.now() + 60_000
  while (Date.now() < until) {
    if (web.exitCode !== null) throw new Error('the server ended before it answered')
    const ok = await fetch(url).then(
      (answer) => answer.ok,
      () => false,
    )
    if (ok) return
    await new Promise((resolve) => setTimeout(resolve, 100))
  }
  throw new Error(`${url} did not answer within 60 s`)
}
