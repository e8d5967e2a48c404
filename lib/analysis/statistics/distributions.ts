const LANCZOS = [
  676.5203681218851, -1259.1392167224028, 771.32342877765313, -176.61502916214059, 12.507343278686905,
  -0.13857109526572012, 9.9843695780195716e-6, 1.5056327351493116e-7,
]

/** Natural logarithm of the gamma function for x > 0 (Lanczos' approximation, 15 digits). */
export function logGamma(x: number): number {
  if (x < 0.5) return Math.log(Math.PI / Math.abs(Math.sin(Math.PI * x))) - logGamma(1 - x)
  const shifted = x - 1
  const base = shifted + LANCZOS.length - 0.5
  const series = LANCZOS.reduce((sum, part, index) => sum + part / (shifted + index + 1), 0.99999999999980993)
  return 0.5 * Math.log(2 * Math.PI) + (shifted + 0.5) * Math.log(base) - base + Math.log(series)
}

/**
 * Upper regularised incomplete gamma function Q(a, x): by its series for x < a + 1, else by Lentz's
 * continued fraction (Abramowitz & Stegun 6.5.29 and 6.5.31).
 */
export function gammaUpper(a: number, x: number): number {
  if (Number.isNaN(x) || Number.isNaN(a)) return NaN
  if (x <= 0) return 1
  if (x === Infinity) return 0
  const front = Math.exp(a * Math.log(x) - x - logGamma(a))
  return x < a + 1 ? 1 - front * gammaSeries(a, x) : front * gammaFraction(a, x)
}

function gammaSeries(a: number, x: number): number {
  let term = 1 / a
  let sum = term
  for (let n = 1; n < 1000 && Math.abs(term) > Math.abs(sum) * 1e-17; n += 1) {
    term *= x / (a + n)
    sum += term
  }
  return sum
}

function gammaFraction(a: number, x: number): number {
  const tiny = 1e-300
  let b = x + 1 - a
  let c = 1 / tiny
  let d = 1 / b
  let h = d
  for (let i = 1; i < 1000; i += 1) {
    const an = -i * (i - a)
    b += 2
    d = 1 / (Math.abs(an * d + b) < tiny ? tiny : an * d + b)
    c = Math.abs(b + an / c) < tiny ? tiny : b + an / c
    h *= d * c
    if (Math.abs(d * c - 1) < 1e-16) break
  }
  return h
}

/** Standard normal P(Z ≤ z). NaN stays NaN. */
export function normalCdf(z: number): number {
  const tail = 0.5 * gammaUpper(0.5, (z * z) / 2)
  return z > 0 ? 1 - tail : tail
}

/** Standard normal P(Z > z), exact far out in the tail. */
export function normalUpperTail(z: number): number {
  return normalCdf(-z)
}

/** P(|Z| ≥ |z|). */
export function normalTwoSided(z: number): number {
  return gammaUpper(0.5, (z * z) / 2)
}

/** P(X² ≥ x) of a χ² variable with `degrees` degrees of freedom. */
export function chiSquaredUpper(x: number, degrees: number): number {
  return gammaUpper(degrees / 2, x / 2)
}

/**
 * Standard normal quantile, by Halley's steps on `normalCdf` from a rough start (Hastings, Abramowitz &
 * Stegun 26.2.23). 0 and 1 give −∞ and ∞, outside NaN.
 * @example normalQuantile(0.975) // 1.959963984540054
 */
export function normalQuantile(p: number): number {
  if (!(p >= 0 && p <= 1)) return NaN
  if (p === 0) return -Infinity
  if (p === 1) return Infinity
  if (p > 0.5) return -normalQuantile(1 - p)
  const t = Math.sqrt(-2 * Math.log(p))
  let z = -(
    t -
    (2.515517 + t * (0.802853 + t * 0.010328)) / (1 + t * (1.432788 + t * (0.189269 + t * 0.001308)))
  )
  for (let step = 0; step < 3; step += 1) {
    const off = (normalCdf(z) - p) * Math.sqrt(2 * Math.PI) * Math.exp((z * z) / 2)
    z -= off / (1 + (z * off) / 2)
  }
  return z
}

/** z of a two-sided interval: `zOfConfidence(0.95) // 1.96`. */
export function zOfConfidence(confidence: number): number {
  return normalQuantile(0.5 + confidence / 2)
}
