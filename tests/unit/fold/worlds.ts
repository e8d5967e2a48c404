import fc from 'fast-check'
import type { Fact, FoldItem, Row, Sample } from '@/lib/analysis/fold'
import { initialState, orderItems, step, type FoldState } from '@/lib/analysis/fold'
import { randomBoat, simulateBoat } from '@/simulator/boat'

export const FROM = Date.UTC(2026, 5, 1)
export const HOUR = 3_600_000
export const MINUTE = 60_000

export function fitting(
  at: number,
  intervalSeconds: number,
  pump = true,
  vacuum = true,
  loggerId = '1',
): Fact {
  return { kind: 'fitting', at, loggerId, intervalSeconds, channels: { pump, vacuum } }
}

export const sampleAt = (at: number, values: Partial<Omit<Sample, 'at'>>): Sample => ({
  at,
  vacuumPa: null,
  pumpOn: null,
  airC: null,
  barometerPa: null,
  supplyV: null,
  ...values,
})

export function foldAll(items: readonly FoldItem[], state: FoldState = initialState()): Row[] {
  const rows: Row[] = []
  for (const item of items) rows.push(...step(state, item))
  return rows
}

/** Boats of the simulator with gaps, nights at the breaker, statements and changes of logger. */
export const boatItems: fc.Arbitrary<FoldItem[]> = fc
  .record({
    seed: fc.integer({ min: 1, max: 400 }),
    logger: fc.constantFrom('both' as const, 'vacuum-only' as const, 'pump-only' as const),
    intervalSeconds: fc.constantFrom(5, 20, 60, 300),
    coarse: fc.boolean(),
    hours: fc.integer({ min: 4, max: 40 }),
    gap: fc.tuple(fc.integer({ min: 0, max: 40 }), fc.integer({ min: 1, max: 600 })),
    breaker: fc.option(fc.tuple(fc.integer({ min: 0, max: 30 }), fc.integer({ min: 5, max: 600 }))),
    statement: fc.option(
      fc.record({
        value: fc.constantFrom('off' as const, 'laid-up' as const, 'worked-on' as const),
        fromHour: fc.integer({ min: 0, max: 30 }),
        minutes: fc.integer({ min: 1, max: 600 }),
      }),
    ),
    refit: fc.option(fc.integer({ min: 0, max: 30 })),
  })
  .map((world) => {
    const boat = randomBoat(world.seed, {
      logger: world.logger,
      intervalSeconds: world.intervalSeconds,
      coarse: world.coarse,
    })
    const span = (fromMs: number, minutes: number) => ({ from: fromMs, to: fromMs + minutes * MINUTE })
    const spec = {
      ...boat,
      logger: { ...boat.logger, silent: [span(FROM + world.gap[0] * HOUR, world.gap[1])] },
      breakerOff: world.breaker ? [span(FROM + world.breaker[0] * HOUR, world.breaker[1])] : [],
    }
    const hours = world.intervalSeconds < 20 ? Math.min(world.hours, 8) : world.hours
    const { samples } = simulateBoat(spec, FROM, FROM + hours * HOUR)
    const facts: Fact[] = [
      fitting(FROM, world.intervalSeconds, world.logger !== 'vacuum-only', world.logger !== 'pump-only'),
    ]
    if (world.statement) {
      const at = FROM + world.statement.fromHour * HOUR
      facts.push({ kind: 'statement', at, value: world.statement.value })
      facts.push({ kind: 'statement', at: at + world.statement.minutes * MINUTE, value: null })
    }
    if (world.refit !== null) facts.push(fitting(FROM + world.refit * HOUR, 60, true, true, '2'))
    return orderItems(
      facts,
      samples.map((sample) => ({ ...sample, at: Math.round(sample.at) })),
    )
  })

const pressure = fc.oneof(
  { weight: 20, arbitrary: fc.integer({ min: 250_000, max: 360_000 }).map((tenths) => tenths / 10) },
  { weight: 1, arbitrary: fc.integer({ min: -200_000, max: 1_010_000 }).map((tenths) => tenths / 10) },
  { weight: 5, arbitrary: fc.constant(33_000) },
)
const maybe = <T>(values: fc.Arbitrary<T>) => fc.option(values, { freq: 3 })

/** Anything that ingest would let through, in order of time, plus facts of every kind. */
export const wildItems: fc.Arbitrary<FoldItem[]> = fc
  .record({
    samples: fc.array(
      fc.record({
        afterMs: fc.oneof(
          { weight: 10, arbitrary: fc.integer({ min: 1, max: 3_000 }) },
          { weight: 20, arbitrary: fc.integer({ min: 1_000, max: 120_000 }) },
          { weight: 1, arbitrary: fc.integer({ min: 100_000, max: 20_000_000 }) },
        ),
        vacuumPa: maybe(pressure),
        pumpOn: maybe(fc.boolean()),
        airC: maybe(fc.integer({ min: -4_000, max: 8_500 }).map((hundredths) => hundredths / 100)),
        barometerPa: maybe(fc.integer({ min: 500_000, max: 1_100_000 }).map((tenths) => tenths / 10)),
        supplyV: maybe(fc.integer({ min: 0, max: 6_000 }).map((hundredths) => hundredths / 100)),
      }),
      { maxLength: 400, size: 'max' },
    ),
    facts: fc.array(
      fc.oneof(
        fc.record({
          kind: fc.constant('settings' as const),
          settings: fc.record({
            kind: fc.constantFrom(
              'pass-through' as const,
              'collecting' as const,
              'unit' as const,
              'two-pumps' as const,
              'on-demand' as const,
            ),
            cutOutPa: maybe(fc.integer({ min: 20_000, max: 50_000 })),
            cutInPa: maybe(fc.integer({ min: 15_000, max: 45_000 })),
          }),
        }),
        fc.record({
          kind: fc.constant('fitting' as const),
          loggerId: fc.constantFrom('1', '2'),
          intervalSeconds: fc.constantFrom(1, 10, 60, 900),
          channels: fc.record({ pump: fc.boolean(), vacuum: fc.boolean() }),
        }),
        fc.record({ kind: fc.constant('removal' as const), loggerId: fc.constant('1') }),
        fc.record({
          kind: fc.constant('statement' as const),
          value: fc.constantFrom('off' as const, 'laid-up' as const, 'worked-on' as const, null),
        }),
      ),
      { maxLength: 6 },
    ),
    places: fc.array(fc.double({ min: 0, max: 1, noNaN: true }), { minLength: 6, maxLength: 6 }),
  })
  .map(({ samples, facts, places }) => {
    let at = FROM
    const timed: Sample[] = samples.map(({ afterMs, ...channels }) => {
      at += afterMs
      return { at, ...channels }
    })
    const dated: Fact[] = facts.map((fact, i) => ({
      ...fact,
      at: Math.round(FROM + (places[i] ?? 0) * (at - FROM)),
    }))
    return orderItems(dated, timed)
  })

export const anyItems = fc.oneof(boatItems, wildItems)
