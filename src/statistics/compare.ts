// Two or more groups of values: differences with intervals, tests of means and of spreads, and equivalence by two one-sided tests.
// A large probability never shows that groups are equal; only equivalence within a stated margin can be shown.
import { type Interval, mean, median, squarable, standardDeviation, sum } from './describe.ts'
import { chiSquareCdf, fisherCdf, fisherUpperTail, studentCdf, studentQuantile } from './distributions.ts'
import { type OneWay, oneWay } from './variance-components.ts'

export interface DifferenceTest {
  readonly difference: number
  readonly standardError: number
  readonly t: number
  readonly df: number
  /** Two-sided. */
  readonly probability: number
  readonly interval: Interval
}

/** Difference, its standard error and df → t, two-sided probability and interval. Throws when nothing scatters. */
export function differenceTest(difference: number, standardError: number, df: number, level: number): DifferenceTest {
  if (!(standardError > 0)) throw new RangeError('the values do not scatter, so a difference has no standard error')
  if (!(df > 0)) throw new RangeError('a test needs a degree of freedom')
  const t = difference / standardError
  const half = studentQuantile((1 + level) / 2, df) * standardError
  return { difference, standardError, t, df, probability: 2 * studentCdf(-Math.abs(t), df), interval: { low: difference - half, high: difference + half, level } }
}

function variance(values: readonly number[]): number {
  return standardDeviation(squarable(values)) ** 2
}

/** Mean of a − mean of b, variances not assumed equal. Throws below two values in a group, and when neither group scatters. Source: Welch, Biometrika 34 (1947) 28. */
export function welch(a: readonly number[], b: readonly number[], level: number): DifferenceTest {
  const parts = [a, b].map((values) => ({ share: variance(values) / values.length, df: values.length - 1 }))
  const total = sum(parts.map((part) => part.share))
  if (!(total > 0)) throw new RangeError('the values do not scatter, so a difference has no standard error')
  return differenceTest(mean(a) - mean(b), Math.sqrt(total), 1 / sum(parts.map((part) => (part.share / total) ** 2 / part.df)), level)
}

/** Mean of a − mean of b with a pooled variance. Throws below two values in a group. Source: ISO 2854:1976. */
export function pooledT(a: readonly number[], b: readonly number[], level: number): DifferenceTest {
  const df = a.length + b.length - 2
  const pooled = ((a.length - 1) * variance(a) + (b.length - 1) * variance(b)) / df
  return differenceTest(mean(a) - mean(b), Math.sqrt(pooled * (1 / a.length + 1 / b.length)), df, level)
}

/** Mean of the differences a − b of pairs. Throws below two pairs, and when the differences do not scatter. Source: ISO 3301:1975. */
export function pairedT(a: readonly number[], b: readonly number[], level: number): DifferenceTest {
  if (a.length !== b.length) throw new RangeError('pairs need as many values on both sides')
  const differences = a.map((value, i) => value - (b[i] ?? 0))
  return differenceTest(mean(differences), standardDeviation(differences) / Math.sqrt(differences.length), differences.length - 1, level)
}

/** Mean − reference. Throws below two values, and when they do not scatter. Source: ISO 2854:1976. */
export function oneSampleT(values: readonly number[], reference: number, level: number): DifferenceTest {
  return differenceTest(mean(values) - reference, standardDeviation(values) / Math.sqrt(values.length), values.length - 1, level)
}

export interface SpreadTest {
  readonly F: number
  readonly df1: number
  readonly df2: number
  readonly probability: number
}

/** Variance of a over variance of b, two-sided probability. Throws when a group does not scatter. Source: ISO 2854:1976. */
export function varianceRatio(a: readonly number[], b: readonly number[]): SpreadTest {
  const [top, bottom] = [variance(a), variance(b)]
  if (!(bottom > 0) || !(top > 0)) throw new RangeError('a group does not scatter')
  const [df1, df2] = [a.length - 1, b.length - 1]
  const F = top / bottom
  return { F, df1, df2, probability: Math.min(1, 2 * Math.min(fisherCdf(F, df1, df2), fisherUpperTail(F, df1, df2))) }
}

/** Equality of spreads on absolute deviations from the medians. Throws when those do not scatter within groups, as with two values each. Source: Brown & Forsythe, J. Am. Stat. Assoc. 69 (1974) 364. */
export function brownForsythe(groups: readonly (readonly number[])[]): SpreadTest {
  return deviationTest(groups, median)
}

/** The same on deviations from the means. Source: Levene, in Contributions to Probability and Statistics, Stanford (1960) 278. */
export function levene(groups: readonly (readonly number[])[]): SpreadTest {
  return deviationTest(groups, mean)
}

function deviationTest(groups: readonly (readonly number[])[], centre: (values: readonly number[]) => number): SpreadTest {
  const deviations = groups.map((group) => {
    const middle = centre(group)
    return group.map((value) => Math.abs(value - middle))
  })
  if (groups.every((group) => group.length <= 2)) throw new RangeError('a comparison of spreads needs a group of three values or more')
  const anova: OneWay = oneWay(deviations)
  return { F: anova.F, df1: anova.dfBetween, df2: anova.dfWithin, probability: anova.probability }
}

/** Equality of variances under normality. Throws below two groups, and when a group does not scatter. Source: Bartlett, Proc. R. Soc. A 160 (1937) 268. */
export function bartlett(groups: readonly (readonly number[])[]): { readonly statistic: number; readonly df: number; readonly probability: number } {
  if (groups.length < 2) throw new RangeError('a comparison of spreads needs at least two groups')
  const parts = groups.map((group) => ({ df: group.length - 1, variance: variance(group) }))
  if (parts.some((part) => !(part.variance > 0))) throw new RangeError('a group does not scatter')
  const df = sum(parts.map((part) => part.df))
  const pooled = sum(parts.map((part) => part.df * part.variance)) / df
  const correction = 1 + (sum(parts.map((part) => 1 / part.df)) - 1 / df) / (3 * (groups.length - 1))
  const statistic = (df * Math.log(pooled) - sum(parts.map((part) => part.df * Math.log(part.variance)))) / correction
  return { statistic, df: groups.length - 1, probability: 1 - chiSquareCdf(statistic, groups.length - 1) }
}

export interface Equivalence {
  /** Against the lower margin (upper tail) and the upper margin (lower tail). */
  readonly lower: { readonly t: number; readonly probability: number }
  readonly upper: { readonly t: number; readonly probability: number }
  /** The larger of both. */
  readonly probability: number
  /** Of level 1 − 2α. */
  readonly interval: Interval
  readonly equivalent: boolean
}

/** Two one-sided tests at α each: equivalent when both margins are ruled out, which is when the interval lies between them. Throws when nothing scatters. Source: Schuirmann, J. Pharmacokin. Biopharm. 15 (1987) 657. */
export function equivalence(found: { readonly difference: number; readonly standardError: number; readonly df: number }, margins: { readonly low: number; readonly high: number }, alpha: number): Equivalence {
  if (!(found.standardError > 0)) throw new RangeError('the values do not scatter, so a difference has no standard error')
  const tLower = (found.difference - margins.low) / found.standardError
  const tUpper = (found.difference - margins.high) / found.standardError
  const lower = { t: tLower, probability: studentCdf(-tLower, found.df) }
  const upper = { t: tUpper, probability: studentCdf(tUpper, found.df) }
  const half = studentQuantile(1 - alpha, found.df) * found.standardError
  const interval = { low: found.difference - half, high: found.difference + half, level: 1 - 2 * alpha }
  return { lower, upper, probability: Math.max(lower.probability, upper.probability), interval, equivalent: interval.low > margins.low && interval.high < margins.high }
}
