import type { FleetRow, HoldTime, Notice, Outlook, Summary } from '@/shared/schemas'

/** Tuesday 1 December 2026, 18:40 on a boat four hours behind UTC. */
export const NOW = Date.parse('2026-12-01T22:40:00Z')
export const OFFSETS = [{ from: 0, seconds: -4 * 3600 }]
const PA_PER_HOUR = 2743

export const hold = (hours: number, change: Partial<HoldTime> = {}): HoldTime => ({
  seconds: hours * 3600,
  low: hours * 0.9 * 3600,
  high: hours * 1.15 * 3600,
  bound: null,
  holds: 9,
  ...change,
})

export const summary = (change: Partial<Summary> = {}): Summary => ({
  at: '2026-12-01T22:40:00Z',
  state: 'leaking',
  since: '2026-11-29T18:10:00Z',
  aboard: 'aboard',
  leakRate: { paPerHour: PA_PER_HOUR, low: 2400, high: 3100, legs: 22, hours: 24, compensated: true },
  holdTime: hold(1.4),
  cutOutPa: 33864,
  settledPa: 33400,
  cutInPa: 27768,
  recharge: { paPerSecond: 140, usualPaPerSecond: 140 },
  cause: null,
  current: { at: '2026-12-01T22:39:00Z', vacuumPa: 31000, pumpOn: false, holdSoFarSeconds: 1800 },
  lastHeardAt: '2026-12-01T22:39:00Z',
  ...change,
})

export const outlook = (change: Partial<Outlook> = {}): Outlook => ({
  at: '2026-12-01T22:40:00Z',
  night: { from: '2026-12-02T02:00:00Z', to: '2026-12-02T11:00:00Z', timeZone: 'Etc/GMT+4', hours: 9 },
  bedtime: '2026-12-02T02:30:00Z',
  chance: 0.99,
  chanceIfFlushedLast: 0.98,
  expectedRuns: 6.2,
  firstRun: { at: null, earliest: '2026-12-02T02:05:00Z', latest: '2026-12-02T03:55:00Z' },
  basis: 'phase-open',
  aboard: 'aboard',
  ...change,
})

export const row = (change: Partial<FleetRow> = {}): FleetRow => ({
  vesselId: '1',
  systemId: '1',
  name: 'Saltmarsh Hare',
  systemName: '',
  harbour: 'Port Averill',
  berth: 'A 03',
  timeZone: 'Etc/GMT+4',
  utcOffsetSeconds: -4 * 3600,
  state: 'tight',
  since: null,
  holdTime: hold(14),
  limitSeconds: 10_800,
  aimSeconds: 28_800,
  moving: null,
  tonight: null,
  lastHeardAt: '2026-12-01T22:39:00Z',
  openNotices: [],
  nextVisitAt: null,
  aboard: 'unknown',
  ...change,
})

export const notice = (change: Partial<Notice> = {}): Notice => ({
  id: '1',
  vesselId: '1',
  systemId: '1',
  vesselName: 'Saltmarsh Hare',
  systemName: '',
  timeZone: 'Etc/GMT+4',
  kind: 'short-hold',
  openedAt: '2026-12-01T12:00:00Z',
  closedAt: null,
  heldSince: null,
  acknowledgedAt: null,
  acknowledgedBy: null,
  acknowledgedNote: null,
  snoozedUntil: null,
  night: null,
  reason: 'Holds 1.4 h, the limit is 3 h.',
  evidence: {},
  ...change,
})
