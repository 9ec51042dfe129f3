// The cover: whose report, of what, its facts, and the overall verdict in words with its mark. It leaves room for the signatures below.
import type { CoverBlock, Inline } from '../../present/document.ts'
import type { Box } from './frames.ts'
import { lineBoxes, setLines } from './lines.ts'
import { baselineIn, type BlockContext, type Slab } from './slab.ts'
import { node, type StructureNode } from './structure.ts'
import { colours, page, styles, type TextStyle, tinted, verdictColours } from './style.ts'

const labelWidth = 96
const inset = 14

export function coverSlabs(cover: CoverBlock, context: BlockContext): readonly Slab[] {
  const boxes: Box[] = []
  let y = 0
  const set = (inlines: readonly Inline[], style: TextStyle, tag: StructureNode, left: number, width: number): void => {
    for (const line of setLines(inlines, style, tag, width, context)) {
      boxes.push(...lineBoxes(line, left, y + baselineIn(style.leading, style.size)))
      y += style.leading
    }
  }
  const paragraph = (): StructureNode => node('P', context.root)
  if (cover.organisation !== undefined) set([{ type: 'text', value: cover.organisation }], styles.coverOrganisation, paragraph(), 0, page.textWidth)
  y += cover.organisation === undefined ? 20 : 26
  boxes.push({ kind: 'panel', x: 0, y, width: 54, height: 3, fill: colours.accent })
  y += 16
  set([{ type: 'text', value: cover.title }], styles.coverTitle, paragraph(), 0, page.textWidth)
  y += 4
  set([{ type: 'text', value: cover.subtitle }], styles.coverSubtitle, paragraph(), 0, page.textWidth)
  y += 20

  const table = node('Table', context.root)
  const body = node('TBody', table)
  for (const fact of cover.facts) {
    const row = node('TR', body)
    const top = y
    set([{ type: 'text', value: fact.label }], styles.coverLabel, node('TH', row, { scope: 'Row' }), 0, labelWidth - 8)
    const after = y
    y = top
    set([factText(fact.text)], styles.coverFact, node('TD', row), labelWidth, page.textWidth - labelWidth)
    y = Math.max(y, after) + 1.5
    boxes.push({ kind: 'rule', x: 0, y, toX: page.textWidth, toY: y, width: 0.3, colour: colours.hairline })
    y += 1.5
  }
  y += 18

  const colour = verdictColours[cover.overall.word]
  const start = y
  const panel = boxes.length
  y += 10
  set([{ type: 'text', value: 'Overall verdict' }], styles.label, paragraph(), inset, page.textWidth - 2 * inset)
  set([cover.overall], tinted(styles.coverVerdict, colour), paragraph(), inset, page.textWidth - 2 * inset)
  y += 3
  set(cover.overallSentence, styles.coverSentence, paragraph(), inset, page.textWidth - 2 * inset)
  y += 10
  boxes.splice(panel, 0,
    { kind: 'panel', x: 0, y: start, width: page.textWidth, height: y - start, fill: colours.panel },
    { kind: 'panel', x: 0, y: start, width: 3, height: y - start, fill: colour })
  return [{ height: y + 6, spaceBefore: 0, boxes }]
}

/** A digest is set in fixed width, so that its letters can be compared. */
function factText(text: string): Inline {
  return /\b[0-9a-f]{32,}\b/.test(text) ? { type: 'inlineCode', value: text } : { type: 'text', value: text }
}
