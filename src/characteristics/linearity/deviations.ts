// Ways in which the data may leave the model: lack of fit, curvature, intercept, and where a straight line ends. Each comes with the
// size of the effect, since a small probability may be a trivial deviation and a large one may be noise.
import { lackOfFit, mandelTest } from '../../statistics/lack-of-fit.ts'
import { mean } from '../../statistics/describe.ts'
import { coefficientInterval, type Fit, predict } from '../../statistics/regression.ts'
import type { LinearityDetail } from './detail.ts'
import type { LinearityOptions, WeightKind } from './options.ts'
import { type Point, weightedFit } from './weighted-fit.ts'

const fewestLevels = 4 // a parabola through three levels leaves nothing to test

export function lackOfFitOf(fit: Fit): Pick<LinearityDetail, 'lackOfFit' | 'lackOfFitAbsent'> {
  try {
    const { F, df1, df2, probability } = lackOfFit(fit)
    const deviations = levelsOf(fit).flatMap(({ x, responses }) => {
      const expected = predict(fit, x).value
      return expected === 0 ? [] : [(100 * (mean(responses) - expected)) / expected]
    })
    const largest = deviations.length === 0 ? undefined : deviations.reduce((worst, each) => (Math.abs(each) > Math.abs(worst) ? each : worst))
    return { lackOfFit: { F, df1, df2, probability, ...(largest === undefined ? {} : { largestDeviation: largest }) } }
  } catch (error) {
    if (error instanceof RangeError) return { lackOfFitAbsent: error.message }
    throw error
  }
}

function levelsOf(fit: Fit): readonly { readonly x: number; readonly responses: readonly number[] }[] {
  return [...new Set(fit.x)].map((x) => ({ x, responses: fit.y.filter((_, index) => fit.x[index] === x) }))
}

export function mandelOf(fit: Fit, options: LinearityOptions): Pick<LinearityDetail, 'mandel' | 'mandelAbsent'> {
  if (options.fit !== 'straight line') return { mandelAbsent: 'the comparison with a parabola is made for a straight line with intercept' }
  return mandelFor(pointsOf(fit), options.weights)
}

function mandelFor(points: readonly Point[], weights: WeightKind): Pick<LinearityDetail, 'mandel' | 'mandelAbsent'> {
  if (new Set(points.map((point) => point.x)).size < fewestLevels) return { mandelAbsent: `fewer than ${fewestLevels} levels` }
  const [line, parabola] = [weightedFit(points, 'straight line', weights), weightedFit(points, 'quadratic', weights)]
  if ('impossible' in line) return { mandelAbsent: line.impossible }
  if ('impossible' in parabola) return { mandelAbsent: parabola.impossible }
  if (isExact(parabola.fit)) return { mandelAbsent: 'the responses lie on a parabola exactly, so no scatter is left to test against' }
  try {
    return { mandel: { ...mandelTest(line.fit, parabola.fit), curvature: parabola.fit.coefficients[2] ?? 0 } }
  } catch (error) {
    if (error instanceof RangeError) return { mandelAbsent: error.message }
    throw error
  }
}

/** Residuals of a fit that are nothing but the binary noise of the computation: an F of them would be a number without meaning. */
function isExact(fit: Fit): boolean {
  const size = fit.y.reduce((total, y, index) => total + (fit.weights[index] ?? 1) * y ** 2, 0)
  return fit.residualSumOfSquares <= 1e-22 * size
}

function pointsOf(fit: Fit): readonly Point[] {
  return fit.x.map((x, index) => ({ x, y: fit.y[index] ?? 0 }))
}

/** Intercept in percent of the fitted response at the full-response level; beyond the standards the fit says nothing. */
export function interceptRelative(fit: Fit, level: number, confidence: number): Pick<LinearityDetail, 'interceptRelative'> {
  const full = predict(fit, level).value
  if (fit.throughZero || full === 0 || level < Math.min(...fit.x) || level > Math.max(...fit.x)) return {}
  const { low, high } = coefficientInterval(fit, 0, confidence)
  const [one, other] = [(100 * low) / full, (100 * high) / full]
  return { interceptRelative: { level, value: (100 * (fit.coefficients[0] ?? 0)) / full, low: Math.min(one, other), high: Math.max(one, other) } }
}

/** Highest level up to which Mandel's test sees no curvature at `alpha`; levels are dropped from the top, never fewer than four are tested. */
export function straightTo(fit: Fit, weights: WeightKind, alpha: number): Pick<LinearityDetail, 'straightTo'> {
  if (fit.degree !== 1 || fit.throughZero) return {}
  const levels = [...new Set(fit.x)].sort((left, right) => left - right)
  const highest = levels.at(-1) ?? 0
  for (let count = levels.length; count >= fewestLevels; count -= 1) {
    const top = levels[count - 1] ?? 0
    const { mandel } = mandelFor(pointsOf(fit).filter((point) => point.x <= top), weights)
    if (mandel !== undefined && mandel.probability >= alpha) return { straightTo: { level: top, highest, probability: mandel.probability } }
  }
  return {}
}

/** Slope between the two highest levels in percent of the fitted slope there: well below 100 at saturation. */
export function topSensitivity(fit: Fit): Pick<LinearityDetail, 'topSensitivity'> {
  const [second, top] = [...levelsOf(fit)].sort((left, right) => left.x - right.x).slice(-2)
  if (second === undefined || top === undefined) return {}
  const fitted = predict(fit, top.x).value - predict(fit, second.x).value
  return fitted === 0 ? {} : { topSensitivity: (100 * (mean(top.responses) - mean(second.responses))) / fitted }
}
