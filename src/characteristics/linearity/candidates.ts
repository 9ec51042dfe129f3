// The same model under each usual weighting, side by side: a choice of weights is shown, not only named.
import type { Fit } from '../../statistics/regression.ts'
import type { WeightCandidate } from './detail.ts'
import type { FitKind, WeightKind } from './options.ts'
import { backCalculationErrors, relativeStandardError, weightedFit } from './weighted-fit.ts'

export function weightCandidates(fit: Fit, kind: FitKind, chosen: WeightKind): readonly WeightCandidate[] {
  const points = fit.x.map((x, index) => ({ x, y: fit.y[index] ?? 0 }))
  const kinds: readonly WeightKind[] = [...new Set<WeightKind>(['none', '1/x', '1/x^2', chosen])]
  return kinds.map((weights): WeightCandidate => {
    const outcome = weights === chosen ? { fit } : weightedFit(points, kind, weights)
    if ('impossible' in outcome) return { weights, chosen: false, impossible: outcome.impossible }
    const errors = backCalculationErrors(outcome.fit)
    const lowest = Math.min(...errors.map((each) => each.level))
    const atLowest = errors.filter((each) => each.level === lowest)
    const rse = relativeStandardError(outcome.fit)
    return {
      weights, chosen: weights === chosen,
      ...(errors.length === 0 ? {} : {
        sumOfErrors: errors.reduce((total, each) => total + Math.abs(each.error), 0), largestError: Math.max(...errors.map((each) => Math.abs(each.error))),
        lowestLevelError: atLowest.reduce((total, each) => total + each.error, 0) / atLowest.length,
      }),
      ...(rse === undefined ? {} : { relativeStandardError: rse }),
    }
  })
}
