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

/**
 * The values themselves, if they are finite and their squares keep all digits; otherwise throws. What no measurement reaches is refused
 * rather than answered with an overflow. All zeros pass.
 */
export function squarable(values: readonly number[]): readonly number[] {
  let largest = 0
  for (const value of values) {
    const size = Math.abs(value)
    if (!(size < Infinity)) throw new RangeError('a value is not a finite number')
    largest = Math.max(largest, size)
  }
  if (largest > 1e125 || (largest > 0 && largest < 1e-125)) throw new RangeError('the values are too large or too small to be squared')
  return values
}

/** Arithmetic mean. Throws on no values, and on values or sums that are not finite. */
export function mean(values: readonly number[]): number {
  const first = values[0]
  if (first === undefined) throw new RangeError('the mean needs at least one value')
  // Centred on the first value: differences of near-equal numbers are exact, so a large offset costs nothing.
  const found = first + sum(values.map((value) => value - first)) / values.length
  if (!Number.isFinite(found)) throw new RangeError('the mean is not a finite number')
  return found
}

/**
 * Sum of squared deviations from the mean: two passes, with the correction for the rounding of the mean. Throws on no values.
 * Source: Chan, Golub & LeVeque, Am. Stat. 37 (1983) 242 (corrected two-pass algorithm).
 */
export function sumOfSquaredDeviations(values: readonly number[]): number {
  squarable(values)
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

/** The middle value, or the mean of the two middle ones. Throws on no values. */
export function median(values: readonly number[]): number {
  if (values.length === 0) throw new RangeError('the median needs at least one value')
  if (!values.every(Number.isFinite)) throw new RangeError('a value is not a finite number')
  const sorted = [...values].sort((left, right) => left - right)
  const middle = sorted.length >> 1
  const upper = sorted[middle] ?? 0
  return sorted.length % 2 === 1 ? upper : (sorted[middle - 1] ?? 0) / 2 + upper / 2
}

export interface Summary {
  readonly n: number
  readonly mean: number
  readonly standardDeviation: number
  /** In percent of the mean's absolute value; undefined when the mean is zero, or too near to it for a number. */
  readonly relativeStandardDeviation: number | undefined
}

/** Count, mean, standard deviation and the latter relative to the mean. Throws below two values. */
export function summary(values: readonly number[]): Summary {
  const centre = mean(values)
  const spread = standardDeviation(values)
  const relative = (spread / Math.abs(centre)) * 100
  return { n: values.length, mean: centre, standardDeviation: spread, relativeStandardDeviation: Number.isFinite(relative) ? relative : undefined }
}

/** Interval of a mean: mean ± t·s/√n. Throws below two values. Source: Student's t; ISO 2602:1980. */
export function meanInterval(given: readonly number[] | { readonly mean: number; readonly standardDeviation: number; readonly n: number }, level: number): Interval & { readonly df: number } {
  const { mean: centre, standardDeviation: spread, n } = 'n' in given ? given : summary(given)
  if (n < 2) throw new RangeError('the interval of a mean needs at least two values')
  const half = (studentQuantile((1 + level) / 2, n - 1) * spread) / Math.sqrt(n)
  return { ...finite({ low: centre - half, high: centre + half, level }), df: n - 1 }
}

/** Interval of a standard deviation: s·√(df/χ²) at both tails. Throws without a degree of freedom. Source: ISO 2854:1976. */
export function standardDeviationInterval(spread: number, df: number, level: number): Interval {
  if (!(df > 0)) throw new RangeError('the interval of a standard deviation needs a degree of freedom')
  return finite({ low: spread * Math.sqrt(df / chiSquareQuantile((1 + level) / 2, df)), high: spread * Math.sqrt(df / chiSquareQuantile((1 - level) / 2, df)), level })
}

function finite(interval: Interval): Interval {
  if (!Number.isFinite(interval.low) || !Number.isFinite(interval.high)) throw new RangeError('the bounds of the interval are not finite numbers')
  return interval
}
