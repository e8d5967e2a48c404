import { describe, expect, it } from 'vitest'
import type { ContactAddress, Recipient } from '@/db/queries/recipients'
import { chooseAddresses, lowestNightChance, type Subject } from '@/lib/messages/choose-addresses'
import { noticeKindSchema, type NoticeKind } from '@/shared/schemas/words'

const contact = (changes: Partial<ContactAddress>): ContactAddress => ({
  id: '1',
  channel: 'sms',
  address: '+12025550110',
  verified: true,
  consented: true,
  stopped: false,
  settings: {},
  ...changes,
})
const person = (changes: Partial<Recipient> = {}): Recipient => ({
  personId: '1',
  name: 'Ada Marsh',
  email: 'ada@boats.example',
  units: { vacuum: 'inHg', temperature: 'C', volume: 'L', clock: '24h' },
  as: 'owner',
  roles: [],
  quiet: { timeZone: 'Europe/London', start: '22:00', end: '07:00' },
  contacts: [contact({})],
  shopKinds: null,
  onCall: 'nobody-named',
  ...changes,
})
const about = (kind: NoticeKind, changes: Partial<Subject> = {}): Subject => ({
  kind,
  transition: 'opened',
  chanceIfFlushedLast: kind === 'night-warning' ? 0.7 : null,
  audience: null,
  noShop: false,
  ...changes,
})
const by = (who: Recipient, subject: Subject) => chooseAddresses(who, subject).map(({ channel }) => channel)
const kindsBy = (who: Recipient, channel: string, changes: Partial<Subject> = {}) =>
  noticeKindSchema.options.filter((kind) => by(who, about(kind, changes)).some((used) => used === channel))

describe('an owner', () => {
  it('is told by mail and, of what is pressing, by text', () => {
    expect(kindsBy(person(), 'email')).toEqual([
      'night-warning',
      'short-hold',
      'short-cycling',
      'running-on',
      'no-start',
      'low-supply',
      'freeze',
    ])
    expect(kindsBy(person(), 'sms')).toEqual([
      'night-warning',
      'short-cycling',
      'running-on',
      'no-start',
      'low-supply',
    ])
  })

  it('without a shop is told by mail what the shop would be', () => {
    expect(kindsBy(person(), 'email', { noShop: true })).toEqual(noticeKindSchema.options)
  })

  it('hears of a silent logger after a day', () => {
    expect(by(person(), about('logger-silent'))).toEqual([])
    expect(by(person(), about('logger-silent', { audience: 'owner' }))).toEqual(['email'])
  })

  it('is told what they asked for and nothing else', () => {
    const settings = { kinds: ['freeze' as const] }
    expect(kindsBy(person({ contacts: [contact({ settings })] }), 'sms')).toEqual(['freeze'])
    expect(kindsBy(person({ contacts: [contact({ channel: 'email', settings })] }), 'email')).toEqual([
      'freeze',
    ])
  })

  it.each([{ verified: false }, { consented: false }, { stopped: true }])(
    'gets no text when %o',
    (changes) => {
      expect(by(person({ contacts: [contact(changes)] }), about('night-warning'))).toEqual(['email'])
    },
  )

  it('who stopped mail gets none, not even to the account’s address', () => {
    const stopped = contact({ channel: 'email', address: 'ada@boats.example', stopped: true })
    expect(by(person({ contacts: [stopped] }), about('night-warning'))).toEqual([])
  })

  it('is warned from the chance on that they chose', () => {
    const choosy = person({ contacts: [contact({ settings: { nightWarningChance: 0.8 } })] })
    expect(by(choosy, about('night-warning', { chanceIfFlushedLast: 0.7 }))).toEqual(['email'])
    expect(by(choosy, about('night-warning', { chanceIfFlushedLast: 0.9 }))).toEqual(['email', 'sms'])
    expect(lowestNightChance([choosy])).toBe(0.5)
    const early = person({ contacts: [contact({ settings: { nightWarningChance: 0.2 } })] })
    expect(lowestNightChance([early])).toBe(0.2)
    expect(lowestNightChance([])).toBe(0.5)
  })
})

describe('a shop', () => {
  const manager = person({ as: 'shop', roles: ['manager'] })
  const technician = person({ as: 'shop', roles: ['technician'] })

  it('tells its managers by mail, and of a pump that runs on by text', () => {
    expect(kindsBy(manager, 'email')).toEqual([
      'short-hold',
      'short-cycling',
      'running-on',
      'slow-recharge',
      'switch-drift',
      'step',
      'logger-silent',
      'sensor-fault',
    ])
    expect(kindsBy(manager, 'sms')).toEqual(['running-on'])
    expect(kindsBy(technician, 'email')).toEqual([])
  })

  it('calls those who may be called at night when nobody answers; the owner is not told twice', () => {
    const onCall = person({
      as: 'shop',
      roles: ['technician'],
      contacts: [contact({ settings: { urgentAtNight: true } })],
    })
    const escalated = about('running-on', { transition: 'escalated' })
    expect(by(onCall, escalated)).toEqual(['email', 'sms'])
    expect(by(technician, escalated)).toEqual([])
    expect(by(person(), escalated)).toEqual([])
  })

  it('hears only of the kinds that it chose', () => {
    const choosy = person({ as: 'shop', roles: ['manager'], shopKinds: ['step', 'short-hold'] })
    expect(kindsBy(choosy, 'email')).toEqual(['short-hold', 'step'])
    expect(kindsBy(choosy, 'sms')).toEqual([])
    const asked = person({ ...choosy, contacts: [contact({ settings: { kinds: ['freeze'] } })] })
    expect(by(asked, about('freeze'))).not.toEqual([])
  })

  it('calls the one on call alone, once somebody is named', () => {
    const escalated = about('running-on', { transition: 'escalated' })
    expect(by(person({ as: 'shop', roles: ['technician'], onCall: 'yes' }), escalated)).toEqual([
      'email',
      'sms',
    ])
    expect(by(person({ as: 'shop', roles: ['manager'], onCall: 'no' }), escalated)).toEqual([])
  })

  it('is left out of what is meant for the owner alone', () => {
    expect(by(manager, about('logger-silent', { audience: 'owner' }))).toEqual([])
  })
})
