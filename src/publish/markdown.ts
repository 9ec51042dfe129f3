// A report → GitHub-flavoured Markdown: our nodes become standard ones and are written by the Markdown library. Tables are written row
// by row, because the library's cost grows faster than the number of rows.
import type { BlockContent, DefinitionContent, Paragraph, PhrasingContent, RootContent } from 'mdast'
import { gfmToMarkdown } from 'mdast-util-gfm'
import { toMarkdown } from 'mdast-util-to-markdown'
import type { CoverBlock, ExhibitRow, ExhibitTable, Inline, ReportBlock, ReportDocument, SectionHeading, SignOffBlock } from '../present/document.ts'
import { headingLabel, userLabel } from './labels.ts'
import { plainInline } from './plain-inline.ts'
import { verdictMarks } from './verdict-marks.ts'

export interface MarkdownPaths {
  chartPath(id: string): string
  tablePath(id: string): string
}

interface Targets {
  readonly paths: MarkdownPaths
  readonly headings: readonly SectionHeading[]
  /** Ids that something refers to; only these get an anchor. */
  readonly referred: ReadonlySet<string>
  readonly names: ReadonlyMap<string, string>
}

export function publishMarkdown(document: ReportDocument, paths: MarkdownPaths): string {
  const headings = document.blocks.filter((block): block is SectionHeading => block.type === 'sectionHeading')
  const targets: Targets = {
    paths, headings,
    referred: new Set([...referredIn(document.blocks), ...(document.blocks.some((block) => block.type === 'contents') ? headings.filter((heading) => heading.depth <= 2).map((heading) => heading.id) : [])]),
    names: new Map(headings.map((heading) => [heading.id, `${heading.annex === true && heading.depth === 1 ? 'Annex' : 'Section'} ${heading.number ?? heading.id}`])),
  }
  const { header } = document
  const top: RootContent = { type: 'paragraph', children: [{ type: 'text', value: `${header.number} · ${header.revision} · ${header.status} · record ${header.digest}` }] }
  return `${written([top, ...document.blocks.flatMap((block) => nodesOf(block, targets))])}\n`
}

/** Text that is Markdown already. */
function ready(text: string): RootContent {
  return { type: 'html', value: text }
}

const extensions = [gfmToMarkdown({ tablePipeAlign: false })]

function written(children: readonly RootContent[]): string {
  return toMarkdown({ type: 'root', children: [...children] }, { bullet: '-', emphasis: '*', rule: '-', extensions }).trimEnd()
}

function nodesOf(block: ReportBlock, targets: Targets): readonly RootContent[] {
  switch (block.type) {
    case 'sectionHeading': return [{ type: 'heading', depth: (block.depth + 1) as 2 | 3 | 4, children: [...anchor(block.id, targets), { type: 'text', value: `${headingLabel(block)} `.trimStart() }, ...phrasing(block.children, targets)] }]
    case 'textBlock':
      if (block.children.length === 0) return []
      return block.origin === 'user' ? [{ type: 'blockquote', children: [{ type: 'paragraph', children: [strong(userLabel)] }, paragraph(block.children, targets)] }] : [textNode(block.children, targets)]
    case 'exhibitTable': return tableNodes(block, targets)
    case 'exhibitFigure': return [
      { type: 'paragraph', children: [...anchor(block.id, targets), { type: 'image', url: targets.paths.chartPath(block.id), alt: block.alternative }] },
      { type: 'paragraph', children: [strong(`Figure ${block.number ?? ''}`.trim()), { type: 'text', value: ' ' }, ...phrasing(block.caption, targets)] },
    ]
    case 'formula': return [paragraph(block.children, targets), { type: 'paragraph', children: [{ type: 'emphasis', children: [{ type: 'text', value: `In words: ${block.words}` }] }] }]
    case 'cover': return coverNodes(block, targets)
    case 'signOff': return signOffNodes(block, targets)
    case 'contents': return contentsNodes(block.title, targets)
    case 'pageBreak': return []
    default: return [standardBlock(block, targets)]
  }
}

function paragraph(inlines: readonly Inline[], targets: Targets): Paragraph {
  return { type: 'paragraph', children: [...phrasing(inlines, targets)] }
}

/** A paragraph, past the library when it holds nothing to escape. */
function textNode(inlines: readonly Inline[], targets: Targets): RootContent {
  const plain = plainText(inlines)
  return plain === undefined ? paragraph(inlines, targets) : ready(plain)
}

function strong(text: string): PhrasingContent {
  return { type: 'strong', children: [{ type: 'text', value: text }] }
}

function anchor(id: string, targets: Targets): readonly PhrasingContent[] {
  return targets.referred.has(id) ? [{ type: 'html', value: `<a id="${id.replaceAll('"', '&quot;')}"></a>` }] : []
}

function phrasing(inlines: readonly (Inline | PhrasingContent)[], targets: Targets): readonly PhrasingContent[] {
  return inlines.flatMap((inline): readonly PhrasingContent[] => {
    switch (inline.type) {
      case 'number': return [{ type: 'text', value: inline.text }]
      case 'verdict': return [{ type: 'text', value: `${verdictMarks[inline.word]} ${inline.word}` }]
      case 'reference': return [linkTo(inline.target, inline.text ?? inline.target)]
      case 'pageReference': return [linkTo(inline.target, targets.names.get(inline.target) ?? inline.target)]
      case 'superscript': return [{ type: 'html', value: '<sup>' }, ...phrasing(inline.children, targets), { type: 'html', value: '</sup>' }]
      case 'subscript': return [{ type: 'html', value: '<sub>' }, ...phrasing(inline.children, targets), { type: 'html', value: '</sub>' }]
      default: return 'children' in inline ? [{ ...inline, children: [...phrasing(inline.children, targets)] } as PhrasingContent] : [inline]
    }
  })
}

function linkTo(id: string, text: string): PhrasingContent {
  return { type: 'link', url: `#${encodeURI(id)}`, children: [{ type: 'text', value: text }] }
}

type StandardBlock = Extract<ReportBlock, { type: 'list' | 'table' | 'blockquote' | 'code' | 'thematicBreak' }>

/** Ordinary blocks stay as they are, but for our inline nodes inside. */
function standardBlock(block: StandardBlock | BlockContent | DefinitionContent, targets: Targets): RootContent {
  const convert = (node: { readonly type: string }): { readonly type: string } => {
    if (node.type === 'paragraph' || node.type === 'tableCell' || node.type === 'heading') return { ...node, children: [...phrasing((node as unknown as { children: Inline[] }).children, targets)] } as typeof node
    return 'children' in node ? ({ ...node, children: (node.children as readonly { readonly type: string }[]).map(convert) } as typeof node) : node
  }
  return convert(block) as RootContent
}

function tableNodes(table: ExhibitTable, targets: Targets): readonly RootContent[] {
  const caption: Paragraph = { type: 'paragraph', children: [...anchor(table.id, targets), strong(`Table ${table.number ?? ''}`.trim()), { type: 'text', value: ' ' }, ...phrasing(table.caption, targets), { type: 'text', value: ' ' }, { type: 'link', url: targets.paths.tablePath(table.id), children: [{ type: 'text', value: '(CSV)' }] }] }
  const head = table.columns.map((column) => cellText([{ type: 'text', value: column.unit === undefined ? column.header : `${column.header} (${column.unit})` }], targets))
  const rows = table.groups.flat().map((row) => rowCells(row, table, targets))
  return [caption, ready(gridText(head, table.columns.map((column) => column.align === 'number'), rows)), ...table.notes.map((note) => textNode(note, targets))]
}

function gridText(head: readonly string[], areRight: readonly boolean[], rows: readonly (readonly string[])[]): string {
  const line = (cells: readonly string[]): string => `| ${cells.join(' | ')} |`
  return [line(head), line(areRight.map((isRight) => (isRight ? '---:' : '---'))), ...rows.map(line)].join('\n')
}

function rowCells(row: ExhibitRow, table: ExhibitTable, targets: Targets): readonly string[] {
  const isSaid = row.cells.some((cell) => cell.some((inline) => inline.type === 'text' && /excluded/i.test(inline.value)))
  return table.columns.map((_, index) => {
    const text = cellText(row.cells[index] ?? [], targets)
    if (row.tone === 'excluded') return `${text === '' ? '' : `~~${text}~~`}${index === 0 && !isSaid ? ' (excluded)' : ''}`
    return row.tone === 'total' && text !== '' ? `**${text}**` : text
  })
}

/** Nothing in it that Markdown could take for a mark, wherever it stands. */
const isHarmless = /^[^\\`*_[\]<>|~&#:@\n]*$/

/** What would begin a list, a heading or white at the start or end of a paragraph, or a bare address. */
const isTreacherous = /^(\d+[.)]|[-+=]+)(\s|$)|^\s|\s$|www\.| {2}/

/** The text as it stands when it needs no escape: by far the most do not, and the library weighs every letter. */
function plainText(inlines: readonly Inline[]): string | undefined {
  let text = ''
  for (const inline of inlines) {
    if (inline.type === 'text') text += inline.value
    else if (inline.type === 'number') text += inline.text
    else if (inline.type === 'verdict') text += `${verdictMarks[inline.word]} ${inline.word}`
    else return undefined
  }
  return isHarmless.test(text) && !isTreacherous.test(text) ? text : undefined
}

function cellText(cell: readonly Inline[], targets: Targets): string {
  const plain = plainText(cell)
  if (plain !== undefined) return plain
  return written([{ type: 'table', children: [{ type: 'tableRow', children: [{ type: 'tableCell', children: [...phrasing(cell, targets)] }] }] }]).split('\n')[0]?.replace(/^\|\s?/, '').replace(/\s*\|$/, '') ?? ''
}

function coverNodes(cover: CoverBlock, targets: Targets): readonly RootContent[] {
  return [
    { type: 'heading', depth: 1, children: [{ type: 'text', value: cover.title }] },
    ...(cover.organisation === undefined ? [] : [{ type: 'paragraph' as const, children: [{ type: 'text' as const, value: cover.organisation }] }]),
    { type: 'paragraph', children: [{ type: 'text', value: cover.subtitle }] },
    { type: 'list', ordered: false, spread: false, children: cover.facts.map((fact) => ({ type: 'listItem', spread: false, children: [{ type: 'paragraph', children: [strong(`${fact.label}:`), { type: 'text', value: ` ${fact.text}` }] }] })) },
    { type: 'paragraph', children: [strong('Overall verdict:'), { type: 'text', value: ' ' }, ...phrasing([cover.overall], targets), { type: 'text', value: '. ' }, ...phrasing(cover.overallSentence, targets)] },
  ]
}

function signOffNodes(block: SignOffBlock, targets: Targets): readonly RootContent[] {
  const cell = (text: string): string => cellText([{ type: 'text', value: text }], targets)
  const rows = block.people.map((person) => [person.role, person.name, person.position, person.meaning, '', ''].map(cell))
  const head = ['Role', 'Name', 'Position', 'Meaning', 'Signature', 'Date, time and zone']
  return [ready(gridText(head, head.map(() => false), rows)), ...(block.note.length === 0 ? [] : [textNode(block.note, targets)])]
}

function contentsNodes(title: string, targets: Targets): readonly RootContent[] {
  const lines = targets.headings.filter((heading) => heading.depth <= 2).map((heading) => {
    const label = `${headingLabel(heading)} ${plainInline(heading.children)}`.trim()
    const text = isHarmless.test(label) ? `[${label}](#${encodeURI(heading.id)})` : written([{ type: 'paragraph', children: [linkTo(heading.id, label)] }])
    return `${heading.depth === 1 ? '' : '  '}- ${text}`
  })
  return [{ type: 'heading', depth: 2, children: [{ type: 'text', value: title }] }, ready(lines.join('\n'))]
}

function referredIn(value: unknown): readonly string[] {
  if (Array.isArray(value)) return value.flatMap(referredIn)
  if (typeof value !== 'object' || value === null) return []
  const inline = value as { readonly type?: unknown; readonly target?: unknown; readonly chart?: unknown }
  if ((inline.type === 'reference' || inline.type === 'pageReference') && typeof inline.target === 'string') return [inline.target]
  if (inline.type === 'exhibitFigure') return referredIn((value as { readonly caption: unknown }).caption)
  return Object.values(value).flatMap(referredIn)
}
