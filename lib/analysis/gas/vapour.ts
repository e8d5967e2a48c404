/**
 * Saturation vapour pressure of water over a plane surface, Pa, at `tempC` °C: Buck's formula,
 * 611.21·exp((18.678 − T/234.5)·T/(257.14 + T)), within 0.1 % from −20 to 50 °C.
 * Source: A. L. Buck (1981), J. Appl. Meteorol. 20, 1527, with the 1996 coefficients. NaN stays NaN.
 * @example saturationVapourPressurePa(20) // 2338.3 Pa
 */
export function saturationVapourPressurePa(tempC: number): number {
  return 611.21 * Math.exp((18.678 - tempC / 234.5) * (tempC / (257.14 + tempC)))
}
