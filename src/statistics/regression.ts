// Polynomial fits y(x), weighted or not, through zero or not, with what follows from them: intervals, bands, inverse prediction.
// x is centred and scaled before the orthogonal fit, then coefficients go back to powers of x. R² of a fit through zero is uncentred.
import { type Interval, sum } from './describe.ts'
import { studentQuantile } from './distributions.ts'
import { leastSquares } from './least-squares.ts'

export interface Fit {
  readonly degree: number
  readonly throughZero: boolean
  /** By ascending power of x; the first is the intercept, 0 when through zero. */
  readonly coefficients: readonly number[]
  readonly standardErrors: readonly number[]
  readonly covariance: readonly (readonly number[])[]
  readonly n: number
  /** Number of fitted coefficients. */
  readonly parameters: number
  readonly df: number
  readonly x: readonly number[]
  readonly y: readonly number[]
  readonly weights: readonly number[]
  readonly fitted: readonly number[]
  /** y − fitted, unweighted. */
  readonly residuals: readonly number[]
  /** Σ w·residual² */
  readonly residualSumOfSquares: number
  /** √(Σ w·residual² / df); its unit is that of y only when the weights are 1. */
  readonly residualStandardDeviation: number
  /** 1 − Σ w·residual² / Σ w·(y − ȳw)²; about zero instead of ȳw when through zero. Undefined when y does not vary. */
  readonly rSquared: number | undefined
  /** (Weighted) correlation of x and y; straight lines with intercept only. */
  readonly correlation: number | undefined
  readonly sumOfWeights: number
  /** Weighted mean of x and Σ w·(x − x̄w)². */
  readonly meanX: number
  readonly sumOfSquaresX: number
}

export interface FitRequest {
  readonly x: readonly number[]
  readonly y: readonly number[]
  readonly weights?: readonly number[] | undefined
  readonly degree: number
  readonly throughZero?: boolean | undefined
}

const powerNames = ['intercept', 'slope', 'curvature']

/**
 * Least-squares polynomial. Throws when there are no more values than coefficients, or the levels do not determine them.
 * Source: Draper & Smith, Applied Regression Analysis, 3rd ed., chapters 1, 5 and 9 (weights).
 */
export function fitPolynomial({ x, y, weights, degree, throughZero = false }: FitRequest): Fit {
  if (x.length !== y.length) throw new RangeError('a fit needs as many responses as levels')
  const w = weights ?? x.map(() => 1)
  const sumOfWeights = sum(w)
  const first = x[0] ?? 0
  const meanX = first + sum(x.map((value, i) => (w[i] ?? 1) * (value - first))) / sumOfWeights
  const centre = throughZero ? 0 : meanX
  const scale = Math.max(...x.map((value) => Math.abs(value - centre))) || 1
  const from = throughZero ? 1 : 0
  const powers = Array.from({ length: degree + 1 - from }, (_, k) => k + from)
  const solved = leastSquares(powers.map((power) => x.map((value) => ((value - centre) / scale) ** power)), y, powers.map((power) => powerNames[power] ?? `coefficient of x^${power}`), weights)
  const variance = solved.residualSumOfSquares / solved.df
  const back = powersOfX(powers, degree, centre, scale)
  const coefficients = back.map((line) => sum(line.map((value, k) => value * (solved.coefficients[k] ?? 0))))
  const covariance = back.map((left) => back.map((right) => variance * sum(left.flatMap((a, k) => right.map((b, l) => a * b * (solved.unscaledCovariance[k]?.[l] ?? 0))))))
  const meanY = (y[0] ?? 0) + sum(y.map((value, i) => (w[i] ?? 1) * (value - (y[0] ?? 0)))) / sumOfWeights
  const about = throughZero ? 0 : meanY
  const total = sum(y.map((value, i) => (w[i] ?? 1) * (value - about) ** 2))
  const sumOfSquaresX = sum(x.map((value, i) => (w[i] ?? 1) * (value - meanX) ** 2))
  const rSquared = total > 0 ? 1 - solved.residualSumOfSquares / total : undefined
  return {
    degree, throughZero, coefficients, covariance, standardErrors: covariance.map((line, k) => Math.sqrt(Math.max(0, line[k] ?? 0))),
    n: x.length, parameters: powers.length, df: solved.df, x, y, weights: w, fitted: solved.fitted, residuals: solved.residuals,
    residualSumOfSquares: solved.residualSumOfSquares, residualStandardDeviation: Math.sqrt(variance), rSquared,
    correlation: degree === 1 && !throughZero && rSquared !== undefined ? Math.sign(coefficients[1] ?? 0) * Math.sqrt(Math.max(0, rSquared)) : undefined,
    sumOfWeights, meanX, sumOfSquaresX,
  }
}

/** Rows: power of x; columns: fitted power of (x − centre)/scale. */
function powersOfX(powers: readonly number[], degree: number, centre: number, scale: number): readonly (readonly number[])[] {
  return Array.from({ length: degree + 1 }, (_, target) => powers.map((power) => (target > power ? 0 : (binomial(power, target) * (-centre) ** (power - target)) / scale ** power)))
}

function binomial(n: number, k: number): number {
  let product = 1
  for (let i = 1; i <= k; i += 1) product = (product * (n - k + i)) / i
  return product
}

/** Fitted response at x and its standard error. */
export function predict(fit: Fit, x: number): { readonly value: number; readonly standardError: number } {
  const powers = fit.coefficients.map((_, power) => x ** power)
  const value = sum(powers.map((power, k) => power * (fit.coefficients[k] ?? 0)))
  const variance = sum(powers.flatMap((left, k) => powers.map((right, l) => left * right * (fit.covariance[k]?.[l] ?? 0))))
  return { value, standardError: Math.sqrt(Math.max(0, variance)) }
}

/** Interval of the mean response at x (Student, df of the fit). */
export function confidenceBand(fit: Fit, x: number, level: number): Interval {
  const { value, standardError } = predict(fit, x)
  const half = studentQuantile((1 + level) / 2, fit.df) * standardError
  return { low: value - half, high: value + half, level }
}

/** Interval of one further response at x; `weightAtX` is its weight in a weighted fit. */
export function predictionInterval(fit: Fit, x: number, level: number, weightAtX = 1): Interval {
  const { value, standardError } = predict(fit, x)
  const half = studentQuantile((1 + level) / 2, fit.df) * Math.hypot(standardError, fit.residualStandardDeviation / Math.sqrt(weightAtX))
  return { low: value - half, high: value + half, level }
}

/** Interval of a coefficient by its power (Student, df of the fit). */
export function coefficientInterval(fit: Fit, power: number, level: number): Interval {
  const value = fit.coefficients[power] ?? 0
  const half = studentQuantile((1 + level) / 2, fit.df) * (fit.standardErrors[power] ?? 0)
  return { low: value - half, high: value + half, level }
}

export type InversePrediction = { readonly x: number } | { readonly outside: 'below' | 'above' | 'no root' }

/** The x within the range whose fitted response is y; a quadratic takes the root inside the range. Degrees 1 and 2. */
export function inversePredict(fit: Pick<Fit, 'coefficients'>, y: number, range: { readonly low: number; readonly high: number }): InversePrediction {
  const [a = 0, b = 0, c = 0] = fit.coefficients
  const slack = (range.high - range.low) * 1e-12
  const inside = rootsOf(a - y, b, c).filter((x) => x >= range.low - slack && x <= range.high + slack)
  if (inside[0] !== undefined) return { x: Math.min(range.high, Math.max(range.low, inside[0])) }
  const at = (x: number): number => a + b * x + c * x * x
  const [low, high] = [at(range.low), at(range.high)]
  if ((high > low ? y < low : y > low) && rootsOf(a - y, b, c).length > 0) return { outside: 'below' }
  if (high > low ? y > high : y < high) return { outside: 'above' }
  return { outside: high === low ? 'no root' : (high > low ? y < low : y > low) ? 'below' : 'no root' }
}

/** Real roots of a + bx + cx², by the form that does not cancel. */
function rootsOf(a: number, b: number, c: number): readonly number[] {
  if (c === 0) return b === 0 ? [] : [-a / b]
  const discriminant = b * b - 4 * a * c
  if (discriminant < 0) return []
  const q = -0.5 * (b + (b < 0 ? -1 : 1) * Math.sqrt(discriminant))
  return q === 0 ? [0] : [q / c, a / q]
}

/**
 * Standard error of x read from the mean of `replicates` responses y0, straight line (first-order; Miller & Miller, section 5.6;
 * weighted: section 5.10). `weightAtX` is the weight of one response at that level.
 */
export function inversePredictionStandardError(fit: Fit, y0: number, replicates: number, weightAtX = 1): number {
  const [a = 0, b = 0] = fit.coefficients
  if (b === 0) throw new RangeError('inverse prediction needs a slope other than zero')
  const x0 = (y0 - a) / b
  const lever = fit.throughZero ? x0 ** 2 / sum(fit.x.map((x, i) => (fit.weights[i] ?? 1) * x * x)) : 1 / fit.sumOfWeights + (x0 - fit.meanX) ** 2 / fit.sumOfSquaresX
  return (fit.residualStandardDeviation / Math.abs(b)) * Math.sqrt(1 / (replicates * weightAtX) + lever)
}

/** Fieller's interval of x read from y0 (Draper & Smith, section 3.2). Throws when the slope is not significant: the interval is then unbounded. */
export function fiellerInterval(fit: Fit, y0: number, replicates: number, level: number): Interval {
  const [a = 0, b = 0] = fit.coefficients
  const t = studentQuantile((1 + level) / 2, fit.df)
  const s = fit.residualStandardDeviation
  const g = (t * s) ** 2 / (b * b * fit.sumOfSquaresX)
  if (!(g < 1)) throw new RangeError('the slope is not significant, so the interval has no bounds')
  const distance = (y0 - a) / b - fit.meanX
  const half = ((t * s) / Math.abs(b)) * Math.sqrt((1 - g) * (1 / replicates + 1 / fit.sumOfWeights) + distance ** 2 / fit.sumOfSquaresX)
  const centre = fit.meanX + distance / (1 - g)
  return { low: centre - half / (1 - g), high: centre + half / (1 - g), level }
}
