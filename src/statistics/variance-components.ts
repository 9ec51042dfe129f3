// Components of variance from runs of replicates: one-way and nested, balanced or not. A negative estimate is kept as `raw` and
// truncated to zero, never hidden; unbalanced designs use n0, not n.
import { type Interval, mean, squarable, sum } from './describe.ts'
import { chiSquareQuantile, fisherUpperTail, studentQuantile } from './distributions.ts'

export interface OneWay {
  readonly groups: number
  readonly n: number
  /** Effective group size: (N − Σ n²/N)/(p − 1). */
  readonly n0: number
  readonly sumOfSquaresBetween: number
  readonly sumOfSquaresWithin: number
  readonly dfBetween: number
  readonly dfWithin: number
  readonly meanSquareBetween: number
  readonly meanSquareWithin: number
  readonly F: number
  readonly probability: number
  readonly grandMean: number
  /** (MS between − MS within)/n0, which may be negative. */
  readonly betweenVarianceRaw: number
  readonly betweenVariance: number
  readonly truncated: boolean
  readonly withinVariance: number
  readonly totalVariance: number
}

/** One-way random-effects analysis of variance. Throws below two groups, without replicates, and when replicates do not scatter. Source: ISO 5725-2:2019, clause 7; Searle, Casella & McCulloch, Variance Components, section 3.6. */
export function oneWay(groups: readonly (readonly number[])[]): OneWay {
  const n = groups.reduce((count, group) => count + group.length, 0)
  if (groups.length < 2) throw new RangeError('analysis of variance needs at least two groups')
  if (groups.some((group) => group.length === 0)) throw new RangeError('a group without values')
  if (n - groups.length < 1) throw new RangeError('analysis of variance needs replicates in at least one group')
  const all = squarable(groups.flat())
  const offset = mean(all)
  const centred = groups.map((group) => group.map((value) => value - offset))
  const grand = mean(centred.flat())
  const means = centred.map(mean)
  const sumOfSquaresBetween = sum(centred.map((group, k) => group.length * ((means[k] ?? 0) - grand) ** 2))
  const sumOfSquaresWithin = sum(centred.flatMap((group, k) => group.map((value) => (value - (means[k] ?? 0)) ** 2)))
  const dfBetween = groups.length - 1
  const dfWithin = n - groups.length
  const meanSquareBetween = sumOfSquaresBetween / dfBetween
  const meanSquareWithin = sumOfSquaresWithin / dfWithin
  const n0 = (n - sum(groups.map((group) => group.length ** 2)) / n) / dfBetween
  if (!(meanSquareWithin > 0)) throw new RangeError('the replicates do not scatter')
  const betweenVarianceRaw = (meanSquareBetween - meanSquareWithin) / n0
  const betweenVariance = Math.max(0, betweenVarianceRaw)
  const F = meanSquareBetween / meanSquareWithin
  return {
    groups: groups.length, n, n0, sumOfSquaresBetween, sumOfSquaresWithin, dfBetween, dfWithin, meanSquareBetween, meanSquareWithin, F,
    probability: fisherUpperTail(F, dfBetween, dfWithin), grandMean: offset + grand, betweenVarianceRaw, betweenVariance,
    truncated: betweenVarianceRaw < 0, withinVariance: meanSquareWithin, totalVariance: meanSquareWithin + betweenVariance,
  }
}

export interface MeanSquareTerm {
  readonly coefficient: number
  readonly meanSquare: number
  readonly df: number
}

/** Effective degrees of freedom of a sum of mean squares: its square over Σ (coefficient·mean square)²/df. Throws when the sum is not above zero. Source: Satterthwaite, Biometrics Bulletin 2 (1946) 110. */
export function satterthwaite(terms: readonly MeanSquareTerm[]): { readonly variance: number; readonly df: number } {
  const variance = sum(terms.map((term) => term.coefficient * term.meanSquare))
  if (!(variance > 0)) throw new RangeError('the sum of mean squares is not above zero')
  // By shares of the sum: fourth powers of the values themselves would overflow.
  return { variance, df: 1 / sum(terms.map((term) => ((term.coefficient * term.meanSquare) / variance) ** 2 / term.df)) }
}

/** Mean squares whose sum is the intermediate-precision variance; within alone when the between component is truncated. */
export function intermediateTerms(anova: OneWay): readonly MeanSquareTerm[] {
  if (anova.truncated) return [{ coefficient: 1, meanSquare: anova.meanSquareWithin, df: anova.dfWithin }]
  return [
    { coefficient: 1 / anova.n0, meanSquare: anova.meanSquareBetween, df: anova.dfBetween },
    { coefficient: 1 - 1 / anova.n0, meanSquare: anova.meanSquareWithin, df: anova.dfWithin },
  ]
}

/**
 * Modified-large-sample interval of the intermediate-precision standard deviation √(within + between).
 * Source: Graybill & Wang, J. Am. Stat. Assoc. 75 (1980) 869; Burdick & Graybill, Confidence Intervals on Variance Components, section 3.2.
 */
export function modifiedLargeSampleInterval(anova: OneWay, level: number): Interval {
  return modifiedLargeSampleIntervalOf(intermediateTerms(anova), level)
}

/** The same for any sum of mean squares. Throws on a negative coefficient. */
export function modifiedLargeSampleIntervalOf(terms: readonly MeanSquareTerm[], level: number): Interval {
  if (terms.some((term) => term.coefficient < 0)) throw new RangeError('the modified large sample interval needs coefficients of at least zero')
  const variance = sum(terms.map((term) => term.coefficient * term.meanSquare))
  if (!(variance > 0)) throw new RangeError('the sum of mean squares is not above zero')
  const spread = (p: number): number => variance * Math.sqrt(sum(terms.map((term) => (((term.df / chiSquareQuantile(p, term.df) - 1) * term.coefficient * term.meanSquare) / variance) ** 2)))
  return { low: Math.sqrt(Math.max(0, variance - spread((1 + level) / 2))), high: Math.sqrt(variance + spread((1 - level) / 2)), level }
}

/** Chi-square interval of the square root of a sum of mean squares, with Satterthwaite's degrees of freedom. */
export function satterthwaiteInterval(terms: readonly MeanSquareTerm[], level: number): Interval & { readonly df: number } {
  const { variance, df } = satterthwaite(terms)
  return { low: Math.sqrt((variance * df) / chiSquareQuantile((1 + level) / 2, df)), high: Math.sqrt((variance * df) / chiSquareQuantile((1 - level) / 2, df)), level, df }
}

/**
 * Interval of the grand mean of results nested in runs: between-run mean square, runs − 1 degrees of freedom; N − 1 would be far too many.
 * Exact for runs of one size. Source: Searle, Casella & McCulloch, Variance Components, section 3.6.
 */
export function nestedMeanInterval(anova: OneWay, level: number): Interval & { readonly df: number; readonly standardError: number } {
  const standardError = Math.sqrt(anova.meanSquareBetween / anova.n)
  const half = studentQuantile((1 + level) / 2, anova.dfBetween) * standardError
  return { low: anova.grandMean - half, high: anova.grandMean + half, level, df: anova.dfBetween, standardError }
}

export interface NestedStage {
  readonly sumOfSquares: number
  readonly df: number
  readonly meanSquare: number
  readonly varianceRaw: number
  readonly variance: number
}

export interface Nested {
  readonly n: number
  readonly grandMean: number
  /** Between the outer groups (days), between the inner ones within an outer (runs), within the inner ones (replicates). */
  readonly outer: NestedStage
  readonly inner: NestedStage
  readonly residual: NestedStage
  /** Coefficients of the expected mean squares: inner in MS inner, inner in MS outer, outer in MS outer. */
  readonly coefficients: { readonly innerInInner: number; readonly innerInOuter: number; readonly outerInOuter: number }
  readonly truncated: boolean
  readonly totalVariance: number
  /** Terms of the total for Satterthwaite, before truncation. */
  readonly terms: readonly MeanSquareTerm[]
}

/** Two-stage nested random-effects analysis (`data[outer][inner][replicate]`), balanced or not. Throws when a stage has no degree of freedom. Source: Searle, Casella & McCulloch, section 3.8 (expected mean squares). */
export function nested(data: readonly (readonly (readonly number[])[])[]): Nested {
  const cells = data.flat()
  const n = cells.reduce((count, cell) => count + cell.length, 0)
  const a = data.length
  const b = cells.length
  if (a < 2) throw new RangeError('a nested analysis needs at least two outer groups')
  if (b - a < 1) throw new RangeError('a nested analysis needs an outer group with two inner ones')
  if (n - b < 1 || cells.some((cell) => cell.length === 0)) throw new RangeError('a nested analysis needs replicates')
  const offset = mean(squarable(cells.flat()))
  const centred = data.map((outer) => outer.map((inner) => inner.map((value) => value - offset)))
  const grand = mean(centred.flat(2))
  const outerMeans = centred.map((outer) => mean(outer.flat()))
  const ssOuter = sum(centred.map((outer, i) => outer.flat().length * ((outerMeans[i] ?? 0) - grand) ** 2))
  const ssInner = sum(centred.flatMap((outer, i) => outer.map((inner) => inner.length * (mean(inner) - (outerMeans[i] ?? 0)) ** 2)))
  const ssResidual = sum(centred.flat().flatMap((inner) => inner.map((value) => (value - mean(inner)) ** 2)))
  const sizes = data.map((outer) => outer.map((inner) => inner.length))
  const within = sum(sizes.map((outer) => sum(outer.map((size) => size ** 2)) / sum(outer)))
  const innerInInner = (n - within) / (b - a)
  const innerInOuter = (within - sum(sizes.flat().map((size) => size ** 2)) / n) / (a - 1)
  const outerInOuter = (n - sum(sizes.map((outer) => sum(outer) ** 2)) / n) / (a - 1)
  const [msOuter, msInner, msResidual] = [ssOuter / (a - 1), ssInner / (b - a), ssResidual / (n - b)]
  if (!(msResidual > 0)) throw new RangeError('the replicates do not scatter')
  const innerRaw = (msInner - msResidual) / innerInInner
  const outerRaw = (msOuter - msResidual - innerInOuter * innerRaw) / outerInOuter
  const stage = (sumOfSquares: number, df: number, raw: number): NestedStage => ({ sumOfSquares, df, meanSquare: sumOfSquares / df, varianceRaw: raw, variance: Math.max(0, raw) })
  const outerShare = 1 / outerInOuter
  const innerShare = (1 - innerInOuter / outerInOuter) / innerInInner
  return {
    n, grandMean: offset + grand, outer: stage(ssOuter, a - 1, outerRaw), inner: stage(ssInner, b - a, innerRaw), residual: stage(ssResidual, n - b, msResidual),
    coefficients: { innerInInner, innerInOuter, outerInOuter }, truncated: innerRaw < 0 || outerRaw < 0,
    totalVariance: msResidual + Math.max(0, innerRaw) + Math.max(0, outerRaw),
    terms: [
      { coefficient: outerShare, meanSquare: msOuter, df: a - 1 }, { coefficient: innerShare, meanSquare: msInner, df: b - a },
      { coefficient: 1 - outerShare - innerShare, meanSquare: msResidual, df: n - b },
    ],
  }
}
