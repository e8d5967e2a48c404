import { TWO_ABOARD, type HabitSpec } from '@/simulator/habits'
import { LOGGER_RESOLUTION_PA, type LoggerSpec } from '@/simulator/logger'
import { PA_PER_INHG, STANDARD_PRESSURE_PA } from '@/simulator/physics/constants'
import { flowForHold } from '@/simulator/physics/leak-flow'
import { leakEdges, type LeakSpec, type Span } from '@/simulator/physics/leaks'
import type { PumpSpec, SupplySpec } from '@/simulator/physics/pump'
import { STEADY_WEATHER, type WeatherSpec } from '@/simulator/physics/weather'

export type SwitchSpec = {
  cutOutPa: number
  cutInPa: number
  /** Standard deviation of each actual point, Pa. */
  scatterPa: number
  /** Creep of either point, Pa a day, from an instant until it is set again. */
  drift: readonly { from: number; cutOutPaPerDay: number; cutInPaPerDay: number; until?: number }[]
}

export type GasSpec = {
  /** How slowly walls and liquid follow the air probe (0 = at once) and how much of its swing reaches them. */
  lagSeconds: number
  coupling: number
  /** Share of saturated vapour in the gas, 0 to 1. */
  wetness: number
  /** The settled top: share of adiabatic cooling that reaches the gas, and how fast it warms back. 0 = none. */
  heatShare: number
  settleSeconds: number
}

export type TankSpec = {
  /** Whether flushed liquid stays in the gas space. */
  collects: boolean
  filledAtStartM3: number
  /** Emptied through the deck fitting, vented meanwhile. */
  pumpOuts: readonly { at: number; minutes: number }[]
}

export interface BoatSpec {
  seed: number
  name: string
  /** Local time minus UTC of the place, for habits and the warmest hour. */
  offsetSeconds: number
  /** Tanks and hoses together, empty, m³. */
  volumeM3: number
  /** Outside pressure that hold times are stated for. */
  standardPressurePa: number
  initialVacuumPa: number
  leaks: readonly LeakSpec[]
  pump: PumpSpec
  supply: SupplySpec
  switch: SwitchSpec
  gas: GasSpec
  tank: TankSpec
  weather: WeatherSpec
  /** Boats of one harbour share its weather: give them one seed. Default: the boat's own. */
  weatherSeed: number | null
  habits: HabitSpec
  logger: LoggerSpec
  /** Pump off at its breaker. */
  breakerOff: readonly Span[]
  /** Switched on, and yet the pump does not start. */
  pumpFails: readonly Span[]
  /** Breaker off and nobody aboard. */
  layUp: readonly Span[]
  /** Opened to the air, as at work on the system. */
  vented: readonly Span[]
}

type Overrides = {
  [Key in keyof BoatSpec]?: BoatSpec[Key] extends readonly unknown[] ? BoatSpec[Key] : DeepPart<BoatSpec[Key]>
}
type DeepPart<Value> = Value extends object ? Partial<Value> : Value
export type BoatOverrides = Overrides

/**
 * A 40-litre pass-through system with two heads, two people always aboard, no leak at all, temperate weather
 * and a logger with every channel each 15 s. `overrides` replace its parts; objects are merged one level deep.
 */
export function defaultBoat(overrides: BoatOverrides = {}): BoatSpec {
  const base = baseBoat()
  const merged: BoatSpec = {
    ...base,
    ...overrides,
    pump: { ...base.pump, ...overrides.pump },
    supply: { ...base.supply, ...overrides.supply },
    switch: { ...base.switch, ...overrides.switch },
    gas: { ...base.gas, ...overrides.gas },
    tank: { ...base.tank, ...overrides.tank },
    weather: { ...base.weather, ...overrides.weather },
    habits: { ...base.habits, ...overrides.habits },
    logger: { ...base.logger, ...overrides.logger },
  }
  return merged
}

function baseBoat(): BoatSpec {
  return {
    seed: 1,
    name: 'Boat',
    offsetSeconds: 0,
    volumeM3: 0.04,
    standardPressurePa: STANDARD_PRESSURE_PA,
    initialVacuumPa: 9.6 * PA_PER_INHG,
    leaks: [],
    pump: { displacementM3PerS: 0.00016, flatOutPa: 22 * PA_PER_INHG, nominalV: 12.6, amps: 6, wear: [] },
    supply: { restV: 12.7, dailyV: 0.25, wanderV: 0.08, sagV: 0.5, sinking: [] },
    switch: {
      cutOutPa: 10 * PA_PER_INHG,
      cutInPa: 8 * PA_PER_INHG,
      scatterPa: 0.02 * PA_PER_INHG,
      drift: [],
    },
    gas: { lagSeconds: 2700, coupling: 0.7, wetness: 0.5, heatShare: 0.5, settleSeconds: 50 },
    tank: { collects: false, filledAtStartM3: 0, pumpOuts: [] },
    weather: { meanC: 18, dailyC: 2.5, wanderC: 1.5, meanBarometerPa: STANDARD_PRESSURE_PA, synopticPa: 600 },
    weatherSeed: null,
    habits: {
      heads: [
        { key: 'head-1', weight: 2, airLitres: 4, waterLitres: 0.6 },
        { key: 'head-2', weight: 1, airLitres: 4, waterLitres: 0.6 },
      ],
      flushesByHour: TWO_ABOARD,
      tapsPerDay: 1,
      airScatter: 0.15,
      flushSeconds: 1.5,
      aboard: 'always',
      away: [],
      extraFlushes: [],
      cups: [],
    },
    logger: {
      channels: ['pump', 'vacuum', 'air', 'barometer', 'supply'],
      intervalSeconds: 15,
      slowChannelSeconds: 0,
      noise: { vacuumPa: 8, airC: 0.03, barometerPa: 5, supplyV: 0.02 },
      resolution: { vacuumPa: LOGGER_RESOLUTION_PA, airC: 0.1, barometerPa: 10, supplyV: 0.01 },
      vacuumOffsetPa: 0,
      clock: { offsetSeconds: 0, driftPpm: 0, driftFrom: 0 },
      silent: [],
      late: [],
      stuck: [],
    },
    breakerOff: [],
    pumpFails: [],
    layUp: [],
    vented: [],
  }
}

/** Everything that blurs, switched off: steady weather, dry gas at the air's temperature, exact switch and sensor, nobody aboard. */
export const CLEAN: BoatOverrides = {
  weather: STEADY_WEATHER,
  gas: { lagSeconds: 0, coupling: 1, wetness: 0, heatShare: 0, settleSeconds: 50 },
  switch: { scatterPa: 0 },
  supply: { restV: 12.6, dailyV: 0, wanderV: 0, sagV: 0 },
  habits: { aboard: 'never', tapsPerDay: 0 },
  logger: {
    noise: { vacuumPa: 0, airC: 0, barometerPa: 0, supplyV: 0 },
    resolution: { vacuumPa: 0, airC: 0, barometerPa: 0, supplyV: 0 },
  },
}

/** The flow of one leak with which a boat of this volume and switch holds so long by itself. */
export const flowForBoatHold = (
  spec: Pick<BoatSpec, 'volumeM3' | 'switch'>,
  kind: LeakSpec['kind'],
  holdSeconds: number,
): number => flowForHold(kind, holdSeconds, spec.volumeM3, spec.switch.cutOutPa, spec.switch.cutInPa)

/** Instants at which something jumps; the integrator steps onto each of them. Sorted, distinct. */
export function boundariesOf(spec: BoatSpec): number[] {
  const spans = [...spec.breakerOff, ...spec.pumpFails, ...spec.layUp, ...spec.vented]
  const instants = [
    ...spec.leaks.flatMap(leakEdges),
    ...spans.flatMap((span) => [span.from, span.to]),
    ...spec.tank.pumpOuts.flatMap((out) => [out.at, out.at + out.minutes * 60_000]),
  ]
  return [...new Set(instants)].sort((a, b) => a - b)
}
