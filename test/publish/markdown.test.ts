// The Markdown, parsed again by the Markdown library: approved as a whole, and no word, number or row lost on the way.
import type { Nodes, Table } from 'mdast'
import remarkGfm from 'remark-gfm'
import remarkParse from 'remark-parse'
import { unified } from 'unified'
import { expect, test } from 'vitest'
import type { ReportBlock } from '../../src/present/document.ts'
import { publishMarkdown } from '../../src/publish/markdown.ts'
import { expectApproved } from '../support/approved.ts'
import { levelTable, number, sampleDocument, text } from './sample-document.ts'

const paths = { chartPath: (id: string) => `charts/${id}.svg`, tablePath: (id: string) => `tables/${id}.csv` }
const published = (blocks: readonly ReportBlock[]): string => publishMarkdown({ ...sampleDocument, blocks }, paths)
const parsed = (markdown: string): Nodes => unified().use(remarkParse).use(remarkGfm, { singleTilde: false }).parse(markdown)
const said = (node: Nodes): string => ('children' in node ? node.children.map(said).join('') : node.type === 'html' ? '' : 'value' in node ? node.value : '')
const tables = (node: Nodes): readonly Table[] => (node.type === 'table' ? [node] : 'children' in node ? node.children.flatMap(tables) : [])

test('the sample reads as approved', () => {
  expectApproved('fixtures/publish/sample/report.md', publishMarkdown(sampleDocument, paths))
})

test.each([
  'limits of *stars* and _lines_ and `ticks`', '1. not a list', '12) nor this', '- no bullet', '+ no bullet', '# no heading', '> no quote', '= 5 mg/L', 'a | b', '<0.0001', '[no] (link)', 'www.example.org', 'a~~b~~c', 'H~2~O', '&amp; stays', '10:30 and 1:2',
  'back\\slash', 'at x@example.org', 'snake_case_name', '0.5 mg/L', '\u22125 %', '![no image](x)', '| first', '3.5', '12.', '---', '***', '    four spaces', 'two  spaces',
])('“%s” is read as it is written, in a paragraph and in a cell', (words) => {
  const paragraph = parsed(published([{ type: 'textBlock', origin: 'program', children: [text(words)] }]))
  expect(paragraph).toMatchObject({ children: [{ type: 'paragraph' }, { type: 'paragraph' }] })
  const second = 'children' in paragraph ? paragraph.children[1] : undefined
  if (second === undefined) throw new Error('no paragraph')
  expect(said(second).trim()).toBe(words.trim())
  const [table] = tables(parsed(published([{ type: 'exhibitTable', id: 't', number: '1', caption: [], notes: [], columns: [{ header: 'x', align: 'text' }, { header: 'y', align: 'text' }], groups: [[{ cells: [[text(words)], [text('end')]] }]] }])))
  expect(table?.children[1]?.children.map((cell) => said(cell).trim())).toEqual([words.trim(), 'end'])
})

test('a table of a thousand rows keeps every cell and is written in time that grows with its rows', () => {
  const table = levelTable('rows', 40, 25)
  const [read] = tables(parsed(published([table])))
  const expected = table.groups.flat().map((row) => row.cells.map((cell) => cell.map((inline) => (inline.type === 'number' ? inline.text : inline.type === 'text' ? inline.value : '')).join('')))
  expect(read?.children.slice(1).map((row) => row.children.map((cell) => said(cell).replace(' (excluded)', '').trim()))).toEqual(expected)
  expect(read?.align).toEqual([null, 'right', 'right', 'right', 'right', null])
})

test('user’s words are quoted under a label, numbers keep their text', () => {
  const markdown = published([{ type: 'textBlock', origin: 'user', children: [text('We accept '), number(-1.5), text('.')] }])
  expect(markdown).toContain('> **Stated by the laboratory**\n>\n> We accept \u22121.5.')
})

test('a link is there for each reference, and its target too', () => {
  const markdown = publishMarkdown(sampleDocument, paths)
  for (const [, id] of markdown.matchAll(/\]\(#([^)]+)\)/g)) expect(markdown).toContain(`<a id="${id}"></a>`)
})
