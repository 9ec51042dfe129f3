// Calibration responses → the straight line that turns responses into concentrations, and the unweighted line whose scatter the
// calibration definitions use. The two differ when a linearity block weights its fit: a weighted residual is no response.
import type { AssessInput } from '../../assess/assessment-part.ts'
import type { Evidence } from '../../assess/finding.ts'
import { evidenceOf, type Measurement, type Measurements } from '../../assess/measurements.ts'
import { diagnostic, type Diagnostic } from '../../diagnostics/diagnostic.ts'
import { type Fit, fitPolynomial } from '../../statistics/regression.ts'
import type { LineDetail } from './detail.ts'
import type { DetectionOptions } from './options.ts'

export interface CalibrationLine {
  readonly detail: LineDetail
  readonly own: Fit
  /** Level and response of every point used. */
  readonly points: { readonly x: readonly number[]; readonly y: readonly number[] }
  readonly measurements: Measurements
  readonly used: readonly Measurement[]
  readonly evidence: readonly Evidence[]
  /** The points lie on a line but for the noise of binary arithmetic. */
  readonly isExact: boolean
  /** All levels of the dataset, also those above `levels-up-to`. */
  readonly levels: readonly number[]
}

export interface LineOutcome {
  readonly line?: CalibrationLine | undefined
  /** Why there is none, when calibration was asked for. */
  readonly because?: string | undefined
}

export function calibrationLine(input: AssessInput<DetectionOptions>, notice: (found: Diagnostic) => void): LineOutcome {
  const { options, place } = input.block
  if (options.calibration === undefined) return {}
  const measurements = input.responses(options.calibration)
  if (measurements === undefined) return { because: `dataset ${options.calibration} gave no responses` }
  const censored = measurements.censored[0]
  if (censored !== undefined) {
    notice(diagnostic('assess/unsuitable-data', `Unexpected \`${censored.cell.text}\` among the calibration responses of \`${input.measurand.id}\``, {
      place: censored.cell.place, actual: censored.cell.text, expected: 'a number', mend: 'Give the response of every calibration standard, or exclude the row with a reason',
    }))
    return { because: `calibration response ${censored.cell.text} is no number` }
  }
  const unplaced = measurements.values.find((each) => each.level === undefined)
  if (unplaced !== undefined) {
    notice(diagnostic('assess/missing-field', `Dataset \`${options.calibration}\` gives a calibration response without a level`, { place, expected: 'a column for `level`', mend: 'Map the column that holds the level of each standard' }))
    return { because: 'a calibration response has no level' }
  }
  const highest = options['levels-up-to']?.value ?? Infinity
  const used = measurements.values.filter((each) => (each.level ?? Infinity) <= highest)
  const x = used.map((each) => each.level ?? 0)
  const y = used.map((each) => each.value)
  if (used.length < 3 || new Set(x).size < 2) {
    notice(diagnostic('assess/too-few-values', `A calibration line of \`${input.measurand.id}\` needs at least three responses at two levels`, { place, actual: `${used.length} responses at ${new Set(x).size} levels`, expected: 'three responses at two levels', mend: options['levels-up-to'] === undefined ? 'Add calibration standards' : 'Raise `levels-up-to`, or add low standards' }))
    return { because: `${used.length} calibration responses at ${new Set(x).size} levels are too few for a line` }
  }
  const own = fitPolynomial({ x, y, degree: 1 })
  const [intercept = 0, slope = 0] = own.coefficients
  if (slope === 0) {
    notice(diagnostic('assess/degenerate-data', `The calibration line of \`${input.measurand.id}\` has no slope`, { place, actual: 'the same response at every level', expected: 'a response that changes with the level', mend: 'Check the mapped columns' }))
    return { because: 'the calibration line has no slope' }
  }
  const evidence = evidenceOf(measurements, used)
  const prior = options['levels-up-to'] === undefined ? priorLine(input, options.calibration) : undefined
  const detail: LineDetail = {
    dataset: options.calibration, ...(prior === undefined ? { slope, intercept } : prior),
    own: {
      slope, intercept, residualStandardDeviation: own.residualStandardDeviation, interceptStandardError: own.standardErrors[0] ?? 0, n: used.length, df: own.df,
      lowest: Math.min(...x), highest: Math.max(...x),
    },
  }
  return { line: { detail, own, points: { x, y }, measurements, used, evidence, isExact: isNoiseOfArithmetic(own.residualStandardDeviation, y), levels: [...new Set(measurements.values.map((each) => each.level ?? 0))] } }
}

/** Binary arithmetic leaves residuals of some 1e-16 of the values where points lie exactly on a line. */
export function isNoiseOfArithmetic(scatter: number, values: readonly number[]): boolean {
  return scatter <= 1e-13 * Math.max(...values.map(Math.abs))
}

/** Slope and intercept of the straight line that an earlier linearity block found on the same dataset. */
function priorLine(input: AssessInput<DetectionOptions>, dataset: string): { readonly block: string; readonly slope: number; readonly intercept: number } | undefined {
  for (const prior of input.prior('linearity').filter((each) => !isCurved(each.detail))) {
    const find = (metric: string): number | undefined => prior.findings.find((each) => each.metric === metric && each.level === undefined && each.condition === undefined && each.evidence.some((evidence) => evidence.dataset === dataset))?.value
    const [slope, intercept] = [find('slope'), find('intercept')]
    if (slope !== undefined && slope !== 0 && intercept !== undefined) return { block: prior.block, slope, intercept }
  }
  return undefined
}

/** The slope of a curve changes along it, so a curve gives no slope here. */
function isCurved(detail: unknown): boolean {
  return typeof detail === 'object' && detail !== null && 'fit' in detail && detail.fit === 'quadratic'
}
