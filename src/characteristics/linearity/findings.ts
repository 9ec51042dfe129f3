// The detail of linearity as findings, each with interval, n, df, method and source.
import type { AssessInput } from '../../assess/assessment-part.ts'
import type { Evidence, FindingDraft, NotEvaluable } from '../../assess/finding.ts'
import type { Fit } from '../../statistics/regression.ts'
import type { LinearityDetail } from './detail.ts'
import type { LinearityOptions } from './options.ts'
import { backCalculationErrors, relativeStandardError } from './weighted-fit.ts'

const regression = 'Draper & Smith, Applied Regression Analysis, 3rd ed., chapters 1 and 9'

export function findingsOf(
  detail: LinearityDetail, fit: Fit, input: AssessInput<LinearityOptions>, evidence: readonly Evidence[],
): { readonly findings: readonly FindingDraft[]; readonly notEvaluable: readonly NotEvaluable[] } {
  const model = `least squares, ${detail.fit}, weights ${detail.weights}`
  const start = { n: detail.n, df: detail.df, evidence }
  const coefficient = (name: 'slope' | 'intercept'): readonly FindingDraft[] => detail.coefficients.filter((each) => each.name === name).map((each) => ({
    ...start, metric: name, value: each.value, interval: { low: each.low, high: each.high, confidence: input.confidence, method: 'Student t' }, method: model, source: regression,
  }))
  const rse = relativeStandardError(fit)
  const usable = backCalculationErrors(fit).length // a level of zero has no relative error
  const findings: FindingDraft[] = [
    ...coefficient('slope'), ...coefficient('intercept'),
    ...(detail.weights === 'none' ? [{ ...start, metric: 'residual-standard-deviation', value: detail.residualStandardDeviation, method: model, source: regression }] : []),
    ...(detail.correlation === undefined ? [] : [{ ...start, metric: 'correlation', value: detail.correlation, method: 'correlation coefficient r; a description, no test', source: regression }]),
    ...(detail.rSquared === undefined ? [] : [{ ...start, metric: 'r-squared', value: detail.rSquared, method: fit.throughZero ? 'R² about zero, not comparable with a fit with intercept' : detail.weights === 'none' ? 'R² about the mean; a description, no test' : 'R² with the weights of the fit, about the weighted mean; a description, no test', source: regression }]),
    ...(detail.lackOfFit === undefined ? [] : [{ ...start, df: detail.lackOfFit.df2, metric: 'lack-of-fit-probability', value: detail.lackOfFit.probability, method: 'F test of lack of fit against true replicates', source: 'Draper & Smith, Applied Regression Analysis, 3rd ed., section 2.1' }]),
    ...(detail.mandel === undefined ? [] : [{ ...start, df: detail.mandel.df2, metric: 'curvature-probability', value: detail.mandel.probability, method: 'Mandel’s test of a parabola against the straight line', source: 'ISO 8466-1:2021' }]),
    ...detail.levels.flatMap((level): readonly FindingDraft[] => (level.worstError === undefined || level.meanError === undefined ? [] : [
      { evidence, n: level.n, metric: 'back-calculation-error', level: level.level, value: level.worstError, method: 'error of the standard furthest off, in percent of its level', source: 'common practice, no source' },
      { evidence, n: level.n, metric: 'back-calculation-mean-error', level: level.level, value: level.meanError, method: 'mean error of the standards, in percent of their level', source: 'common practice, no source' },
    ])),
    ...(rse === undefined ? [] : [{ ...start, n: usable, df: usable - fit.parameters, metric: 'relative-standard-error', value: rse, method: 'relative standard error over every standard above zero, divided by n − coefficients', source: 'US EPA method 8000D, section 11.5' }]),
    ...(detail.interceptRelative === undefined ? [] : [{ ...start, metric: 'intercept-relative', value: detail.interceptRelative.value, interval: { low: detail.interceptRelative.low, high: detail.interceptRelative.high, confidence: input.confidence, method: 'Student t, full response taken as exact' }, method: 'intercept in percent of the fitted full response', source: 'common practice, no source' }]),
    ...(detail.straightTo === undefined ? [] : [{ ...start, metric: 'straight-to', value: detail.straightTo.level, method: 'highest level up to which Mandel’s test sees no curvature', source: 'ISO 8466-1:2021' }]),
    ...(detail.topSensitivity === undefined ? [] : [{ ...start, metric: 'top-sensitivity', value: detail.topSensitivity, method: 'slope between the two highest levels in percent of the fitted one', source: 'common practice, no source' }]),
    ...(detail.slopeRsdBetweenRuns === undefined ? [] : [{ ...start, n: detail.runs.length, df: detail.runs.length - 1, metric: 'slope-rsd-between-runs', value: detail.slopeRsdBetweenRuns, method: 'relative standard deviation of the slopes of single runs', source: 'common practice, no source' }]),
  ]
  return { findings, notEvaluable: absent(detail, rse) }
}

function absent(detail: LinearityDetail, rse: number | undefined): readonly NotEvaluable[] {
  return [
    ...(detail.weights === 'none' ? [] : [{ metric: 'residual-standard-deviation', because: 'a weighted residual is no response', notAsked: true as const }]),
    ...(detail.correlation === undefined ? [{ metric: 'correlation', because: 'r describes a straight line with intercept and varying responses only' }] : []),
    ...(detail.rSquared === undefined ? [{ metric: 'r-squared', because: 'the responses do not vary' }] : []),
    ...(detail.lackOfFitAbsent === undefined ? [] : [{ metric: 'lack-of-fit-probability', because: detail.lackOfFitAbsent }]),
    ...(detail.mandelAbsent === undefined ? [] : [{ metric: 'curvature-probability', because: detail.mandelAbsent }]),
    ...detail.levels.filter((level) => level.worstError === undefined).map((level): NotEvaluable => ({ metric: 'back-calculation-error', level: level.level, because: level.level === 0 ? 'a level of zero has no relative error' : 'a response cannot be read back' })),
    ...(rse === undefined ? [{ metric: 'relative-standard-error', because: 'too few standards above zero' }] : []),
    ...(detail.interceptRelative === undefined ? [{ metric: 'intercept-relative', because: detail.fit === 'through zero' ? 'the model has no intercept' : 'the full response is zero, or its level lies outside the standards' }] : []),
    ...(detail.straightTo === undefined ? [{ metric: 'straight-to', because: detail.fit === 'straight line' ? 'at no choice of four or more levels does Mandel’s test see no curvature' : 'the model is no straight line with intercept' }] : []),
    ...(detail.topSensitivity === undefined ? [{ metric: 'top-sensitivity', because: 'the fitted line is flat at the top' }] : []),
    ...(detail.slopeRsdBetweenRuns === undefined ? [{ metric: 'slope-rsd-between-runs', because: 'the study names no runs, or fewer than two could be fitted', notAsked: true as const }] : []),
  ]
}
