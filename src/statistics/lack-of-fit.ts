// Does the model follow the data? Lack of fit against true replicates, and Mandel's comparison of a line with a parabola.
// Repeated injections of one preparation are no true replicates; a small probability may still be a trivial deviation.
import { sum } from './describe.ts'
import { fisherUpperTail } from './distributions.ts'
import type { Fit } from './regression.ts'

export interface VarianceTest {
  readonly F: number
  readonly df1: number
  readonly df2: number
  /** Upper tail. */
  readonly probability: number
}

/** F of lack of fit over pure error. Source: Draper & Smith, Applied Regression Analysis, 3rd ed., section 2.1. Throws without replicates or without more levels than coefficients. */
export function lackOfFit(fit: Fit): VarianceTest & { readonly sumOfSquaresPureError: number; readonly sumOfSquaresLackOfFit: number } {
  const levels = new Map<number, { readonly y: number; readonly w: number }[]>()
  fit.x.forEach((x, i) => {
    const point = { y: fit.y[i] ?? 0, w: fit.weights[i] ?? 1 }
    const group = levels.get(x)
    if (group === undefined) levels.set(x, [point])
    else group.push(point)
  })
  const df2 = fit.n - levels.size
  const df1 = levels.size - fit.parameters
  if (df2 < 1) throw new RangeError('lack of fit needs true replicates at a level')
  if (df1 < 1) throw new RangeError('lack of fit needs more levels than coefficients')
  const pure = sum([...levels.values()].map((group) => {
    const first = group[0]?.y ?? 0
    const centre = first + sum(group.map((point) => point.w * (point.y - first))) / sum(group.map((point) => point.w))
    return sum(group.map((point) => point.w * (point.y - centre) ** 2))
  }))
  const lack = Math.max(0, fit.residualSumOfSquares - pure)
  if (!(pure > 0)) throw new RangeError('the replicates do not scatter, so lack of fit has no yardstick')
  const F = lack / df1 / (pure / df2)
  return { F, df1, df2, probability: fisherUpperTail(F, df1, df2), sumOfSquaresPureError: pure, sumOfSquaresLackOfFit: lack }
}

/** Mandel's test: how much a parabola improves on a line. Throws when the parabola leaves no residual or the fits are no such pair. Source: ISO 8466-1:2021, clause 6. */
export function mandelTest(line: Fit, parabola: Fit): VarianceTest {
  if (line.degree !== 1 || parabola.degree !== 2 || line.df !== parabola.df + 1) throw new RangeError('the comparison needs a line and a parabola through the same values')
  const df2 = parabola.df
  if (!(parabola.residualSumOfSquares > 0)) throw new RangeError('the parabola leaves no residual, so there is no yardstick')
  const F = Math.max(0, line.residualSumOfSquares - parabola.residualSumOfSquares) / (parabola.residualSumOfSquares / df2)
  return { F, df1: 1, df2, probability: fisherUpperTail(F, 1, df2) }
}
