// Layout of the sample report: approved positions, and what must hold for any report — nothing outside the page, nothing over anything
// else, no heading alone at the foot of a page, no row lost.
import { describe, expect, test } from 'vitest'
import type { ExhibitTable, ReportBlock, ReportDocument } from '../../src/present/document.ts'
import { loadFonts } from '../../src/publish/fonts.ts'
import { flow } from '../../src/publish/pdf/flow.ts'
import type { Box, Frames, TextBox } from '../../src/publish/pdf/frames.ts'
import { rolePath } from '../../src/publish/pdf/structure.ts'
import { page as geometry } from '../../src/publish/pdf/style.ts'
import { expectApproved } from '../support/approved.ts'
import { fontBytes } from './assets.ts'
import { framesText, structureText } from './frames-text.ts'
import { levelTable, number, sampleDocument, sampleDrawings, text } from './sample-document.ts'

const fonts = loadFonts(fontBytes)
const laid = (document: ReportDocument): Frames => flow({ document, drawings: sampleDrawings, fonts })
const withBlocks = (blocks: readonly ReportBlock[]): ReportDocument => ({ ...sampleDocument, blocks })
const sample = laid(sampleDocument)

/** Reports that stress one thing each. */
const documents: readonly { readonly name: string; readonly document: ReportDocument }[] = [
  { name: 'the sample', document: sampleDocument },
  { name: 'forty sections', document: withBlocks([{ type: 'contents', title: 'Contents' }, ...Array.from({ length: 40 }, (_, index): readonly ReportBlock[] => [
    { type: 'sectionHeading', id: `section-${index}`, depth: index % 3 === 0 ? 1 : 2, number: String(index + 1), children: [text(`Section with the number ${index + 1}`)] },
    { type: 'textBlock', origin: index % 5 === 0 ? 'user' : 'program', children: [text('Words of running text that fill some lines. '.repeat(2 + (index % 7)).trim())] },
    ...(index % 4 === 0 ? [levelTable(`table-${index}`, 1 + (index % 3), 3 + index)] : []),
  ]).flat()]) },
  { name: 'unbreakable words', document: withBlocks([
    { type: 'textBlock', origin: 'program', children: [text(`word ${'x'.repeat(300)} word`)] },
    { type: 'exhibitTable', id: 'words', number: '1', caption: [text('Long words')], notes: [], columns: Array.from({ length: 6 }, (_, index) => ({ header: 'H'.repeat(20 + index * 10), align: 'text' as const })), groups: [[{ cells: Array.from({ length: 6 }, () => [text('y'.repeat(90))]) }]] },
  ]) },
  { name: 'numbers of unequal size', document: withBlocks([
    { type: 'exhibitTable', id: 'numbers', number: '1', caption: [text('Numbers')], notes: [], columns: [{ header: 'Item', align: 'text', rowHeader: true }, { header: 'x', unit: 'mg/L', align: 'number' }, { header: 'Interval', align: 'number' }], groups: [[
      { cells: [[text('a')], [number(12345.678)], [number(1.5), text(' to '), number(2.25)]] },
      { cells: [[text('b')], [number(0.001)], [number(10), text(' to '), number(200.125)]] },
      { cells: [[text('c')], [text('not evaluable')], []] },
      { cells: [[text('d')], [number(1.2e-7, '1.2 × 10⁻⁷')], [number(-4, '\u22124')]] },
    ]] },
  ]) },
]

test('the sample stands where it was approved', () => {
  expectApproved('fixtures/publish/sample/frames.txt', framesText(sample))
})

test('the logical tree is the approved one', () => {
  expectApproved('fixtures/publish/sample/structure.txt', structureText(sample))
})

describe.each(documents)('$name', ({ document }) => {
  const frames = laid(document)

  test('no text leaves the text area', () => {
    const right = geometry.left + geometry.textWidth
    const outside = frames.pages.flatMap((page) => texts(page.boxes).filter((box) => box.x < geometry.left - 0.1 || box.x + box.width > right + 0.5 || box.y - box.size * 0.7 < geometry.top - 0.5 || box.y > geometry.bottom + 0.5))
    expect(outside.map((box) => box.text)).toEqual([])
  })

  test('nothing stands over anything else', () => {
    const clashes = frames.pages.flatMap((page, index) => {
      const areas = [...page.header, ...page.boxes, ...page.footer].flatMap(areaOf)
      return areas.flatMap((first, at) => areas.slice(at + 1).filter((second) => overlap(first, second)).map((second) => `page ${index + 1}: ${first.name} / ${second.name}`))
    })
    expect(clashes).toEqual([])
  })

  test('no heading is the last on its page', () => {
    const alone = frames.pages.flatMap((page) => {
      const last = texts(page.boxes).at(-1)
      return last?.tag !== undefined && /^H\d$/.test(last.tag.role) ? [last.text] : []
    })
    expect(alone).toEqual([])
  })

  test('no page is empty', () => {
    expect(frames.pages.filter((page) => texts(page.boxes).length === 0)).toEqual([])
  })

  test('every cell of every table is there, once', () => {
    const said = wordsOf(frames)
    for (const table of document.blocks.filter((block): block is ExhibitTable => block.type === 'exhibitTable')) {
      for (const cell of table.groups.flat().flatMap((row) => row.cells).flatMap((inlines) => inlines)) {
        const printed = cell.type === 'number' ? cell.text : cell.type === 'text' ? cell.value : ''
        expect(said).toContain(printed.replace(/\s/g, ''))
      }
    }
  })
})

test('contents and page references name the page on which their target stands', () => {
  const pageOf = new Map(sample.pages.flatMap((page, index) => page.boxes.flatMap((box) => (box.kind === 'anchor' ? [[box.id, index + 1] as const] : []))))
  const contents = sample.pages[1]
  for (const link of contents?.boxes.filter((box) => box.kind === 'link' && box.words.includes('to page')) ?? []) {
    if (link.kind !== 'link' || link.target.kind !== 'inside') continue
    expect(link.words).toBe(`${/^(.*) to page/.exec(link.words)?.[1] ?? ''} to page ${pageOf.get(link.target.id)}`)
  }
  expect(pageOf.get('linearity')).toBeDefined()
})

test('a table that goes on has its head again on each page, as decoration, and its row headers stay in the logical tree', () => {
  const frames = laid(withBlocks([levelTable('long', 10, 30)]))
  expect(frames.pages.length).toBeGreaterThan(5)
  frames.pages.forEach((page, index) => {
    const heads = texts(page.boxes).filter((box) => box.text.trim() === 'Nominal level')
    expect(heads).toHaveLength(1)
    expect(heads[0]?.tag === undefined).toBe(index > 0)
  })
  const rows = texts(frames.pages.flatMap((page) => page.boxes)).filter((box) => box.tag?.role === 'TH' && box.tag.scope === 'Row')
  expect(rows).toHaveLength(300)
})

test('a table too wide is split, each part with the row headers, and loses no column', () => {
  const parts = sample.pages.flatMap((page) => texts(page.boxes)).filter((box) => box.text.trim() === 'Preparation')
  expect(parts.length).toBeGreaterThan(1)
  const heads = sample.pages.flatMap((page) => texts(page.boxes)).filter((box) => /^Day \d+$/.test(box.text.trim()) && box.tag?.role === 'TH')
  expect(heads.map((box) => box.text.trim())).toEqual(Array.from({ length: 24 }, (_, index) => `Day ${index + 1}`))
})

test('decimal marks of a column stand one below the other', () => {
  const frames = laid(documents.find((each) => each.name === 'numbers of unequal size')?.document ?? sampleDocument)
  const cells = texts(frames.pages.flatMap((page) => page.boxes)).filter((box) => box.tag?.role === 'TD')
  const markOf = (printed: string): number => {
    const box = cells.find((each) => each.text === printed)
    if (box === undefined) throw new Error(`no cell ${printed}`)
    return box.x + fonts.measure(printed.split('.')[0] ?? '', box.face, box.size)
  }
  expect(markOf('12345.678')).toBeCloseTo(markOf('0.001'), 1)
})

test('a number keeps its unit', () => {
  const paragraph: ReportBlock = { type: 'textBlock', origin: 'program', children: Array.from({ length: 60 }, (_, index) => [text('the slope is '), number(index + 0.5), text(' mg/L and ')]).flat() }
  const frames = laid(withBlocks([paragraph]))
  const lines = texts(frames.pages.flatMap((page) => page.boxes)).map((box) => box.text)
  expect(lines.length).toBeGreaterThan(5)
  expect(lines.filter((line) => /\d\s*$/.test(line) || /^\s*mg/.test(line))).toEqual([])
})

test('the user’s own words are marked as such', () => {
  const block = texts(sample.pages.flatMap((page) => page.boxes)).filter((box) => box.tag !== undefined && rolePath(box.tag).includes('BlockQuote'))
  expect(block.map((box) => box.text.trim())).toContain('Stated by the laboratory')
})

test('every page bears number, revision, status, digest, and page n of m', () => {
  sample.pages.forEach((page, index) => {
    const said = [...page.header, ...page.footer].map((box) => (box.kind === 'text' ? box.text : '')).join(' ')
    for (const part of ['EX-VR-001', 'revision 1', 'draft', '0123456789ab', `page ${index + 1} of ${sample.pages.length}`]) expect(said).toContain(part)
  })
})

test('a reference to nothing is our fault and throws', () => {
  const block: ReportBlock = { type: 'textBlock', origin: 'program', children: [{ type: 'pageReference', target: 'nowhere' }] }
  expect(() => laid(withBlocks([block]))).toThrow('nowhere')
})

function texts(boxes: readonly Box[]): readonly TextBox[] {
  return boxes.filter((box): box is TextBox => box.kind === 'text')
}

/** Everything said, without white: cells may break anywhere. */
function wordsOf(frames: Frames): string {
  const byTag = new Map<unknown, string>()
  for (const box of frames.pages.flatMap((page) => texts(page.boxes))) byTag.set(box.tag, (byTag.get(box.tag) ?? '') + box.text)
  return [...byTag.values()].join('\n').replace(/[^\S\n]/g, '')
}

interface Area {
  readonly name: string
  readonly left: number
  readonly right: number
  readonly top: number
  readonly bottom: number
}

function areaOf(box: Box): readonly Area[] {
  if (box.kind === 'text') return [{ name: box.text, left: box.x, right: box.x + box.width, top: box.y - box.size * 0.66, bottom: box.y + box.size * 0.1 }]
  if (box.kind === 'drawing') return [{ name: 'drawing', left: box.x, right: box.x + box.drawing.width * box.scale, top: box.y, bottom: box.y + box.drawing.height * box.scale }]
  return []
}

/** By more than a third of a point, which no eye sees. */
function overlap(first: Area, second: Area): boolean {
  return Math.min(first.right, second.right) - Math.max(first.left, second.left) > 0.34 && Math.min(first.bottom, second.bottom) - Math.max(first.top, second.top) > 0.34
}
