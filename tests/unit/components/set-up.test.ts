import { describe, expect, it } from 'vitest'
import { startOfDay } from '@/components/vessel/set-up/days'
import { figuresFormSchema, figuresToSend, figureValues } from '@/components/vessel/set-up/figure-values'
import { shown, typed } from '@/components/vessel/set-up/figures-typed'
import { changeWords } from '@/components/vessel/set-up/history-words'
import {
  freeKey,
  newPart,
  partsFormSchema,
  partsToSend,
  partValues,
  withoutPart,
} from '@/components/vessel/set-up/part-values'
import { layOutUpright } from '@/components/vessel/set-up/plant-layout'
import { figureLines } from '@/components/vessel/set-up/set-up-lines'
import { inTestWords } from '@/components/vessel/set-up/test-points'
import { sizeUnit, volumeM3 } from '@/components/vessel/set-up/volumes'
import { utcWords } from '@/components/vessel/set-up/zone-field'
import type { Part, Settings } from '@/shared/schemas'
import { DEFAULT_UNITS, M3_PER } from '@/shared/units'

const SETTINGS: Settings = {
  inForceFrom: '2026-01-01T00:00:00Z',
  kind: 'pass-through',
  cutOutPa: 33_863.9,
  cutInPa: null,
  limitSeconds: 10_800,
  aimSeconds: 28_800,
  silenceSeconds: 21_600,
  pumpAmps: 6.5,
  lowSupplyV: null,
}
const PARTS: Part[] = [
  { key: 'tank', kind: 'tank', name: 'Tank', volumeM3: 0.0301234567, parent: null },
  { key: 'hose', kind: 'hose', name: 'Forward hose', volumeM3: null, parent: 'tank' },
  { key: 'head', kind: 'head', name: 'Forward head', volumeM3: 0.002, parent: 'hose' },
]

describe('figures typed', () => {
  it('are read with a point or a comma, and nothing is null', () => {
    expect([typed('2,5'), typed(' 2.5 '), typed('−3'), typed('.5'), typed('')]).toEqual([
      2.5,
      2.5,
      -3,
      0.5,
      null,
    ])
    expect([typed('two'), typed('1.2.3'), typed('1e3'), typed('-')]).toEqual([NaN, NaN, NaN, NaN])
    expect(shown(2.4000001, 2)).toBe('2.4')
  })
})

describe('a volume from sizes', () => {
  // Geometry: π/4·d²·L, and the product of the sides.
  it('is that of a cylinder, a box and a hose', () => {
    expect(volumeM3('hose', [0.038, 10])).toBeCloseTo(0.011341, 6)
    expect(volumeM3('cylinder', [0.3, 0.5])).toBeCloseTo(0.035343, 6)
    expect(volumeM3('box', [0.4, 0.3, 0.25])).toBeCloseTo(0.03, 12)
  })
  it('is unknown while a size is missing or nought', () => {
    expect(volumeM3('hose', [0.038, null])).toBeNull()
    expect(volumeM3('box', [0.4, 0.3, null])).toBeNull()
    expect(volumeM3('cylinder', [0, 1])).toBeNull()
  })
  it('is measured in inches and feet by readers of gallons', () => {
    expect(sizeUnit('hose', 1, 'usGal')).toEqual({ name: 'ft', metres: 0.3048 })
    expect(sizeUnit('hose', 0, 'L')).toEqual({ name: 'mm', metres: 0.001 })
    expect(sizeUnit('box', 0, 'impGal').name).toBe('in')
  })
})

describe('the parts', () => {
  it('that nobody touched are sent back to the last digit, in any unit', () => {
    for (const volume of ['L', 'usGal', 'impGal'] as const) {
      const units = { ...DEFAULT_UNITS, volume }
      const { parts } = partsFormSchema.parse({ parts: partValues(PARTS, units) })
      expect(partsToSend(parts, units)).toEqual(PARTS)
    }
  })
  it('take a volume typed in gallons and one from sizes', () => {
    const units = { ...DEFAULT_UNITS, volume: 'usGal' } as const
    const [tank, hose, head] = partValues(PARTS, units)
    const { parts } = partsFormSchema.parse({
      parts: [
        { ...tank, volume: '8' },
        { ...hose, shape: 'hose', sizes: ['1.5', '20', ''] },
        { ...head, volume: '' },
      ],
    })
    const sent = partsToSend(parts, units)
    expect(sent[0]?.volumeM3).toBeCloseTo(8 * M3_PER.usGal, 12)
    expect(sent[1]?.volumeM3).toBeCloseTo((Math.PI / 4) * (1.5 * 0.0254) ** 2 * 20 * 0.3048, 12)
    expect(sent[2]?.volumeM3).toBeNull()
  })
  it('are refused without a name, with one twice, and with sizes missing', () => {
    const [tank, hose, head] = partValues(PARTS, DEFAULT_UNITS)
    const wrong = (parts: object[]) =>
      partsFormSchema.safeParse({ parts }).error?.issues.map((issue) => issue.path.join('.'))
    expect(wrong([{ ...tank, name: ' ' }])).toEqual(['parts.0.name'])
    expect(wrong([{ ...head }, { ...hose, name: 'Forward head' }])).toEqual(['parts.0.name', 'parts.1.name'])
    expect(wrong([{ ...tank, shape: 'box', sizes: ['40', '', '30'] }])).toEqual(['parts.0.sizes.1'])
    expect(wrong([{ ...tank, volume: 'much' }])).toEqual(['parts.0.volume'])
  })
  it('get a key and a name of their own, and lead to the tank', () => {
    expect(freeKey('head', new Set(['head-1', 'head-2']))).toBe('head-3')
    expect(newPart('head', PARTS)).toMatchObject({ key: 'head-1', name: 'Head 2', parent: 'tank' })
    expect(newPart('tank', [])).toMatchObject({ key: 'tank-1', name: 'Tank', parent: '' })
  })
  it('lead on past one that is removed', () => {
    const left = withoutPart(partValues(PARTS, DEFAULT_UNITS), 'hose')
    expect(left.map((part) => [part.key, part.parent])).toEqual([
      ['tank', ''],
      ['head', 'tank'],
    ])
  })
  it('are drawn upright under what they lead to, each once, rings too', () => {
    expect(layOutUpright(PARTS).map((place) => [place.part.key, place.depth, place.row])).toEqual([
      ['tank', 0, 0],
      ['hose', 1, 1],
      ['head', 2, 2],
    ])
    const ring = PARTS.map((part) => (part.key === 'tank' ? { ...part, parent: 'head' } : part))
    expect(
      layOutUpright(ring)
        .map((place) => place.part.key)
        .sort(),
    ).toEqual(['head', 'hose', 'tank'])
  })
  it('in a test are said by what it leaves out where that is shorter', () => {
    const names = new Map(PARTS.map((part) => [part.key, part.name]))
    expect(inTestWords(['tank', 'hose', 'head'], names)).toBe('everything')
    expect(inTestWords(['tank', 'hose'], names)).toBe('all but Forward head')
    expect(inTestWords(['tank'], names)).toBe('Tank')
  })
})

describe('the figures', () => {
  const schema = figuresFormSchema('inHg')
  const was = figureValues(SETTINGS, '', 'inHg')
  const send = (change: object) => figuresToSend(schema.parse({ ...was, ...change }), was, 'inHg', [])
  it('that nobody touched are not sent', () => {
    expect(was).toMatchObject({ cutOut: '10', cutIn: '', limitHours: '3', silenceHours: '6' })
    expect(send({})).toBeNull()
    expect(send({ limitHours: '4,5', cutIn: '8' })).toEqual({
      limitSeconds: 16_200,
      cutInPa: expect.closeTo(27_091.1, 1),
    })
    expect(send({ cutOut: '', pumpAmps: '' })).toEqual({ cutOutPa: null, pumpAmps: null })
  })
  it('count from the start of a day on board', () => {
    const offsets = [
      { from: '2026-01-01T00:00:00Z', seconds: 0 },
      { from: '2026-03-29T01:00:00Z', seconds: 3600 },
    ]
    const change = figuresToSend(
      schema.parse({ ...was, kind: 'unit', when: 'day', day: '2026-04-02' }),
      was,
      'inHg',
      offsets,
    )
    expect(change).toEqual({ kind: 'unit', inForceFrom: '2026-04-01T23:00:00.000Z' })
    // The day on which the clock goes forward begins by the old offset.
    expect(startOfDay('2026-03-29', offsets)).toBe('2026-03-29T00:00:00.000Z')
    expect(startOfDay('2026-03-30', offsets)).toBe('2026-03-29T23:00:00.000Z')
  })
  it('that contradict each other are said at the field', () => {
    const wrong = (change: object) =>
      schema.safeParse({ ...was, ...change }).error?.issues.map((issue) => issue.path.join('.'))
    expect(wrong({ cutIn: '10' })).toEqual(['cutIn'])
    expect(wrong({ limitHours: '9' })).toEqual(['aimHours'])
    expect(wrong({ limitHours: '' })).toEqual(['limitHours'])
    expect(wrong({ when: 'day' })).toEqual(['day'])
    expect(wrong({ cutOut: '31' })).toEqual(['cutOut'])
  })
  it('stand beside what the record shows', () => {
    const lines = figureLines(SETTINGS, { cutOutPa: 33_000, cutInPa: 27_091 }, DEFAULT_UNITS)
    const of = (name: string) => lines.find((line) => line.name === name)?.value
    expect(of('Pump stops at')).toBe('10.0 inHg; the record shows 9.7 inHg')
    expect(of('Pump starts at')).toBe('8.0 inHg, learned')
    expect(figureLines(SETTINGS, undefined, DEFAULT_UNITS)[2]?.value).toBe('not learned yet')
  })
})

describe('a change in the history', () => {
  const words = (
    field: string,
    from: string | number | null | undefined,
    to: string | number | null,
    part: string | null = null,
  ) => changeWords(from === undefined ? { field, part, to } : { field, part, from, to }, DEFAULT_UNITS)
  it('says from what to what', () => {
    expect(words('limitSeconds', 10_800, 16_200)).toBe('limit: 3 h → 4.5 h')
    expect(words('cutOutPa', null, 33_863.9)).toBe('pump stops at: left to the record → 10.0 inHg')
    expect(words('kind', 'pass-through', 'unit')).toBe('kind: pass-through → unit')
    expect(words('volumeM3', null, 0.03, 'Tank')).toBe('Tank, volume: nothing → 30 L')
    expect(words('timeZone', undefined, 'Europe/London')).toBe('time zone: → Europe/London')
    expect([
      words('part', null, 'Aft head', 'Aft head'),
      words('part', 'Aft head', null, 'Aft head'),
    ]).toEqual(['Aft head: added', 'Aft head: removed'])
  })
})

it('an offset is said as people write it', () => {
  expect([utcWords(0), utcWords(-12_600), utcWords(45_900)]).toEqual(['UTC+00:00', 'UTC−03:30', 'UTC+12:45'])
})
