// How the cases made in other software (a generate.py beside each) are computed by the program. Names only, as in its neighbours.
import { alternatingBlocks, type Block } from '../../src/statistics/alternating-blocks.ts'
import { chiSquareQuantile, fisherQuantile, fisherUpperTail, normalQuantile, studentQuantile } from '../../src/statistics/distributions.ts'
import { noncentralStudentCdf, noncentralStudentDelta } from '../../src/statistics/noncentral-student.ts'
import { fiellerInterval, fitPolynomial, predict } from '../../src/statistics/regression.ts'

type Data = Readonly<Record<string, unknown>>
const numbers = (value: unknown): readonly number[] => value as readonly number[]
const rows = (value: unknown): readonly (readonly [number, number, number])[] => value as readonly (readonly [number, number, number])[]

export const certifiedReferences: Readonly<Record<string, (data: Data) => unknown>> = {
  'noncentral-student': (data) => ({
    cdf: rows(data['t_df_delta']).map(([t, df, delta]) => noncentralStudentCdf(t, df, delta)), delta: rows(data['alpha_beta_df']).map(([alpha, beta, df]) => noncentralStudentDelta(df, alpha, beta)),
  }),
  distributions: (data) => ({
    t: rows(data['t']).map(([p, df]) => studentQuantile(p, df)), F: rows(data['F']).map(([p, df1, df2]) => fisherQuantile(p, df1, df2)), chi2: rows(data['chi2']).map(([p, df]) => chiSquareQuantile(p, df)),
    z: numbers(data['z']).map(normalQuantile), F_above: rows(data['F_above']).map(([f, df1, df2]) => fisherUpperTail(f, df1, df2)),
  }),
  'weighted-polynomials': weightedPolynomials, 'alternating-blocks': blocks, fieller,
}

function weightedPolynomials(data: Data): unknown {
  const figures = (degree: number): unknown => {
    const fit = fitPolynomial({ x: numbers(data['x']), y: numbers(data['y']), weights: numbers(data['weights']), degree })
    const at = predict(fit, Number(data['at']))
    return { coefficients: fit.coefficients, standard_errors: fit.standardErrors, s_residual: fit.residualStandardDeviation, r_squared: fit.rSquared, fitted: at.value, fitted_error: at.standardError }
  }
  return { line: figures(1), parabola: figures(2) }
}

function blocks(data: Data): unknown {
  return Object.fromEntries(Object.entries(data).map(([name, each]) => {
    const { condition, order, mean } = each as Readonly<Record<'condition' | 'order' | 'mean', readonly number[]>>
    const found = alternatingBlocks(condition.map((c, k): Block => ({ condition: c, order: order[k] ?? 0, mean: mean[k] ?? 0 })), 0.95)
    return [name, {
      df: found.df, drift: found.drift, drift_error: found.driftStandardError,
      effects: found.effects.map((effect) => ({ difference: effect.difference, error: effect.standardError, t: effect.t, p: effect.probability, ci95: [effect.interval.low, effect.interval.high] })),
    }]
  }))
}

function fieller(data: Data): unknown {
  const [x, y, weights] = [numbers(data['x']), numbers(data['y']), numbers(data['weights'])]
  const [y0, replicates, weight] = [Number(data['y0']), Number(data['replicates']), Number(data['weight'])]
  const plain = fiellerInterval(fitPolynomial({ x, y, degree: 1 }), y0, replicates, 0.95)
  const weighted = fiellerInterval(fitPolynomial({ x, y, weights, degree: 1 }), y0, replicates, 0.95, weight)
  return { plain: [plain.low, plain.high], weighted: [weighted.low, weighted.high] }
}
