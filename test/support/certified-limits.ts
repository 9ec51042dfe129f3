// How further published cases are computed by the program: lower limits, calibrations, runs, summaries, rounding. Names only, as in its neighbour.
import { equivalence, oneSampleT, pooledT, welch } from '../../src/statistics/compare.ts'
import { mean, meanInterval, standardDeviation, standardDeviationInterval } from '../../src/statistics/describe.ts'
import { iso11843, mdl } from '../../src/statistics/detection.ts'
import { normalQuantile, studentQuantile } from '../../src/statistics/distributions.ts'
import { lackOfFit, mandelTest } from '../../src/statistics/lack-of-fit.ts'
import { noncentralStudentCdf } from '../../src/statistics/noncentral-student.ts'
import { grubbsCritical } from '../../src/statistics/outliers.ts'
import { type Fit, fitPolynomial, inversePredict, inversePredictionStandardError } from '../../src/statistics/regression.ts'
import { type Rounded, roundHalfEven, roundHalfUp, type RoundingMode, roundSignificant } from '../../src/statistics/rounding.ts'
import { intermediateTerms, modifiedLargeSampleInterval, nestedMeanInterval, oneWay, satterthwaite, satterthwaiteInterval } from '../../src/statistics/variance-components.ts'

type Data = Readonly<Record<string, unknown>>
const numbers = (value: unknown): readonly number[] => value as readonly number[]
const groupsIn = (value: unknown): readonly (readonly number[])[] => value as readonly (readonly number[])[]
const half = ({ low, high }: { readonly low: number; readonly high: number }): number => (high - low) / 2

export const certifiedLimits: Readonly<Record<string, (data: Data) => unknown>> = {
  'standard-addition': standardAddition, 'weighted-candidates': weightedCandidates, 'lack-of-fit': lackOfFitFigures, 'method-detection-limit': methodDetectionLimit, iso11843: capabilityOfDetection,
  'intermediate-precision': (data) => intermediatePrecision(groupsIn(data['groups'])),
  'intermediate-precision-sets': (data) => Object.fromEntries(Object.entries(data).map(([name, groups]) => [name, intermediatePrecision(groupsIn(groups))])),
  'one-way-levels': oneWayLevels, 'tost-one-sample': equivalenceOfMean, rounding, 'two-summaries': twoSummaries, 'welch-satterthwaite': effectiveDegrees, 'one-sided-tolerance': oneSidedTolerance,
  'grubbs-critical-one-sided': (data) => ({ T: numbers(data['n']).map((n) => grubbsCritical(n, 2 * Number(data['alpha']))) }),
  'spread-interval-factors': (data) => {
    const { low, high } = standardDeviationInterval(1, Number(data['n']) - 1, 0.95)
    return { lcl_factor: low, ucl_factor: high }
  },
}

function standardAddition(data: Data): unknown {
  const fit = fitPolynomial({ x: numbers(data['x_added']), y: numbers(data['y']), degree: 1 })
  const read = inversePredict(fit, 0, { low: -100, high: 0 })
  // Zero response is no measurement: only the line has an error.
  const error = inversePredictionStandardError(fit, 0, Infinity)
  return { intercept: fit.coefficients[0], slope: fit.coefficients[1], x_E: 'x' in read ? -read.x : undefined, s_xE: error, ci95_halfwidth: studentQuantile(0.975, fit.df) * error }
}

function weightedCandidates(data: Data): unknown {
  const [x, y] = [numbers(data['x']), numbers(data['y'])]
  const [lowest = 0, response = 0] = [x[0], y[0]]
  const figures = (fit: Fit): unknown => {
    const read = inversePredict(fit, response, { low: 0, high: 2 * lowest })
    return {
      intercept: fit.coefficients[0], slope: fit.coefficients[1], s_residual: fit.residualStandardDeviation, s_intercept: fit.standardErrors[0], s_slope: fit.standardErrors[1],
      r: fit.correlation, r_squared: fit.rSquared, lowest_error_percent: 'x' in read ? (100 * (read.x - lowest)) / lowest : undefined,
    }
  }
  return {
    unweighted: figures(fitPolynomial({ x, y, degree: 1 })), one_over_x: figures(fitPolynomial({ x, y, weights: x.map((each) => 1 / each), degree: 1 })),
    one_over_x_squared: figures(fitPolynomial({ x, y, weights: x.map((each) => 1 / each ** 2), degree: 1 })),
  }
}

function lackOfFitFigures(data: Data): unknown {
  const [x, y] = [numbers(data['x']), numbers(data['y'])]
  const [line, parabola] = [fitPolynomial({ x, y, degree: 1 }), fitPolynomial({ x, y, degree: 2 })]
  const [lack, mandel] = [lackOfFit(line), mandelTest(line, parabola)]
  return {
    intercept: line.coefficients[0], slope: line.coefficients[1], ss_residual: line.residualSumOfSquares, ss_pure_error: lack.sumOfSquaresPureError, curvature: parabola.coefficients[2],
    lack_of_fit: { F: lack.F, df1: lack.df1, df2: lack.df2, p: lack.probability }, mandel: { F: mandel.F, df1: mandel.df1, df2: mandel.df2, p: mandel.probability },
  }
}

function methodDetectionLimit(data: Data): unknown {
  const silent = Array.from({ length: Number(data['blanks_without_number'] ?? 0) }, () => undefined)
  const { spikes, blanks, limit } = mdl({ spikes: numbers(data['spikes']), blanks: [...silent, ...numbers(data['blanks'])] })
  return { spikes: { sd: spikes.standardDeviation, limit: spikes.limit }, blanks: { mean: blanks.mean, sd: blanks.standardDeviation, limit: blanks.limit }, limit }
}

function capabilityOfDetection(data: Data): unknown {
  const points = { x: numbers(data['x']), y: numbers(data['y']) }
  const found = iso11843(points, Number(data['replicates']), Number(data['alpha']), Number(data['beta']))
  const fit = fitPolynomial({ ...points, degree: 1 })
  return {
    intercept: found.intercept, slope: found.slope, s_residual: found.residualStandardDeviation, critical_response: found.criticalResponse, critical_value: found.criticalValue, delta: found.delta,
    minimum_detectable: found.minimumDetectable, ten_residual_deviations: (10 * fit.residualStandardDeviation) / found.slope, ten_intercept_errors: (10 * (fit.standardErrors[0] ?? 0)) / found.slope,
  }
}

function intermediatePrecision(groups: readonly (readonly number[])[]): unknown {
  const anova = oneWay(groups)
  const nestedMean = nestedMeanInterval(anova, 0.95)
  const naive = meanInterval(groups.flat(), 0.95)
  const [large, approximate] = [modifiedLargeSampleInterval(anova, 0.95), satterthwaiteInterval(intermediateTerms(anova), 0.95)]
  return {
    ms_within: anova.meanSquareWithin, ms_between: anova.meanSquareBetween, n0: anova.n0, between_variance: anova.betweenVariance, between_variance_raw: anova.betweenVarianceRaw,
    s_r: Math.sqrt(anova.withinVariance), s_IP: Math.sqrt(anova.totalVariance), df: satterthwaite(intermediateTerms(anova)).df, satterthwaite: [approximate.low, approximate.high], mls: [large.low, large.high],
    mean: anova.grandMean, mean_halfwidth: half(nestedMean), mean_df: nestedMean.df, naive_halfwidth: half(naive), naive_df: naive.df, plain_sd: standardDeviation(groups.flat()),
  }
}

function oneWayLevels(data: Data): unknown {
  return { levels: (data['levels'] as readonly (readonly (readonly number[])[])[]).map((groups) => {
    const anova = oneWay(groups)
    return { m: anova.grandMean, s_r: Math.sqrt(anova.withinVariance), s_R: Math.sqrt(anova.totalVariance) }
  }) }
}

function equivalenceOfMean(data: Data): unknown {
  const values = numbers(data['values'])
  const test = oneSampleT(values, Number(data['reference']), 0.9)
  const decisions = numbers(data['margins']).map((margin) => equivalence(test, { low: -margin, high: margin }, 0.05))
  const reference = Number(data['reference'])
  return {
    mean: mean(values), sd: standardDeviation(values), ci90: decisions[0] === undefined ? [] : [reference + decisions[0].interval.low, reference + decisions[0].interval.high],
    equivalent: decisions.map((each) => (each.equivalent ? 1 : 0)),
  }
}

function rounding(data: Data): unknown {
  const rows = data['rows'] as readonly (readonly [number, 'decimals' | 'significant', number, RoundingMode])[]
  const round = (value: number, rule: string, count: number, mode: RoundingMode): Rounded => (rule === 'significant' ? roundSignificant(value, count, mode) : mode === 'half up' ? roundHalfUp(value, count) : roundHalfEven(value, count))
  return { text: rows.map((row) => round(...row).text) }
}

function twoSummaries(data: Data): unknown {
  const [n, means, sds] = [numbers(data['n']), numbers(data['mean']), numbers(data['sd'])]
  // Series with the stated sizes, means and spreads: the tests see nothing else.
  const [a, b] = [0, 1].map((k) => {
    const raw = Array.from({ length: n[k] ?? 0 }, (_, index) => index)
    const [centre, spread] = [mean(raw), standardDeviation(raw)]
    return raw.map((value) => (means[k] ?? 0) + ((sds[k] ?? 0) * (value - centre)) / spread)
  }) as [number[], number[]]
  const [pooled, unequal] = [pooledT(a, b, 0.95), welch(a, b, 0.95)]
  return {
    pooled_sd: pooled.standardError / Math.sqrt(1 / a.length + 1 / b.length), abs_t: Math.abs(pooled.t), df: pooled.df, t_crit: studentQuantile(0.975, pooled.df), t_pooled: pooled.t, df_pooled: pooled.df,
    t_crit_975: studentQuantile(0.975, pooled.df), t_crit_95: studentQuantile(0.95, pooled.df), t_welch: unequal.t, df_welch: unequal.df, t_crit_welch: studentQuantile(0.975, unequal.df),
  }
}

function effectiveDegrees(data: Data): unknown {
  const dfs = numbers(data['df'])
  const { variance, df } = satterthwaite(numbers(data['u_components_nm']).map((u, k) => ({ coefficient: 1, meanSquare: u ** 2, df: dfs[k] ?? 0 })))
  return { u_c: Math.sqrt(variance), nu_eff: df, t_99: studentQuantile(0.995, Math.floor(df)) }
}

/** The factor at which the noncentral t distribution gives the stated confidence, found by halving. */
function oneSidedTolerance(data: Data): unknown {
  const factor = (n: number): number => {
    const delta = normalQuantile(Number(data['P'])) * Math.sqrt(n)
    let [low, high] = [0, 100]
    for (let step = 0; step < 60; step += 1) {
      const middle = (low + high) / 2
      if (noncentralStudentCdf(middle * Math.sqrt(n), n - 1, delta) < Number(data['gamma'])) low = middle
      else high = middle
    }
    return low
  }
  const sizes = Array.isArray(data['n']) ? numbers(data['n']) : [Number(data['n'])]
  return { k: sizes.map(factor), k1_noncentral_t: factor(sizes[0] ?? 2) }
}
