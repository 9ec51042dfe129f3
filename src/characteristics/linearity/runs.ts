// Independent calibrations of different runs beside each other: a slope that moves from day to day is a precision of its own.
import { summary } from '../../statistics/describe.ts'
import type { LinearityDetail, StandardPoint } from './detail.ts'
import type { FitKind, WeightKind } from './options.ts'
import { weightedFit } from './weighted-fit.ts'

export function runsOf(points: readonly StandardPoint[], kind: FitKind, weights: WeightKind): Pick<LinearityDetail, 'runs' | 'runsLeftOut' | 'slopeRsdBetweenRuns'> {
  const runsLeftOut: { readonly run: string; readonly n: number; readonly because: string }[] = []
  const names = [...new Set(points.flatMap((point) => point.run ?? []))]
  const runs = names.flatMap((run) => {
    const own = points.filter((point) => point.run === run)
    const outcome = weightedFit(own.map((point) => ({ x: point.level, y: point.response })), kind, weights)
    if ('impossible' in outcome) {
      runsLeftOut.push({ run, n: own.length, because: outcome.impossible })
      return []
    }
    const [intercept = 0, slope = 0] = outcome.fit.coefficients
    return [{ run, n: own.length, slope, intercept, residualStandardDeviation: outcome.fit.residualStandardDeviation }]
  })
  const spread = runs.length < 2 ? undefined : summary(runs.map((each) => each.slope)).relativeStandardDeviation
  return { runs, runsLeftOut, ...(spread === undefined ? {} : { slopeRsdBetweenRuns: spread }) }
}

/** The combination of the run fields, in the order the study names them. */
export function runName(factors: Readonly<Record<string, string>>, fields: readonly string[]): string {
  return fields.map((field) => factors[field] ?? '').join(' ')
}
