export type TemperaturePoint = { atSeconds: number; airC: number | null }

/**
 * Temperature of the gas behind walls and liquid: the air's, followed with a first-order lag,
 * dT_gas/dt = (T_air − T_gas)/τ, exact for air that moves in straight lines between points. Starts at the
 * first known air temperature (or `startC`); where the air is unknown the last value is held, before the
 * first known one it is null. `timeConstantSeconds` 0 gives the air itself. Points ascending in time.
 * @returns °C for each point, in order; an empty list for none
 */
export function lagTemperature(
  points: readonly TemperaturePoint[],
  timeConstantSeconds: number,
  startC: number | null = null,
): (number | null)[] {
  let gasC = startC
  let before: { atSeconds: number; airC: number } | null = null
  return points.map((point) => {
    if (point.airC === null || Number.isNaN(point.airC)) return gasC
    const here = { atSeconds: point.atSeconds, airC: point.airC }
    gasC =
      before === null ? (gasC ?? here.airC) : followRamp(gasC ?? here.airC, before, here, timeConstantSeconds)
    before = here
    return gasC
  })
}

function followRamp(
  gasC: number,
  from: { atSeconds: number; airC: number },
  to: { atSeconds: number; airC: number },
  timeConstantSeconds: number,
): number {
  const elapsedSeconds = to.atSeconds - from.atSeconds
  if (timeConstantSeconds <= 0) return to.airC
  if (elapsedSeconds <= 0) return gasC
  const kept = Math.exp(-elapsedSeconds / timeConstantSeconds)
  const trailing = ((to.airC - from.airC) * timeConstantSeconds) / elapsedSeconds
  return to.airC - trailing + (gasC - from.airC + trailing) * kept
}
