import { describe, expect, it } from 'vitest'
import { loggerFinding } from '@/components/loggers/logger-sheet'
import { loggersFinding, sortViews, viewOf } from '@/components/loggers/health'
import { clockWords } from '@/components/register/live-line'
import { recordFinding } from '@/components/register/record-view'
import { codeIn } from '@/components/register/scanned-code'
import {
  nextStep,
  progressWords,
  stateOfStep,
  stepAfter,
  stepNamed,
  stepsOf,
} from '@/components/register/steps'
import { figureWords } from '@/shared/commissioning-words'
import type { CheckKind, CheckOutcome, Commissioning, Logger, LoggerHealth } from '@/shared/schemas'
import { inHgToPa } from '@/shared/units'

const NOW = Date.parse('2026-03-10T12:00:00Z')
const hoursAgo = (hours: number): string => new Date(NOW - hours * 3_600_000).toISOString()

const logger = (over: Partial<Logger> = {}): Logger => ({
  id: '1',
  serial: 'L-1',
  shopId: '1',
  intervalSeconds: 60,
  channels: ['pump', 'vacuum'],
  keyMadeAt: hoursAgo(900),
  retiredAt: null,
  lastHeardAt: hoursAgo(0.1),
  clockOffsetSeconds: 2,
  fitted: { vesselId: '1', vesselName: 'Turnstone', systemId: '1', systemName: '', since: hoursAgo(900) },
  ...over,
})
const health = (over: Partial<LoggerHealth> = {}): LoggerHealth => ({
  loggerId: '1',
  supplyV: 12.7,
  supplyAt: hoursAgo(1),
  lowSupplyV: 11.8,
  silenceSeconds: 21_600,
  ...over,
})
const view = (over: Partial<Logger> = {}, also: Partial<LoggerHealth> = {}) =>
  viewOf(logger(over), health(also), NOW)

describe('what is the matter with a logger', () => {
  it('is nothing when it is heard, on time and fed', () => {
    expect(view()).toMatchObject({ place: 'assigned', matters: [] })
  })
  it('is silence past its system’s limit, and not before', () => {
    expect(view({ lastHeardAt: hoursAgo(5.9) }).place).toBe('assigned')
    expect(view({ lastHeardAt: hoursAgo(7) })).toMatchObject({ place: 'silent', matters: ['silent for 7 h'] })
    expect(view({ lastHeardAt: hoursAgo(7) }, { silenceSeconds: 86_400 }).place).toBe('assigned')
  })
  it('gives one just registered its time to be heard', () => {
    expect(view({ lastHeardAt: null, keyMadeAt: hoursAgo(1) }).place).toBe('assigned')
    expect(view({ lastHeardAt: null, keyMadeAt: hoursAgo(7) }).matters).toEqual(['not heard yet'])
  })
  it('is a clock over two minutes off, either way', () => {
    expect(view({ clockOffsetSeconds: 120 }).matters).toEqual([])
    expect(view({ clockOffsetSeconds: 540 }).matters).toEqual(['clock 9 min ahead'])
    expect(view({ clockOffsetSeconds: -540 }).matters).toEqual(['clock 9 min behind'])
  })
  it('is a supply under the figure that was set, and none where none was', () => {
    expect(view({}, { supplyV: 11.2 }).matters).toEqual(['supply low, 11.2 V'])
    expect(view({}, { supplyV: 11.2, lowSupplyV: null }).matters).toEqual([])
  })
  it('is not asked of one in stock or retired', () => {
    const still = { lastHeardAt: hoursAgo(5000), clockOffsetSeconds: 900 }
    expect(view({ ...still, fitted: null })).toMatchObject({ place: 'stock', matters: [] })
    expect(view({ ...still, retiredAt: hoursAgo(10) })).toMatchObject({ place: 'retired', matters: [] })
  })
})

describe('the loggers in a sentence', () => {
  const silent = view({ serial: 'Z-9', lastHeardAt: hoursAgo(30) })
  it('says that all is well, what waits, and what wants a look', () => {
    expect(loggersFinding([view()])).toBe('The one logger on a boat is heard and well.')
    expect(loggersFinding([view(), view(), view({ fitted: null })])).toBe(
      'All 2 loggers on boats are heard and well. 1 waits in stock.',
    )
    expect(loggersFinding([view(), silent, view({ clockOffsetSeconds: 900 })])).toBe(
      '2 of 3 loggers on boats want a look: 1 not heard, 1 clock off.',
    )
    expect(loggersFinding([view({ fitted: null })])).toBe('No logger is on a boat yet. 1 waits in stock.')
  })
  it('does not call well what has not been heard yet', () => {
    const fresh = view({ lastHeardAt: null, keyMadeAt: hoursAgo(1) })
    expect(loggersFinding([view(), fresh])).toBe(
      '1 of 2 loggers on boats is heard and well; 1 just registered is not heard yet.',
    )
    expect(loggerFinding(fresh, NOW)).toBe('On Turnstone, just registered and not heard yet.')
  })
  it('puts those first that want a look', () => {
    expect(sortViews([view(), silent]).map((entry) => entry.logger.serial)).toEqual(['Z-9', 'L-1'])
  })
  it('says how far a clock is off', () => {
    expect([clockWords(1), clockWords(-40), clockWords(600)]).toEqual([
      'right',
      '40 s behind',
      '10 min ahead',
    ])
  })
})

const KINDS: CheckKind[] = ['first-reading', 'zero', 'two-point', 'pump-channel']
const check = (kind: CheckKind, outcome: CheckOutcome | null) => ({
  kind,
  beganAt: hoursAgo(1),
  doneAt: outcome === null ? null : hoursAgo(0.5),
  doneBy: 'Ines',
  outcome,
  figures: [],
  reason: '',
})
const commissioning = (over: Partial<Commissioning> = {}): Commissioning => ({
  id: '7',
  way: 'claim',
  serial: 'L-1',
  userCode: null,
  startedAt: hoursAgo(2),
  startedBy: 'Ines',
  system: null,
  logger: null,
  fittedAt: null,
  setAsideAt: null,
  finishedAt: null,
  finishedBy: null,
  passed: null,
  note: null,
  needed: KINDS,
  checks: [],
  ...over,
})
const SYSTEM = {
  id: '1',
  name: '',
  vesselId: '1',
  vesselName: 'Turnstone',
  timeZone: 'Europe/London',
  utcOffsetSeconds: 0,
  cutOutPa: null,
  cutInPa: null,
}

describe('the steps of a registration', () => {
  it('go from the boat to the record, by what the logger measures', () => {
    expect(stepsOf(commissioning())).toEqual(['boat', 'logger', ...KINDS, 'record'])
    expect(stepAfter(commissioning(), 'pump-channel')).toBe('record')
    expect(stepAfter(commissioning(), 'record')).toBeNull()
    expect(stepNamed('zero')).toBe('zero')
    expect(stepNamed('constructor')).toBeUndefined()
  })
  it('are resumed at the first that is not settled', () => {
    expect(nextStep(commissioning())).toBe('boat')
    expect(nextStep(commissioning({ system: SYSTEM }))).toBe('logger')
    const fitted = { system: SYSTEM, fittedAt: hoursAgo(1) }
    expect(nextStep(commissioning(fitted))).toBe('first-reading')
    const failed = [check('first-reading', 'passed'), check('zero', 'failed'), check('two-point', 'passed')]
    expect(nextStep(commissioning({ ...fitted, checks: failed }))).toBe('zero')
    expect(progressWords(commissioning({ ...fitted, checks: failed }))).toBe('4 of 7 steps done')
  })
  it('count the newest attempt, and show one that is under way', () => {
    const again = commissioning({ checks: [check('zero', 'failed'), check('zero', 'passed')] })
    expect(stateOfStep(again, 'zero')).toBe('passed')
    const under = commissioning({ checks: [check('zero', 'failed'), check('zero', null)] })
    expect(stateOfStep(under, 'zero')).toBe('under-way')
    expect(stateOfStep(under, 'two-point')).toBe('open')
  })
  it('are summed up in the record', () => {
    const all = KINDS.map((kind) => check(kind, 'passed'))
    expect(recordFinding(commissioning({ checks: all }))).toMatch(/can be signed off/)
    const mixed = [check('first-reading', 'passed'), check('zero', 'left-out'), check('two-point', 'failed')]
    const record = commissioning({ checks: mixed, finishedAt: hoursAgo(0), passed: false })
    expect(recordFinding(record)).toBe(
      'Signed off with exceptions. Did not pass: two-point check; not done: pump channel; left out: zero check.',
    )
  })
})

describe('a code that the camera read', () => {
  it('is the code itself or an address that carries it', () => {
    expect(codeIn('WDJB-MJHT')).toBe('WDJB-MJHT')
    expect(codeIn(' wdjbmjht ')).toBe('WDJBMJHT')
    expect(codeIn('https://watch.example/claim?code=WDJB-MJHT')).toBe('WDJB-MJHT')
  })
  it('is nothing else', () => {
    for (const other of ['', 'AEIO-UAEI', 'WDJB-MJH', 'https://watch.example/claim', 'mwk_WDJBMJHT'])
      expect(codeIn(other), other).toBeNull()
  })
})

describe('figures of a check', () => {
  it('are said in the reader’s unit, with their interval', () => {
    const rate = {
      name: '',
      value: inHgToPa(0.2),
      unit: 'Pa/h' as const,
      low: inHgToPa(0.1),
      high: inHgToPa(0.3),
    }
    expect(figureWords(rate, 'inHg')).toBe('0.20 inHg/h (0.10 to 0.30 inHg/h)')
    expect(figureWords({ name: '', value: 33_864, unit: 'Pa' }, 'kPa')).toBe('33.86 kPa')
    expect(figureWords({ name: '', value: null, unit: 's' }, 'inHg')).toBe('–')
    expect(figureWords({ name: '', value: 1.0309, unit: 'ratio' }, 'inHg')).toBe('1.0309')
  })
})
