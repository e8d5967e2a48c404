import { describe, expect, it } from 'vitest'
import type { ToldEvent } from '@/db/queries/notice-events'
import { compose } from '@/lib/messages/compose'
import { stripText } from '@/lib/messages/emails/night-strip'
import { gsmLength, toGsm } from '@/lib/messages/gsm'
import { noticeKindSchema, type NoticeKind } from '@/shared/schemas/words'

const PLACES = { appUrl: 'https://watch.example', linkCode: 'abcdefghjk' }
const READER = {
  name: 'Ada Marsh',
  units: { vacuum: 'inHg', temperature: 'C', volume: 'L', clock: '24h' } as const,
}
const NIGHT = {
  quiet: { from: '2026-03-10T22:00:00Z', to: '2026-03-11T07:00:00Z' },
  local: { from: '22:00', to: '07:00', bedtime: '22:30', firstAt: null, firstAfterBedtime: '00:00' },
  chance: 0.97,
  chanceIfFlushedLast: 0.93,
  expectedRuns: 6.2,
  expectedRunsIfFlushedLast: 5.6,
  holdSeconds: 5400,
  heardAtLocal: '19:59',
  strip: { quiet: [240, 780], expected: [360, 450, 540, 630, 720] },
}
const RECORD = {
  holdSeconds: 7200,
  holdLowSeconds: 6900,
  holdHighSeconds: 7500,
  limitSeconds: 10_800,
  holds: 3,
  airC: 1.4,
  supplyV: 11.4,
  lowSupplyV: 11.8,
  fromPaPerHour: 372.5,
  toPaPerHour: 1523.9,
  sinceLocal: 'Tue 14:10',
  untilLocal: 'Tue 17:25',
  fault: 'the reading has not moved',
}

const event = (kind: NoticeKind, changes: Partial<ToldEvent> = {}): ToldEvent => ({
  eventId: '1',
  noticeId: '1',
  kind,
  transition: 'opened',
  at: new Date('2026-03-10T20:00:00Z'),
  reason: '',
  evidence: kind === 'night-warning' ? NIGHT : RECORD,
  night: kind === 'night-warning' ? '2026-03-10' : null,
  systemId: '1',
  vesselId: '7',
  vesselName: 'Saltmarsh Hare',
  systemName: '',
  timeZone: 'Europe/London',
  ...changes,
})
const boat = (vesselName: string, index: number) =>
  event('night-warning', { vesselName, vesselId: String(index), eventId: String(index) })

describe('a night warning', () => {
  it('as a text says boat, what, what to do and where to look, in 160 letters', async () => {
    const { bodyText } = await compose('sms', [event('night-warning')], READER, PLACES)
    expect(bodyText).toBe(
      'Saltmarsh Hare: pump likely to run 6x tonight, 22-07. Last flush, let it stop, then a cup of water in each bowl. Reply VISIT or MUTE. watch.example/a/abcdefghjk',
    )
    expect(gsmLength(bodyText)).toBeLessThanOrEqual(160)
  })

  it('as a mail says how sure, what first and what next, the cup only after the pump has stopped', async () => {
    const { subject, bodyText, bodyHtml } = await compose('email', [event('night-warning')], READER, PLACES)
    expect(subject).toBe('Saltmarsh Hare: the toilet pump is likely to run about 6 times tonight')
    expect(bodyText).toContain('first by about 00:00 if the last flush is at 22:30')
    expect(bodyText).toContain('93 % likely')
    expect(bodyText).toMatch(/wait until the pump has stopped\. Then put a cup of water/)
    expect(bodyText).toContain('Never switch off a breaker that also feeds a bilge pump.')
    expect(bodyText).toContain('https://watch.example/a/abcdefghjk')
    for (const line of ['Saltmarsh Hare', '93 % likely', 'bilge pump']) expect(bodyHtml).toContain(line)
  })

  it('draws its strip with table cells, nine hours of them dark, five with a run', async () => {
    const { bodyHtml } = await compose('email', [event('night-warning')], READER, PLACES)
    expect(bodyHtml?.match(/height:34px/g)).toHaveLength(48)
    expect(bodyHtml?.match(/background-color:#13303f/g)).toHaveLength(27)
    expect(bodyHtml?.match(/border-left:3px solid #ff5fb4/g)).toHaveLength(5)
    expect(stripText({ quiet: [240, 780], expected: [360, 450] })).toContain('00:00, 01:30')
  })

  it('speaks by the reader’s clock', async () => {
    const reader = { ...READER, units: { ...READER.units, clock: '12h' as const } }
    const { bodyText } = await compose('email', [event('night-warning')], reader, PLACES)
    expect(bodyText).toContain('between 10:00 pm and 7:00 am')
    expect(bodyText).toContain('first by about 12:00 am')
  })

  it.each([2, 3, 5, 12])('of %i boats is one text that fits', async (count) => {
    const names = ['Saltmarsh Hare', 'Brent Goose', 'Petrel’s Rest of Averill Sound', 'Čmelák', 'Redshank']
    const events = Array.from({ length: count }, (_, index) =>
      boat(`${names[index % 5]}${index > 4 ? index : ''}`, index),
    )
    const { bodyText } = await compose('sms', events, READER, PLACES)
    expect(gsmLength(bodyText)).toBeLessThanOrEqual(160)
    expect(bodyText).toMatch(/^Pump likely to run tonight: Saltmarsh Hare 6x, /)
    expect(bodyText).toContain('watch.example/a/abcdefghjk')
  })
})

describe('every kind', () => {
  it.each(noticeKindSchema.options)(
    '%s has a text of 160 letters in the basic alphabet, however long the name',
    async (kind) => {
      for (const vesselName of ['Hare', 'The Right Honourable Admiral’s Second Favourite Launch']) {
        for (const transition of ['opened', 'worsened', 'ended', 'escalated'] as const) {
          const { bodyText } = await compose('sms', [event(kind, { vesselName, transition })], READER, PLACES)
          expect(gsmLength(bodyText)).toBeLessThanOrEqual(160)
          expect(toGsm(bodyText)).toBe(bodyText)
          expect(bodyText).toMatch(/^(Hare|The Right)/)
          expect(bodyText).toContain('watch.example/a/abcdefghjk')
        }
      }
    },
  )

  it.each(noticeKindSchema.options)('%s has a mail without a gap where a figure is missing', async (kind) => {
    for (const evidence of kind === 'night-warning' ? [NIGHT] : [RECORD, {}]) {
      const { subject, bodyText, bodyHtml } = await compose(
        'email',
        [event(kind, { evidence })],
        READER,
        PLACES,
      )
      for (const text of [subject, bodyText, bodyHtml]) {
        expect(text).toContain('Saltmarsh Hare')
        expect(text).not.toMatch(/undefined|NaN|null|Infinity/)
      }
    }
  })
})
