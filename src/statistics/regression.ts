// Polynomial fits y(x), weighted or not, through zero or not, with what follows from them: intervals, bands, inverse prediction.
// x is centred and scaled before the orthogonal fit, then coefficients go back to powers of x. R² of a fit through zero is uncentred.
import { type Interval, squarable, sum } from './describe.ts'
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
  /** The fit in powers of (x − centre)/scale, the form in which it was solved and in which predictions lose no digits. */
  readonly centred: CentredFit
}

export interface CentredFit {
  readonly centre: number
  readonly scale: number
  readonly powers: readonly number[]
  readonly coefficients: readonly number[]
  readonly covariance: readonly (readonly number[])[]
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
 * Least-squares polynomial. Throws when there are no more values than coefficients, the levels do not determine them, or a figure of
 * the fit leaves the range of numbers.
 * Source: Draper & Smith, Applied Regression Analysis, 3rd ed., chapters 1, 5 and 9 (weights).
 */
export function fitPolynomial({ x, y, weights, degree, throughZero = false }: FitRequest): Fit {
  if (x.length !== y.length) throw new RangeError('a fit needs as many responses as levels')
  if (weights !== undefined && weights.length !== x.length) throw new RangeError('a fit needs as many weights as levels')
  squarable(x)
  squarable(y)
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
  const centred = solved.unscaledCovariance.map((line) => line.map((value) => variance * value))
  const covariance = back.map((left) => back.map((right) => sum(left.flatMap((a, k) => right.map((b, l) => a * b * (centred[k]?.[l] ?? 0))))))
  // A variance that became zero or infinite on the way is no variance.
  if (![...coefficients, ...covariance.flat()].every(Number.isFinite) || (variance > 0 && covariance.slice(from).some((line, k) => !((line[k + from] ?? 0) > 0)))) throw new RangeError('the values are too large or too small for this fit')
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
    sumOfWeights, meanX, sumOfSquaresX, centred: { centre, scale, powers, coefficients: solved.coefficients, covariance: centred },
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
export function predict(fit: Pick<Fit, 'centred'>, x: number): { readonly value: number; readonly standardError: number } {
  const { centre, scale, powers, coefficients, covariance } = fit.centred
  const at = powers.map((power) => ((x - centre) / scale) ** power)
  const value = sum(at.map((term, k) => term * (coefficients[k] ?? 0)))
  const variance = sum(at.flatMap((left, k) => at.map((right, l) => left * right * (covariance[k]?.[l] ?? 0))))
  return { value, standardError: Math.sqrt(Math.max(0, variance)) }
}

/** Interval of the mean response at x: fitted ± t·its standard error. Source: Draper & Smith, 3rd ed., section 3.1. */
export function confidenceBand(fit: Fit, x: number, level: number): Interval {
  const { value, standardError } = predict(fit, x)
  const half = studentQuantile((1 + level) / 2, fit.df) * standardError
  return { low: value - half, high: value + half, level }
}

/** Interval of one further response at x; `weightAtX` is its weight in a weighted fit. Throws on a weight that is not above zero. Source: as above. */
export function predictionInterval(fit: Fit, x: number, level: number, weightAtX = 1): Interval {
  if (!(weightAtX > 0)) throw new RangeError('a weight must be positive and finite')
  const { value, standardError } = predict(fit, x)
  const half = studentQuantile((1 + level) / 2, fit.df) * Math.hypot(standardError, fit.residualStandardDeviation / Math.sqrt(weightAtX))
  return { low: value - half, high: value + half, level }
}

/** Interval of a coefficient by its power: ± t·its standard error. Throws on a power that was not fitted. Source: Draper & Smith, 3rd ed., section 1.4. */
export function coefficientInterval(fit: Fit, power: number, level: number): Interval {
  const [value, error] = [fit.coefficients[power], fit.standardErrors[power]]
  if (value === undefined || error === undefined || (power === 0 && fit.throughZero)) throw new RangeError('the fit has no coefficient of this power')
  const half = studentQuantile((1 + level) / 2, fit.df) * error
  return { low: value - half, high: value + half, level }
}

export type InversePrediction = { readonly x: number } | { readonly outside: 'below' | 'above' | 'no root' }

/**
 * The x within the range whose fitted response is y; a parabola takes the root inside the range. `below` and `above` tell on which side of
 * the range x would lie. Two roots inside give `no root`: which one is meant cannot be known. Throws above degree 2.
 */
export function inversePredict(fit: Pick<Fit, 'coefficients'>, y: number, range: { readonly low: number; readonly high: number }): InversePrediction {
  if (fit.coefficients.length > 3) throw new RangeError('inverse prediction needs a line or a parabola')
  const [a = 0, b = 0, c = 0] = fit.coefficients
  const slack = (range.high - range.low) * 1e-12
  const inside = rootsOf(a - y, b, c).filter((x) => x >= range.low - slack && x <= range.high + slack)
  const [first, second] = inside
  if (first !== undefined && second !== undefined && Math.abs(first - second) > slack) return { outside: 'no root' }
  if (first !== undefined) return { x: Math.min(range.high, Math.max(range.low, first)) }
  const at = (x: number): number => a + b * x + c * x * x
  const [low, high] = [at(range.low), at(range.high)]
  if (low === high) return { outside: 'no root' }
  if (high > low ? y < low : y > low) return { outside: 'below' }
  return { outside: (high > low ? y > high : y < high) ? 'above' : 'no root' }
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
 * Standard error of x read on a straight line from the mean of `replicates` responses y0, to first order; `weightAtX` is the weight of
 * one response at that level, and infinitely many replicates leave the error of the line alone. Throws on other fits and without slope.
 * Source: Miller & Miller, Statistics and Chemometrics for Analytical Chemistry, sections 5.6 and 5.10 (weighted).
 */
export function inversePredictionStandardError(fit: Fit, y0: number, replicates: number, weightAtX = 1): number {
  const [a = 0, b = 0] = lineOf(fit)
  if (!(replicates > 0 && weightAtX > 0)) throw new RangeError('inverse prediction needs replicates and a weight above zero')
  const x0 = (y0 - a) / b
  const lever = fit.throughZero ? x0 ** 2 / sum(fit.x.map((x, i) => (fit.weights[i] ?? 1) * x * x)) : 1 / fit.sumOfWeights + (x0 - fit.meanX) ** 2 / fit.sumOfSquaresX
  return (fit.residualStandardDeviation / Math.abs(b)) * Math.sqrt(1 / (replicates * weightAtX) + lever)
}

/**
 * Fieller's interval of x read from the mean of `replicates` responses y0 on a line with intercept. Throws on other fits, and when the
 * slope is not significant: the interval is then unbounded. Source: Draper & Smith, 3rd ed., section 3.2.
 */
export function fiellerInterval(fit: Fit, y0: number, replicates: number, level: number, weightAtX = 1): Interval {
  const [a = 0, b = 0] = lineOf(fit)
  if (fit.throughZero) throw new RangeError('this interval needs a line with intercept')
  if (!(replicates > 0 && weightAtX > 0)) throw new RangeError('inverse prediction needs replicates and a weight above zero')
  const t = studentQuantile((1 + level) / 2, fit.df)
  const s = fit.residualStandardDeviation
  const g = (t * s) ** 2 / (b * b * fit.sumOfSquaresX)
  if (!(g < 1)) throw new RangeError('the slope is not significant, so the interval has no bounds')
  const distance = (y0 - a) / b - fit.meanX
  const half = ((t * s) / Math.abs(b)) * Math.sqrt((1 - g) * (1 / (replicates * weightAtX) + 1 / fit.sumOfWeights) + distance ** 2 / fit.sumOfSquaresX)
  const centre = fit.meanX + distance / (1 - g)
  return { low: centre - half / (1 - g), high: centre + half / (1 - g), level }
}

function lineOf(fit: Fit): readonly number[] {
  if (fit.degree !== 1) throw new RangeError('this needs a straight line')
  if (fit.coefficients[1] === 0) throw new RangeError('inverse prediction needs a slope other than zero')
  return fit.coefficients
}
