// List of contents: sections of the first two levels with their pages, each line a link.
import type { ContentsBlock, SectionHeading } from '../../present/document.ts'
import { headingLabel } from '../labels.ts'
import type { Box } from './frames.ts'
import { lineBoxes, setLines } from './lines.ts'
import { baselineIn, type BlockContext, type Slab } from './slab.ts'
import { node } from './structure.ts'
import { colours, page, styles } from './style.ts'

const numberWidth = { 1: 24, 2: 34 } as const
const pageWidth = 34

export function contentsSlabs(block: ContentsBlock, headings: readonly SectionHeading[], context: BlockContext): readonly Slab[] {
  const title = styles.heading1
  const heading = node('H1', context.root)
  const list = node('TOC', context.root)
  const [line] = setLines([{ type: 'text', value: block.title }], title, heading, page.textWidth, context)
  return [
    { height: title.leading + 6, spaceBefore: 18, keepWithNext: 'must', boxes: line === undefined ? [] : lineBoxes(line, 0, baselineIn(title.leading, title.size)) },
    ...headings.filter((each) => each.depth <= 2).map((each): Slab => entry(each, node('TOCI', list), context)),
    { height: 8, spaceBefore: 0, boxes: [] },
  ]
}

function entry(heading: SectionHeading, item: ReturnType<typeof node>, context: BlockContext): Slab {
  const depth = heading.depth === 1 ? 1 : 2
  const style = styles[`contents${depth}`]
  const tag = node('Link', item)
  const number = headingLabel(heading)
  const left = depth === 1 ? 0 : numberWidth[1]
  const textLeft = Math.max(left + numberWidth[depth], left + context.shaping.width(number, style.face, style.size) + 8)
  const lines = setLines(heading.children, style, tag, page.textWidth - textLeft - pageWidth, context)
  const height = lines.length * style.leading
  const last = lines.at(-1)
  const lastBaseline = (lines.length - 1) * style.leading + baselineIn(style.leading, style.size)
  const shown = context.pageOf(heading.id)
  const shownWidth = context.shaping.width(shown, styles.contents2.face, styles.contents2.size)
  const dotsFrom = textLeft + (last?.width ?? 0) + 5
  const dotsTo = page.textWidth - Math.max(shownWidth, 10) - 6
  const at = (text: string, x: number, y: number, face: typeof style.face, size: number): Box =>
    ({ kind: 'text', x, y, text, face, size, width: context.shaping.width(text, face, size), colour: style.colour, tag })
  return {
    height, spaceBefore: depth === 1 ? 5 : 0, ...(depth === 1 ? { keepWithNext: 'must' } : {}),
    boxes: [
      ...(number === '' ? [] : [at(`${number} `, left, baselineIn(style.leading, style.size), style.face, style.size)]),
      ...lines.flatMap((line, index) => lineBoxes(line, textLeft, index * style.leading + baselineIn(style.leading, style.size))),
      ...(dotsTo - dotsFrom < 8 ? [] : [{ kind: 'rule', x: dotsFrom, y: lastBaseline, toX: dotsTo, toY: lastBaseline, width: 0.5, colour: colours.rule, dash: [0.5, 3] } as const]),
      at(` ${shown}`, page.textWidth - shownWidth - context.shaping.width(' ', styles.contents2.face, styles.contents2.size), lastBaseline, styles.contents2.face, styles.contents2.size),
      { kind: 'link', x: 0, y: 0, width: page.textWidth, height, target: { kind: 'inside', id: heading.id }, words: `${number} to page ${shown}`.trim(), tag },
    ],
  }
}
