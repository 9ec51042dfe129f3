// Results of one level, by run → components of variance, standard deviations and intervals. A negative component is kept as estimated and
// used as zero; without runs there is repeatability only.
import { mean, standardDeviation, standardDeviationInterval } from '../../statistics/describe.ts'
import { horwitzRatio, predictedReproducibility } from '../../statistics/horwitz.ts'
import { intermediateTerms, modifiedLargeSampleInterval, modifiedLargeSampleIntervalOf, nested, oneWay, satterthwaite, satterthwaiteInterval } from '../../statistics/variance-components.ts'
import type { ComponentLine, PrecisionLevel, RunLine, SpreadEstimate } from './detail.ts'

export interface LevelRequest {
  readonly level?: number | undefined
  readonly runs: readonly { readonly run: string; readonly outer?: string | undefined; readonly values: readonly number[] }[]
  readonly excluded: PrecisionLevel['excluded']
  readonly confidence: number
  readonly isNested: boolean
  readonly horwitzFactor?: number | undefined
}

/** Throws RangeError when the values do not allow any estimate. */
export function precisionLevel(request: LevelRequest): PrecisionLevel {
  const values = request.runs.flatMap((each) => each.values)
  const centre = mean(values)
  const runs = request.runs.map((each): RunLine => ({ run: each.run, values: each.values, mean: mean(each.values) }))
  const start = { ...(request.level === undefined ? {} : { level: request.level }), n: values.length, mean: centre, runs, excluded: request.excluded }
  const parts = request.runs.length < 2 ? alone(values, centre, request.confidence) : request.isNested ? nestedRuns(request, centre) : singleRuns(request, centre)
  return { ...start, ...parts, ...horwitz(request, parts) }
}

type Parts = Omit<PrecisionLevel, 'level' | 'n' | 'mean' | 'runs' | 'excluded' | 'horwitz'>

function spread(value: number, df: number, centre: number, interval: { readonly low: number; readonly high: number }): SpreadEstimate {
  return { value, df, low: interval.low, high: interval.high, ...(centre === 0 ? {} : { relative: (100 * value) / Math.abs(centre) }) }
}

function alone(values: readonly number[], centre: number, confidence: number): Parts {
  const value = standardDeviation(values)
  if (value === 0) throw new RangeError('the values do not scatter')
  return { repeatability: spread(value, values.length - 1, centre, standardDeviationInterval(value, values.length - 1, confidence)), components: [], anova: [], truncated: false }
}

function component(name: string, raw: number, total: number): ComponentLine {
  const variance = Math.max(0, raw)
  return { component: name, raw, variance, standardDeviation: Math.sqrt(variance), share: (100 * variance) / total }
}

function singleRuns(request: LevelRequest, centre: number): Parts {
  const anova = oneWay(request.runs.map((each) => each.values))
  const repeatability = Math.sqrt(anova.withinVariance)
  const terms = intermediateTerms(anova)
  const byApproximation = satterthwaiteInterval(terms, request.confidence)
  return {
    repeatability: spread(repeatability, anova.dfWithin, centre, standardDeviationInterval(repeatability, anova.dfWithin, request.confidence)),
    intermediate: {
      ...spread(Math.sqrt(anova.totalVariance), byApproximation.df, centre, modifiedLargeSampleInterval(anova, request.confidence)),
      satterthwaiteDf: byApproximation.df, satterthwaiteLow: byApproximation.low, satterthwaiteHigh: byApproximation.high,
      intervalMethod: anova.truncated ? 'chi-square of the within-run mean square' : 'modified large sample (Graybill-Wang)',
    },
    betweenRuns: Math.sqrt(anova.betweenVariance),
    components: [component('within runs', anova.withinVariance, anova.totalVariance), component('between runs', anova.betweenVarianceRaw, anova.totalVariance)],
    anova: [
      { source: 'between runs', df: anova.dfBetween, sumOfSquares: anova.sumOfSquaresBetween, meanSquare: anova.meanSquareBetween },
      { source: 'within runs', df: anova.dfWithin, sumOfSquares: anova.sumOfSquaresWithin, meanSquare: anova.meanSquareWithin },
    ],
    n0: anova.n0, truncated: anova.truncated,
  }
}

function nestedRuns(request: LevelRequest, centre: number): Parts {
  const outers = [...new Set(request.runs.map((each) => each.outer ?? ''))]
  const found = nested(outers.map((outer) => request.runs.filter((each) => each.outer === outer).map((each) => each.values)))
  const repeatability = Math.sqrt(found.residual.meanSquare)
  // After truncation the mean squares no longer add up to the total; degrees of freedom are those before truncation, and the interval is
  // the chi-square one with them.
  const { df } = satterthwaite(found.terms)
  const usable = !found.truncated && found.terms.every((term) => term.coefficient >= 0)
  const total = Math.sqrt(found.totalVariance)
  const approximate = standardDeviationInterval(total, df, request.confidence)
  const interval = usable ? modifiedLargeSampleIntervalOf(found.terms, request.confidence) : approximate
  return {
    repeatability: spread(repeatability, found.residual.df, centre, standardDeviationInterval(repeatability, found.residual.df, request.confidence)),
    intermediate: { ...spread(total, df, centre, interval), satterthwaiteDf: df, satterthwaiteLow: approximate.low, satterthwaiteHigh: approximate.high, intervalMethod: usable ? 'modified large sample (Graybill-Wang)' : 'chi-square with Satterthwaite degrees of freedom' },
    betweenRuns: Math.sqrt(found.inner.variance),
    components: [component('within runs', found.residual.varianceRaw, found.totalVariance), component('between inner groups', found.inner.varianceRaw, found.totalVariance), component('between outer groups', found.outer.varianceRaw, found.totalVariance)],
    anova: [
      { source: 'between outer groups', df: found.outer.df, sumOfSquares: found.outer.sumOfSquares, meanSquare: found.outer.meanSquare },
      { source: 'between inner groups', df: found.inner.df, sumOfSquares: found.inner.sumOfSquares, meanSquare: found.inner.meanSquare },
      { source: 'within runs', df: found.residual.df, sumOfSquares: found.residual.sumOfSquares, meanSquare: found.residual.meanSquare },
    ],
    truncated: found.truncated,
  }
}

function horwitz(request: LevelRequest, parts: Parts): Pick<PrecisionLevel, 'horwitz'> {
  const massFraction = request.horwitzFactor === undefined || request.level === undefined ? 0 : request.level * request.horwitzFactor
  if (!(massFraction > 0 && massFraction <= 1) || parts.repeatability.relative === undefined) return {}
  return { horwitz: {
    massFraction, predicted: predictedReproducibility(massFraction), ratioRepeatability: horwitzRatio(parts.repeatability.relative, massFraction),
    ...(parts.intermediate?.relative === undefined ? {} : { ratioIntermediate: horwitzRatio(parts.intermediate.relative, massFraction) }),
  } }
}
