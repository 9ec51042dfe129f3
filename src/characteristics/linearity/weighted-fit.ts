// Points + model + weights → fit, or why there is none. A weight that would be infinite is refused; nothing is added to make it finite.
import { standardDeviation } from '../../statistics/describe.ts'
import { type Fit, fitPolynomial, inversePredict } from '../../statistics/regression.ts'
import type { FitKind, WeightKind } from './options.ts'

export interface Point {
  readonly x: number
  readonly y: number
}

export type FitOutcome = { readonly fit: Fit } | { readonly impossible: string }

export function weightedFit(points: readonly Point[], kind: FitKind, weights: WeightKind): FitOutcome {
  const given = weightsOf(points, weights)
  if (typeof given === 'string') return { impossible: given }
  const request = { x: points.map((point) => point.x), y: points.map((point) => point.y), weights: given, degree: kind === 'quadratic' ? 2 : 1, throughZero: kind === 'through zero' }
  try {
    return { fit: fitPolynomial(request) }
  } catch (error) {
    if (error instanceof RangeError) return { impossible: error.message }
    throw error
  }
}

function weightsOf(points: readonly Point[], kind: WeightKind): readonly number[] | undefined | string {
  switch (kind) {
    case 'none': return undefined
    case '1/x': case '1/x^2':
      if (points.some((point) => point.x <= 0)) return 'a level of zero has no such weight; leave the zero standard out of this dataset, or choose other weights'
      return points.map((point) => (kind === '1/x' ? 1 / point.x : 1 / point.x ** 2))
    case '1/y': case '1/y^2':
      if (points.some((point) => point.y <= 0)) return 'a response of zero or below has no such weight'
      return points.map((point) => (kind === '1/y' ? 1 / point.y : 1 / point.y ** 2))
    case '1/s^2': {
      const spreads = new Map<number, number>()
      for (const level of new Set(points.map((point) => point.x))) {
        const values = points.filter((point) => point.x === level).map((point) => point.y)
        const spread = values.length < 2 ? 0 : standardDeviation(values)
        if (spread === 0) return 'a level without scattering replicates has no such weight'
        spreads.set(level, spread)
      }
      return points.map((point) => 1 / (spreads.get(point.x) ?? 1) ** 2)
    }
  }
}

/** Level read back from a response, up to one range width outside the levels and never past a turning point; undefined without a root. */
export function backCalculated(fit: Fit, response: number): number | undefined {
  const [low, high] = [Math.min(...fit.x), Math.max(...fit.x)]
  const [, slope = 0, curvature = 0] = fit.coefficients
  const turning = curvature === 0 ? undefined : -slope / (2 * curvature)
  const width = high - low || Math.abs(high) || 1
  const range = {
    low: turning !== undefined && turning < low ? Math.max(turning, low - width) : low - width,
    high: turning !== undefined && turning > high ? Math.min(turning, high + width) : high + width,
  }
  const found = inversePredict(fit, response, range)
  return 'x' in found ? found.x : undefined
}

/** Errors in percent of the level, for standards above zero that can be read back. */
export function backCalculationErrors(fit: Fit): readonly { readonly level: number; readonly error: number }[] {
  return fit.x.flatMap((level, index) => {
    const found = level === 0 ? undefined : backCalculated(fit, fit.y[index] ?? 0)
    return found === undefined ? [] : [{ level, error: (100 * (found - level)) / level }]
  })
}

/** Relative standard error in percent over every standard: √(Σ error² / (n − p)). Source: relative standard error of a calibration, US EPA method 8000D, section 11.5. */
export function relativeStandardError(fit: Fit): number | undefined {
  const errors = backCalculationErrors(fit)
  const df = errors.length - fit.parameters
  return df < 1 ? undefined : Math.sqrt(errors.reduce((total, each) => total + each.error ** 2, 0) / df)
}
