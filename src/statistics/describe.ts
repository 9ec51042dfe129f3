// Mean, spread and their intervals for one series of values. Sums are compensated and centred, so that a large offset costs no digits.
import { chiSquareQuantile, studentQuantile } from './distributions.ts'

/** A two-sided interval; `level` is the confidence as a fraction. */
export interface Interval {
  readonly low: number
  readonly high: number
  readonly level: number
}

/** Neumaier's compensated sum. */
export function sum(values: readonly number[]): number {
  let total = 0
  let lost = 0
  for (const value of values) {
    const next = total + value
    lost += Math.abs(total) >= Math.abs(value) ? total - next + value : value - next + total
    total = next
  }
  return total + lost
}

/** Arithmetic mean. Throws on no values. */
export function mean(values: readonly number[]): number {
  const first = values[0]
  if (first === undefined) throw new RangeError('the mean needs at least one value')
  // Centred on the first value: differences of near-equal numbers are exact, so a large offset costs nothing.
  return first + sum(values.map((value) => value - first)) / values.length
}

/** Sum of squared deviations from the mean (two passes, with the correction for the rounding of the mean). */
export function sumOfSquaredDeviations(values: readonly number[]): number {
  const centre = mean(values)
  const deviations = values.map((value) => value - centre)
  const residue = sum(deviations)
  return Math.max(0, sum(deviations.map((deviation) => deviation * deviation)) - (residue * residue) / values.length)
}

/** The power of two at or below a positive number, kept where its inverse is finite too. */
export function powerOfTwo(value: number): number {
  return 2 ** Math.min(1000, Math.max(-1000, Math.floor(Math.log2(value))))
}

/** Sample standard deviation (s), with n − 1. Throws below two values. */
export function standardDeviation(values: readonly number[]): number {
  if (values.length < 2) throw new RangeError('the standard deviation needs at least two values')
  const largest = values.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
  if (largest === 0) return 0
  // Scaled by a power of two, which costs no digit, so that squares of 1e200 do not overflow and squares of 1e-200 do not vanish.
  const scale = powerOfTwo(largest)
  return scale * Math.sqrt(sumOfSquaredDeviations(values.map((value) => value / scale)) / (values.length - 1))
}

export function median(values: readonly number[]): number {
  if (values.length === 0) throw new RangeError('the median needs at least one value')
  const sorted = [...values].sort((left, right) => left - right)
  const middle = sorted.length >> 1
  const upper = sorted[middle] ?? 0
  return sorted.length % 2 === 1 ? upper : ((sorted[middle - 1] ?? 0) + upper) / 2
}

export interface Summary {
  readonly n: number
  readonly mean: number
  readonly standardDeviation: number
  /** In percent of the mean's absolute value; undefined when the mean is zero. */
  readonly relativeStandardDeviation: number | undefined
}

export function summary(values: readonly number[]): Summary {
  const centre = mean(values)
  const spread = standardDeviation(values)
  return { n: values.length, mean: centre, standardDeviation: spread, relativeStandardDeviation: centre === 0 ? undefined : (100 * spread) / Math.abs(centre) }
}

/** Interval of a mean: mean ± t·s/√n (Student; ISO 2602). */
export function meanInterval(given: readonly number[] | { readonly mean: number; readonly standardDeviation: number; readonly n: number }, level: number): Interval & { readonly df: number } {
  const { mean: centre, standardDeviation: spread, n } = 'n' in given ? given : summary(given)
  if (n < 2) throw new RangeError('the interval of a mean needs at least two values')
  const half = (studentQuantile((1 + level) / 2, n - 1) * spread) / Math.sqrt(n)
  return { low: centre - half, high: centre + half, level, df: n - 1 }
}

/** Interval of a standard deviation with `df` degrees of freedom, by the chi-square distribution (ISO 2854). */
export function standardDeviationInterval(spread: number, df: number, level: number): Interval {
  if (!(df > 0)) throw new RangeError('the interval of a standard deviation needs a degree of freedom')
  return { low: spread * Math.sqrt(df / chiSquareQuantile((1 + level) / 2, df)), high: spread * Math.sqrt(df / chiSquareQuantile((1 - level) / 2, df)), level }
}
