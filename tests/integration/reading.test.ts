import { beforeAll, describe, expect, it } from 'vitest'
import type { Hold, Outlook, Run, Summary, Trace } from '@/shared/schemas'
import {
  CUT_IN_PA,
  CUT_OUT_PA,
  everybody,
  newBoat,
  sawTooth,
  upload,
  type Boat,
  type People,
} from './api-boats'

const HOUR = 3_600_000
const PA_PER_HOUR = 2000
/** A day and a half that ends a while ago, at a whole minute, so that every instant of it is known. */
const TO = Math.floor(Date.now() / 60_000) * 60_000 - 120_000
const FROM = TO - 36 * HOUR
const FLUSH = FROM + 20 * HOUR + 30_000
const GAP: [number, number] = [FROM + 28 * HOUR, FROM + 30 * HOUR]
const iso = (ms: number) => new Date(ms).toISOString()

let people: People
let boat: Boat
let csv: string
beforeAll(async () => {
  people = await everybody()
  boat = await newBoat(people)
  csv = sawTooth({ from: FROM, to: TO, paPerHour: PA_PER_HOUR, flushes: [FLUSH], gaps: [GAP] })
  await upload(boat, csv)
})

const read = async <T>(what: string, person = people.owner): Promise<T> =>
  (await person.get(`/api/systems/${boat.systemId}/${what}`).expect(200)).body as T
type Listed<T> = { items: T[]; next: string | null }

/** Samples as they were sent. */
const sent = () =>
  csv
    .trim()
    .split('\r\n')
    .slice(1)
    .map((line) => line.split(','))
    .map(([time = '', vacuum = '']) => ({ at: Date.parse(time), vacuumPa: Number(vacuum) }))

describe('runs', () => {
  it('are listed in order with what started each', async () => {
    const { items, next } = await read<Listed<Run>>('runs')
    expect(next).toBeNull()
    expect(items.map((run) => run.startedAt)).toEqual(items.map((run) => run.startedAt).toSorted())
    expect(items.filter((run) => run.trigger === 'flush')).toHaveLength(1)
    const leaks = items.filter((run) => run.trigger === 'leak')
    expect(leaks.length).toBeGreaterThan(6)
    for (const run of leaks) {
      expect(run.durationSeconds).toBeCloseTo(30, 0)
      expect(run.vacuumAtStartPa).toBeLessThanOrEqual(CUT_IN_PA)
      expect(run.vacuumAtStopPa).toBeCloseTo(CUT_OUT_PA, 0)
    }
  })

  it('begin within [from, to)', async () => {
    const all = (await read<Listed<Run>>('runs')).items
    const [second, third] = [all[1]?.startedAt ?? '', all[2]?.startedAt ?? '']
    const { items } = await read<Listed<Run>>(`runs?from=${second}&to=${third}`)
    expect(items.map((run) => run.startedAt)).toEqual([second])
  })

  it('page by the cursor, each once', async () => {
    const all = (await read<Listed<Run>>('runs')).items
    const first = await read<Listed<Run>>('runs?limit=3')
    const rest = await read<Listed<Run>>(`runs?limit=5000&cursor=${first.next}`)
    expect([...first.items, ...rest.items]).toEqual(all)
    await people.owner.get(`/api/systems/${boat.systemId}/runs?cursor=nonsense`).expect(400)
  })

  it('are those that were known at an instant', async () => {
    const at = iso(FROM + 12 * HOUR)
    const { items } = await read<Listed<Run>>(`runs?at=${at}`)
    expect(items.length).toBeGreaterThan(1)
    expect(items.every((run) => run.startedAt < at)).toBe(true)
  })
})

describe('holds', () => {
  it('are listed with their endings and rates, the open one last with its duration so far', async () => {
    const now = TO + 10 * 60_000
    const answer = await people.owner
      .get(`/api/systems/${boat.systemId}/holds`)
      .set('x-now', iso(now))
      .expect(200)
    const { items } = answer.body as Listed<Hold>
    const open = items[items.length - 1]
    expect(open).toMatchObject({ ending: 'open', endedAt: null })
    expect(open?.durationSeconds).toBeCloseTo((now - Date.parse(open?.startedAt ?? '')) / 1000, 1)
    const leaks = items.filter((hold) => hold.ending === 'leak')
    for (const hold of leaks.filter((one) => one.durationSeconds > HOUR / 1000)) {
      expect(hold.leakRate?.paPerHour).toBeGreaterThan(PA_PER_HOUR * 0.95)
      expect(hold.leakRate?.paPerHour).toBeLessThan(PA_PER_HOUR * 1.05)
    }
    expect(items.filter((hold) => hold.ending === 'flush')).toHaveLength(1)
    expect(items.filter((hold) => hold.ending === 'interrupted').length).toBeGreaterThanOrEqual(1)
  })
})

describe('the summary', () => {
  it('says how fast it leaks and how long it holds, with how sure', async () => {
    const summary = await read<Summary>('summary')
    const trueHoldSeconds = ((CUT_OUT_PA - CUT_IN_PA) / PA_PER_HOUR) * 3600
    expect(summary.state).toBe('weeping')
    expect(summary.leakRate?.paPerHour).toBeGreaterThan(PA_PER_HOUR * 0.95)
    expect(summary.leakRate?.paPerHour).toBeLessThan(PA_PER_HOUR * 1.05)
    expect(summary.holdTime?.seconds).toBeGreaterThan(trueHoldSeconds * 0.95)
    expect(summary.holdTime?.seconds).toBeLessThan(trueHoldSeconds * 1.05)
    expect(summary.current).toMatchObject({ pumpOn: false, at: expect.any(String) })
  })

  it('is as of an instant, from what was known then', async () => {
    const before = await read<Summary>(`summary?at=${iso(FROM - HOUR)}`)
    expect(before).toMatchObject({ at: iso(FROM - HOUR), state: 'unheard', current: null, leakRate: null })
    const early = await read<Summary>(`summary?at=${iso(FROM + 8 * HOUR)}`)
    expect(early.current?.at).toBe(iso(FROM + 8 * HOUR))
    expect(early.leakRate?.legs).toBeLessThan((await read<Summary>('summary')).leakRate?.legs ?? 0)
  })

  it('is unheard when silence has lasted, with nothing new told', async () => {
    const answer = await people.owner
      .get(`/api/systems/${boat.systemId}/summary`)
      .set('x-now', iso(Date.now() + 10 * HOUR))
      .expect(200)
    expect(answer.body.state).toBe('unheard')
    const fleet = await people.owner
      .get(`/api/vessels?vessel=${boat.vesselId}`)
      .set('x-now', iso(Date.now() + 10 * HOUR))
      .expect(200)
    expect(fleet.body.items).toMatchObject([{ systemId: boat.systemId, state: 'unheard' }])
  })
})

describe('the trace', () => {
  const trace = (from: number, to: number, points: number) =>
    read<Trace>(`trace?from=${iso(from)}&to=${iso(to)}&points=${points}`)

  it.each([20, 37, 100, 1200, 4000])(
    'keeps every extreme in at most %i buckets on multiples of the resolution',
    async (points) => {
      const { resolutionSeconds, channels } = await trace(FROM, TO + 1, points)
      const { vacuum } = channels
      if (vacuum === undefined) throw new Error('no vacuum')
      expect(vacuum.at.length).toBeLessThanOrEqual(points)
      expect(vacuum.at.every((at) => (at / 1000) % resolutionSeconds === 0)).toBe(true)
      expect(vacuum.at).toEqual(vacuum.at.toSorted((a, b) => a - b))
      const extremes = new Map<number, { min: number; max: number }>()
      for (const { at, vacuumPa } of sent()) {
        const bucket = Math.floor(at / 1000 / resolutionSeconds) * resolutionSeconds * 1000
        const known = extremes.get(bucket) ?? { min: Infinity, max: -Infinity }
        extremes.set(bucket, { min: Math.min(known.min, vacuumPa), max: Math.max(known.max, vacuumPa) })
      }
      for (const [bucket, { min, max }] of extremes) {
        const index = vacuum.at.indexOf(bucket)
        expect(vacuum.min[index]).toBeCloseTo(min, 1)
        expect(vacuum.max[index]).toBeCloseTo(max, 1)
        expect(vacuum.mean[index]).toBeGreaterThanOrEqual(min - 0.1)
        expect(vacuum.mean[index]).toBeLessThanOrEqual(max + 0.1)
      }
    },
  )

  it('keeps to its span at the edges, where a bucket is wider', async () => {
    const [from, to] = [FROM + 90 * 60_000, FROM + 30.5 * HOUR]
    const { channels, resolutionSeconds } = await trace(from, to, 10)
    expect(resolutionSeconds).toBeGreaterThanOrEqual(3600)
    const within = sent().filter(({ at }) => at >= from && at < to)
    const numbers = (values: (number | null)[] | undefined) =>
      (values ?? []).filter((value) => value !== null)
    expect(Math.max(...numbers(channels.vacuum?.max))).toBeCloseTo(
      Math.max(...within.map((s) => s.vacuumPa)),
      1,
    )
    expect(Math.min(...numbers(channels.vacuum?.min))).toBeCloseTo(
      Math.min(...within.map((s) => s.vacuumPa)),
      1,
    )
  })

  it('shows missing data as one bucket of nulls', async () => {
    const { channels } = await trace(FROM, TO + 1, 1200)
    const nulls = (channels.vacuum?.at ?? []).filter((_, index) => channels.vacuum?.mean[index] === null)
    expect(nulls).toHaveLength(1)
    expect(nulls[0]).toBeGreaterThanOrEqual(GAP[0] - 120_000)
    expect(nulls[0]).toBeLessThan(GAP[1])
  })

  it('gives the pump as runs, flushes, and the boat’s clock', async () => {
    const { runs, flushes, offsets, channels } = await trace(FROM, TO, 500)
    expect(runs.filter((run) => run.trigger === 'leak').length).toBeGreaterThan(6)
    expect(flushes).toHaveLength(1)
    expect(Math.abs((flushes[0]?.at ?? 0) - FLUSH)).toBeLessThan(120_000)
    expect(offsets[0]).toEqual({ from: FROM, seconds: expect.any(Number) })
    expect(channels.air?.mean.filter((value) => value !== null).every((value) => value === 18)).toBe(true)
    expect(channels.supply).toBeUndefined()
  })

  it('is corrected by a calibration from its moment on', async () => {
    const other = await newBoat(people)
    await upload(other, sawTooth({ from: TO - 4 * HOUR, to: TO, paPerHour: 1000 }))
    const path = `/api/systems/${other.systemId}/trace?from=${iso(TO - 4 * HOUR)}&to=${iso(TO)}&points=1000`
    const before = (await people.owner.get(path).expect(200)).body as Trace
    await people.owner
      .post(`/api/loggers/${other.loggerId}/calibrations`, {
        vacuumOffsetPa: 500,
        vacuumGain: 1,
        inForceFrom: iso(TO - 2 * HOUR),
      })
      .expect(200)
    const after = (await people.owner.get(path).expect(200)).body as Trace
    before.channels.vacuum?.at.forEach((at, index) => {
      const shift = at < TO - 2 * HOUR ? 0 : 500
      expect(after.channels.vacuum?.mean[index]).toBeCloseTo(
        (before.channels.vacuum?.mean[index] ?? 0) - shift,
        0,
      )
    })
  })
})

describe('the night', () => {
  it('is foretold in the boat’s quiet hours', async () => {
    const outlook = await read<Outlook>('outlook')
    expect(outlook.night.timeZone).toBe('Europe/London')
    expect(Date.parse(outlook.night.to)).toBeGreaterThan(Date.now())
    expect(outlook.chanceIfFlushedLast).toBeGreaterThan(0.9)
    expect(outlook.expectedRuns).toBeGreaterThan(1)
  })

  it('is drawn as a strip, minutes from 18:00, oldest first', async () => {
    const answer = await people.owner.get(`/api/nights?systems=${boat.systemId}&nights=3`).expect(200)
    const [{ nights }] = answer.body.items as [
      { nights: { date: string; quiet: number[]; runs: number[]; flushes: number[]; more: number }[] },
    ]
    expect(nights).toHaveLength(3)
    expect(nights.map((night) => night.date)).toEqual(nights.map((night) => night.date).toSorted())
    const runs = (await read<Listed<Run>>('runs')).items
    for (const { date, quiet, runs: ticks, more } of nights) {
      expect([quiet[0], more]).toEqual([240, 0])
      for (const minute of ticks) {
        // London in winter; in summer an hour less.
        const at = Date.parse(`${date}T18:00:00Z`) + minute * 60_000
        expect(
          runs.some((run) =>
            [0, HOUR].some((dst) => Math.abs(Date.parse(run.startedAt) - (at - dst)) < 6_000),
          ),
        ).toBe(true)
      }
    }
    expect(nights.flatMap((night) => night.runs).length).toBeGreaterThan(1)
  })
})

describe('before and after', () => {
  it('tells a repair that held from one that did not', async () => {
    const other = await newBoat(people)
    const middle = TO - 30 * HOUR
    await upload(other, sawTooth({ from: TO - 60 * HOUR, to: middle, paPerHour: 4000 }))
    await upload(other, sawTooth({ from: middle + 60_000, to: TO, paPerHour: 500 }))
    const compare = async (before: [number, number], after: [number, number]) =>
      (
        await people.owner
          .get(
            `/api/systems/${other.systemId}/comparison?before=${before.map(iso).join('/')}&after=${after.map(iso).join('/')}`,
          )
          .expect(200)
      ).body
    const repaired = await compare([TO - 60 * HOUR, middle], [middle, TO])
    expect(repaired.verdict).toBe('held')
    expect(repaired.ratio.value).toBeGreaterThan(4)
    expect(repaired.before.leakRatePaPerHour).toBeGreaterThan(repaired.after.leakRatePaPerHour * 4)
    const same = await compare([TO - 60 * HOUR, TO - 45 * HOUR], [TO - 45 * HOUR, middle])
    expect(same.verdict).toBe('no-change')
  })

  it('needs a visit that has begun, on this system', async () => {
    const visit = await people.owner
      .post(`/api/vessels/${boat.vesselId}/visits`, { complaint: 'runs' })
      .expect(201)
    const { id } = visit.body as { id: string }
    const path = `/api/systems/${boat.systemId}/comparison?visit=${id}`
    await people.owner.get(path).expect(409)
    await people.technician
      .patch(`/api/visits/${id}`, { status: 'under-way', startedAt: iso(TO - 12 * HOUR) })
      .expect(200)
    expect((await people.owner.get(path).expect(200)).body.verdict).toEqual(expect.any(String))
    await people.owner.get(`/api/systems/${boat.systemId}/comparison?visit=999999999`).expect(404)
    await people.owner.get(`/api/systems/${boat.systemId}/comparison`).expect(400)
  })
})

describe('the trend', () => {
  it('finds the step where the leak grew', async () => {
    const other = await newBoat(people)
    const middle = TO - 48 * HOUR
    await upload(other, sawTooth({ from: TO - 120 * HOUR, to: middle, paPerHour: 500 }))
    await upload(other, sawTooth({ from: middle + 60_000, to: TO, paPerHour: 2500 }))
    const { steps } = (await people.owner.get(`/api/systems/${other.systemId}/trend`).expect(200)).body
    expect(steps).toHaveLength(1)
    const [step] = steps
    expect(step.fromPaPerHour).toBeCloseTo(500, -2)
    expect(step.toPaPerHour).toBeCloseTo(2500, -2)
    expect(Date.parse(step.between[0])).toBeLessThanOrEqual(middle + 60_000)
    expect(Date.parse(step.between[1])).toBeGreaterThanOrEqual(middle - 60_000)
  })
})

describe('a notice', () => {
  it('is read with its story, acknowledged with a note, and snoozed', async () => {
    const other = await newBoat(people)
    await upload(other, sawTooth({ from: TO - 12 * HOUR, to: TO, paPerHour: 6000 }))
    const open = await people.owner.get(`/api/notices?state=open&vessel=${other.vesselId}`).expect(200)
    const notice = (open.body.items as { id: string; kind: string }[]).find(
      (one) => one.kind === 'short-hold',
    )
    expect(notice).toMatchObject({ vesselId: other.vesselId, systemId: other.systemId, acknowledgedAt: null })
    const path = `/api/notices/${notice?.id}`
    const acknowledged = await people.technician
      .post(`${path}/acknowledge`, { note: 'on my list' })
      .expect(200)
    expect(acknowledged.body).toMatchObject({
      acknowledgedNote: 'on my list',
      acknowledgedAt: expect.any(String),
    })
    const until = iso(Date.now() + 86_400_000)
    expect((await people.owner.patch(path, { snoozedUntil: until }).expect(200)).body.snoozedUntil).toBe(
      until,
    )
    const whole = await people.owner.get(path).expect(200)
    const transitions = (whole.body.events as { transition: string }[]).map((event) => event.transition)
    expect(transitions).toEqual(expect.arrayContaining(['opened', 'acknowledged', 'snoozed']))
    expect((whole.body.told as unknown[]).length).toBeGreaterThan(0)
    const closed = await people.owner.get(`/api/notices?state=closed&vessel=${other.vesselId}`).expect(200)
    expect(closed.body.items).toEqual([])
  })
})
