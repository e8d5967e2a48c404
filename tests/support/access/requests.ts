import { randomInt, randomUUID } from 'node:crypto'
import type { Actor } from './actors'
import { PASSWORD, type World } from './world'

export interface Asked {
  path: string
  /** Sent as JSON, unless `form` says that it is a form. */
  body?: unknown
  form?: boolean
  headers?: Record<string, string>
}

type Ask = (world: World, actor: Actor) => Asked

const at = (daysAgo: number): string => new Date(Date.now() - daysAgo * 86_400_000).toISOString()
const mail = (): string => `${randomUUID()}@matrix.example`
const get =
  (path: (world: World) => string): Ask =>
  (world) => ({ path: path(world) })
const send =
  (path: (world: World) => string, body: unknown = {}): Ask =>
  (world) => ({ path: path(world), body })

const vessel = (rest = '') => get((world) => `/api/vessels/${world.vesselId}${rest}`)
const system = (rest: string) => get((world) => `/api/systems/${world.systemId}/${rest}`)
const own = (path: string): Ask => get(() => path)
const commissioning = (rest: string) => (world: World) =>
  `/api/commissionings/${world.commissioningId}${rest}`
const fitted = (rest: string) => (world: World) => `/api/commissionings/${world.fittedCommissioningId}${rest}`
const emailOf = (world: World, actor: Actor): string =>
  actor === 'nobody' ? 'nobody@matrix.example' : world.people[actor].email

/** Of the staff's own shop; the owner names the one that sees most. */
const shopFor = (world: World, actor: Actor): string =>
  actor === 'figures' ? world.figuresShopId : world.shopId

/**
 * What each row of the matrix asks: rightly said, so that only the right decides. Ids are those of the world's boat
 * and its shop, which for a stranger are a stranger's.
 */
export const REQUESTS: Record<string, Ask> = {
  'GET /api/vessels': own('/api/vessels'),
  'POST /api/vessels': (world, actor) => ({
    path: '/api/vessels',
    body: { name: `New ${randomUUID()}`, timeZone: 'Europe/London', ownerEmail: emailOf(world, actor) },
  }),
  'GET /api/vessels/{id}': vessel(),
  'PATCH /api/vessels/{id}': send((world) => `/api/vessels/${world.vesselId}`, { berth: 'Z 9' }),
  'GET /api/vessels/{id}/aboard': vessel('/aboard'),
  'PUT /api/vessels/{id}/aboard': send((world) => `/api/vessels/${world.vesselId}/aboard`, { value: true }),
  'GET /api/vessels/{id}/access': vessel('/access'),
  'GET /api/vessels/{id}/log': vessel('/log'),
  'PUT /api/vessels/{id}/access/{shopId}': send(
    (world) => `/api/vessels/${world.vesselId}/access/${world.strangeShopId}`,
    { level: 'full' },
  ),
  'DELETE /api/vessels/{id}/access/{shopId}': get(
    (world) => `/api/vessels/${world.vesselId}/access/${world.shopId}`,
  ),
  'POST /api/vessels/{id}/systems': (world) => ({
    path: `/api/vessels/${world.vesselId}/systems`,
    body: { name: randomUUID() },
  }),
  'POST /api/vessels/{id}/visits': (world, actor) => ({
    path: `/api/vessels/${world.vesselId}/visits`,
    body: { complaint: 'runs', shopId: shopFor(world, actor) },
  }),

  'GET /api/systems/{id}/settings': system('settings'),
  'PUT /api/systems/{id}/settings': send((world) => `/api/systems/${world.systemId}/settings`, {
    pumpAmps: 6,
  }),
  'PUT /api/systems/{id}/parts': send((world) => `/api/systems/${world.systemId}/parts`, {
    parts: [{ key: 'tank', kind: 'tank', name: 'Tank' }],
  }),
  'PUT /api/systems/{id}/statement': send((world) => `/api/systems/${world.systemId}/statement`, {
    value: 'laid-up',
  }),
  'PUT /api/statements': (world) => ({
    path: '/api/statements',
    body: { systems: [world.systemId], value: 'laid-up' },
  }),
  'GET /api/systems/{id}/summary': system('summary'),
  'GET /api/systems/{id}/runs': system('runs'),
  'GET /api/systems/{id}/holds': system('holds'),
  'GET /api/systems/{id}/outlook': system('outlook'),
  'GET /api/systems/{id}/trend': system('trend'),
  'GET /api/systems/{id}/comparison': system(`comparison?before=${at(2)}/${at(1)}&after=${at(1)}/${at(0)}`),
  'GET /api/systems/{id}/trace': system(`trace?from=${at(1)}&to=${at(0)}`),
  'GET /api/systems/{id}/set-up': system('set-up'),
  'GET /api/time-zones': own('/api/time-zones?search=london'),
  'GET /api/systems/{id}/suspects': system('suspects'),
  'GET /api/systems/{id}/cup-tests': system('cup-tests'),
  'POST /api/systems/{id}/cup-tests': send((world) => `/api/systems/${world.systemId}/cup-tests`, {
    partKey: 'head',
  }),
  'DELETE /api/systems/{id}/cup-tests/{testId}': get(
    (world) => `/api/systems/${world.systemId}/cup-tests/${world.cupTestId}`,
  ),
  'GET /api/outlook-score': own('/api/outlook-score'),
  'GET /api/nights': get((world) => `/api/nights?systems=${world.systemId}&nights=2`),

  'GET /api/loggers': own('/api/loggers'),
  'GET /api/loggers/health': own('/api/loggers/health'),
  'POST /api/systems/{id}/loggers': (world) => ({
    path: `/api/systems/${world.systemId}/loggers`,
    body: { serial: `R-${randomUUID()}`, intervalSeconds: 60, channels: ['pump'] },
  }),
  'DELETE /api/loggers/{id}': get((world) => `/api/loggers/${world.loggerId}`),
  'DELETE /api/loggers/{id} · left behind': get((world) => `/api/loggers/${world.leftLoggerId}`),
  'POST /api/loggers/{id}/key': send((world) => `/api/loggers/${world.loggerId}/key`),
  'POST /api/loggers/{id}/key · left behind': send((world) => `/api/loggers/${world.leftLoggerId}/key`),
  'POST /api/loggers/{id}/calibrations': send((world) => `/api/loggers/${world.loggerId}/calibrations`, {
    vacuumOffsetPa: 0,
  }),
  'POST /api/loggers/{id}/watch': send((world) => `/api/loggers/${world.loggerId}/watch`),
  'GET /api/loggers/{id}/commissioning': get((world) => `/api/loggers/${world.loggerId}/commissioning`),
  'GET /api/loggers/{id}/commissioning/pdf': get(
    (world) => `/api/loggers/${world.loggerId}/commissioning/pdf`,
  ),
  'GET /api/claims/{userCode}': get((world) => `/api/claims/${world.userCode}`),
  'POST /api/claims/{userCode}': (world) => ({
    path: `/api/claims/${world.userCode}`,
    body: { answer: 'approve', systemId: world.systemId },
  }),
  'POST /api/claims/{userCode} · deny': send((world) => `/api/claims/${world.userCode}`, { answer: 'deny' }),

  'GET /api/commissionings': own('/api/commissionings'),
  'POST /api/commissionings': (world) => ({
    path: '/api/commissionings',
    body: { way: 'key', serial: `K-${randomUUID()}`, systemId: world.systemId },
  }),
  'GET /api/commissionings/{id}': get(commissioning('')),
  'PATCH /api/commissionings/{id}': send(commissioning(''), { setAside: true }),
  'POST /api/commissionings/{id}/fitting': send(commissioning('/fitting'), { channels: ['pump', 'vacuum'] }),
  'POST /api/commissionings/{id}/checks/{kind}': send(fitted('/checks/zero'), { step: 'begin' }),
  'GET /api/commissionings/{id}/live': get(fitted('/live')),
  'POST /api/commissionings/{id}/finish': send(fitted('/finish'), { note: 'the rest tomorrow' }),

  'GET /api/notices': own('/api/notices'),
  'GET /api/notices/{id}': get((world) => `/api/notices/${world.noticeId}`),
  'PATCH /api/notices/{id}': send((world) => `/api/notices/${world.noticeId}`, { snoozedUntil: at(-1) }),
  'POST /api/notices/{id}/acknowledge': send((world) => `/api/notices/${world.noticeId}/acknowledge`, {
    note: 'seen',
  }),
  'GET /api/messages': own('/api/messages'),
  'POST /api/messages/{id}/resend': send((world) => `/api/messages/${world.messageId}/resend`),
  'GET /api/links/{code}': get((world) => `/api/links/${world.linkCode}`),
  'POST /api/links/{code}': send((world) => `/api/links/${world.linkCode}`, { word: 'OK' }),
  'GET /api/outbox': own('/api/outbox'),

  'GET /api/visits': own('/api/visits'),
  'GET /api/visits/{id}': get((world) => `/api/visits/${world.visitId}`),
  'GET /api/visits/{id} · done before': get((world) => `/api/visits/${world.doneVisitId}`),
  'PATCH /api/visits/{id}': send((world) => `/api/visits/${world.visitId}`, { status: 'under-way' }),
  'POST /api/visits/{id}/gauge-tests': (world) => ({
    path: `/api/visits/${world.visitId}/gauge-tests`,
    body: {
      id: randomUUID(),
      startedAt: at(0.2),
      endedAt: at(0.1),
      partKeys: ['tank'],
      startPa: 33_000,
      endPa: 32_000,
    },
  }),
  'POST /api/visits/{id}/entries': (world) => ({
    path: `/api/visits/${world.visitId}/entries`,
    body: { id: randomUUID(), at: at(0.1), kind: 'note', body: {} },
  }),
  'POST /api/visits/{id}/part-changes': (world) => ({
    path: `/api/visits/${world.visitId}/part-changes`,
    body: { id: randomUUID(), at: at(0.1), partKey: 'tank', action: 'tightened' },
  }),

  'GET /api/me': own('/api/me'),
  'PATCH /api/me': send(() => '/api/me', { units: { vacuum: 'kPa' } }),
  'PUT /api/me/password': send(() => '/api/me/password', { current: PASSWORD, next: 'another watchword' }),
  'PUT /api/me/email': () => ({ path: '/api/me/email', body: { email: mail(), password: PASSWORD } }),
  'GET /api/me/export': own('/api/me/export'),
  'GET /api/me/sessions': own('/api/me/sessions'),
  'DELETE /api/me/sessions': own('/api/me/sessions'),
  'DELETE /api/me/sessions/{id}': get((world) => `/api/me/sessions/${world.sessionId}`),
  'GET /api/me/contacts': own('/api/me/contacts'),
  'POST /api/me/contacts': () => ({
    path: '/api/me/contacts',
    body: { channel: 'email', address: mail() },
  }),
  'PATCH /api/me/contacts/{id}': send((world) => `/api/me/contacts/${world.contactId}`, { settings: {} }),
  'DELETE /api/me/contacts/{id}': get((world) => `/api/me/contacts/${world.contactId}`),
  'POST /api/me/contacts/{id}/proof': send((world) => `/api/me/contacts/${world.contactId}/proof`),
  'POST /api/me/contacts/{id}/verify': send((world) => `/api/me/contacts/${world.contactId}/verify`, {
    code: '000000',
  }),
  'GET /api/me/second-factor': own('/api/me/second-factor'),
  'POST /api/me/second-factor': send(() => '/api/me/second-factor', { password: PASSWORD }),
  'PUT /api/me/second-factor': send(() => '/api/me/second-factor', { code: '000000' }),
  'POST /api/me/second-factor/off': send(() => '/api/me/second-factor/off', {
    password: PASSWORD,
    code: '000000',
  }),
  'POST /api/me/second-factor/recovery-codes': send(() => '/api/me/second-factor/recovery-codes', {
    password: PASSWORD,
    code: '000000',
  }),
  'POST /api/me/shops': send(() => '/api/me/shops', { name: 'Another shop', timeZone: 'Europe/London' }),
  'DELETE /api/me/shops/{id}': get((world) => `/api/me/shops/${world.shopId}`),
  'GET /api/account/delete': own('/api/account/delete'),
  'POST /api/account/delete': (world, actor) => ({
    path: '/api/account/delete',
    body: { email: emailOf(world, actor), password: PASSWORD },
  }),

  'GET /api/shops': own('/api/shops'),
  'GET /api/shops/{id}': get((world) => `/api/shops/${world.shopId}`),
  'PATCH /api/shops/{id}': send((world) => `/api/shops/${world.shopId}`, { harbour: 'Grey Sound' }),
  'GET /api/shops/{id}/people': get((world) => `/api/shops/${world.shopId}/people`),
  'PUT /api/shops/{id}/people/{personId}': send(
    (world) => `/api/shops/${world.shopId}/people/${world.people.technician.id}`,
    { roles: ['technician', 'installer'] },
  ),
  'GET /api/shops/{id}/log': get((world) => `/api/shops/${world.shopId}/log`),

  'GET /api/invitations': get((world) => `/api/invitations?shop=${world.shopId}`),
  'GET /api/invitations · of a vessel': get((world) => `/api/invitations?vessel=${world.vesselId}`),
  'POST /api/invitations': (world) => ({
    path: '/api/invitations',
    body: { email: mail(), shopId: world.shopId, role: 'technician' },
  }),
  'POST /api/invitations · to a vessel': (world) => ({
    path: '/api/invitations',
    body: { email: mail(), vesselId: world.vesselId },
  }),
  'DELETE /api/invitations/{id}': get((world) => `/api/invitations/${world.invitationId}`),
  'DELETE /api/invitations/{id} · to a vessel': get(
    (world) => `/api/invitations/${world.vesselInvitationId}`,
  ),
  'POST /api/invitations/{id}/resend': send((world) => `/api/invitations/${world.invitationId}/resend`),
  'POST /api/invitations/look': (world) => ({
    path: '/api/invitations/look',
    body: { token: world.invitationSecret },
  }),
  'POST /api/invitations/accept': (world) => ({
    path: '/api/invitations/accept',
    body: { token: world.invitationSecret, name: 'New hand', password: 'one more watchword' },
  }),
  'POST /api/sign-up': () => ({ path: '/api/sign-up', body: { email: mail(), name: 'Somebody' } }),
  'POST /api/confirm-email': (world) => ({
    path: '/api/confirm-email',
    body: { token: world.confirmSecret },
  }),
  'POST /api/password/forgot': () => ({ path: '/api/password/forgot', body: { email: mail() } }),
  'POST /api/password/reset': (world) => ({
    path: '/api/password/reset',
    body: { token: world.resetSecret, password: 'a newer watchword' },
  }),

  'POST /api/leak-down': send(() => '/api/leak-down', { startPa: 33_000, endPa: 32_000, seconds: 1800 }),
  'POST /api/isolation': send(() => '/api/isolation', {
    parts: [{ key: 'tank', kind: 'tank', volumeM3: 0.03 }],
    tests: [],
  }),
  'GET /api/health': own('/api/health'),
  'GET /api/openapi.json': own('/api/openapi.json'),
  'POST /api/device_authorization': () => ({
    path: '/api/device_authorization',
    form: true,
    body: { client_id: `D-${randomUUID()}` },
  }),
  'POST /api/token': () => ({
    path: '/api/token',
    form: true,
    body: {
      grant_type: 'urn:ietf:params:oauth:grant-type:device_code',
      device_code: randomUUID(),
      client_id: 'D-1',
    },
  }),
  'POST /api/ingest': () => ({
    path: '/api/ingest',
    body: [],
    headers: { 'content-type': 'application/senml+json' },
  }),
  'POST /api/sms/inbound': () => ({ path: '/api/sms/inbound', form: true, body: { From: '+12025550199' } }),
  'POST /api/sms/status': () => ({ path: '/api/sms/status', form: true, body: { MessageSid: 'SM0' } }),
  'GET /api/auth/{nextauth}': own('/api/auth/csrf'),
  'POST /api/auth/{nextauth}': () => ({
    path: '/api/auth/callback/credentials',
    form: true,
    body: { email: mail(), password: PASSWORD, json: 'true' },
  }),
  ...Object.fromEntries(
    ['GET', 'POST', 'PUT', 'PATCH', 'DELETE', 'OPTIONS'].map((method) => [
      `${method} /api/{path}`,
      own('/api/there/is/no/such/address'),
    ]),
  ),
}

/** Where each page of the matrix is looked for; the very address where nothing varies. */
export const PAGE_PATHS: Record<string, (world: World) => string> = {
  '/vessels/{id}': (world) => `/vessels/${world.vesselId}`,
  '/vessels/{id}/record': (world) => `/vessels/${world.vesselId}/record`,
  '/vessels/{id}/pump': (world) => `/vessels/${world.vesselId}/pump`,
  '/vessels/{id}/notices': (world) => `/vessels/${world.vesselId}/notices`,
  '/vessels/{id}/visits': (world) => `/vessels/${world.vesselId}/visits`,
  '/vessels/{id}/set-up': (world) => `/vessels/${world.vesselId}/set-up`,
  '/vessels/{id}/access': (world) => `/vessels/${world.vesselId}/access`,
  '/reset-password/{token}': (world) => `/reset-password/${world.resetSecret}`,
  '/confirm/{token}': (world) => `/confirm/${world.confirmSecret}`,
  '/invitation/{token}': (world) => `/invitation/${world.invitationSecret}`,
  '/a/{code}': (world) => `/a/${world.linkCode}`,
  '/register/{id}': (world) => `/register/${world.commissioningId}`,
  '/register/{id}/{step}': (world) => `/register/${world.commissioningId}/boat`,
  '/loggers/{id}': (world) => `/loggers/${world.loggerId}`,
  '/loggers/{id}/commissioning': (world) => `/loggers/${world.loggerId}/commissioning`,
}

/** Another address each time (RFC 3849's range): limits by address are tested elsewhere. */
export const someAddress = (): string =>
  `2001:db8:${randomInt(65_536).toString(16)}:${randomInt(65_536).toString(16)}::1`
