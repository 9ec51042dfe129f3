// Responses at known levels → model, deviations, tests and back-calculated errors of one measurand. r and R² describe; they prove nothing.
import type { AssessInput, AssessOutput, Inverted } from '../../assess/assessment-part.ts'
import type { NotEvaluable } from '../../assess/finding.ts'
import { evidenceOf, type Measurements } from '../../assess/measurements.ts'
import { diagnostic, type Diagnostic } from '../../diagnostics/diagnostic.ts'
import { mean } from '../../statistics/describe.ts'
import { coefficientInterval, confidenceBand, type Fit, inversePredict, predict } from '../../statistics/regression.ts'
import { weightCandidates } from './candidates.ts'
import type { Coefficient, LevelLine, LinearityDetail, StandardPoint } from './detail.ts'
import { interceptRelative, lackOfFitOf, mandelOf, straightTo, topSensitivity } from './deviations.ts'
import { findingsOf } from './findings.ts'
import type { LinearityOptions } from './options.ts'
import { runName, runsOf } from './runs.ts'
import { backCalculated, type Point, weightedFit } from './weighted-fit.ts'

const linePoints = 41 // enough that a parabola and its band look smooth at the width of a page

export function assessLinearity(input: AssessInput<LinearityOptions>): AssessOutput<LinearityDetail> {
  const { options, place } = input.block
  const measurements = input.responses(options.data)
  const nothing = (because: string, diagnostics: readonly Diagnostic[], design: Readonly<Record<string, number>> = {}): AssessOutput<LinearityDetail> => ({
    detail: undefined, findings: [], notEvaluable: judgedMetrics.map((metric): NotEvaluable => ({ metric, because })), design, diagnostics,
  })
  if (measurements === undefined) return nothing(`dataset ${options.data} gives no responses`, [])
  const unfit = unfitData(measurements, input)
  if (unfit !== undefined) return nothing('the calibration data are not usable', [unfit])
  const points = measurements.values.map((each): Point => ({ x: each.level ?? 0, y: each.value }))
  const levels = [...new Set(points.map((point) => point.x))].sort((left, right) => left - right)
  const runFields = options.runs ?? []
  const design = {
    levels: levels.length, replicates: levels.length === 0 ? 0 : Math.min(...levels.map((level) => points.filter((point) => point.x === level).length)),
    ...(runFields.length === 0 ? {} : { runs: new Set(measurements.values.map((each) => runName(each.factors, runFields))).size }),
  }
  const outcome = levels.length < 3 ? { impossible: `${levels.length} levels are too few for a calibration` } : weightedFit(points, options.fit, options.weights)
  if ('impossible' in outcome) {
    const isChoice = options.weights !== 'none' && levels.length >= 3
    return nothing(outcome.impossible, [diagnostic(isChoice ? 'assess/unsuitable-data' : 'assess/too-few-values', `The calibration of \`${input.measurand.id}\` cannot be fitted (${options.fit}, weights ${options.weights}): ${outcome.impossible}`, {
      place, actual: `${points.length} responses at ${levels.length} levels`, expected: 'at least three levels, more responses than coefficients, and a finite weight for each', mend: 'Add standards, or choose another fit or other weights',
    })], design)
  }
  const { fit } = outcome
  const detail = detailOf(input, measurements, fit, levels)
  return {
    detail, design, ...findingsOf(detail, fit, input, evidenceOf(measurements)),
    diagnostics: notes(detail, input),
  }
}

/** Metrics a criterion may name; each is reported or said to be not evaluable. */
const judgedMetrics = ['slope', 'intercept', 'residual-standard-deviation', 'correlation', 'r-squared', 'lack-of-fit-probability', 'curvature-probability', 'back-calculation-error', 'back-calculation-mean-error', 'relative-standard-error', 'intercept-relative', 'straight-to', 'top-sensitivity', 'slope-rsd-between-runs']

function unfitData(measurements: Measurements, input: AssessInput<LinearityOptions>): Diagnostic | undefined {
  const censored = measurements.censored[0]
  if (censored !== undefined) {
    return diagnostic('assess/unsuitable-data', `Unexpected \`${censored.cell.text}\` among the calibration responses of \`${input.measurand.id}\``, {
      place: censored.cell.place, actual: censored.cell.text, expected: 'a number', mend: 'Give the response of every standard, or exclude the row with a reason',
    })
  }
  const unmapped = input.block.options.runs?.find((field) => measurements.values.some((each) => each.factors[field] === undefined))
  if (unmapped !== undefined) {
    const mapped = Object.keys(measurements.values[0]?.factors ?? {})
    return diagnostic('assess/missing-field', `\`${input.block.id}\` names the run field \`${unmapped}\`, which dataset \`${measurements.dataset}\` does not map`, {
      place: input.block.place, actual: unmapped, expected: mapped.length === 0 ? 'a column for it' : mapped.join(', '), mend: `Add \`${unmapped}:\` under \`columns:\``,
    })
  }
  const unplaced = measurements.values.find((each) => each.level === undefined)
  if (unplaced === undefined) return undefined
  const cell = input.observations(measurements.dataset).find((each) => each.row === unplaced.rows[0])?.fields['level']
  return diagnostic('assess/missing-field', `Dataset \`${measurements.dataset}\` gives a response without a level`, {
    place: cell?.place ?? input.block.place, actual: cell === undefined ? 'no column for `level`' : `\`${cell.text.trim()}\``, expected: 'a level in every row',
    mend: cell === undefined ? 'Map the column that holds the level of each standard' : 'Fill in the level, or leave the row out with `rows:`',
  })
}

function detailOf(input: AssessInput<LinearityOptions>, measurements: Measurements, fit: Fit, levels: readonly number[]): LinearityDetail {
  const { options } = input.block
  const range = { low: levels[0] ?? 0, high: levels.at(-1) ?? 0 }
  const runFields = options.runs ?? []
  const points = measurements.values.map((each, index): StandardPoint => {
    const level = each.level ?? 0
    const found = backCalculated(fit, each.value)
    return {
      level, response: each.value, fitted: fit.fitted[index] ?? 0, residual: fit.residuals[index] ?? 0,
      ...(found === undefined ? {} : { found, ...(level === 0 ? {} : { error: (100 * (found - level)) / level }) }),
      ...(runFields.length === 0 ? {} : { run: runName(each.factors, runFields) }),
    }
  })
  const grid = Array.from({ length: linePoints }, (_, index) => range.low + ((range.high - range.low) * index) / (linePoints - 1))
  const names = ['intercept', 'slope', 'curvature'] as const
  const coefficients = fit.coefficients.flatMap((value, power): readonly Coefficient[] => {
    const name = names[power]
    if (name === undefined || (power === 0 && fit.throughZero)) return []
    const { low, high } = coefficientInterval(fit, power, input.confidence)
    return [{ name, value, standardError: fit.standardErrors[power] ?? 0, low, high }]
  })
  return {
    fit: options.fit, weights: options.weights, n: fit.n, df: fit.df, coefficients, residualStandardDeviation: fit.residualStandardDeviation,
    ...(fit.rSquared === undefined ? {} : { rSquared: fit.rSquared }), ...(fit.correlation === undefined ? {} : { correlation: fit.correlation }),
    range, points,
    excluded: measurements.excluded.map((each) => ({ level: each.level ?? 0, response: each.value, exclusion: each.exclusion ?? 0 })),
    levels: levels.map((level): LevelLine => levelLine(level, points)),
    line: grid.map((x) => ({ x, y: predict(fit, x).value })),
    band: grid.map((x) => {
      const { low, high } = confidenceBand(fit, x, input.confidence)
      return { x, low, high }
    }),
    candidates: weightCandidates(fit, options.fit, options.weights),
    ...lackOfFitOf(fit), ...mandelOf(fit, options), ...interceptRelative(fit, options['full-response']?.value ?? range.high, input.confidence),
    ...straightTo(fit, options.weights, 1 - input.confidence), ...topSensitivity(fit),
    ...runsOf(points, options.fit, options.weights),
  }
}

function levelLine(level: number, points: readonly StandardPoint[]): LevelLine {
  const own = points.filter((point) => point.level === level)
  const errors = own.flatMap((point) => point.error ?? [])
  const start = { level, n: own.length, meanResponse: mean(own.map((point) => point.response)) }
  if (errors.length < own.length) return start
  return { ...start, meanError: mean(errors), worstError: errors.reduce((worst, error) => (Math.abs(error) > Math.abs(worst) ? error : worst)) }
}

function notes(detail: LinearityDetail, input: AssessInput<LinearityOptions>): readonly Diagnostic[] {
  const turning = detail.coefficients.find((each) => each.name === 'curvature')
  const slope = detail.coefficients.find((each) => each.name === 'slope')
  const at = turning === undefined || slope === undefined || turning.value === 0 ? undefined : -slope.value / (2 * turning.value)
  return [
    ...(at !== undefined && at > detail.range.low && at < detail.range.high ? [diagnostic('assess/unsuitable-data', `The parabola of \`${input.measurand.id}\` turns inside the calibrated range`, { place: input.block.place, actual: `at ${at}`, expected: 'a response that rises or falls throughout', mend: 'Shorten the range, or choose another model' })] : []),
    ...(input.block.options.weights === '1/s^2' && detail.levels.some((level) => level.n < 5) ? [diagnostic('assess/method-note', `Weights 1/s² of \`${input.measurand.id}\` rest on fewer than five values at a level and are unsteady`, { place: input.block.place })] : []),
  ]
}

/** Result of a response: inside the calibrated levels only. */
export function invertLinearity(detail: LinearityDetail, response: number): Inverted {
  const value = (name: Coefficient['name']): number => detail.coefficients.find((each) => each.name === name)?.value ?? 0
  const found = inversePredict({ coefficients: [value('intercept'), value('slope'), value('curvature')] }, response, detail.range)
  return 'x' in found ? { result: found.x } : { outside: found.outside === 'above' ? 'above' : 'below' }
}
