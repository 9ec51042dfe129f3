// Outlier tests flag; they never remove. Grubbs' test is two-sided here, as in ISO 5725-2.
import { mean, standardDeviation } from './describe.ts'
import { studentQuantile } from './distributions.ts'

export interface GrubbsTest {
  readonly G: number
  /** Index of the value furthest from the mean. */
  readonly index: number
  readonly critical05: number
  readonly critical01: number
}

/** Largest deviation from the mean in units of s. Source: ISO 5725-2:2019, clause 7.3.4; Grubbs, Technometrics 11 (1969) 1. Throws below three values or without scatter. */
export function grubbs(values: readonly number[]): GrubbsTest {
  const n = values.length
  if (n < 3) throw new RangeError("Grubbs' test needs at least three values")
  const [centre, spread] = [mean(values), standardDeviation(values)]
  if (!(spread > 0)) throw new RangeError('the values do not scatter')
  const distances = values.map((value) => Math.abs(value - centre) / spread)
  const G = Math.max(...distances)
  return { G, index: distances.indexOf(G), critical05: grubbsCritical(n, 0.05), critical01: grubbsCritical(n, 0.01) }
}

/** Two-sided critical value: ((n − 1)/√n)·√(t²/(n − 2 + t²)), t at 1 − α/(2n) with n − 2 degrees of freedom. */
export function grubbsCritical(n: number, alpha: number): number {
  const t = studentQuantile(1 - alpha / (2 * n), n - 2)
  return ((n - 1) / Math.sqrt(n)) * Math.sqrt((t * t) / (n - 2 + t * t))
}
