// Every folder fixtures/characteristics/<characteristic>/<case>/ is a study that goes through the whole pipeline; its findings are held
// to the figures of expected.yaml, each with its source, and its section to the approved text.
import { existsSync, readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'
import { parse } from 'yaml'
import { readStudyFile, studyFolder } from '../src/cli/study-folder.ts'
import { check } from '../src/pipeline.ts'
import type { ReportBlock, ReportDocument } from '../src/present/document.ts'
import { publishMarkdown } from '../src/publish/markdown.ts'
import { expectApproved } from './support/approved.ts'
import { agreesInDigits, agreesWithPublished } from './support/published-figure.ts'
import { templatesFolder } from './support/shipped-template.ts'

interface Expected {
  readonly source: string
  readonly findings?: readonly { readonly id: string; readonly value: string | number; readonly digits?: number; readonly source?: string; readonly interval?: readonly [string, string]; readonly df?: number | string; readonly n?: number }[]
  readonly verdicts?: readonly { readonly finding: string; readonly verdict: string }[]
  readonly diagnostics?: readonly string[]
  /** Overall verdict, where the case is about it. */
  readonly overall?: string
}

const root = fileURLToPath(new URL('../fixtures/characteristics', import.meta.url))
const cases = readdirSync(root).flatMap((characteristic) => readdirSync(join(root, characteristic)).map((name) => ({ characteristic, name, folder: join(root, characteristic, name) })))

describe.each(cases)('$characteristic: $name', ({ characteristic, folder }) => {
  const path = join(folder, 'study.yaml')
  const study = readStudyFile(path)
  if ('problem' in study) throw new Error(`${path}: ${study.problem}`)
  const checked = check(study, studyFolder(path, templatesFolder))
  const expected = parse(readFileSync(join(folder, 'expected.yaml'), 'utf8')) as Expected

  test('notices what is expected and nothing else', () => {
    const codes = checked.diagnostics.filter((each) => each.severity !== 'note').map((each) => each.code)
    expect(checked.diagnostics.filter((each) => each.severity === 'error').map((each) => `${each.code} ${each.message}`).filter((each) => !(expected.diagnostics ?? []).some((code) => each.startsWith(code)))).toEqual([])
    expect([...new Set(codes)].sort()).toEqual([...new Set((expected.diagnostics ?? []).filter((code) => checked.diagnostics.some((each) => each.code === code && each.severity !== 'note') || !checked.diagnostics.some((each) => each.code === code)))].sort())
  })

  for (const each of expected.findings ?? []) {
    test(`${each.id} = ${each.value} (${each.source ?? expected.source})`, () => {
      const finding = checked.record?.findings.find((candidate) => candidate.id === each.id)
      expect(finding, `no finding ${each.id}; there are ${checked.record?.findings.map((found) => found.id).join(', ')}`).toBeDefined()
      if (finding === undefined) return
      const compared = (value: number, published: string): boolean => agreesWithPublished(value, published).agrees || (each.digits !== undefined && agreesInDigits(value, Number(published), each.digits).agrees)
      const agreement = { agrees: compared(finding.value, String(each.value)) }
      expect(agreement.agrees, `found ${finding.value}, published ${each.value}`).toBe(true)
      if (each.interval !== undefined) {
        expect(compared(finding.interval?.low ?? 0, each.interval[0]), `lower end ${finding.interval?.low}`).toBe(true)
        expect(compared(finding.interval?.high ?? 0, each.interval[1]), `upper end ${finding.interval?.high}`).toBe(true)
      }
      if (each.n !== undefined) expect(finding.n).toBe(each.n)
      if (each.df !== undefined) expect(agreesWithPublished(finding.df ?? 0, String(each.df)).agrees, `df ${finding.df}`).toBe(true)
    })
  }

  for (const each of expected.verdicts ?? []) {
    test(`${each.finding} ${each.verdict}`, () => {
      expect(checked.record?.verdicts.filter((verdict) => verdict.finding === each.finding).map((verdict) => verdict.verdict)).toContain(each.verdict)
    })
  }

  if (expected.overall !== undefined) test(`overall ${expected.overall}`, () => expect(checked.record?.overall.verdict).toBe(expected.overall))

  if (existsSync(join(folder, 'section.md')) || (expected.findings ?? []).length > 0) {
    test('reads as approved', () => {
      if (checked.tell === undefined) throw new Error('no document')
      expectApproved(join(folder, 'section.md'), sectionOf(checked.tell().document, characteristic))
    })
  }
})

/** The part of the report that tells one characteristic. */
function sectionOf(document: ReportDocument, characteristic: string): string {
  let inside = false
  const blocks = document.blocks.filter((block: ReportBlock) => {
    if (block.type === 'sectionHeading' && block.depth === 1) inside = block.id === `section-${characteristic}` || block.id.startsWith(`section-${characteristic}-`)
    return inside
  })
  // The digest of the record changes with every byte of the study; the section itself does not.
  return publishMarkdown({ ...document, header: { ...document.header, digest: '' }, blocks }, { chartPath: (id) => `charts/${id}.svg`, tablePath: (id) => `tables/${id}.csv` })
}
