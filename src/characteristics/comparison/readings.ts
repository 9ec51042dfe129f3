// Measurements of a dataset → readings under named conditions in their order, or why there are none.
import type { AssessInput } from '../../assess/assessment-part.ts'
import { fieldGap, type Measurement, type Measurements } from '../../assess/measurements.ts'
import { counted } from '../../diagnostics/counted.ts'
import { diagnostic, type Diagnostic } from '../../diagnostics/diagnostic.ts'
import { type ComparisonOptions, otherConditions } from './options.ts'

export interface ConditionReading {
  readonly order: number
  readonly value: number
  readonly condition: string
  readonly measurement: Measurement
}

export interface ReadingsOutcome {
  readonly measurements?: Measurements
  readonly readings: readonly ConditionReading[]
  /** Under the conditions compared. */
  readonly excluded: readonly Measurement[]
  readonly because?: string
  readonly diagnostics: readonly Diagnostic[]
}

export function readingsOf(input: AssessInput<ComparisonOptions>): ReadingsOutcome {
  const { options, place } = input.block
  const measurements = input.results(options.data)
  if (measurements === undefined) return { readings: [], excluded: [], because: `dataset ${options.data} gives no results`, diagnostics: [] }
  if (measurements.values.length > 0 && !measurements.values.some((each) => each.factors[options.conditions.column] !== undefined)) {
    const mapped = Object.keys(measurements.values[0]?.factors ?? {})
    return {
      measurements, readings: [], excluded: [], because: `dataset ${options.data} maps no column for ${options.conditions.column}`,
      diagnostics: [diagnostic('assess/missing-field', `Dataset \`${options.data}\` maps no column for \`${options.conditions.column}\`, which should hold the condition`, { place, actual: mapped.join(', '), expected: options.conditions.column, mend: mapped.length === 0 ? `Add \`${options.conditions.column}:\` under \`columns:\`` : `Write one of ${mapped.join(', ')} as \`column:\`, or map it` })],
    }
  }
  const wanted = [options.conditions.reference, ...otherConditions(options)]
  const conditionOf = (each: Pick<Measurement, 'factors'>): string => each.factors[options.conditions.column] ?? ''
  const censored = measurements.censored.find((each) => wanted.includes(conditionOf(each)))
  if (censored !== undefined) {
    const cell = `${censored.cell.text.trim()} in ${censored.cell.place.file}:${censored.cell.place.line ?? ''}`
    return {
      measurements, readings: [], excluded: [], because: `a censored value (${cell}) stands under ${conditionOf(censored)}`,
      diagnostics: [diagnostic('assess/censored-value', `A censored value of \`${input.measurand.id}\` stands in the comparison`, { place: censored.cell.place, actual: censored.cell.text.trim(), expected: 'a number', mend: 'Measure conditions well above the detection limit' })],
    }
  }
  const used = measurements.values.filter((each) => wanted.includes(conditionOf(each)))
  const gap = options.design === 'alternating blocks' && used.some((each) => each.factors[options.block] !== undefined) ? fieldGap(input, { ...measurements, values: used }, [options.block], 'block') : undefined
  if (gap !== undefined) return { measurements, readings: [], excluded: [], because: 'a reading does not tell its block', diagnostics: [gap] }
  // The order of measuring is the mapped `order`, else that of the file.
  const placed = used.map((measurement, index) => ({ measurement, at: measurement.numbers['order'] ?? index })).sort((left, right) => left.at - right.at)
  const readings = placed.map(({ measurement }, index): ConditionReading => ({ order: index + 1, value: measurement.value, condition: conditionOf(measurement), measurement }))
  const absent = wanted.filter((condition) => !readings.some((each) => each.condition === condition))
  if (absent.length === 0) return { measurements, readings, excluded: measurements.excluded.filter((each) => wanted.includes(conditionOf(each))), diagnostics: leftOut(measurements.values.filter((each) => !used.includes(each)), conditionOf, input) }
  const found = [...new Set(measurements.values.map(conditionOf))]
  return {
    measurements, readings: [], excluded: [], because: `no reading under ${absent.join(', ')}`,
    diagnostics: [diagnostic('assess/too-few-values', `No reading of \`${input.measurand.id}\` stands under ${absent.map((each) => `\`${each}\``).join(', ')}`, { place, actual: found.join(', '), expected: wanted.join(', '), mend: `Check \`conditions:\`; \`${options.conditions.column}\` must be a mapped field that holds these texts` })],
  }
}

/** Readings of the dataset under conditions that the study does not compare. */
function leftOut(others: readonly Measurement[], conditionOf: (each: Measurement) => string, input: AssessInput<ComparisonOptions>): readonly Diagnostic[] {
  if (others.length === 0) return []
  const named = [...new Set(others.map(conditionOf))].map((condition) => (condition === '' ? 'no condition' : `\`${condition}\``))
  const { data, conditions } = input.block.options
  const bare = others.find((each) => conditionOf(each) === '')
  return [diagnostic('assess/method-note', `${counted(others.length, 'reading')} of \`${input.measurand.id}\` under ${named.join(', ')} ${others.length === 1 ? 'is' : 'are'} no part of the comparison`, {
    place: input.observations(data).find((each) => each.row === bare?.rows[0])?.fields[conditions.column]?.place ?? input.block.place, actual: named.join(', '), expected: [conditions.reference, ...otherConditions(input.block.options)].join(', '), mend: 'Name the condition under `conditions:` if it is to be compared',
  })]
}
