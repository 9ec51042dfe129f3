// The whole of a study is read: every key, every default named, every number as typed; and whatever is damaged, errors come instead of a throw.
import { readFileSync } from 'node:fs'
import { expect, test } from 'vitest'
import fc from 'fast-check'
import { catalogue } from '../../src/characteristics/index.ts'
import { readDefinition } from '../../src/definition/index.ts'
import type { StudyDefinition } from '../../src/definition/study.ts'
import { hasErrors } from '../../src/diagnostics/stage-result.ts'
import { printDiagnostics } from '../../src/diagnostics/print.ts'
import { tinyCatalogue } from '../support/tiny-catalogue.ts'
import { exampleStudy } from './example-study.ts'

function read(text: string): StudyDefinition {
  const { value, diagnostics } = readDefinition({ file: 'study.yaml', text }, tinyCatalogue)
  if (value === undefined) throw new Error(printDiagnostics(diagnostics, { sources: new Map([['study.yaml', text]]) }))
  expect(diagnostics).toEqual([])
  return value
}

const study = read(exampleStudy)

test('identity, method, people and rules', () => {
  expect(study.report).toMatchObject({ number: 'GHW-VR-014', revision: 2, kind: 'full validation', date: '2026-04-17', supersedes: { value: '../revision-1/record.json', place: { line: 5, column: 15 } } })
  expect(study.method).toMatchObject({ number: 'GHW-M-031', revision: '4' })
  expect(study.people.reviewed.map((person) => person.id)).toEqual(['bl', 'dn'])
  expect(study.rules).toEqual({ confidence: 0.95, decideOn: 'unrounded values', rounding: 'half up', to: 'decimals of the limit' })
  expect(read(exampleStudy.replace('95 %', '99.9 %')).rules.confidence).toBe(0.999)
})

test('datasets: what a file says wins over what the dataset says', () => {
  const [calibration, , spikes] = study.datasets
  expect(calibration?.files.map((file) => [file.path, file.decimal, file.headerRow, file.fixed])).toEqual([['raw/cal-1.csv', undefined, undefined, {}], ['raw/cal-2.csv', 'comma', 4, { day: '2026-03-02' }]])
  expect(calibration?.rows.map((rule) => [rule.column, rule.accepted])).toEqual([['Type', ['STD', 'CAL']]])
  expect(calibration).toMatchObject({ replicate: { value: 'vial' }, average: [{ value: 'injection' }], tokens: { notDetected: ['n.a.'], missing: ['-'] } })
  expect(spikes).toMatchObject({ columns: { response: { kind: 'per measurand', columns: { nitrate: { value: 'Area NO3' } } } }, through: { value: 'linearity' }, subtractBlank: { value: 'blanks' }, reportable: 'recomputed' })
  const defaults = read(exampleStudy.replace('  calibration:\n', '  calibration:\n    decimal: point\n    fixed: { analyst: AK, day: 2026-03-01 }\n')).datasets[0]
  expect(defaults?.files.map((file) => [file.decimal, file.fixed])).toEqual([['point', { analyst: 'AK', day: '2026-03-01' }], ['comma', { analyst: 'AK', day: '2026-03-02' }]])
})

test('exclusions select a row by text', () => {
  expect(study.exclusions).toMatchObject([{ number: 1, dataset: { value: 'calibration' }, row: { matches: [{ column: 'Inj', text: '41' }], file: 'raw/cal-1.csv', rows: 1 }, measurands: ['chloride'], requestedBy: 'ak', approvedBy: 'bl' }])
})

test('blocks keep their order, their names and their criteria as typed', () => {
  expect(study.blocks.map((block) => [block.id, block.measurands, block.decideBy])).toEqual([['linearity', ['chloride', 'nitrate'], 'estimate'], ['comparison.low', ['nitrate'], 'interval'], ['comparison.high', ['chloride', 'nitrate'], 'estimate']])
  expect(study.blocks[0]?.criteria).toMatchObject([
    { metric: 'back-calculation-error', limit: { kind: 'at most', bound: { value: 15, unit: '%', text: '15' } }, overrides: {} },
    { metric: 'slope', source: 'GHW-SOP-7', limit: { kind: 'above', bound: { value: 1.9, unit: 'µS·min/(mg/L)' } }, overrides: { nitrate: { text: 'above 0.9 µS·min/(mg/L)' } } },
  ])
  expect(study.blocks[2]?.criteria).toMatchObject([{ metric: 'difference', limit: { kind: 'between', high: { text: '2.0' } }, place: { line: 52 } }])
})

test('design, absences, texts and registers', () => {
  expect(study.design).toMatchObject([{ characteristic: 'linearity', counts: { levels: 7, replicates: 2 }, assumedRsd: { value: 2, unit: '%' } }])
  expect(study.notPerformed).toMatchObject([{ characteristic: 'robustness' }])
  expect(study.texts).toEqual({ discussion: 'The feeds differ little.', conclusion: 'Suitable, with the remarks above.' })
  expect([study.deviations, study.equipment, study.materials]).toEqual([[], [{ Equipment: 'balance', Number: 'B-3' }], []])
})

test('each default taken is named', () => {
  expect(study.defaults).toEqual([
    { key: 'rules.rounding', value: 'half up' }, { key: 'rules.to', value: 'decimals of the limit' },
    { key: 'exclusions[1].row.rows', value: '1' },
    { key: 'characteristics.linearity.decide-by', value: 'estimate' }, { key: 'characteristics.linearity.measurands', value: 'every measurand' },
    { key: 'characteristics.comparison.high.decide-by', value: 'estimate' }, { key: 'characteristics.comparison.high.measurands', value: 'every measurand' },
  ])
  expect(read(exampleStudy.replace(/rules: .*\n/, '')).defaults.slice(0, 5).map((each) => each.key)).toEqual(['exclusions[1].row.rows', 'rules.confidence', 'rules.decide-on', 'rules.rounding', 'rules.to'])
})

test('mistakes in different parts are told together', () => {
  const damaged = exampleStudy.replace('unit: mg/L, response: µS·min, name', 'unit: mgl, response: µS·min, name').replace('requested-by: ak', 'requested-by: zz').replace('fit: straight line', 'fit: strait line').replace('through: linearity', 'through: linear').replace('kind: full validation', 'kind: full')
  const { value, diagnostics } = readDefinition({ file: 'study.yaml', text: damaged }, tinyCatalogue)
  expect(value).toBeUndefined()
  expect(diagnostics.map((each) => [each.code, each.place?.line]).sort((left, right) => Number(left[1]) - Number(right[1]))).toEqual([
    ['definition/unknown-choice', 8], ['definition/unknown-unit', 21], ['definition/unknown-name', 37], ['definition/unknown-name', 41], ['definition/unknown-choice', 46],
  ])
})

test('a study without one character is read or told, never thrown at', () => {
  for (let index = 0; index < exampleStudy.length; index += 3) expectTold(exampleStudy.slice(0, index) + exampleStudy.slice(index + 1))
}, 120_000)

test('a study with lines shuffled, doubled or replaced by other lines is read or told', () => {
  const lines = exampleStudy.split('\n')
  const others = ['- a', '  : ', '? x', '{', 'a: [', '\t', '!!binary x', '&a', '*a', '"', '---', '%A', '<<: *a', 'constructor: 1', '__proto__: { a: 1 }', 'toString: [1]']
  fc.assert(fc.property(fc.array(fc.tuple(fc.nat(lines.length - 1), fc.constantFrom(...lines, ...others)), { minLength: 1, maxLength: 6 }), (changes) => {
    const changed = [...lines]
    for (const [index, line] of changes) changed[index] = line
    expectTold(changed.join('\n'))
  }), { seed: 20260417, numRuns: 300 })
}, 120_000)

function expectTold(text: string): void {
  const { value, diagnostics } = readDefinition({ file: 'study.yaml', text }, tinyCatalogue)
  expect(value === undefined, text).toBe(hasErrors(diagnostics))
  for (const each of diagnostics) {
    const lines = text.split('\n')
    expect(each.place?.line ?? 0, each.message).toBeGreaterThan(0)
    expect(each.place?.line ?? 0, each.message).toBeLessThanOrEqual(lines.length)
  }
}

test('a study with one of everything is read with the catalogue of the program', () => {
  const path = new URL('../../fixtures/definition/every-part/study.yaml', import.meta.url)
  const { value, diagnostics } = readDefinition({ file: 'study.yaml', text: readFileSync(path, 'utf8') }, catalogue)
  expect(printDiagnostics(diagnostics, { sources: new Map() })).toBe('')
  expect(value?.blocks.map((block) => block.id)).toEqual(['linearity', 'range', 'detection', 'accuracy', 'precision', 'comparison'])
  expect(value?.blocks.map((block) => block.criteria.length)).toEqual([2, 2, 2, 1, 2, 1])
})

test('five hundred measurands take no longer than a moment', () => {
  const many = Array.from({ length: 500 }, (_, index) => `  m${index}: { unit: mg/L, response: µS·min }\n`).join('')
  const text = exampleStudy.replace(/ {2}chloride: \{.*\n/, (line) => line + many)
  read(text)
  const start = performance.now()
  read(text)
  expect(performance.now() - start).toBeLessThan(1000) // milliseconds; some 50 alone on a quiet machine
})
