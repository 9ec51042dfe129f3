// Headings, paragraphs, lists, quotes, code and formulas → slabs. At least two lines of a paragraph stand together at a page's end and
// at the next page's start; the user's own words carry a rule at their side and say whose they are.
import type { PhrasingContent } from 'mdast'
import type { FormulaBlock, Inline, MarkdownBlock, SectionHeading, TextBlock } from '../../present/document.ts'
import { headingLabel, userLabel } from '../labels.ts'
import { plainInline } from '../plain-inline.ts'
import type { Box } from './frames.ts'
import { type Line, lineBoxes, setLines } from './lines.ts'
import { extentOf } from './words.ts'
import { baselineIn, type BlockContext, type Slab } from './slab.ts'
import { node, type StructureNode } from './structure.ts'
import { colours, page, styles, type TextStyle } from './style.ts'

type Inlines = readonly (Inline | PhrasingContent)[]

interface Setting {
  readonly style: TextStyle
  readonly tag: StructureNode
  readonly left: number
  readonly width: number
  readonly spaceBefore: number
  readonly keepWithNext?: 'must'
  /** Drawn on every line, behind the text. */
  readonly behind?: (height: number) => readonly Box[]
}

/** One slab a line, with widows and orphans held. */
export function paragraphSlabs(inlines: Inlines, setting: Setting, context: BlockContext): readonly Slab[] {
  const lines = setLines(inlines, setting.style, setting.tag, setting.width, context)
  return lines.map((line, index) => lineSlab(line, setting, index === 0 ? setting.spaceBefore : 0, keeping(lines.length, index, setting.keepWithNext)))
}

function keeping(count: number, index: number, atEnd: 'must' | undefined): 'must' | undefined {
  if (index === count - 1) return atEnd
  return index === 0 || index === count - 2 ? 'must' : undefined
}

function lineSlab(line: Line, setting: Setting, spaceBefore: number, keepWithNext: 'must' | undefined): Slab {
  const { style, left } = setting
  return {
    height: style.leading, spaceBefore,
    boxes: [...(setting.behind?.(style.leading) ?? []), ...lineBoxes(line, left, baselineIn(style.leading, style.size))],
    ...(keepWithNext === undefined ? {} : { keepWithNext }),
  }
}

const headingSpace = { 1: 26, 2: 18, 3: 12 } as const

/** The first annex begins a page; the others follow one another. */
export function headingSlabs(heading: SectionHeading, isFirstAnnex: boolean, context: BlockContext): readonly Slab[] {
  const style = styles[`heading${heading.depth}`]
  const tag = node(`H${heading.depth}`, context.root)
  const label = headingLabel(heading)
  const indent = label === '' ? 0 : context.shaping.width(label, style.face, style.size) + style.size * 0.75
  const lines = setLines(heading.children, style, tag, page.textWidth - indent, context)
  const baseline = baselineIn(style.leading, style.size)
  const slabs = lines.map((line, index): Slab => ({
    height: style.leading, spaceBefore: index === 0 ? headingSpace[heading.depth] : 0, keepWithNext: 'must',
    boxes: [
      ...(index > 0 ? [] : [{ kind: 'anchor', y: 0, id: heading.id } as const]),
      ...(index > 0 || label === '' ? [] : lineBoxes({ pieces: [{ text: `${label} `, style, rise: 0, tag, x: 0, width: indent }], width: indent }, 0, baseline)),
      ...lineBoxes(line, indent, baseline),
    ],
  }))
  const space: Slab = { height: heading.depth === 1 ? 5 : 2, spaceBefore: 0, boxes: [], keepWithNext: 'must' }
  return [...(isFirstAnnex ? [{ height: 0, spaceBefore: 0, boxes: [], breaksPage: true } as const] : []), ...slabs, space]
}

const sideRule = { indent: 12, width: 2 } as const

/** `follows`: the block before is in the user's own words. */
export function textBlockSlabs(block: TextBlock, follows: boolean, context: BlockContext): readonly Slab[] {
  if (block.children.length === 0) return []
  if (block.origin !== 'user') {
    // What ends in a colon announces what comes next.
    const announces = plainInline(block.children.slice(-1), context.pageOf).endsWith(':')
    return paragraphSlabs(block.children, { style: styles.body, tag: node('P', context.root), left: 0, width: page.measure, spaceBefore: follows ? 10 : 6, ...(announces ? { keepWithNext: 'must' } : {}) }, context)
  }
  const quote = node('BlockQuote', context.root)
  const label: readonly Slab[] = follows ? [] : paragraphSlabs(
    [{ type: 'text', value: userLabel }],
    { style: styles.label, tag: node('P', quote), left: sideRule.indent, width: page.measure, spaceBefore: 8, keepWithNext: 'must', behind: besideRule }, context,
  )
  return [...label, ...paragraphSlabs(block.children, { style: styles.body, tag: node('P', quote), left: sideRule.indent, width: page.measure - sideRule.indent, spaceBefore: follows ? 4 : 0, behind: besideRule }, context)]
}

function besideRule(height: number): readonly Box[] {
  return [{ kind: 'panel', x: 0, y: 0, width: sideRule.width, height, fill: colours.accent }]
}

export function formulaSlabs(block: FormulaBlock, context: BlockContext): readonly Slab[] {
  const tag = node('Formula', context.root, { alternative: block.words, isPlaced: true })
  const lines = setLines(block.children, styles.formula, tag, page.textWidth - 24, context)
  const baseline = baselineIn(styles.formula.leading, styles.formula.size)
  return [{
    height: lines.length * styles.formula.leading + 4, spaceBefore: 6,
    boxes: lines.flatMap((line, index) => lineBoxes(line, 24, 2 + index * styles.formula.leading + baseline)),
  }]
}

/** Ordinary Markdown; tables are set elsewhere. */
export function markdownSlabs(block: Exclude<MarkdownBlock, { type: 'table' }>, context: BlockContext): readonly Slab[] {
  return blockSlabs(block, { parent: context.root, left: 0, space: 6 }, context)
}

interface Nesting {
  readonly parent: StructureNode
  readonly left: number
  readonly space: number
}

type AnyBlock = MarkdownBlock | Extract<MarkdownBlock, { type: 'list' }>['children'][number]['children'][number]

function blockSlabs(block: AnyBlock, nesting: Nesting, context: BlockContext): readonly Slab[] {
  const { parent, left, space } = nesting
  const width = page.measure - left
  switch (block.type) {
    case 'paragraph': case 'heading':
      return paragraphSlabs(block.children, { style: styles.body, tag: node('P', parent), left, width, spaceBefore: space }, context)
    case 'list': return listSlabs(block, nesting, context)
    case 'blockquote': {
      const quote = node('BlockQuote', parent)
      return block.children.flatMap((child) => blockSlabs(child, { parent: quote, left: left + 14, space }, context))
    }
    case 'code': case 'html': {
      const tag = node('Code', node('P', parent))
      const lines = block.value.split('\n')
      return lines.flatMap((line, index) => paragraphSlabs([{ type: 'text', value: line.replaceAll(' ', '\u00a0') }], {
        style: styles.code, tag, left: left + 8, width: width - 16, spaceBefore: index === 0 ? space : 0,
        behind: (height) => [{ kind: 'panel', x: left, y: 0, width: width, height, fill: colours.panel }],
      }, context))
    }
    case 'thematicBreak':
      return [{ height: 8, spaceBefore: space, boxes: [{ kind: 'rule', x: left, y: 4, toX: left + width, toY: 4, width: 0.5, colour: colours.rule }] }]
    default:
      throw new Error(`the PDF cannot set a Markdown block of type ${block.type}`)
  }
}

function listSlabs(list: Extract<MarkdownBlock, { type: 'list' }>, nesting: Nesting, context: BlockContext): readonly Slab[] {
  const tag = node('L', nesting.parent)
  const first = list.start ?? 1
  const labels = list.children.map((_, index) => (list.ordered === true ? `${first + index}.` : '•'))
  const indent = Math.max(...labels.map((label) => extentOf([{ type: 'text', value: label }], styles.body, context).natural)) + 7
  return list.children.flatMap((item, index) => {
    const itemTag = node('LI', tag)
    const label = node('Lbl', itemTag)
    const body = node('LBody', itemTag)
    const slabs = item.children.flatMap((child, at) => blockSlabs(child, { parent: body, left: nesting.left + indent, space: at === 0 ? (index === 0 ? nesting.space : 3) : 3 }, context))
    const text = labels[index] ?? ''
    const mark = setLines([{ type: 'text', value: text }], styles.body, label, indent, context).flatMap((line) => lineBoxes(line, nesting.left, baselineIn(styles.body.leading, styles.body.size)))
    return slabs.map((slab, at) => (at === 0 ? { ...slab, boxes: [...mark, ...slab.boxes] } : slab))
  })
}
