// The written PDF, read back by a reader that is not ours (pdf.js): every number, every link, bookmark, tag and attachment.
import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs'
import { beforeAll, describe, expect, test } from 'vitest'
import type { Inline, ReportBlock } from '../../src/present/document.ts'
import { loadFonts } from '../../src/publish/fonts.ts'
import type { Attachment } from '../../src/publish/pdf/attachments.ts'
import { publishPdf } from '../../src/publish/pdf/publish-pdf.ts'
import { colourProfile, fontBytes } from './assets.ts'
import { sampleDocument, sampleDrawings } from './sample-document.ts'

const attachments: readonly Attachment[] = [
  { name: 'inputs/study.yaml', bytes: new TextEncoder().encode('format: 1\n'), relationship: 'Source', description: 'study: study.yaml' },
  { name: 'inputs/raw/empty.csv', bytes: new Uint8Array(0), relationship: 'Source', description: 'raw data: raw/empty.csv' },
  { name: 'record.json', bytes: Uint8Array.from({ length: 5000 }, (_, index) => index % 251), relationship: 'Data', description: 'every finding' },
]

const make = (): Uint8Array => publishPdf({ document: sampleDocument, drawings: sampleDrawings, fonts: loadFonts(fontBytes), attachments, colourProfile })

interface StructureItem {
  readonly role?: string
  readonly type?: string
  readonly alt?: string
  readonly children?: readonly StructureItem[]
}

let bytes: Uint8Array
let reader: Awaited<ReturnType<typeof getDocument>['promise']>
let pageTexts: readonly string[]

beforeAll(async () => {
  bytes = make()
  reader = await getDocument({ data: bytes.slice(), verbosity: 0 }).promise
  pageTexts = await eachPage(async (page) => (await page.getTextContent()).items.map((item) => ('str' in item ? item.str : '')).join(''))
})

async function eachPage<T>(of: (page: Awaited<ReturnType<typeof reader.getPage>>) => Promise<T>): Promise<readonly T[]> {
  const found: T[] = []
  for (let index = 1; index <= reader.numPages; index += 1) found.push(await of(await reader.getPage(index)))
  return found
}

const tight = (text: string): string => text.replace(/\s/g, '')

test('the same report gives the same bytes', () => {
  expect(Buffer.from(make()).equals(Buffer.from(bytes))).toBe(true)
})

test('every number of the report is read back', () => {
  const said = tight(pageTexts.join(''))
  const numbers = sampleDocument.blocks.flatMap(numbersIn)
  expect(numbers.length).toBeGreaterThan(500)
  expect(numbers.filter((printed) => !said.includes(tight(printed)))).toEqual([])
})

test('every page is numbered', () => {
  pageTexts.forEach((said, index) => {
    expect(said).toContain(`page ${index + 1} of ${reader.numPages}`)
  })
})

test('title, language, producer and dates come from the report', async () => {
  const { info, metadata } = await reader.getMetadata()
  expect(info).toMatchObject({ Title: `EX-VR-001 ${sampleDocument.title}`, Author: 'A. Author; B. Reviewer', CreationDate: 'D:20260417000000Z', ModDate: 'D:20260417000000Z', Language: 'en' })
  // ISO 19005-3, 6.6.2 and 6.6.4; ISO 14289-1, clause 5.
  expect([metadata.get('pdfaid:part'), metadata.get('pdfaid:conformance'), metadata.get('pdfuaid:part'), metadata.get('dc:title')]).toEqual(['3', 'A', '1', `EX-VR-001 ${sampleDocument.title}`])
})

test('every link and bookmark arrives at a page', async () => {
  const targets = (await eachPage(async (page) => (await page.getAnnotations()) as readonly { readonly subtype: string; readonly dest?: readonly unknown[]; readonly url?: string }[])).flat()
  expect(targets).toHaveLength(10) // five of the contents, two references, three page references
  for (const link of targets) expect(await reader.getPageIndex((link.dest?.[0] ?? null) as Parameters<typeof reader.getPageIndex>[0])).toBeGreaterThanOrEqual(0)
  const outline = await reader.getOutline()
  expect(outline.map((item) => item.title)).toEqual(['1 Summary', '2 Linearity and working range', '3 Precision', 'Annex A Raw data'])
  expect(outline[1]?.items.map((item) => item.title)).toEqual(['2.1 Measurand one'])
  const [first] = (outline[1]?.dest ?? []) as readonly Parameters<typeof reader.getPageIndex>[0][]
  if (first === undefined) throw new Error('a bookmark without a target')
  expect(tight(pageTexts[await reader.getPageIndex(first)] ?? '')).toContain(tight('2 Linearity and working range'))
})

test('attachments come back byte for byte', async () => {
  const found = (await reader.getAttachments()) as Readonly<Record<string, { readonly content: Uint8Array; readonly description: string }>>
  expect(Object.keys(found).sort()).toEqual(['inputs_raw_empty.csv', 'inputs_study.yaml', 'record.json'])
  for (const attachment of attachments) {
    const read = found[attachment.name.replaceAll('/', '_')]
    expect(Buffer.from(read?.content ?? []).equals(Buffer.from(attachment.bytes))).toBe(true)
    expect(read?.description).toContain(attachment.name)
  }
})

test('two attachments cannot hide each other', () => {
  const twice: readonly Attachment[] = [{ name: 'a/b.csv', bytes: new Uint8Array(1), relationship: 'Source', description: '' }, { name: 'a_b.csv', bytes: new Uint8Array(1), relationship: 'Source', description: '' }]
  expect(() => publishPdf({ document: { ...sampleDocument, blocks: [] }, drawings: new Map(), fonts: loadFonts(fontBytes), attachments: twice, colourProfile })).toThrow('same name')
})

describe('tags', () => {
  let roles: ReadonlyMap<string, number>
  let items: readonly StructureItem[]

  beforeAll(async () => {
    const trees = await eachPage(async (page) => (await page.getStructTree()) as StructureItem)
    items = trees.flatMap(itemsOf)
    const counts = new Map<string, number>()
    for (const item of items) if (item.role !== undefined) counts.set(item.role, (counts.get(item.role) ?? 0) + 1)
    roles = counts
  })

  test('headings, tables, lists and figures are there', () => {
    for (const role of ['H1', 'H2', 'H3', 'P', 'Table', 'THead', 'TBody', 'TR', 'TH', 'TD', 'Caption', 'L', 'LI', 'Lbl', 'LBody', 'Figure', 'Formula', 'Link', 'TOC', 'TOCI', 'BlockQuote', 'Note', 'Code']) expect([role, roles.get(role) ?? 0]).not.toEqual([role, 0])
  })

  test('every figure and formula has its alternative text', () => {
    for (const item of items.filter((each) => each.role === 'Figure' || each.role === 'Formula')) expect(item.alt ?? '').not.toBe('')
  })

  test('all that is drawn is content of an element or an artifact', async () => {
    // ISO 14289-1, 7.1: content is either tagged or an artifact.
    const untagged = await eachPage(async (page) => {
      const text = await page.getTextContent({ includeMarkedContent: true })
      let depth = 0
      return text.items.filter((item) => {
        if ('str' in item) return depth === 0 && item.str.trim() !== ''
        depth += item.type === 'endMarkedContent' ? -1 : 1
        return false
      })
    })
    expect(untagged.flat()).toEqual([])
  })
})

function itemsOf(item: StructureItem): readonly StructureItem[] {
  return [item, ...(item.children ?? []).flatMap(itemsOf)]
}

function numbersIn(block: ReportBlock): readonly string[] {
  const of = (inlines: readonly Inline[]): readonly string[] => inlines.flatMap((inline) => (inline.type === 'number' ? [inline.text] : 'children' in inline ? of(inline.children as readonly Inline[]) : []))
  if (block.type === 'exhibitTable') return [block.caption, ...block.notes, ...block.groups.flat().flatMap((row) => row.cells)].flatMap(of)
  if (block.type === 'cover') return of(block.overallSentence)
  return block.type === 'textBlock' ? of(block.children) : []
}
