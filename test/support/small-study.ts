// A study of one block in memory, taken through the whole pipeline: for what a characteristic does with awkward designs and options.
import { check, type Checked } from '../../src/pipeline.ts'
import { shippedTemplate } from './shipped-template.ts'

const head = `format: 1
report: { number: WE-1, revision: 1, title: "A small study", kind: verification, date: 2026-05-04, language: en, template: validation-report }
method: { number: M-1, technique: ion chromatography }
intended-use: An invented example.
people:
  prepared: { id: rw, name: Runa Wolde, position: analyst }
  reviewed: { id: jt, name: Jory Tamsin, position: second analyst }
  approved: { id: pk, name: Pell Karsten, position: head of laboratory }
measurands:
  substance: { unit: mg/L }
texts: { conclusion: None is drawn from an invented example. }
`

/** `body` holds `data:` and `characteristics:`; `files` the raw files by name. */
export function checkSmallStudy(body: string, files: Readonly<Record<string, string>>): Checked {
  const encoder = new TextEncoder()
  return check({ path: 'study.yaml', bytes: encoder.encode(`${head}${body}`) }, {
    program: { name: 'Assaywrit', version: '0.0.0-test' }, templates: ['validation-report'], template: shippedTemplate,
    read: (path) => (files[path] === undefined ? { problem: 'no such file', mend: '' } : { path, bytes: encoder.encode(files[path]) }),
  })
}

/** `code: message` of every error and warning. */
export function troubleOf(checked: Checked): readonly string[] {
  return checked.diagnostics.filter((each) => each.severity !== 'note').map((each) => `${each.code}: ${each.message}`)
}

export function verdictsOf(checked: Checked): Readonly<Record<string, string>> {
  return Object.fromEntries((checked.record?.verdicts ?? []).map((each) => [each.finding, each.verdict]))
}
