// What case folders cannot show of lower limits: options that contradict each other, order of rows, and data too poor for any answer.
import { describe, expect, test } from 'vitest'
import type { AssessInput, AssessOutput, PriorAssessment } from '../../src/assess/assessment-part.ts'
import type { CensoredMeasurement, Measurement, Measurements } from '../../src/assess/measurements.ts'
import { detection } from '../../src/characteristics/detection/index.ts'
import type { DetectionDetail } from '../../src/characteristics/detection/detail.ts'
import type { DetectionOptions } from '../../src/characteristics/detection/options.ts'
import type { CellValue, Observation } from '../../src/data/dataset.ts'
import type { Reading } from '../../src/definition/fields.ts'
import type { StudyNode } from '../../src/definition/study-node.ts'
import type { Diagnostic } from '../../src/diagnostics/diagnostic.ts'

const place = { file: 'study.yaml', line: 1, column: 1 }

type Plain = string | number | boolean | readonly Plain[] | { readonly [key: string]: Plain }

function node(value: Plain): StudyNode {
  if (typeof value !== 'object') return { kind: 'scalar', text: String(value), quoted: false, value, place }
  if (Array.isArray(value)) return { kind: 'list', items: value.map(node), place }
  return { kind: 'map', entries: Object.entries(value).map(([key, each]) => ({ key, keyPlace: place, value: node(each as Plain) })), place }
}

function read(options: Plain): { readonly options: DetectionOptions | undefined; readonly diagnostics: readonly Diagnostic[] } {
  const diagnostics: Diagnostic[] = []
  const reading: Reading = { path: 'characteristics.detection', report: (found) => diagnostics.push(found), took: () => undefined }
  return { options: detection.options.read(node(options), reading) as DetectionOptions | undefined, diagnostics }
}

interface Given {
  readonly level?: number
  readonly value: number | string
  readonly factors?: Readonly<Record<string, string>>
}

type Data = Readonly<Record<string, { readonly field: 'response' | 'result'; readonly rows: readonly Given[] }>>

function cellOf(value: number | string): CellValue {
  return typeof value === 'number' ? { kind: 'number', value } : value.startsWith('<') ? { kind: 'below', bound: Number(value.slice(1)) } : { kind: 'not detected' }
}

function measurementsOf(dataset: string, data: Data): Measurements {
  const { field, rows } = data[dataset] ?? { field: 'result' as const, rows: [] }
  const shared = (each: Given, index: number): Pick<Measurement, 'factors' | 'rows'> & { level?: number } => ({ factors: each.factors ?? {}, rows: [index], ...(each.level === undefined ? {} : { level: each.level }) })
  return {
    dataset, field, chain: [], excluded: [],
    values: rows.flatMap((each, index): readonly Measurement[] => (typeof each.value === 'number' ? [{ ...shared(each, index), value: each.value, numbers: {}, averaged: [each.value] }] : [])),
    censored: rows.flatMap((each, index): readonly CensoredMeasurement[] => (typeof each.value === 'number' ? [] : [{ ...shared(each, index), numbers: {}, cell: { ...cellOf(each.value), text: each.value, column: 'Found', place } }])),
  }
}

function assess(plain: Plain, data: Data, prior: readonly PriorAssessment[] = []): AssessOutput<DetectionDetail> {
  const { options, diagnostics } = read(plain)
  if (options === undefined) throw new Error(diagnostics.map((each) => each.message).join('; '))
  const input: AssessInput<DetectionOptions> = {
    block: { id: 'detection', characteristic: 'detection', measurands: ['m'], options, decideBy: 'estimate', criteria: [], place },
    measurand: { id: 'm', name: 'm', unit: 'mg/L', responseUnit: 'mAU', place }, confidence: 0.95,
    responses: (dataset) => measurementsOf(dataset, data), results: (dataset) => measurementsOf(dataset, data), prior: () => prior,
    observations: (dataset) => (data[dataset]?.rows ?? []).map((each, row): Observation => ({ row, measurand: 'm', fields: { [data[dataset]?.field ?? 'result']: { ...cellOf(each.value), text: String(each.value), column: 'Found', place } } })),
  }
  return detection.assess(input) as AssessOutput<DetectionDetail>
}

const blankResults = [0.004, -0.002, 0.001, 0.003, -0.004, 0.002, 0.005, -0.001]
const blanks = { field: 'result', rows: blankResults.map((value) => ({ value })) } as const
const line = { field: 'response', rows: [[0, 0.11], [0, 0.15], [1, 1.14], [1, 1.09], [2, 2.18], [2, 2.1], [3, 3.07], [3, 3.16], [4, 4.1], [4, 4.19]].map(([level = 0, value = 0]) => ({ level, value })) } as const

describe('options', () => {
  test.each<[string, Plain, string]>([
    ['several definitions and none governs', { by: ['blank scatter', 'critical value'], blanks: 'b' }, 'govern'],
    ['the governing definition is not asked for', { by: ['blank scatter', 'critical value'], blanks: 'b', govern: 'MDL' }, 'not among `by`'],
    ['blank scatter without blanks', { by: 'blank scatter' }, '`blanks`'],
    ['calibration scatter without calibration', { by: 'calibration scatter' }, '`calibration`'],
    ['MDL without spikes', { by: 'MDL', blanks: 'b' }, '`spikes`'],
    ['intercept scatter without runs', { by: 'intercept scatter', calibration: 'c' }, '`runs`'],
    ['signal to noise without a convention', { by: 'signal to noise', blanks: 'b', spikes: 's' }, '`noise`'],
    ['signal to noise without signal', { by: 'signal to noise', noise: 'rms' }, '`trace`'],
    ['a quantitation limit from a definition that gives none', { by: ['MDL', 'blank scatter'], govern: 'MDL', 'govern-quantitation': 'MDL', blanks: 'b', spikes: 's' }, 'gives no quantitation limit'],
    ['a confirmed level without confirmation', { by: 'blank scatter', blanks: 'b', 'govern-quantitation': 'confirmed level' }, '`confirmation`'],
  ])('%s is an error', (_, options, words) => {
    const found = read(options)
    expect(found.options).toBeUndefined()
    expect(found.diagnostics.map((each) => each.message).join('\n')).toContain(words)
  })
})

describe('findings', () => {
  test('do not depend on the order of rows', () => {
    const options = { by: ['calibration scatter', 'ISO 11843-2', 'blank scatter', 'critical value'], govern: 'ISO 11843-2', calibration: 'c', blanks: 'b' }
    const forward = assess(options, { c: line, b: blanks })
    const backward = assess(options, { c: { ...line, rows: line.rows.toReversed() }, b: { ...blanks, rows: blanks.rows.toReversed() } })
    expect(backward.findings.map((each) => [each.metric, each.condition])).toEqual(forward.findings.map((each) => [each.metric, each.condition]))
    backward.findings.forEach((each, index) => expect(each.value).toBeCloseTo(forward.findings[index]?.value ?? NaN, 12))
  })

  test('twice from the same input are the same', () => {
    const options = { by: 'ISO 11843-2', calibration: 'c' }
    expect(assess(options, { c: line })).toEqual(assess(options, { c: line }))
  })

  test('every one has evidence, a method and a source', () => {
    const found = assess({ by: ['calibration scatter', 'blank scatter'], govern: 'blank scatter', calibration: 'c', blanks: 'b' }, { c: line, b: blanks })
    expect(found.findings.length).toBeGreaterThan(6)
    for (const each of found.findings) {
      expect(each.evidence.flatMap((evidence) => evidence.rows).length).toBeGreaterThan(0)
      expect(each.method).not.toBe('')
      expect(each.source).not.toBe('')
      expect(Object.keys(detection.metrics)).toContain(each.metric)
    }
  })

  test('a net result of m measurements and n blanks multiplies the scatter by the square root of 1/m + 1/n', () => {
    const plain = assess({ by: 'blank scatter', blanks: 'b' }, { b: blanks })
    const net = assess({ by: 'blank scatter', blanks: 'b', 'sample-replicates': 2, 'blank-replicates': 4 }, { b: blanks })
    const value = (found: AssessOutput<DetectionDetail>): number => found.findings.find((each) => each.metric === 'detection-limit')?.value ?? NaN
    expect(value(net) / value(plain)).toBeCloseTo(Math.sqrt(1 / 2 + 1 / 4), 12)
  })

  test.each([['straight line', 2], ['quadratic', 1.003]])('blank responses take the slope of a linearity block with a %s when it is one number', (fit, slope) => {
    const finding = (metric: string, value: number): PriorAssessment['findings'][number] => ({ id: `linearity/m/${metric}`, metric, value, unit: '', measurand: 'm', characteristic: 'linearity', block: 'linearity', method: 'fit', source: 'fit', evidence: [{ dataset: 'c', field: 'response', rows: [0] }] })
    const coefficients = [finding('slope', 2), finding('intercept', 0.1), ...(fit === 'quadratic' ? [finding('quadratic-coefficient', 0.1)] : [])]
    const found = assess({ by: 'blank scatter', calibration: 'c', blanks: 'b' }, { c: line, b: { field: 'response', rows: blanks.rows } }, [{ block: 'linearity', detail: { fit }, findings: coefficients, verdicts: [] }])
    expect(found.detail?.line?.slope).toBeCloseTo(slope, 10)
    expect(found.detail?.line?.block).toBe(fit === 'quadratic' ? undefined : 'linearity')
  })

  test('a slope that falls gives positive limits', () => {
    const falling = { ...line, rows: line.rows.map((each) => ({ level: each.level, value: 5 - each.value })) }
    const found = assess({ by: 'calibration scatter', calibration: 'c' }, { c: falling })
    expect(found.findings.find((each) => each.metric === 'detection-limit')?.value).toBeCloseTo(0.1411, 4)
  })
})

describe('poor data', () => {
  test.each<[string, Plain, Data]>([
    ['no blanks', { by: 'blank scatter', blanks: 'b' }, { b: { field: 'result', rows: [] } }],
    ['two blanks', { by: 'critical value', blanks: 'b' }, { b: { field: 'result', rows: [{ value: 1 }, { value: 2 }] } }],
    ['equal blanks', { by: 'blank scatter', blanks: 'b' }, { b: { field: 'result', rows: [{ value: 1 }, { value: 1 }, { value: 1 }] } }],
    ['censored blanks', { by: 'blank scatter', blanks: 'b' }, { b: { field: 'result', rows: [{ value: 1 }, { value: '<2' }, { value: 1 }, { value: 3 }] } }],
    ['responses without calibration', { by: 'blank scatter', blanks: 'b' }, { b: { field: 'response', rows: blanks.rows } }],
    ['one calibration level', { by: 'ISO 11843-2', calibration: 'c' }, { c: { field: 'response', rows: [1, 2, 3].map((value) => ({ level: 1, value })) } }],
    ['no slope', { by: 'calibration scatter', calibration: 'c' }, { c: { field: 'response', rows: [1, 2, 3].map((level) => ({ level, value: 1 })) } }],
    ['points exactly on a line', { by: 'ISO 11843-2', calibration: 'c' }, { c: { field: 'response', rows: [1, 2, 3, 4].map((level) => ({ level, value: level })) } }],
    ['a censored spike', { by: 'MDL', blanks: 'b', spikes: 's' }, { b: blanks, s: { field: 'result', rows: [...Array.from({ length: 7 }, (_, index) => ({ value: 1 + index / 10 })), { value: 'n.d.' }] } }],
    ['a negative spike', { by: 'MDL', blanks: 'b', spikes: 's' }, { b: blanks, s: { field: 'result', rows: Array.from({ length: 7 }, (_, index) => ({ value: index - 1 })) } }],
    ['no trace', { by: 'signal to noise', noise: 'rms', trace: { data: 't', level: '1 mg/L', baseline: { from: 0, to: 1 }, peak: { from: 1, to: 2 } } }, { t: { field: 'response', rows: [] } }],
  ])('%s: no limit, a reason, and nothing thrown', (_, options, data) => {
    const found = assess(options, data)
    expect(found.findings.map((each) => each.metric)).not.toContain('detection-limit')
    expect(found.notEvaluable.find((each) => each.metric === 'detection-limit')?.because).toMatch(/\w/)
    expect(found.diagnostics.some((each) => each.severity !== 'note')).toBe(true)
    expect(JSON.stringify(found)).not.toContain('null')
  })

  test('a level in another unit than the measurand is an error', () => {
    const found = assess({ by: 'calibration scatter', calibration: 'c', 'levels-up-to': '2 µg/L' }, { c: line })
    expect(found.diagnostics.map((each) => each.severity)).toContain('error')
  })

  test('a quantitation limit below every tested level is not evaluable until results confirm it', () => {
    const options = { by: 'blank scatter', blanks: 'b' }
    const computed = assess(options, { b: blanks })
    expect(computed.notEvaluable.find((each) => each.metric === 'quantitation-limit')?.because).toContain('no results confirm it')
    const low = { field: 'result', rows: [0.031, 0.029, 0.03, 0.033, 0.028, 0.03].map((value) => ({ level: 0.03, value })) } as const
    const confirmed = assess({ ...options, confirmation: 'q' }, { b: blanks, q: low })
    expect(confirmed.findings.map((each) => each.metric)).toContain('quantitation-limit')
  })
})
