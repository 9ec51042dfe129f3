// The conformity table of the demo report, read back from the PDF by an outside reader through its tags: every number in it is that of
// the record, every limit, verdict and page as well.
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs'
import { beforeAll, expect, test } from 'vitest'
import { readStudyFile, studyFolder } from '../src/cli/study-folder.ts'
import type { StudyRecord } from '../src/assess/record.ts'
import { check } from '../src/pipeline.ts'
import type { ExhibitTable, Inline } from '../src/present/document.ts'
import { publish } from '../src/publish/index.ts'
import { colourProfile, fontBytes } from './publish/assets.ts'
import { templatesFolder } from './support/shipped-template.ts'

interface StructureNode {
  readonly role?: string
  readonly type?: string
  readonly id?: string
  readonly children?: readonly StructureNode[]
}

const path = join(fileURLToPath(new URL('..', import.meta.url)), 'fixtures/studies/process-water/study.yaml')
let record: StudyRecord
let table: ExhibitTable
let printed: readonly (readonly string[])[] = []
let pageText: readonly string[] = []

beforeAll(async () => {
  const study = readStudyFile(path)
  if ('problem' in study) throw new Error(study.problem)
  const checked = check(study, studyFolder(path, templatesFolder))
  if (checked.record === undefined || checked.tell === undefined) throw new Error('the demo does not build')
  record = checked.record
  const { document } = checked.tell()
  const found = document.blocks.find((block): block is ExhibitTable => block.type === 'exhibitTable' && block.id === 'conformity')
  if (found === undefined) throw new Error('no conformity table')
  table = found
  const { pdf } = await publish(document, { fontBytes, colourProfile, attachments: () => [] })
  const reader = await getDocument({ data: pdf, useSystemFonts: false, verbosity: 0 }).promise
  const texts: string[] = []
  const rows: (readonly string[])[] = []
  for (let number = 1; number <= reader.numPages; number += 1) {
    const page = await reader.getPage(number)
    const { items } = await page.getTextContent({ includeMarkedContent: true })
    texts.push(items.map((item) => ('str' in item ? item.str : '')).join(' '))
    if (number <= 8) rows.push(...rowsOf(await page.getStructTree() as StructureNode, items as readonly Item[]))
  }
  pageText = texts
  printed = rows.filter((row) => row.length === table.columns.length && row[0] !== 'Measurand')
}, 120_000)

type Item = { readonly type?: string; readonly id?: string; readonly str?: string }

/** Cell texts of every table row on a page, by the marked content of its cells. */
function rowsOf(tree: StructureNode, items: readonly Item[]): readonly (readonly string[])[] {
  const texts = new Map<string, string>()
  const open: string[] = []
  for (const item of items) {
    if (item.type === 'beginMarkedContentProps' || item.type === 'beginMarkedContent') open.push(item.id ?? '')
    else if (item.type === 'endMarkedContent') open.pop()
    else if (item.str !== undefined) {
      const id = open.filter((each) => each !== '').at(-1)
      if (id !== undefined) texts.set(id, `${texts.get(id) ?? ''}${item.str} `)
    }
  }
  const textOf = (node: StructureNode): string => (node.type === 'content' ? (texts.get(node.id ?? '') ?? '') : (node.children ?? []).map(textOf).join(' '))
  const visit = (node: StructureNode): readonly (readonly string[])[] => (node.role === 'TR'
    ? [(node.children ?? []).map((cell) => textOf(cell).replace(/\s+/g, ' ').trim())]
    : (node.children ?? []).flatMap(visit))
  return visit(tree)
}

function numbersIn(text: string): readonly { readonly value: number; readonly half: number }[] {
  return [...text.replace(/\u2212/g, '-').matchAll(/-?\d+(?:\.(\d+))?/g)].map((match) => ({ value: Number(match[0]), half: 0.5 * 10 ** -(match[1]?.length ?? 0) }))
}

/** Rows without empty cells: a reader leaves empty cells out of the tree. */
const full = (): readonly ExhibitTable['groups'][number][number][] => table.groups.flat().filter((row) => row.cells.every((cell) => cell.length > 0))
const valuesOf = (cell: readonly Inline[]): readonly number[] => cell.flatMap((inline) => (inline.type === 'number' ? [inline.value] : []))

test('every row of the table is read back, in order', () => {
  const rows = full()
  expect(rows.length).toBeGreaterThan(20)
  const start = printed.findIndex((row) => row[0] === record.study.measurands[0]?.name)
  const read = printed.slice(start, start + rows.length)
  expect(read.length).toBe(rows.length)
  for (const [index, row] of rows.entries()) {
    const expected = valuesOf(row.cells[4] ?? [])
    const found = numbersIn(read[index]?.[4] ?? '').slice(0, expected.length)
    expect(found.length, `row ${index + 1}: ${read[index]?.join(' | ')}`).toBe(expected.length)
    expected.forEach((value, at) => expect(Math.abs((found[at]?.value ?? NaN) - value), `row ${index + 1}: ${read[index]?.join(' | ')}`).toBeLessThanOrEqual((found[at]?.half ?? 0) * (1 + 1e-9)))
  }
})

test('the numbers, limits and verdicts are those of the record', () => {
  for (const row of table.groups.flat()) {
    const verdict = row.cells[5]?.find((inline) => inline.type === 'verdict')
    const limit = row.cells[2]?.map((inline) => ('value' in inline ? inline.value : '')).join('')
    const values = valuesOf(row.cells[4] ?? [])
    if (limit === '') continue
    const judged = record.verdicts.filter((each) => each.criterion === limit && each.verdict === verdict?.word)
    const known = judged.flatMap((each) => [...(each.unrounded ?? []), ...(each.level === undefined ? [] : [each.level])])
    expect(judged.length, String(limit)).toBeGreaterThan(0)
    for (const value of values) expect(known).toContain(value)
  }
})

test('each page number leads to the section that it names', () => {
  const rows = full()
  const start = printed.findIndex((row) => row[0] === record.study.measurands[0]?.name)
  for (const [index] of rows.entries()) {
    const [measurand = '', , , , , verdict = '', page = ''] = printed[start + index] ?? []
    if (verdict.includes('not performed')) continue
    expect(pageText[Number(page) - 1], `page ${page} for ${measurand}`).toContain(measurand)
  }
})
