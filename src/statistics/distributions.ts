// The doorway to the plain distributions: Student, Fisher, chi-square, normal. Arguments outside their domain throw; nothing returns NaN.
import chiSquareCdfOf from '@stdlib/stats-base-dists-chisquare-cdf'
import chiSquareQuantileOf from '@stdlib/stats-base-dists-chisquare-quantile'
import fisherCdfOf from '@stdlib/stats-base-dists-f-cdf'
import fisherQuantileOf from '@stdlib/stats-base-dists-f-quantile'
import normalCdfOf from '@stdlib/stats-base-dists-normal-cdf'
import normalQuantileOf from '@stdlib/stats-base-dists-normal-quantile'
import studentCdfOf from '@stdlib/stats-base-dists-t-cdf'
import studentQuantileOf from '@stdlib/stats-base-dists-t-quantile'

export function studentQuantile(p: number, df: number): number {
  return known(studentQuantileOf(p, df), 'Student quantile')
}

export function studentCdf(t: number, df: number): number {
  return known(studentCdfOf(t, df), 'Student probability')
}

export function fisherQuantile(p: number, df1: number, df2: number): number {
  return known(fisherQuantileOf(p, df1, df2), 'F quantile')
}

export function fisherCdf(f: number, df1: number, df2: number): number {
  return known(fisherCdfOf(f, df1, df2), 'F probability')
}

export function chiSquareQuantile(p: number, df: number): number {
  return known(chiSquareQuantileOf(p, df), 'chi-square quantile')
}

export function chiSquareCdf(x: number, df: number): number {
  return known(chiSquareCdfOf(x, df), 'chi-square probability')
}

export function normalQuantile(p: number): number {
  return known(normalQuantileOf(p, 0, 1), 'normal quantile')
}

export function normalCdf(z: number): number {
  return known(normalCdfOf(z, 0, 1), 'normal probability')
}

function known(value: number, name: string): number {
  if (Number.isNaN(value)) throw new RangeError(`the ${name} has no value for these arguments`)
  return value
}
