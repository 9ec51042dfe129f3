// How each kind of certified case is computed by the program: data of the case → figures under the names its source uses.
// Only names are translated here; nothing is computed but ratios that a source prints beside what the program gives.
import { bartlett, brownForsythe, levene, type DifferenceTest, equivalence, oneSampleT, pairedT, pooledT, varianceRatio, welch } from '../../src/statistics/compare.ts'
import { currieCriticalValue, currieMinimumDetectable } from '../../src/statistics/detection.ts'
import { mean, meanInterval, standardDeviation, standardDeviationInterval, summary } from '../../src/statistics/describe.ts'
import { chiSquareQuantile, fisherCdf, fisherQuantile, normalCdf, normalQuantile, studentQuantile } from '../../src/statistics/distributions.ts'
import { predictedReproducibility } from '../../src/statistics/horwitz.ts'
import { lackOfFit, mandelTest } from '../../src/statistics/lack-of-fit.ts'
import { leastSquares } from '../../src/statistics/least-squares.ts'
import { grubbs, grubbsCritical } from '../../src/statistics/outliers.ts'
import { coefficientInterval, type Fit, fitPolynomial, inversePredict, inversePredictionStandardError } from '../../src/statistics/regression.ts'
import { nested, nestedMeanInterval, oneWay, satterthwaite } from '../../src/statistics/variance-components.ts'
import { certifiedLimits } from './certified-limits.ts'
import { certifiedReferences } from './certified-references.ts'

type Data = Readonly<Record<string, unknown>>
const numbers = (value: unknown): readonly number[] => value as readonly number[]

export const certifiedStatistics: Readonly<Record<string, (data: Data) => unknown>> = {
  ...certifiedLimits, ...certifiedReferences,
  'one-way': ofOneWay, spreads, 'one-sample': oneSample, anscombe, line, 'weighted-line': weightedLine, describe, 'grubbs-critical': ofGrubbsCritical, grubbs: ofGrubbs,
  'summary-variance-ratio': summaryVarianceRatio, horwitz: (data) => ({ prsd_R_percent: numbers(data['mass_fraction']).map(predictedReproducibility) }), 'nist-regression': nistRegression,
  't-one-sided-99': (data) => ({ t: numbers(data['n']).map((n) => studentQuantile(0.99, n - 1)) }), currie, 'din-calibration': din, nested: ofNested, quantiles, tost, paired, 'two-samples': twoSamples,
}

function groupsOf(data: Data): readonly (readonly number[])[] {
  const groups = data['groups']
  if (groups !== undefined) return (Array.isArray(groups) ? groups : Object.values(groups as object)) as readonly (readonly number[])[]
  // The simulated sets of NIST StRD: in each group the centre, then centre − 0.1 and + 0.1 in turn, built as decimal text.
  const tenths = (centre: number, shift: number): number => {
    const [whole = '0', tenth = '0'] = centre.toFixed(1).split('.')
    return Number(`${whole}.${Number(tenth) + shift}`)
  }
  return numbers(data['centres']).map((centre) => [centre, ...Array.from({ length: (Number(data['n_per_group']) - 1) / 2 }, () => [tenths(centre, -1), tenths(centre, 1)]).flat()])
}

function ofOneWay(data: Data): unknown {
  const anova = oneWay(groupsOf(data))
  const { F, probability: p } = anova
  const [between, within] = [anova.sumOfSquaresBetween, anova.sumOfSquaresWithin]
  const critical = fisherQuantile(0.95, anova.dfBetween, anova.dfWithin)
  const interval = nestedMeanInterval(anova, 0.95)
  return {
    F, p_value: p, F_crit: critical, F_crit_05: critical, grand_mean: anova.grandMean,
    ss_between: between, ss_treatment: between, ss_looms: between, ss_within: within, ss_error: within, ss_total: between + within,
    ms_between: anova.meanSquareBetween, ms_treatment: anova.meanSquareBetween, ms_looms: anova.meanSquareBetween, ms_within: anova.meanSquareWithin, ms_error: anova.meanSquareWithin,
    var_between: anova.betweenVariance, var_within: anova.withinVariance, var_looms: anova.betweenVariance, var_error: anova.withinVariance, var_between_anova: anova.betweenVarianceRaw,
    reml: { var_batch: anova.betweenVariance, sd_batch: Math.sqrt(anova.betweenVariance), var_residual: anova.withinVariance, sd_residual: Math.sqrt(anova.withinVariance), intercept: anova.grandMean, se_intercept: interval.standardError },
    between: { df: anova.dfBetween, ss: between, ms: anova.meanSquareBetween, F }, within: { df: anova.dfWithin, ss: within, ms: anova.meanSquareWithin },
    r_squared: between / (between + within), residual_sd: Math.sqrt(anova.meanSquareWithin),
  }
}

function spreads(data: Data): unknown {
  const groups = groupsOf(data)
  const [b, bf, centred, anova] = [bartlett(groups), brownForsythe(groups), levene(groups), oneWay(groups)]
  return {
    bartlett: { K2: b.statistic, df: b.df, p: b.probability }, brown_forsythe: { F: bf.F, p: bf.probability }, levene: { F: centred.F, p: centred.probability }, bartlett_T: b.statistic, bartlett_crit: chiSquareQuantile(0.95, b.df),
    brown_forsythe_W: bf.F, F_crit: fisherQuantile(0.95, bf.df1, bf.df2), anova_F: anova.F, anova_p: anova.probability, ss_between: anova.sumOfSquaresBetween, ss_within: anova.sumOfSquaresWithin,
  }
}

function oneSample(data: Data): unknown {
  const values = numbers(data['values'])
  const test = oneSampleT(values, Number(data['reference']), 0.95)
  return { mean: mean(values), sd: standardDeviation(values), t: test.t, abs_t: Math.abs(test.t), t_crit_one_sided_95: studentQuantile(0.95, test.df), t_crit_2df: studentQuantile(0.975, test.df) }
}

function lineFigures(fit: Fit): Readonly<Record<string, unknown>> {
  const [intercept = 0, slope = 0] = fit.coefficients
  const F = (slope / (fit.standardErrors[1] ?? 1)) ** 2
  return {
    intercept, slope, s_intercept: fit.standardErrors[0], s_slope: fit.standardErrors[1], s_residual: fit.residualStandardDeviation, r_squared: fit.rSquared, r: fit.correlation,
    ss_residual: fit.residualSumOfSquares, sse: fit.residualSumOfSquares, F, p_value: 1 - fisherCdf(F, 1, fit.df),
  }
}

function anscombe(data: Data): unknown {
  const sets = Object.entries(data as Readonly<Record<string, { readonly x: readonly number[]; readonly y: readonly number[] }>>)
  const fits = Object.fromEntries(sets.map(([name, set]) => [name, fitPolynomial({ ...set, degree: 1 })]))
  const second = data['set2'] as { readonly x: readonly number[]; readonly y: readonly number[] }
  if (mandelTest(fits['set2']!, fitPolynomial({ ...second, degree: 2 })).probability > 1e-6) throw new Error('the second set is curved, and the test does not see it')
  return { ...Object.fromEntries(Object.entries(fits).map(([name, fit]) => [name, lineFigures(fit)])), set1_R_output: lineFigures(fits['set1']!) }
}

function line(data: Data): unknown {
  const [x, y] = [numbers(data['x']), numbers(data['y'])]
  const fit = fitPolynomial({ x, y, degree: 1 })
  const [intercept = 0, slope = 0] = fit.coefficients
  const bounds = (power: number): readonly [number, number] => {
    const { low, high } = coefficientInterval(fit, power, 0.95)
    return [low, high]
  }
  const half = (power: number): number => (bounds(power)[1] - bounds(power)[0]) / 2
  const t = studentQuantile(0.975, fit.df)
  const unknown = data['unknown_y'] === undefined ? [] : Array.isArray(data['unknown_y']) ? numbers(data['unknown_y']) : [Number(data['unknown_y'])]
  const read = unknown.map((response) => inversePredict(fit, response, { low: Math.min(...x) - 1, high: Math.max(...x) + 1 }))
  const x0 = read.map((each) => ('x' in each ? each.x : Number.NaN))
  const errors = unknown.map((response) => inversePredictionStandardError(fit, response, 1))
  const replicated = new Set(x).size < x.length ? lackOfFit(fit) : undefined
  return {
    ...lineFigures(fit), ci95_halfwidth_intercept: half(0), ci95_halfwidth_slope: half(1), ci95_intercept: bounds(0), ci95_slope: bounds(1), x0: Array.isArray(data['unknown_y']) ? x0 : x0[0], s_x0: errors, ci95_halfwidth_x0: errors.map((error) => t * error),
    s_x0_m1: errors[0], ...(unknown[0] === undefined ? {} : { s_x0_m4: inversePredictionStandardError(fit, unknown[0], 4) }),
    lod_y: intercept + 3 * fit.residualStandardDeviation, lod_x: (3 * fit.residualStandardDeviation) / slope,
    process_sd_sx0: fit.residualStandardDeviation / slope, process_cv_percent: (100 * fit.residualStandardDeviation) / slope / mean(x),
    ...(replicated === undefined ? {} : { F: replicated.F, df_lof: replicated.df1, df_pe: replicated.df2, ss_lack_of_fit: replicated.sumOfSquaresLackOfFit, ss_pure_error: replicated.sumOfSquaresPureError }),
  }
}

function weightedLine(data: Data): unknown {
  const [x, y, sd] = [numbers(data['x']), numbers(data['y']), numbers(data['sd_y'])]
  const raw = sd.map((each) => 1 / each ** 2)
  const weights = raw.map((each) => (each * raw.length) / raw.reduce((total, other) => total + other, 0))
  const figures = (fit: Fit): Readonly<Record<string, unknown>> => ({ ...lineFigures(fit), x0: numbers(data['unknown_y']).map((response) => {
    const found = inversePredict(fit, response, { low: 0, high: 10 })
    return 'x' in found ? found.x : Number.NaN
  }) })
  return { unweighted: figures(fitPolynomial({ x, y, degree: 1 })), weighted: { ...figures(fitPolynomial({ x, y, weights, degree: 1 })), weights } }
}

function describe(data: Data): unknown {
  const rule = /first value ([\d.]+), then ([\d.]+), ([\d.]+) repeated (\d+)/.exec(String(data['rule'] ?? ''))
  const values = rule === null ? numbers(data['values']) : [Number(rule[1]), ...Array.from({ length: Number(rule[4]) }, () => [Number(rule[2]), Number(rule[3])]).flat()]
  const { n, mean: centre, standardDeviation: sd } = summary(values)
  const half = (level: number): number => {
    const { low, high } = meanInterval(values, level)
    return (high - low) / 2
  }
  return { n, mean: centre, sd, ci95_halfwidth: half(0.95), ci99_halfwidth: half(0.99), ci95_halfwidth_z: (normalQuantile(0.975) * sd) / Math.sqrt(n) }
}

function ofGrubbsCritical(data: Data): unknown {
  const of = (alpha: number): readonly number[] => numbers(data['p']).map((n) => grubbsCritical(n, alpha))
  return { alpha_1pct: of(0.01), alpha_5pct: of(0.05) }
}

function ofGrubbs(data: Data): unknown {
  const values = numbers(data['values'])
  const test = grubbs(values)
  return { G: test.G, T: test.G, G_crit: test.critical05, mean: mean(values), sd: standardDeviation(values) }
}

function summaryVarianceRatio(data: Data): unknown {
  const [n, sd] = [numbers(data['n']), numbers(data['sd'])]
  // Two series with the stated sizes and spreads: the ratio sees nothing else.
  const series = (count: number, spread: number): readonly number[] => {
    const raw = Array.from({ length: count }, (_, index) => index)
    const factor = spread / standardDeviation(raw)
    return raw.map((value) => value * factor)
  }
  const test = varianceRatio(series(n[0] ?? 0, sd[0] ?? 0), series(n[1] ?? 0, sd[1] ?? 0))
  return { F: test.F, F_crit_one_sided: fisherQuantile(0.95, test.df1, test.df2) }
}

function nistRegression(data: Data): unknown {
  const y = numbers(data['y'])
  if (data['x_columns'] !== undefined) {
    const columns = data['x_columns'] as readonly (readonly number[])[]
    const centres = columns.map(mean)
    // Centred regressors, then the intercept is moved back: what fitPolynomial does for one regressor.
    const fit = leastSquares([y.map(() => 1), ...columns.map((column, k) => column.map((value) => value - (centres[k] ?? 0)))], y, ['intercept', ...columns.map((_, k) => `regressor ${k + 1}`)])
    const slopes = fit.coefficients.slice(1)
    const shift = [1, ...centres.map((centre) => -centre)]
    const variance = fit.residualSumOfSquares / fit.df
    const interceptVariance = variance * shift.reduce((total, a, k) => total + shift.reduce((inner, b, l) => inner + a * b * (fit.unscaledCovariance[k]?.[l] ?? 0), 0), 0)
    const figures = (values: readonly number[]): Readonly<Record<string, number>> => Object.fromEntries(values.map((value, k) => [`B${k}`, value]))
    return regressionFigures(y, fit.residualSumOfSquares, fit.df, columns.length, figures([(fit.coefficients[0] ?? 0) - slopes.reduce((total, slope, k) => total + slope * (centres[k] ?? 0), 0), ...slopes]),
      figures([Math.sqrt(interceptVariance), ...slopes.map((_, k) => Math.sqrt(variance * (fit.unscaledCovariance[k + 1]?.[k + 1] ?? 0)))]), mean(y))
  }
  const x = numbers(data['x'])
  const throughZero = data['through_zero'] === true
  const degree = Number(data['degree'])
  const fit = fitPolynomial({ x, y, degree, throughZero })
  const keep = (values: readonly number[]): Readonly<Record<string, number>> => Object.fromEntries(values.flatMap((value, k) => (throughZero && k === 0 ? [] : [[`B${k}`, value]])))
  return regressionFigures(y, fit.residualSumOfSquares, fit.df, fit.parameters - (throughZero ? 0 : 1), keep(fit.coefficients), keep(fit.standardErrors), throughZero ? 0 : mean(y), fit.rSquared)
}

function regressionFigures(y: readonly number[], residual: number, df: number, regressionDf: number, coefficients: unknown, coefficientSd: unknown, about: number, rSquared?: number): unknown {
  const total = y.reduce((sum, value) => sum + (value - about) ** 2, 0)
  const regression = total - residual
  return {
    coefficients, coefficient_sd: coefficientSd, residual_sd: Math.sqrt(residual / df), r_squared: rSquared ?? regression / total,
    anova: { regression: { df: regressionDf, ss: regression, ms: regression / regressionDf, F: residual === 0 ? Infinity : regression / regressionDf / (residual / df) }, residual: { df, ss: residual, ms: residual / df } },
  }
}

function currie(data: Data): unknown {
  const [alpha, beta] = [Number(data['alpha']), Number(data['beta'])]
  // Known standard deviation: as good as infinite degrees of freedom.
  return { LC_over_sigma0: currieCriticalValue(1, 1e9, alpha, 1), LD_over_sigma0: currieMinimumDetectable(1, 1e9, alpha, beta, 1) }
}

function din(data: Data): unknown {
  const [x, y] = [numbers(data['x']), numbers(data['y'])]
  const fit = fitPolynomial({ x, y, degree: 1 })
  const [intercept = 0, slope = 0] = fit.coefficients
  const decision = studentQuantile(0.99, fit.df) * inversePredictionStandardError(fit, intercept, 1)
  return {
    intercept, slope, decision_limit: decision, decision_limit_more_digits: decision, detection_limit: 2 * decision,
    ci99_halfwidth_at_y3500: studentQuantile(0.995, fit.df) * inversePredictionStandardError(fit, Number(data['unknown_y']), 1),
  }
}

function ofNested(data: Data): unknown {
  const found = nested(data['nested'] as readonly (readonly (readonly number[])[])[])
  const total = Math.sqrt(found.totalVariance)
  const { df } = satterthwaite(found.terms)
  const repeatability = standardDeviationInterval(Math.sqrt(found.residual.meanSquare), found.residual.df, 0.95)
  const within = standardDeviationInterval(total, df, 0.95)
  const stages = [found.outer, found.inner, found.residual]
  return {
    df: stages.map((stage) => stage.df), ss: stages.map((stage) => stage.sumOfSquares), ms: stages.map((stage) => stage.meanSquare), F_mid: found.inner.meanSquare / found.residual.meanSquare, F_top: found.outer.meanSquare / found.inner.meanSquare,
    var_error: found.residual.meanSquare, var_mid: found.inner.varianceRaw, var_run: found.inner.varianceRaw, var_top: found.outer.varianceRaw, var_day: found.outer.varianceRaw, coefficients: Object.values(found.coefficients), grand_mean: found.grandMean,
    s_repeatability: Math.sqrt(found.residual.meanSquare), s_within_lab: total, df_within_lab: df, ci95_s_repeatability: [repeatability.low, repeatability.high], ci95_s_within_lab: [within.low, within.high],
  }
}

function quantiles(data: Data): unknown {
  const rows = (key: string): readonly (readonly number[])[] => (data[key] ?? []) as readonly (readonly number[])[]
  return {
    chi2: data['p_df'] === undefined ? [] : rows('p_df').map(([p = 0, df = 1]) => chiSquareQuantile(p, df)), t: data['p_df'] === undefined ? [] : rows('p_df').map(([p = 0, df = 1]) => studentQuantile(p, df)),
    F: rows('p_df1_df2').map(([p = 0, df1 = 1, df2 = 1]) => fisherQuantile(p, df1, df2)),
    quantile: numbers(data['p'] ?? []).map(normalQuantile), cdf: numbers(data['z'] ?? []).map(normalCdf),
  }
}

function tost(data: Data): unknown {
  const [a, b] = [numbers(data['a']), numbers(data['b'])]
  const [alpha, margin] = [Number(data['alpha']), Number(data['margin'])]
  const figures = (test: DifferenceTest, limit: number): unknown => {
    const { interval, probability } = equivalence(test, { low: -limit, high: limit }, alpha)
    return { mean_diff: test.difference, se: test.standardError, df: test.df, ci90: [interval.low, interval.high], p_value: probability }
  }
  const [logA, logB] = [a.map(Math.log), b.map(Math.log)]
  return {
    welch: figures(welch(a, b, 0.9), margin), pooled: figures(pooledT(a, b, 0.9), margin), paired: figures(pairedT(a, b, 0.9), margin),
    log_paired_margin_ln1_25: figures(pairedT(logA, logB, 0.9), Math.log(1.25)), log_welch_margin_ln1_25: figures(welch(logA, logB, 0.9), Math.log(1.25)),
  }
}

function paired(data: Data): unknown {
  const differences = data['differences'] === undefined ? undefined : numbers(data['differences'])
  const [a, b] = differences === undefined ? [numbers(data['a']), numbers(data['b'])] : [differences, differences.map(() => 0)]
  const test = pairedT(a, b, 0.95)
  return { df: test.df, mean: test.difference, mean_diff: test.difference, se: test.standardError, sd_diff: test.standardError * Math.sqrt(a.length), t: test.t, t_crit_9df: studentQuantile(0.975, test.df) }
}

function twoSamples(data: Data): unknown {
  const [a, b] = [numbers(data['a']), numbers(data['b'])]
  const [pooled, unequal] = [pooledT(a, b, 0.95), welch(a, b, 0.95)]
  const ratio = varianceRatio(a, b)
  const isWelch = data['b'] !== undefined && a.length !== b.length
  return {
    mean: [mean(a), mean(b)], sd: [standardDeviation(a), standardDeviation(b)], variance: [standardDeviation(a) ** 2, standardDeviation(b) ** 2], t: isWelch ? unequal.t : pooled.t, t_welch: unequal.t, df: pooled.df, df_welch: unequal.df,
    df_integer: Math.round(unequal.df), pooled_sd: pooled.standardError / Math.sqrt(1 / a.length + 1 / b.length), ci95: [pooled.interval.low, pooled.interval.high], F: ratio.F, F_crit_one_sided: fisherQuantile(0.95, ratio.df1, ratio.df2),
    t_crit_10df: studentQuantile(0.975, 10), t_crit_5df: studentQuantile(0.975, 5), t_crit_one_sided_15: studentQuantile(0.95, 15),
  }
}
