// Blank and spike datasets → values with their concentrations. A response is turned into a concentration by the calibration line, also
// below its lowest standard and below zero: negative blanks are legitimate data, and dropping them would flatter every limit.
import type { AssessInput } from '../../assess/assessment-part.ts'
import type { CensoredMeasurement, Measurement, Measurements } from '../../assess/measurements.ts'
import { mean, standardDeviation } from '../../statistics/describe.ts'
import type { CalibrationLine } from './calibration-line.ts'
import type { SeriesDetail, SeriesPoint } from './detail.ts'
import type { DetectionOptions } from './options.ts'

export interface Series {
  readonly measurements: Measurements
  readonly quantity: 'response' | 'result'
  readonly values: readonly number[]
  /** Undefined when responses stand without a calibration line. */
  readonly concentrations?: readonly number[] | undefined
  readonly detail: SeriesDetail
}

export function readSeries(input: AssessInput<DetectionOptions>, dataset: string | undefined, line: CalibrationLine | undefined): Series | undefined {
  if (dataset === undefined) return undefined
  const fields = input.observations(dataset)[0]?.fields ?? {}
  const quantity = 'response' in fields && !('result' in fields) ? 'response' : 'result'
  const measurements = quantity === 'response' ? input.responses(dataset) : input.results(dataset)
  if (measurements === undefined) return undefined
  const points = measurements.values.map((each) => pointOf(each, quantity, line))
  const values = points.map((each) => each.value)
  const concentrations = points.flatMap((each) => each.concentration ?? [])
  const complete = concentrations.length === points.length
  return {
    measurements, quantity, values, ...(complete ? { concentrations } : {}),
    detail: {
      dataset, quantity, points, excluded: measurements.excluded.map((each) => pointOf(each, quantity, line)), censored: measurements.censored.map(censoredPoint),
      ...(values.length < 2 ? {} : { summary: { n: values.length, ...spreadOf(values) } }),
      ...(complete && concentrations.length >= 2 ? { concentrations: spreadOf(concentrations) } : {}),
    },
  }
}

/** Dilution and sample amount act on a concentration as they do everywhere else. */
function pointOf(measurement: Measurement, quantity: 'response' | 'result', line: CalibrationLine | undefined): SeriesPoint {
  const { value, level, factors, numbers, exclusion } = measurement
  const read = line === undefined ? undefined : ((value - line.detail.intercept) / line.detail.slope) * (numbers['dilution'] ?? 1) / (numbers['sample-amount'] ?? 1)
  const concentration = quantity === 'result' ? value : read
  return { value, factors, ...(concentration === undefined ? {} : { concentration }), ...(level === undefined ? {} : { level }), ...(exclusion === undefined ? {} : { exclusion }) }
}

function censoredPoint({ cell, factors }: CensoredMeasurement): SeriesDetail['censored'][number] {
  if (cell.kind === 'below' || cell.kind === 'above') return { text: cell.text, bound: cell.bound, direction: cell.kind, factors }
  return { text: cell.text, factors }
}

function spreadOf(values: readonly number[]): { readonly mean: number; readonly standardDeviation: number; readonly lowest: number; readonly highest: number } {
  return { mean: mean(values), standardDeviation: standardDeviation(values), lowest: Math.min(...values), highest: Math.max(...values) }
}
