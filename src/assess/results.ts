// Responses of a dataset → results, in the settled order: mean of the unit, blank subtraction, inverse prediction, dilution, sample amount.
// Each step that is taken is named in `chain`; a response outside the calibrated range gives no result.
import type { Dataset } from '../data/dataset.ts'
import type { DatasetSource, Measurand } from '../definition/study.ts'
import { counted } from '../diagnostics/counted.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { StageResult } from '../diagnostics/stage-result.ts'
import { mean } from '../statistics/describe.ts'
import type { Inverted } from './assessment-part.ts'
import { independentUnits } from './independent-units.ts'
import type { CensoredMeasurement, Measurement, Measurements } from './measurements.ts'

export interface Calibration {
  readonly block: string
  readonly name?: string | undefined
  invert(response: number): Inverted
}

export interface ResultsRequest {
  readonly dataset: Dataset
  readonly source: DatasetSource
  readonly measurand: Measurand
  readonly putBackExcluded: boolean
  /** Calibrations of this measurand assessed so far. */
  readonly calibrations: readonly Calibration[]
  /** Mean response of the blank dataset, when the source subtracts one. */
  readonly blankMean?: number | undefined
}

export function resultsOf(request: ResultsRequest): StageResult<Measurements> {
  const { dataset, source, measurand, putBackExcluded } = request
  const reported = dataset.fields.includes('result')
  const measured = dataset.fields.includes('response')
  if (!reported && !measured) {
    return { value: undefined, diagnostics: [diagnostic('assess/missing-field', `Dataset \`${dataset.name}\` maps neither \`result\` nor \`response\``, {
      place: source.place, expected: 'a column for `result`, or for `response` with `through:`', mend: 'Add `result:` under `columns:`',
    })] }
  }
  if (reported && measured && source.reportable === undefined) {
    return { value: undefined, diagnostics: [diagnostic('assess/missing-field', `Dataset \`${dataset.name}\` maps both \`result\` and \`response\` and does not say which is reported`, {
      place: source.place, expected: '`reportable: result` or `reportable: recomputed`', mend: 'Add `reportable:` to the dataset',
    })] }
  }
  const asReported = reported ? independentUnits(dataset, source, measurand.id, 'result', putBackExcluded) : undefined
  if (!measured) return asReported ?? { value: undefined, diagnostics: [] }
  const recomputed = recompute(request)
  if (asReported === undefined) return recomputed
  const chosen = source.reportable === 'recomputed' ? recomputed : asReported
  return { value: chosen.value, diagnostics: [...asReported.diagnostics, ...recomputed.diagnostics, ...differences(asReported.value, recomputed.value, source, measurand)] }
}

function recompute(request: ResultsRequest): StageResult<Measurements> {
  const { dataset, source, measurand } = request
  const units = independentUnits(dataset, source, measurand.id, 'response', request.putBackExcluded)
  const calibration = chooseCalibration(request)
  const diagnostics: Diagnostic[] = [...units.diagnostics]
  if (calibration === undefined) {
    diagnostics.push(diagnostic('assess/no-calibration', `No calibration turns the responses of dataset \`${dataset.name}\` into results of \`${measurand.id}\``, {
      place: source.through?.place ?? source.place, actual: `${request.calibrations.length} blocks that can`, expected: 'exactly one linearity block, or `through:` with its name',
      mend: 'Write `through:` with the id of a linearity block that is evaluable for this measurand',
    }))
  }
  if (units.value === undefined || calibration === undefined) return { value: undefined, diagnostics }
  const outside: CensoredMeasurement[] = []
  const convert = (unit: Measurement): Measurement | undefined => {
    const response = unit.value - (request.blankMean ?? 0)
    const inverted = calibration.invert(response)
    if ('outside' in inverted) {
      const cell = dataset.observations.find((each) => each.row === unit.rows[0] && each.measurand === measurand.id)?.fields['response']
      if (cell !== undefined) outside.push({ level: unit.level, factors: unit.factors, numbers: unit.numbers, cell, rows: unit.rows })
      return undefined
    }
    return { ...unit, value: (inverted.result * (unit.numbers['dilution'] ?? 1)) / (unit.numbers['sample-amount'] ?? 1) }
  }
  const values = units.value.values.flatMap((unit) => convert(unit) ?? [])
  const firstOutside = outside[0]
  if (firstOutside !== undefined) {
    diagnostics.push(diagnostic('assess/outside-calibration', `${counted(outside.length, 'response')} of \`${measurand.id}\` in dataset \`${dataset.name}\` outside the calibrated range`, {
      place: firstOutside.cell.place, actual: firstOutside.cell.text, expected: `a response within the range of \`${calibration.block}\``,
      mend: 'Calibrate over the whole range of use, or dilute', related: outside.slice(1, 4).map((each) => ({ message: 'also outside', place: each.cell.place })),
    }))
  }
  const excluded = units.value.excluded.flatMap((unit) => {
    const seen = outside.length
    const converted = convert(unit)
    outside.length = seen
    return converted === undefined ? [] : [converted]
  })
  return { value: { ...units.value, values, excluded, censored: [...units.value.censored, ...outside], chain: chainOf(request, units.value.chain, calibration) }, diagnostics }
}

function chainOf(request: ResultsRequest, averaging: readonly string[], calibration: Calibration): readonly string[] {
  const fields = request.dataset.fields
  return [
    ...averaging,
    ...(request.blankMean === undefined ? [] : [`mean response of dataset ${request.source.subtractBlank?.value ?? ''} subtracted`]),
    `inverse prediction through ${calibration.block}`,
    ...(fields.includes('dilution') ? ['multiplied by the dilution factor'] : []),
    ...(fields.includes('sample-amount') ? ['divided by the sample amount'] : []),
  ]
}

function chooseCalibration(request: ResultsRequest): Calibration | undefined {
  const wanted = request.source.through?.value
  if (wanted === undefined) return request.calibrations.length === 1 ? request.calibrations[0] : undefined
  return request.calibrations.find((each) => each.block === wanted || each.name === wanted)
}

function differences(reported: Measurements | undefined, recomputed: Measurements | undefined, source: DatasetSource, measurand: Measurand): readonly Diagnostic[] {
  if (reported === undefined || recomputed === undefined) return []
  const byRow = new Map(recomputed.values.map((each) => [each.rows[0], each.value]))
  const pairs = reported.values.flatMap((each) => {
    const other = byRow.get(each.rows[0])
    return other === undefined ? [] : [Math.abs(other - each.value)]
  })
  const largest = Math.max(0, ...pairs)
  return [diagnostic('assess/method-note', `Results of \`${measurand.id}\` in dataset \`${source.name}\` were both reported and recomputed: ${pairs.length} pairs, largest difference ${largest} ${measurand.unit}`, {
    place: source.place, expected: `reported here: ${source.reportable ?? ''}`,
  })]
}

/** Mean response of the units of a blank dataset. */
export function meanResponse(dataset: Dataset, source: DatasetSource, measurand: string, putBackExcluded: boolean): number | undefined {
  const units = independentUnits(dataset, source, measurand, 'response', putBackExcluded)
  return units.value === undefined || units.value.values.length === 0 ? undefined : mean(units.value.values.map((each) => each.value))
}
