import { createHash, randomBytes, randomUUID } from 'node:crypto'
import { encode } from 'next-auth/jwt'
import type { Knex } from '@/db/knex'
import { env } from '@/lib/env'
import { ACTORS, type Person } from './actors'

/** A boat with one of everything, and people who stand to it in every way there is. Made anew wherever a test writes. */
export interface World {
  people: Record<Person, { id: string; email: string; cookie: string }>
  /** Stands nowhere but in this world's rows of the boat: whoever reads it has seen something of the boat. */
  marker: string
  password: string
  shopId: string
  strangeShopId: string
  withdrawnShopId: string
  figuresShopId: string
  vesselId: string
  systemId: string
  loggerId: string
  serial: string
  /** Of the shop with withdrawn access, still fitted to the boat's second system. */
  leftLoggerId: string
  cupTestId: string
  noticeId: string
  messageId: string
  visitId: string
  /** Of the shop with withdrawn access, before that. */
  doneVisitId: string
  invitationId: string
  invitationSecret: string
  vesselInvitationId: string
  commissioningId: string
  fittedCommissioningId: string
  userCode: string
  contactId: string
  sessionId: string
  linkCode: string
  resetSecret: string
  confirmSecret: string
  /** A boat of the strange owner, which the strange shop sees. */
  strange: { vesselId: string; systemId: string; loggerId: string; visitId: string; personId: string }
}

export const PASSWORD = 'a watchword of tests'
/** Argon2id of it, made once: hashing is slow on purpose. */
const PASSWORD_HASH = import('@/lib/auth/passwords').then(({ hashPassword }) => hashPassword(PASSWORD))
const sha256 = (text: string): Buffer => createHash('sha256').update(text).digest()
const ALL_ROLES = ['technician', 'installer', 'manager'] as const

/** The cookie of a session, as signing in gives it. */
export async function cookieOf(sessionId: string): Promise<string> {
  const token = await encode({ token: { sid: sessionId }, secret: env().secret })
  return `next-auth.session-token=${token}`
}

/** Makes a world in one transaction. @param knex as the owner of the tables */
export function makeWorld(knex: Knex): Promise<World> {
  return knex.transaction((trx) => build(trx))
}

async function build(trx: Knex.Transaction): Promise<World> {
  const marker = `mark-${randomUUID()}`
  const short = marker.slice(5, 13)
  const passwordHash = await PASSWORD_HASH
  const add = async (table: string, row: object): Promise<string> => {
    const [made] = await trx(table).insert(row).returning<{ id: unknown }[]>('id')
    return String(made?.id)
  }
  const hours = (count: number) => new Date(Date.now() + count * 3_600_000)

  const person = async (name: string) => {
    const email = `${name.toLowerCase()}.${randomUUID()}@matrix.example`
    const id = await add('person', {
      email,
      name: `Matrix ${name}`,
      password_hash: passwordHash,
      email_confirmed_at: hours(-99),
    })
    const sessionId = randomUUID()
    await trx('session').insert({ id: sessionId, person_id: id, expires_at: hours(24) })
    return { id, email, cookie: await cookieOf(sessionId) }
  }
  const people = {} as World['people'] // filled below, one for each name
  for (const name of ACTORS) if (name !== 'nobody') people[name] = await person(name)
  const second = await person('second')

  const shop = (name: string) => add('shop', { name: `${name} ${short}`, harbour: 'Port Averill' })
  const [shopId, strangeShopId, withdrawnShopId, figuresShopId] = [
    await shop('Own shop'),
    await shop('Strange shop'),
    await shop('Withdrawn shop'),
    await shop('Figures shop'),
  ]
  const join = (personId: string, of: string, roles: readonly string[], endedAt: Date | null = null) =>
    trx('membership').insert(
      roles.map((role) => ({
        shop_id: of,
        person_id: personId,
        role,
        since: hours(-9000),
        ended_at: endedAt,
      })),
    )
  await join(people.technician.id, shopId, ['technician'])
  await join(people.installer.id, shopId, ['installer'])
  await join(people.manager.id, shopId, ['manager'])
  await join(second.id, shopId, ['manager'])
  await join(people.lapsed.id, shopId, ALL_ROLES, hours(-48))
  await join(people.strangeManager.id, strangeShopId, ['manager'])
  await join(people.withdrawn.id, withdrawnShopId, ALL_ROLES)
  await join(people.figures.id, figuresShopId, ALL_ROLES)

  const boat = async (name: string, ownerId: string, ofShop: string | null) => {
    const vesselId = await add('vessel', {
      name,
      time_zone: 'Europe/London',
      harbour: name,
      berth: name,
    })
    await trx('vessel_owner').insert({ vessel_id: vesselId, person_id: ownerId, since: hours(-9000) })
    const systemId = await add('system', { vessel_id: vesselId, name })
    await trx('setting').insert({
      system_id: systemId,
      in_force_from: hours(-9000),
      cut_out_pa: 33_864,
      cut_in_pa: 27_091,
    })
    const loggerId = await add('logger', {
      serial: `${name}-a`.slice(0, 60),
      shop_id: ofShop,
      interval_seconds: 60,
      channels: trx.raw("array['pump','vacuum']"),
      key_hash: randomBytes(32),
      key_made_at: hours(-9000),
      last_heard_at: hours(-0.1),
    })
    await fit(loggerId, systemId)
    return { vesselId, systemId, loggerId }
  }
  const fit = (loggerId: string, systemId: string) =>
    trx('logger_fitting').insert({
      logger_id: loggerId,
      system_id: systemId,
      span: trx.raw('tstzrange(?, null)', [hours(-9000)]),
    })
  const own = await boat(marker, people.owner.id, shopId)
  const strange = await boat(`strange-${short}`, people.strangeOwner.id, strangeShopId)
  const { vesselId, systemId, loggerId } = own
  const access = (of: string, by: string, vessel: string, level: string, withdrawnAt: Date | null = null) =>
    trx('shop_access').insert({
      vessel_id: vessel,
      shop_id: of,
      level,
      granted_by: by,
      granted_at: hours(-9000),
      withdrawn_at: withdrawnAt,
    })
  await access(shopId, people.owner.id, vesselId, 'full')
  await access(figuresShopId, people.owner.id, vesselId, 'figures')
  await access(withdrawnShopId, people.owner.id, vesselId, 'full', hours(-24))
  await access(strangeShopId, people.strangeOwner.id, strange.vesselId, 'full')

  // What the boat is made of, what it did, and what was said of it.
  await trx('part').insert(
    ['tank', 'head'].map((kind) => ({
      system_id: systemId,
      key: kind,
      kind,
      name: `${kind} ${marker}`,
      volume_m3: 0.01,
    })),
  )
  await trx('system_state')
    .where({ system_id: systemId })
    .update({ last_heard_at: hours(-0.1) })
  const times = { started_at: hours(-3), known_at: hours(-1) }
  await trx('run').insert(
    ['leak', 'flush'].map((trigger, index) => ({
      ...times,
      system_id: systemId,
      started_at: hours(-3 + index),
      stopped_at: hours(-2.9 + index),
      trigger,
      edge_uncertainty_seconds: 0,
    })),
  )
  await trx('hold').insert(
    [0, 1].map((flushes) => ({
      ...times,
      system_id: systemId,
      started_at: hours(-4 + flushes),
      ended_at: hours(-3.5 + flushes),
      ending: flushes === 0 ? 'leak' : 'flush',
      flushes,
      edge_uncertainty_seconds: 0,
    })),
  )
  await trx('leg').insert({
    ...times,
    system_id: systemId,
    hold_started_at: hours(-4),
    ended_at: hours(-2),
    bins: JSON.stringify({
      offsetSeconds: [],
      vacuumPa: [],
      airC: [],
      laggedAirC: [],
      barometerPa: [],
      count: [],
    }),
  })
  await trx('flush').insert({
    system_id: systemId,
    at: hours(-2),
    drop_pa: 3000,
    started_pump: true,
    known_at: hours(-1),
  })
  await trx('fault').insert({
    ...times,
    system_id: systemId,
    kind: 'stuck',
    ended_at: hours(-2),
    detail: marker,
  })
  await trx('system_day').insert({
    system_id: systemId,
    day: hours(-48),
    leak_runs: 1,
    flush_runs: 1,
    flushes: 1,
    run_seconds: 60,
    observed_seconds: 86_400,
  })
  await trx('outlook').insert({
    system_id: systemId,
    night: hours(-24),
    given_at: hours(-26),
    quiet_from: hours(-20),
    quiet_to: hours(-11),
    aboard: 'unknown',
    detail: JSON.stringify({ marker }),
  })
  const upload = await add('upload', {
    logger_id: loggerId,
    received_at: hours(-1),
    format: 'csv',
    received: 1,
    stored: 1,
    duplicate: 0,
    conflicting: 0,
    rejected: 0,
  })
  await trx('sample').insert({ logger_id: loggerId, upload_id: upload, at: hours(-2), vacuum_pa: 30_000 })
  await trx('sample_hour').insert({ logger_id: loggerId, hour: hours(-2), samples: 1, supply_mean_v: 12.5 })
  await trx('calibration').insert({ logger_id: loggerId, in_force_from: hours(-100) })
  await trx('statement').insert([
    {
      vessel_id: vesselId,
      value: 'aboard',
      from_at: hours(-5),
      until_at: hours(50),
      said_by: people.owner.id,
    },
  ])
  await trx('statement').insert({
    vessel_id: vesselId,
    system_id: systemId,
    value: 'worked-on',
    from_at: hours(-500),
    until_at: hours(-499),
    said_by: people.owner.id,
  })

  const cupTestId = await add('cup_test', {
    system_id: systemId,
    part_key: 'head',
    head_name: `head ${marker}`,
    water_at: hours(-20),
    said_by: people.owner.id,
    said_at: hours(-20),
  })
  const noticeId = await add('notice', {
    system_id: systemId,
    vessel_id: vesselId,
    kind: 'short-hold',
    opened_at: hours(-5),
    reason: `holds too short ${marker}`,
  })
  const event = await add('notice_event', {
    notice_id: noticeId,
    at: hours(-5),
    transition: 'opened',
    reason: marker,
  })
  const linkCode = randomBytes(10).toString('hex')
  const messageId = await add('message', {
    person_id: people.owner.id,
    channel: 'email',
    address: people.owner.email,
    subject: marker,
    body_text: `${marker} leaks`,
    queued_at: hours(-5),
    send_after: hours(-5),
    failed_at: hours(-4),
    failure: 'refused',
    link_code: linkCode,
  })
  await trx('message_subject').insert({
    message_id: messageId,
    notice_event_id: event,
    channel: 'email',
    person_id: people.owner.id,
  })
  await trx('delivery_attempt').insert({
    message_id: messageId,
    at: hours(-4),
    outcome: 'failed',
    detail: marker,
  })

  const visit = async (of: string, vessel: string, system: string, row: object) =>
    add('visit', {
      vessel_id: vessel,
      system_id: system,
      shop_id: of,
      asked_by: people.owner.id,
      complaint: marker,
      asked_at: hours(-8),
      ...row,
    })
  const visitId = await visit(shopId, vesselId, systemId, { status: 'planned' })
  await trx('visit_entry').insert({
    id: randomUUID(),
    visit_id: visitId,
    at: hours(-1),
    kind: 'note',
    body: '{}',
  })
  await trx('gauge_test').insert({
    id: randomUUID(),
    visit_id: visitId,
    system_id: systemId,
    started_at: hours(-2),
    ended_at: hours(-1),
    part_keys: trx.raw("array['tank']"),
    start_pa: 33_000,
    end_pa: 32_000,
  })
  await trx('part_change').insert({
    id: randomUUID(),
    visit_id: visitId,
    part_key: 'tank',
    at: hours(-1),
    action: 'cleaned',
    detail: marker,
  })
  await trx('photo').insert({
    id: randomUUID(),
    visit_id: visitId,
    at: hours(-1),
    media_type: 'image/png',
    bytes: Buffer.from('89504e470d0a1a0a', 'hex'),
    caption: marker,
  })
  await add('report_version', { visit_id: visitId, version: 1, made_at: hours(-1), body: '{}' })
  const doneVisitId = await visit(withdrawnShopId, vesselId, systemId, {
    status: 'closed',
    complaint: 'of the shop that lost sight',
    closed_at: hours(-30),
  })
  const strangeVisitId = await visit(strangeShopId, strange.vesselId, strange.systemId, {
    status: 'planned',
    asked_by: people.strangeOwner.id,
    complaint: 'strange',
  })

  const invitationSecret = randomBytes(32).toString('base64url')
  const invitation = (to: object, secret: string) =>
    add('invitation', {
      email: `${randomUUID()}@matrix.example`,
      token_hash: sha256(secret),
      invited_by: people.manager.id,
      created_at: hours(-1),
      expires_at: hours(100),
      ...to,
    })
  const invitationId = await invitation({ shop_id: shopId, role: 'technician' }, invitationSecret)
  const vesselInvitationId = await invitation({ vessel_id: vesselId }, randomUUID())

  const commissioning = (row: object) =>
    add('commissioning', {
      started_by: people.installer.id,
      shop_id: shopId,
      started_at: hours(-1),
      way: 'key',
      serial: `${marker.slice(0, 30)}-c${randomUUID().slice(0, 4)}`,
      system_id: systemId,
      ...row,
    })
  const commissioningId = await commissioning({})
  const fittedCommissioningId = await commissioning({
    way: 'known',
    serial: `${marker}-a`.slice(0, 60),
    logger_id: loggerId,
    fitted_at: hours(-1),
  })
  await trx('commissioning_check').insert({
    commissioning_id: fittedCommissioningId,
    kind: 'first-reading',
    began_at: hours(-1),
    done_at: hours(-1),
    outcome: 'passed',
    reason: marker,
  })

  const letters = 'BCDFGHJKLMNPQRSTVWXZ'
  const userCode = [...randomBytes(8)].map((byte) => letters[byte % letters.length]).join('')
  await trx('device_claim').insert({
    device_code_hash: randomBytes(32),
    user_code: userCode,
    serial: `CLAIM-${randomUUID().slice(0, 8)}`,
    created_at: hours(0),
    expires_at: hours(1),
  })

  const left = await add('system', { vessel_id: vesselId, name: `aft ${marker}` })
  await trx('setting').insert({ system_id: left, in_force_from: hours(-9000) })
  const leftLoggerId = await add('logger', {
    serial: `${marker}-left`.slice(0, 60),
    shop_id: withdrawnShopId,
    interval_seconds: 60,
    channels: trx.raw("array['pump','vacuum']"),
    key_hash: randomBytes(32),
    last_heard_at: hours(-0.2),
  })
  await fit(leftLoggerId, left)

  const contactId = await add('contact', {
    person_id: people.owner.id,
    channel: 'email',
    address: `${randomUUID()}@matrix.example`,
  })
  const sessionId = randomUUID()
  await trx('session').insert({ id: sessionId, person_id: people.owner.id, expires_at: hours(24) })
  const [resetSecret, confirmSecret] = [
    randomBytes(32).toString('base64url'),
    randomBytes(32).toString('base64url'),
  ]
  const token = (secret: string, purpose: string, personId: string, subject: string | null) =>
    trx('token').insert({
      hash: sha256(secret),
      purpose,
      person_id: personId,
      subject,
      created_at: hours(-0.1),
      expires_at: hours(0.5),
    })
  await token(resetSecret, 'reset-password', second.id, null)
  await token(confirmSecret, 'confirm-contact', people.owner.id, contactId)
  await trx('audit_entry').insert({
    person_id: people.owner.id,
    vessel_id: vesselId,
    shop_id: shopId,
    action: 'visit.asked',
    detail: JSON.stringify({ marker }),
  })

  return {
    people,
    marker,
    password: PASSWORD,
    shopId,
    strangeShopId,
    withdrawnShopId,
    figuresShopId,
    ...own,
    serial: `${marker}-a`.slice(0, 60),
    leftLoggerId,
    cupTestId,
    noticeId,
    messageId,
    visitId,
    doneVisitId,
    invitationId,
    invitationSecret,
    vesselInvitationId,
    commissioningId,
    fittedCommissioningId,
    userCode,
    contactId,
    sessionId,
    linkCode,
    resetSecret,
    confirmSecret,
    strange: { ...strange, visitId: strangeVisitId, personId: people.strangeOwner.id },
  }
}
