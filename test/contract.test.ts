// What every characteristic owes to its stages, checked for each entry of the catalogue on the demo and on generated studies: declared
// metrics are reported or explained, numbers are finite, findings carry unit and evidence, exhibits carry captions and alternative texts,
// and too little data is told, never thrown.
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'
import { readStudyFile, studyFolder } from '../src/cli/study-folder.ts'
import type { StudyRecord } from '../src/assess/record.ts'
import { catalogue } from '../src/characteristics/index.ts'
import { check, type Checked, type World } from '../src/pipeline.ts'
import { generatedStudy } from './support/generated-study.ts'
import { shippedTemplate, templatesFolder } from './support/shipped-template.ts'

const encoder = new TextEncoder()

function world(files: ReadonlyMap<string, string>): World {
  return {
    program: { name: 'Assaywrit', version: '0.0.0-test' }, templates: ['validation-report'], template: shippedTemplate,
    read: (path) => (files.has(path) ? { path, bytes: encoder.encode(files.get(path)) } : { problem: 'no such file', mend: '' }),
  }
}

function demo(): Checked {
  const path = join(fileURLToPath(new URL('..', import.meta.url)), 'fixtures/studies/process-water/study.yaml')
  const study = readStudyFile(path)
  if ('problem' in study) throw new Error(study.problem)
  return check(study, studyFolder(path, templatesFolder))
}

function generated(keep: (line: string, index: number) => boolean = () => true): Checked {
  const study = generatedStudy({ seed: 41, measurands: 2 })
  const files = new Map([...study.files].map(([path, text]) => [path, `${text.trimEnd().split('\n').filter(keep).join('\n')}\n`]))
  return check({ path: 'study.yaml', bytes: encoder.encode(study.study) }, world(files))
}

function recordOf(checked: Checked): StudyRecord {
  if (checked.record === undefined) throw new Error(checked.diagnostics.map((each) => `${each.code} ${each.message}`).join('\n'))
  return checked.record
}

const records = [recordOf(demo()), recordOf(generated())]

describe.each(catalogue.map((part) => ({ part, id: part.id })))('$id', ({ part, id }) => {
  const own = records.flatMap((record) => record.assessments.filter((each) => each.characteristic === id).map((assessment) => ({ record, assessment })))

  test('is asked for by the demo and by generated studies', () => expect(new Set(own.map((each) => each.record)).size).toBe(records.length))

  test('reports every metric it declares, or says why not', () => {
    for (const { record, assessment } of own) {
      const findings = record.findings.filter((each) => each.block === assessment.block && each.measurand === assessment.measurand).map((each) => each.metric)
      const told = new Set([...findings, ...assessment.notEvaluable.map((each) => each.metric)])
      const conditional = new Set(['signal-to-noise', 'quantitation-recovery', 'quantitation-rsd', 'critical-value', 'minimum-detectable-value', 'blank-standard-deviation', 'blank-response-standard-deviation', 'method-detection-limit', 'mdl-spikes', 'mdl-blanks', 'detection-limit-by-definition', 'quantitation-limit-by-definition', 'mean'])
      // A detection block reports the definitions it was asked for; its other metrics belong to definitions that were not asked for.
      expect(Object.keys(part.metrics).filter((metric) => !told.has(metric) && !(id === 'detection' && conditional.has(metric))), `${assessment.block}/${assessment.measurand}`).toEqual([])
    }
  })

  test('gives every finding a unit of its metric, a method, a source and evidence', () => {
    for (const record of records) for (const finding of record.findings.filter((each) => each.characteristic === id)) {
      expect(part.metrics[finding.metric], finding.id).toBeDefined()
      expect(finding.method.length, finding.id).toBeGreaterThan(3)
      expect(finding.source.length, finding.id).toBeGreaterThan(3)
      expect(finding.evidence.flatMap((each) => each.rows).length, finding.id).toBeGreaterThan(0)
      for (const evidence of finding.evidence) {
        const rows = record.datasets.find((dataset) => dataset.name === evidence.dataset)?.rows ?? []
        for (const row of evidence.rows) expect(rows[row]?.fate.kind, `${finding.id} row ${row}`).toBe('used')
      }
      if (finding.interval !== undefined) expect(finding.interval.low <= finding.value + Math.abs(finding.value) * 1e-9 && finding.interval.high >= finding.value - Math.abs(finding.value) * 1e-9, `${finding.id} lies in its interval`).toBe(true)
    }
  })

  test('describes every metric and every option for the published schema', () => {
    for (const metric of Object.values(part.metrics)) expect([metric.label === metric.label.trim(), metric.help.length > 10]).toEqual([true, true])
    for (const [key, property] of Object.entries((part.options.schema as { properties?: Record<string, { description?: string }> }).properties ?? {})) expect(property.description, key).toBeTypeOf('string')
  })
})

test('equal input, equal record', () => {
  expect(JSON.stringify(recordOf(generated()))).toBe(JSON.stringify(records[1]))
})

test.each([
  ['one row of data', (_: string, index: number) => index < 2],
  ['two rows of data', (_: string, index: number) => index < 3],
  ['every seventh row', (_: string, index: number) => index === 0 || index % 7 === 1],
])('%s: told, not thrown, and no number that is none', (_, keep) => {
  const checked = generated(keep)
  expect(checked.diagnostics.length).toBeGreaterThan(0)
  if (checked.record === undefined) return
  const text = JSON.stringify(checked.record, (__, value: unknown) => (typeof value === 'number' && !Number.isFinite(value) ? 'NOT FINITE' : value))
  expect(text).not.toContain('NOT FINITE')
  expect(checked.tell?.().document.blocks.length).toBeGreaterThan(10)
})

test('a column of equal values everywhere: told, not thrown', () => {
  const study = generatedStudy({ seed: 42, measurands: 1 })
  const separator = study.study.includes('delimiter: semicolon') ? ';' : ','
  const files = new Map([...study.files].map(([path, text]) => [path, text.trimEnd().split('\n').map((line, index) => (index === 0 ? line : [...line.split(separator).slice(0, -1), '5'].join(separator))).join('\n') + '\n']))
  const checked = check({ path: 'study.yaml', bytes: encoder.encode(study.study.replace(/^ {2}(\w+): \{ files: \[raw\/(days|spikes)/gm, '  $1: { files: [raw/$2')) }, world(files))
  expect(checked.diagnostics.length).toBeGreaterThan(0)
})

test('every exhibit has a caption, every figure an alternative text, and ids are unique', () => {
  for (const checked of [demo(), generated()]) {
    const blocks = checked.tell?.().document.blocks ?? []
    const ids = blocks.flatMap((block) => ('id' in block ? [block.id] : []))
    expect(ids.filter((id, index) => ids.indexOf(id) !== index)).toEqual([])
    for (const block of blocks) {
      if (block.type === 'exhibitTable' || block.type === 'exhibitFigure') expect(block.caption.length, block.id).toBeGreaterThan(0)
      if (block.type === 'exhibitFigure') expect(block.alternative.length, block.id).toBeGreaterThan(20)
      if (block.type === 'exhibitTable') for (const row of block.groups.flat()) expect(row.cells.length, block.id).toBe(block.columns.length)
    }
  }
})
