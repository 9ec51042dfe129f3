// A report → frames. Blocks become slabs once; only those that print page numbers are set again until no page number changes, so the
// list of contents can never point to the wrong page.
import type { Table as MarkdownTable } from 'mdast'
import type { ExhibitFigure, ExhibitTable, Inline, ReportBlock, ReportDocument, SectionHeading } from '../../present/document.ts'
import type { Drawing } from '../drawing.ts'
import type { FontFaces } from '../fonts.ts'
import { headingLabel } from '../labels.ts'
import { plainInline } from '../plain-inline.ts'
import { contentsSlabs } from './contents.ts'
import { coverSlabs } from './cover.ts'
import { figureSlabs, isNarrow } from './figure.ts'
import type { Frames } from './frames.ts'
import { paginate } from './paginate.ts'
import { runningBoxes } from './running.ts'
import { signOffSlabs } from './sign-off.ts'
import { shaping as shapingOf } from './shaping.ts'
import type { BlockContext, Slab } from './slab.ts'
import { node } from './structure.ts'
import { tableSlabs } from './table.ts'
import { formulaSlabs, headingSlabs, markdownSlabs, textBlockSlabs } from './text-slabs.ts'

export interface FlowInput {
  readonly document: ReportDocument
  /** By figure id. */
  readonly drawings: ReadonlyMap<string, Drawing>
  readonly fonts: FontFaces
}

/** As wide as the page numbers of a long report, before they are known. */
const placeholder = '000'

/** Page numbers settle after two rounds; more would mean that they move each other to and fro. */
const mostRounds = 6

export function flow({ document, drawings, fonts }: FlowInput): Frames {
  const root = node('Document', undefined)
  const headings = document.blocks.filter((block): block is SectionHeading => block.type === 'sectionHeading')
  const groups = grouped(document.blocks, drawings)
  const shaping = shapingOf(fonts)
  const settled = new Map<number, readonly Slab[]>()
  let pages: ReadonlyMap<string, number> = new Map()
  for (let round = 0; round < mostRounds; round += 1) {
    const known = pages
    const context: BlockContext = { shaping, root, pageOf: (target) => (round === 0 ? placeholder : String(pageOf(target, known))) }
    const slabs = groups.flatMap((group, index): readonly Slab[] => {
      const before = settled.get(index)
      if (before !== undefined) return before
      const made = slabsOf(group, groups[index - 1], headings, drawings, context)
      if (!group.some(printsPages)) settled.set(index, made)
      return made
    })
    const laid = paginate(slabs)
    const found = new Map(laid.flatMap((boxes, index) => boxes.flatMap((box) => (box.kind === 'anchor' ? [[box.id, index + 1] as const] : []))))
    if (round > 0 && [...found].every(([id, at]) => known.get(id) === at)) {
      return {
        root,
        pages: laid.map((boxes, index) => ({ boxes, ...runningBoxes(document.header, index + 1, laid.length, shaping) })),
        outline: headings.map((heading) => ({ title: outlineTitle(heading, context), depth: heading.depth, id: heading.id })),
      }
    }
    pages = found
  }
  throw new Error('the page numbers of the contents do not settle')
}

function pageOf(target: string, pages: ReadonlyMap<string, number>): number {
  const found = pages.get(target)
  if (found === undefined) throw new Error(`a page reference points to ${target}, which the report does not hold`)
  return found
}

function outlineTitle(heading: SectionHeading, context: BlockContext): string {
  return `${headingLabel(heading)} ${plainInline(heading.children, context.pageOf)}`.trim()
}

/** Blocks that are set together: two narrow figures in a row; all others alone. */
function grouped(blocks: readonly ReportBlock[], drawings: ReadonlyMap<string, Drawing>): readonly (readonly ReportBlock[])[] {
  const groups: ReportBlock[][] = []
  for (const block of blocks) {
    const last = groups.at(-1)
    const pairs = last?.length === 1 && last[0] !== undefined && isNarrowFigure(last[0], drawings) && isNarrowFigure(block, drawings)
    if (pairs) last.push(block)
    else groups.push([block])
  }
  return groups
}

function isNarrowFigure(block: ReportBlock, drawings: ReadonlyMap<string, Drawing>): boolean {
  return block.type === 'exhibitFigure' && isNarrow(drawingOf(block, drawings))
}

function drawingOf(figure: ExhibitFigure, drawings: ReadonlyMap<string, Drawing>): Drawing {
  const drawing = drawings.get(figure.id)
  if (drawing === undefined) throw new Error(`figure ${figure.id} has no drawing`)
  return drawing
}

function slabsOf(group: readonly ReportBlock[], before: readonly ReportBlock[] | undefined, headings: readonly SectionHeading[], drawings: ReadonlyMap<string, Drawing>, context: BlockContext): readonly Slab[] {
  const figures = group.flatMap((block) => (block.type === 'exhibitFigure' ? [{ figure: block, drawing: drawingOf(block, drawings) }] : []))
  if (figures.length > 0) return figureSlabs(figures, context)
  return group.flatMap((block): readonly Slab[] => {
    switch (block.type) {
      case 'sectionHeading': return headingSlabs(block, block === headings.find((each) => each.annex === true && each.depth === 1), context)
      case 'textBlock': return textBlockSlabs(block, before?.some((each) => each.type === 'textBlock' && each.origin === 'user') === true, context)
      case 'exhibitTable': return tableSlabs(block, context)
      case 'table': return tableSlabs(fromMarkdown(block), context)
      case 'exhibitFigure': return []
      case 'formula': return formulaSlabs(block, context)
      case 'cover': return coverSlabs(block, context)
      case 'signOff': return signOffSlabs(block, context)
      case 'contents': return contentsSlabs(block, headings, context)
      case 'pageBreak': return [{ height: 0, spaceBefore: 0, boxes: [], breaksPage: true }]
      default: return markdownSlabs(block, context)
    }
  })
}

/** A table of a template: first row as head, no caption. */
function fromMarkdown(table: MarkdownTable): ExhibitTable {
  const [head, ...rows] = table.children.map((row) => row.children.map((cell) => cell.children as readonly Inline[]))
  const columns = (head ?? []).map((cell, index) => ({ header: plainInline(cell), align: table.align?.[index] === 'right' ? 'number' as const : 'text' as const }))
  return { type: 'exhibitTable', id: '', caption: [], columns, groups: [rows.map((cells) => ({ cells }))], notes: [] }
}

function printsPages(block: ReportBlock): boolean {
  if (block.type === 'contents') return true
  if (block.type === 'exhibitTable') return [block.caption, ...block.notes, ...block.groups.flatMap((group) => group.flatMap((row) => row.cells))].some(holdPage)
  return 'children' in block && holdPage(block.children as readonly Inline[])
}

function holdPage(inlines: readonly Inline[]): boolean {
  return inlines.some((inline) => inline.type === 'pageReference' || ('children' in inline && holdPage(inline.children as readonly Inline[])))
}
