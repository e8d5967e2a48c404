import { GAMMA } from './constants'
import { leakInflow, type LeakLaw } from './leak-flow'

/** The surroundings of the gas at one instant. */
export type Surroundings = { outsidePa: number; outsideK: number; wallK: number; vapourPa: number }

/** What stays the same during one step. */
export type StepConditions = {
  law: LeakLaw
  volumeM3: number
  heatShare: number
  settleSeconds: number
  /** Pumping speed, m³/s, at a vacuum; null while the pump is off. */
  speed: ((vacuumPa: number) => number) | null
}

/** The gas itself: amount as p·V/T (Pa·m³/K) and how much warmer it is than the wall (K). */
export type Gas = { amount: number; excessK: number }

/** Absolute pressure, Pa: the air's own and the vapour's. */
export const absolutePa = (gas: Gas, volumeM3: number, around: Surroundings): number =>
  (gas.amount * (around.wallK + gas.excessK)) / volumeM3 + around.vapourPa

export const vacuumOf = (gas: Gas, volumeM3: number, around: Surroundings): number =>
  around.outsidePa - absolutePa(gas, volumeM3, around)

/**
 * Rates of change of the gas, per second. Air enters by the leak law and leaves at the pump's speed; the
 * energy balance of an open volume of ideal gas cools what is left, d ln T = (γ−1) d ln n, and warms it with
 * what rushes in (γ·T_outside for each part entering); walls take that back with one time constant.
 */
export function gasRates(gas: Gas, conditions: StepConditions, around: Surroundings): Gas {
  const temperature = around.wallK + gas.excessK
  const inside = absolutePa(gas, conditions.volumeM3, around)
  const inflow = leakInflow(conditions.law, around.outsidePa, inside, around.outsideK)
  const speed = conditions.speed ? conditions.speed(around.outsidePa - inside) / conditions.volumeM3 : 0
  const entering = inflow > 0 ? (inflow / gas.amount) * (GAMMA * around.outsideK - temperature) : 0
  const heating = conditions.heatShare * (entering - (GAMMA - 1) * temperature * speed)
  return { amount: inflow - speed * gas.amount, excessK: heating - gas.excessK / conditions.settleSeconds }
}

const along = (gas: Gas, rate: Gas, seconds: number): Gas => ({
  amount: gas.amount + rate.amount * seconds,
  excessK: gas.excessK + rate.excessK * seconds,
})

/** One classical Runge–Kutta step. `first` are the rates at its start, which the caller has had to know. */
export function rungeKuttaStep(
  gas: Gas,
  first: Gas,
  seconds: number,
  conditions: StepConditions,
  middle: Surroundings,
  end: Surroundings,
): Gas {
  const second = gasRates(along(gas, first, seconds / 2), conditions, middle)
  const third = gasRates(along(gas, second, seconds / 2), conditions, middle)
  const fourth = gasRates(along(gas, third, seconds), conditions, end)
  return {
    amount: gas.amount + (seconds / 6) * (first.amount + 2 * (second.amount + third.amount) + fourth.amount),
    excessK:
      gas.excessK + (seconds / 6) * (first.excessK + 2 * (second.excessK + third.excessK) + fourth.excessK),
  }
}
