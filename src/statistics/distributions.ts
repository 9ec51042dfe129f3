// The doorway to the plain distributions: Student, Fisher, chi-square, normal. Arguments outside their domain throw; nothing returns NaN.
import chiSquareCdfOf from '@stdlib/stats-base-dists-chisquare-cdf'
import chiSquareQuantileOf from '@stdlib/stats-base-dists-chisquare-quantile'
import fisherCdfOf from '@stdlib/stats-base-dists-f-cdf'
import fisherQuantileOf from '@stdlib/stats-base-dists-f-quantile'
import normalCdfOf from '@stdlib/stats-base-dists-normal-cdf'
import normalQuantileOf from '@stdlib/stats-base-dists-normal-quantile'
import studentCdfOf from '@stdlib/stats-base-dists-t-cdf'
import studentQuantileOf from '@stdlib/stats-base-dists-t-quantile'

/** t below which a share p of Student's distribution lies. Throws outside 0 ≤ p ≤ 1, df > 0. */
export function studentQuantile(p: number, df: number): number {
  return known(studentQuantileOf(p, df), 'Student quantile')
}

/** P(T ≤ t). An upper tail is the lower tail of −t, which keeps its digits. */
export function studentCdf(t: number, df: number): number {
  return known(studentCdfOf(t, df), 'Student probability')
}

/** F below which a share p of Fisher's distribution lies. Throws outside 0 ≤ p ≤ 1, df > 0. */
export function fisherQuantile(p: number, df1: number, df2: number): number {
  return known(fisherQuantileOf(p, df1, df2), 'F quantile')
}

/** P(F ≤ f) with df1 of the numerator, df2 of the denominator. */
export function fisherCdf(f: number, df1: number, df2: number): number {
  return known(fisherCdfOf(f, df1, df2), 'F probability')
}

/** P(F > f), as the lower tail of 1/F with the degrees of freedom exchanged: 1 − P(F ≤ f) would lose a small probability. */
export function fisherUpperTail(f: number, df1: number, df2: number): number {
  return f > 0 ? fisherCdf(1 / f, df2, df1) : 1
}

/** χ² below which a share p lies. Throws outside 0 ≤ p ≤ 1, df > 0. */
export function chiSquareQuantile(p: number, df: number): number {
  return known(chiSquareQuantileOf(p, df), 'chi-square quantile')
}

/** P(χ² ≤ x). */
export function chiSquareCdf(x: number, df: number): number {
  return known(chiSquareCdfOf(x, df), 'chi-square probability')
}

/** z below which a share p of the standard normal distribution lies. Throws outside 1e-300 ≤ p < 1. */
export function normalQuantile(p: number): number {
  if (!(p >= 1e-300 && p < 1)) throw new RangeError('the normal quantile has no value for these arguments')
  if (p > 0.5) return -normalQuantile(1 - p)
  if (p > 0.01) return normalQuantileOf(p, 0, 1)
  // The package is off by 5e-14 at p = 1e-5 and by 1e-5 at 1e-15; Newton's steps on the logarithm of its accurate probability are not.
  let z = -Math.sqrt(-2 * Math.log(p))
  for (let step = 0; step < 8; step += 1) {
    const below = normalCdf(z)
    z -= Math.log(below / p) * below * Math.sqrt(2 * Math.PI) * Math.exp((z * z) / 2)
  }
  return z
}

/** P(Z ≤ z). */
export function normalCdf(z: number): number {
  return known(normalCdfOf(z, 0, 1), 'normal probability')
}

function known(value: number, name: string): number {
  if (Number.isNaN(value)) throw new RangeError(`the ${name} has no value for these arguments`)
  return value
}
