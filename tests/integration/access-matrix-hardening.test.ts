import { readFileSync } from 'node:fs'
import path from 'node:path'
import { createHash, randomUUID } from 'node:crypto'
import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest'
import type { Knex } from '@/db/knex'
import { asIngest } from '@/db/roles'
import { authOptions } from '@/lib/auth/options'
import { deliver } from '@/lib/messages/deliver'
import { queueMail } from '@/lib/messages/queue-mail'
import { ACTORS, cellsOf, type Actor } from '../support/access/actors'
import { askingServer, cookieOf, type Asker } from '../support/access/ask'
import { HANDLERS, PAGES } from '../support/access/matrix'
import { PAGE_PATHS, REQUESTS } from '../support/access/requests'
import { fingerprint, methodOf } from '../support/access/run-matrix'
import { makeWorld, PASSWORD, type World } from '../support/access/world'
import { serverUrl } from '../support/client'
import { serverDatabase } from '../support/database'

let database: Knex
let world: World
let ask: Asker
beforeAll(async () => {
  database = serverDatabase()
  world = await makeWorld(database)
  ask = askingServer(serverUrl())
})
afterAll(() => database.destroy())

const ROOT = path.resolve(import.meta.dirname, '../..')
const directives = (policy: string): Map<string, string> =>
  new Map(
    policy.split(';').map((part) => {
      const [name = '', ...rest] = part.trim().split(/\s+/)
      return [name, rest.join(' ')]
    }),
  )

describe('pages', () => {
  for (const address of [...Object.keys(PAGES), '/there/is/no/such/page', '/vessels/1.js'])
    it(`${address} runs our scripts alone and is framed by nobody`, async () => {
      const where = PAGE_PATHS[address]?.(world) ?? address
      const { status, headers, text } = await ask('GET', { path: where }, cookieOf(world, 'owner'))
      const policy = directives(headers.get('content-security-policy') ?? '')
      const scripts = policy.get('script-src') ?? ''
      const nonce = /'nonce-([^']+)'/.exec(scripts)?.[1] ?? ''
      expect(Buffer.from(nonce, 'base64').length).toBeGreaterThanOrEqual(16)
      expect(scripts).toContain("'strict-dynamic'")
      expect(scripts).not.toMatch(/unsafe-inline|unsafe-eval|https?:|\*/)
      expect(policy.get('style-src')).not.toMatch(/unsafe-inline|\*/)
      expect(policy.get('default-src')).toBe("'self'")
      for (const [name, value] of [
        ['object-src', "'none'"],
        ['base-uri', "'none'"],
        ['frame-ancestors', "'none'"],
        ['form-action', "'self'"],
        ['connect-src', "'self'"],
      ] as const)
        expect(policy.get(name), name).toBe(value)
      expect(headers.get('x-content-type-options')).toContain('nosniff')
      expect(headers.get('referrer-policy')).toBe('same-origin')
      expect(headers.get('permissions-policy')).toContain('geolocation=()')
      expect(headers.get('cross-origin-opener-policy')).toBe('same-origin')
      expect(headers.get('x-powered-by')).toBeNull()
      expect(headers.get('cache-control') ?? '').toMatch(/no-store|no-cache|private/)
      // Each script and style of the page itself carries this answer's nonce; nothing hangs on an attribute.
      const tags = [...text.matchAll(/<(?:script|style)\b[^>]*>/g)]
      if (status < 300 || status >= 400) expect(tags.length).toBeGreaterThan(0)
      for (const [tag] of tags) expect(tag).toContain(`nonce="${nonce}"`)
      expect(text).not.toMatch(/<[a-z][^>]*\son(?:click|load|error|submit|focus|mouseover)=/i)
      const again = await ask('GET', { path: where }, cookieOf(world, 'owner'))
      expect(again.headers.get('content-security-policy')).not.toContain(nonce)
    })

  it('of ids that could never be any answer as of nothing at all', async () => {
    for (const [address, where] of Object.entries(PAGE_PATHS)) {
      if (!/\{(?:id)\}/.test(address)) continue
      for (const id of ['x', '1.js', '0', '-1', '99999999999999999999', '4294967296', "1'--", '%00']) {
        const path = where(world).replace(/\/\d+/, `/${id}`)
        const { status } = await ask('GET', { path }, cookieOf(world, 'owner'))
        expect([path, status >= 400 && status < 500]).toEqual([path, true])
      }
    }
  })

  it('are not the only thing that is served with its kind made plain', async () => {
    for (const file of ['/sw.js', '/mark.svg', '/manifest.webmanifest']) {
      const { status, headers } = await ask('GET', { path: file }, '')
      expect(status, file).toBe(200)
      expect(headers.get('x-content-type-options'), file).toBe('nosniff')
    }
  })
})

describe('handlers', () => {
  it('answer data for one reader: never cached, never run, never framed', async () => {
    for (const row of Object.keys(HANDLERS).filter((name) => methodOf(name) === 'GET')) {
      if (row.includes('/api/auth/')) continue
      for (const actor of ['nobody', 'owner'] as const) {
        const request = REQUESTS[row]
        if (request === undefined) continue
        const { headers } = await ask('GET', request(world, actor), cookieOf(world, actor))
        expect(headers.get('cache-control'), row).toBe('private, no-store')
        expect(headers.get('x-content-type-options'), row).toContain('nosniff')
        expect(headers.get('content-security-policy'), row).toContain("default-src 'none'")
      }
    }
  })

  it('let no other site read them', async () => {
    const { headers } = await ask(
      'GET',
      { path: '/api/me', headers: { origin: 'https://elsewhere.example' } },
      cookieOf(world, 'owner'),
    )
    expect(headers.get('access-control-allow-origin')).toBeNull()
  })

  it('answer an id out of sight in the very words of one that is not there', async () => {
    const alike = (text: string) => text.replaceAll(/\d{3,}/g, '#')
    for (const [row, cells] of Object.entries(HANDLERS)) {
      const request = REQUESTS[row]
      if (methodOf(row) !== 'GET' || request === undefined || row.includes('{path}')) continue
      for (const actor of ['strangeOwner', 'withdrawn'] as const) {
        if (cellsOf(row, cells)[actor] !== '404') continue
        const asked = request(world, actor)
        const nowhere = asked.path.replace(/\/\d+|=\d+/, (id) => `${id.charAt(0)}987654321`)
        const [hidden, absent] = [
          await ask('GET', asked, cookieOf(world, actor)),
          await ask('GET', { path: nowhere }, cookieOf(world, actor)),
        ]
        expect([absent.status, alike(absent.text)], `${row} as ${actor}`).toEqual([404, alike(hidden.text)])
      }
    }
  })

  it('never answer a stack, a query or a path of the server', async () => {
    for (const asked of [
      { path: '/api/vessels', body: { name: 'x'.repeat(500) } },
      { path: '/api/vessels', body: '{' },
      { path: '/api/leak-down', body: { startPa: 'a' } },
    ]) {
      const { status, text } = await ask('POST', asked, cookieOf(world, 'owner'))
      expect(status).toBeGreaterThanOrEqual(400)
      expect(text).not.toMatch(/node_modules|at \/|select |insert |\.ts:\d/)
    }
  })
})

describe('writes from elsewhere', () => {
  /** Machines with secrets of their own, and no cookie that a browser would send along. */
  const WITHOUT_A_COOKIE = [
    'POST /api/ingest',
    'POST /api/device_authorization',
    'POST /api/token',
    'POST /api/sms/inbound',
    'POST /api/sms/status',
    // Guarded by a token of its own against forged forms.
    'POST /api/auth/{nextauth}',
  ]
  const writes = Object.entries(HANDLERS).filter(
    ([row]) => methodOf(row) !== 'GET' && !row.includes('{path}') && !WITHOUT_A_COOKIE.includes(row),
  )
  const whoMay = (row: string, cells: string): Actor | undefined => {
    const of = cellsOf(row, cells)
    return (
      (['manager', 'owner', 'nobody'] as const).find((actor) => of[actor] === 'ok') ??
      ACTORS.find((actor) => of[actor] === 'ok')
    )
  }

  it('by a page of another site are refused, whoever is signed in, and change nothing', async () => {
    const before = await fingerprint(database)
    for (const [row, cells] of writes) {
      const actor = whoMay(row, cells) ?? 'owner'
      const request = REQUESTS[row]
      if (request === undefined) continue
      const asked = request(world, actor)
      for (const origin of ['https://elsewhere.example', 'null', `${serverUrl()}.elsewhere.example`]) {
        const { status, text } = await ask(
          methodOf(row),
          { ...asked, headers: { ...asked.headers, origin } },
          cookieOf(world, actor),
        )
        expect([row, status], origin).toEqual([row, 403])
        expect(text, row).toContain('wrong-origin')
      }
    }
    expect(await fingerprint(database)).toBe(before)
  })

  it('as a form, which any page can send, are refused and change nothing', async () => {
    const before = await fingerprint(database)
    for (const [row, cells] of writes) {
      const actor = whoMay(row, cells) ?? 'owner'
      const asked = REQUESTS[row]?.(world, actor)
      // Without a body there is nothing to disguise; deleting cannot be asked for by a form.
      if (asked?.body === undefined || JSON.stringify(asked.body) === '{}') continue
      for (const type of [
        'text/plain',
        'application/x-www-form-urlencoded',
        'multipart/form-data; boundary=x',
      ]) {
        const { status } = await ask(
          methodOf(row),
          { ...asked, headers: { 'content-type': type } },
          cookieOf(world, actor),
        )
        expect([row, status], type).toEqual([row, 415])
      }
    }
    expect(await fingerprint(database)).toBe(before)
  })
})

describe('cookies', () => {
  it('of a session are read by no script and sent along by no other site', async () => {
    const csrf = await fetch(`${serverUrl()}/api/auth/csrf`)
    const given = csrf.headers.getSetCookie()
    const { csrfToken } = (await csrf.json()) as { csrfToken: string }
    const answer = await fetch(`${serverUrl()}/api/auth/callback/credentials`, {
      method: 'POST',
      redirect: 'manual',
      headers: {
        'content-type': 'application/x-www-form-urlencoded',
        cookie: given.map((line) => line.split(';')[0]).join('; '),
      },
      body: new URLSearchParams({
        email: world.people.figures.email,
        password: PASSWORD,
        csrfToken,
        json: 'true',
      }),
    })
    expect(answer.status).toBe(200)
    const session = answer.headers.getSetCookie().find((line) => line.includes('session-token='))
    for (const line of [session ?? '', ...given.filter((entry) => entry.includes('csrf'))]) {
      expect(line).toMatch(/; ?HttpOnly/i)
      expect(line).toMatch(/; ?SameSite=Lax/i)
      expect(line).toMatch(/; ?Path=\//i)
      expect(line).not.toMatch(/; ?Domain=/i)
    }
  })

  it('are bound to https where there is https', () => {
    vi.stubEnv('APP_URL', 'https://middlewatch.example')
    try {
      const { useSecureCookies, cookies } = authOptions()
      expect(useSecureCookies).toBe(true)
      expect(cookies?.sessionToken).toMatchObject({
        name: '__Secure-next-auth.session-token',
        options: { secure: true, httpOnly: true, sameSite: 'lax' },
      })
    } finally {
      vi.unstubAllEnvs()
    }
  })

  it('of sessions that have ended, run out or lost their person are nobody’s', async () => {
    const other = await makeWorld(database)
    const me = (actor: Actor) => ask('GET', { path: '/api/me' }, cookieOf(other, actor))
    expect((await me('owner')).status).toBe(200)
    const { owner, technician, installer } = other.people
    await database('session').where({ person_id: owner.id }).update({ ended_at: new Date() })
    await database('session')
      .where({ person_id: technician.id })
      .update({ created_at: '2000-01-01', expires_at: '2000-01-02' })
    await database('person').where({ id: installer.id }).update({ deleted_at: new Date() })
    for (const actor of ['owner', 'technician', 'installer'] as const) {
      expect((await me(actor)).status, actor).toBe(401)
      const page = await ask('GET', { path: '/tonight' }, cookieOf(other, actor))
      expect(page.location, actor).toContain('/sign-in')
    }
  })
})

describe('whether an address has an account', () => {
  const strangers = () => [world.people.strangeOwner.email, `${randomUUID()}@matrix.example`]

  it.each([
    ['forgetting a password', '/api/password/forgot', {}],
    ['signing up', '/api/sign-up', { name: 'Somebody' }],
  ])('is not told by %s', async (_, where, more) => {
    const answers = []
    for (const email of strangers()) {
      const { status, text } = await ask('POST', { path: where, body: { email, ...more } }, '')
      answers.push({ status, text })
    }
    expect(answers[0]).toEqual(answers[1])
    expect(answers[0]?.status).toBe(200)
  })

  it('is not told to who invites', async () => {
    const shapes = []
    for (const email of strangers()) {
      const body = { email, shopId: world.shopId, role: 'technician' }
      const { status, text } = await ask(
        'POST',
        { path: '/api/invitations', body },
        cookieOf(world, 'manager'),
      )
      const answer = JSON.parse(text) as Record<string, unknown>
      expect(answer.email).toBe(email)
      const itsOwn = ['id', 'email', 'createdAt', 'expiresAt']
      const rest = Object.entries(answer).filter(([name]) => !itsOwn.includes(name))
      shapes.push({ status, rest })
    }
    expect(shapes[0]).toEqual(shapes[1])
  })

  it('is not told by links that are made up, used or run out: they are all alike', async () => {
    const used = `${randomUUID()}${randomUUID()}`
    await database('token').insert({
      hash: createHash('sha256').update(used).digest(),
      purpose: 'reset-password',
      person_id: world.people.strangeOwner.id,
      created_at: '2026-01-01',
      expires_at: '2026-01-02',
    })
    for (const where of [
      '/api/password/reset',
      '/api/confirm-email',
      '/api/invitations/accept',
      '/api/invitations/look',
    ]) {
      const answers = []
      for (const token of [used, `${randomUUID()}${randomUUID()}`]) {
        const { status, text } = await ask(
          'POST',
          { path: where, body: { token, password: 'some other watchword', name: 'Somebody' } },
          '',
        )
        answers.push({ status, text })
      }
      expect(answers[0], where).toEqual(answers[1])
      expect(answers[0]?.status, where).toBe(410)
    }
  })
})

describe('guessing', () => {
  it('at one’s own password, by a session in other hands, comes to an end', async () => {
    const other = await makeWorld(database)
    const statuses: number[] = []
    for (let count = 0; count < 12; count += 1) {
      const body = { current: `guess ${count}`, next: 'a better watchword' }
      statuses.push(
        (await ask('PUT', { path: '/api/me/password', body }, cookieOf(other, 'technician'))).status,
      )
    }
    expect(statuses[0]).toBe(422)
    expect(statuses[11]).toBe(429)
  })

  it('at links in messages comes to an end, for one address alone', async () => {
    const from = (address: string) =>
      ask('GET', { path: '/api/links/abcdefghjk', headers: { 'x-forwarded-for': address } }, '')
    const tried = []
    for (let count = 0; count < 31; count += 1) tried.push((await from('203.0.113.201')).status)
    expect(tried[0]).toBe(404)
    expect(tried[30]).toBe(429)
    expect((await from('203.0.113.202')).status).toBe(404)
    expect((await ask('GET', { path: `/api/links/${world.linkCode}` }, '')).status).toBe(200)
  })
})

describe('secrets', () => {
  /** All that the database holds, as text; secrets in `bytea` would show as hexadecimal. */
  async function everything(leaveOut: readonly string[]): Promise<string[]> {
    const tables = await database('pg_tables')
      .whereNotIn('schemaname', ['pg_catalog', 'information_schema'])
      .select<{ schemaname: string; tablename: string }[]>('schemaname', 'tablename')
    const rows: string[] = []
    for (const { schemaname, tablename } of tables) {
      if (leaveOut.includes(tablename)) continue
      const found = await database.raw<{ rows: { row: string }[] }>('select t::text as row from ??.?? t', [
        schemaname,
        tablename,
      ])
      rows.push(...found.rows.map(({ row }) => `${tablename} ${row}`))
    }
    return rows
  }

  it('are in the database as hashes alone, once they have been used', async () => {
    const other = await makeWorld(database)
    const as = (actor: Actor) => cookieOf(other, actor)
    const post = async (where: string, body: unknown, actor: Actor, form = false) =>
      JSON.parse((await ask('POST', { path: where, body, form }, as(actor))).text) as Record<string, string>
    const serial = `S-${randomUUID()}`
    const registered = await post(
      `/api/systems/${other.systemId}/loggers`,
      { serial, intervalSeconds: 60, channels: ['pump'] },
      'manager',
    )
    const key = registered.key ?? ''
    const upload = await fetch(`${serverUrl()}/api/ingest`, {
      method: 'POST',
      headers: { authorization: `Bearer ${key}`, 'content-type': 'text/csv' },
      body: `time,pump\n${new Date(Date.now() - 60_000).toISOString()},0\n`,
    })
    expect(upload.status).toBe(200)
    const rolled = (await post(`/api/loggers/${registered.id}/key`, {}, 'manager')).key ?? ''
    const claim = await post('/api/device_authorization', { client_id: `C-${randomUUID()}` }, 'nobody', true)
    await post('/api/confirm-email', { token: other.confirmSecret }, 'nobody')
    await post('/api/password/reset', { token: other.resetSecret, password: 'never to be found' }, 'nobody')
    const factor = await post('/api/me/second-factor', { password: PASSWORD }, 'technician')
    const secrets = {
      key,
      rolled,
      deviceCode: claim.device_code ?? '',
      totp: factor.secret ?? '',
      confirm: other.confirmSecret,
      reset: other.resetSecret,
      invitation: other.invitationSecret,
      password: PASSWORD,
      newPassword: 'never to be found',
      cookie: other.people.owner.cookie.split('=')[1] ?? '',
    }
    for (const [name, secret] of Object.entries(secrets)) expect(secret.length, name).toBeGreaterThan(10)
    const rows = await everything([])
    expect(rows.length).toBeGreaterThan(100)
    for (const [name, secret] of Object.entries(secrets)) {
      const hex = Buffer.from(secret).toString('hex')
      const found = rows.filter((row) => row.includes(secret) || row.includes(hex))
      expect(found, name).toEqual([])
    }
  })

  it('in mails of the account go with the sending, where people have mailboxes', async () => {
    const secret = `secret-${randomUUID()}`
    const now = new Date()
    vi.stubEnv('MODE', 'production')
    vi.stubEnv('TWILIO_API_URL', '')
    try {
      const mail = {
        personId: null,
        to: `${randomUUID()}@matrix.example`,
        subject: 'Choose',
        purpose: 'account' as const,
      }
      const id = await asIngest((trx) =>
        queueMail(
          trx,
          { ...mail, paragraphs: ['Here:'], action: { label: 'Go', url: `https://mw.example/${secret}` } },
          now,
        ),
      )
      const waiting = await database('message')
        .where({ id: String(id) })
        .first<{ body_text: string }>('body_text')
      expect(waiting?.body_text).toContain(secret)
      const sent: string[] = []
      await deliver(String(id), now, {
        sendMail: (message) => {
          sent.push(message.text)
          return Promise.resolve('taken')
        },
        sendText: () => Promise.reject(new Error('no texts here')),
        close: () => {},
      })
      expect(sent.join()).toContain(secret)
      const kept = await database('message')
        .where({ id: String(id) })
        .first<{ row: string }>(database.raw('message::text as row'))
      expect(kept?.row).not.toContain(secret)
    } finally {
      vi.unstubAllEnvs()
    }
  })

  it('stand in no file of the source', () => {
    for (const file of ['.env.example', 'README.md', 'DEVELOPERS.md', 'next.config.ts', 'package.json'])
      expect(readFileSync(path.join(ROOT, file), 'utf8'), file).not.toMatch(
        /-----BEGIN|mwk_[A-Za-z0-9_-]{20}|\bAC[0-9a-f]{32}\b|postgres:\/\/[^:\s]+:[^@\s]+@(?!localhost|127)/,
      )
  })
})

describe('uploads', () => {
  it('are taken by what they are, not by what they are called', async () => {
    const other = await makeWorld(database)
    const { text } = await ask(
      'POST',
      {
        path: `/api/systems/${other.systemId}/loggers`,
        body: { serial: `U-${randomUUID()}`, intervalSeconds: 60, channels: ['pump'] },
      },
      cookieOf(other, 'manager'),
    )
    const { key } = JSON.parse(text) as { key: string }
    const post = async (type: string, body: string | Buffer, encoding?: string) =>
      (
        await fetch(`${serverUrl()}/api/ingest`, {
          method: 'POST',
          headers: {
            authorization: `Bearer ${key}`,
            'content-type': type,
            ...(encoding === undefined ? {} : { 'content-encoding': encoding }),
          },
          body: typeof body === 'string' ? body : new Uint8Array(body),
        })
      ).status
    const picture = Buffer.from('89504e470d0a1a0a0000000d49484452', 'hex')
    expect(await post('image/png', picture)).toBe(415)
    expect(await post('text/html', '<script>1</script>')).toBe(415)
    expect([400, 422]).toContain(await post('text/csv', picture))
    expect([400, 422]).toContain(await post('application/senml+json', picture))
    expect(await post('text/csv', picture, 'gzip')).toBe(400)
    expect(await post('text/csv', picture, 'br')).toBe(415)
  })
})

describe('dependencies', () => {
  interface Package {
    version?: string
    resolved?: string
    integrity?: string
    link?: boolean
    inBundle?: boolean
    hasInstallScript?: boolean
  }
  const own = JSON.parse(readFileSync(path.join(ROOT, 'package.json'), 'utf8')) as {
    dependencies: Record<string, string>
    devDependencies: Record<string, string>
    allowScripts: Record<string, boolean>
  }
  const lock = JSON.parse(readFileSync(path.join(ROOT, 'package-lock.json'), 'utf8')) as {
    packages: Record<string, Package>
  }
  const locked = Object.entries(lock.packages).filter(([where]) => where !== '')

  it('are pinned exactly, and the lock agrees', () => {
    for (const [name, version] of Object.entries({ ...own.dependencies, ...own.devDependencies })) {
      expect(version, name).toMatch(/^\d+\.\d+\.\d+(?:-[\w.]+)?$/)
      expect(lock.packages[`node_modules/${name}`]?.version, name).toBe(version)
    }
  })

  it('are the very bytes that were locked, and from the registry', () => {
    for (const [where, { resolved, integrity, inBundle, link }] of locked) {
      expect(link ?? false, where).toBe(false)
      if (resolved !== undefined) expect(resolved, where).toMatch(/^https:\/\/registry\.npmjs\.org\//)
      if (inBundle !== true) expect(integrity, where).toMatch(/^sha512-/)
    }
  })

  it('run no script when installed but those that are named', () => {
    const scripted = locked
      .filter(([, { hasInstallScript }]) => hasInstallScript === true)
      .map(([where]) => where.slice(where.lastIndexOf('node_modules/') + 'node_modules/'.length))
    const allowed = Object.keys(own.allowScripts).filter((name) => own.allowScripts[name] === true)
    expect(scripted.filter((name) => !allowed.includes(name))).toEqual([])
    expect(allowed.filter((name) => !scripted.includes(name))).toEqual([])
  })
})
