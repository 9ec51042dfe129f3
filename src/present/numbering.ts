// Numbers headings (1, 1.1, …; annexes A, B, …), tables and figures in order, and fills every reference to them.
// A reference to nothing is our bug and throws.
import type { ExhibitColumn, ExhibitRow, Inline, ReportBlock } from './document.ts'

export function numbered(blocks: readonly ReportBlock[]): readonly ReportBlock[] {
  const names = new Map<string, string>()
  const counters = { heading: [0, 0, 0], annex: 0, table: 0, figure: 0 }
  let inAnnex = false
  const withNumbers = blocks.map((block): ReportBlock => {
    switch (block.type) {
      case 'sectionHeading': {
        inAnnex = block.depth === 1 ? block.annex === true : inAnnex
        const number = headingNumber(counters, block.depth, inAnnex)
        names.set(block.id, `${inAnnex && block.depth === 1 ? 'Annex' : 'Section'} ${number}`)
        return { ...block, number }
      }
      case 'exhibitTable': {
        counters.table += 1
        names.set(block.id, `Table ${counters.table}`)
        return { ...block, number: String(counters.table) }
      }
      case 'exhibitFigure': {
        counters.figure += 1
        names.set(block.id, `Figure ${counters.figure}`)
        return { ...block, number: String(counters.figure) }
      }
      default: return block
    }
  })
  return withNumbers.map((block) => withReferences(block, names))
}

function headingNumber(counters: { heading: number[]; annex: number }, depth: 1 | 2 | 3, inAnnex: boolean): string {
  if (depth === 1) {
    counters.heading[1] = counters.heading[2] = 0
    if (inAnnex) counters.annex += 1
    else counters.heading[0] = (counters.heading[0] ?? 0) + 1
  } else {
    counters.heading[depth - 1] = (counters.heading[depth - 1] ?? 0) + 1
    if (depth === 2) counters.heading[2] = 0
  }
  const top = inAnnex ? String.fromCharCode(64 + counters.annex) : String(counters.heading[0])
  return [top, ...counters.heading.slice(1, depth)].join('.')
}

function withReferences(block: ReportBlock, names: ReadonlyMap<string, string>): ReportBlock {
  const fill = (inlines: readonly Inline[]): readonly Inline[] => inlines.map((inline) => filled(inline, names))
  switch (block.type) {
    case 'textBlock': case 'sectionHeading': case 'formula': return { ...block, children: fill(block.children) }
    case 'exhibitFigure': return { ...block, caption: fill(block.caption) }
    case 'signOff': return { ...block, note: fill(block.note) }
    case 'cover': return { ...block, overallSentence: fill(block.overallSentence) }
    case 'exhibitTable': return {
      ...block, caption: fill(block.caption), notes: block.notes.map(fill), columns: block.columns.map((column): ExhibitColumn => column),
      groups: block.groups.map((group) => group.map((row): ExhibitRow => ({ ...row, cells: row.cells.map(fill) }))),
    }
    default: return block
  }
}

function filled(inline: Inline, names: ReadonlyMap<string, string>): Inline {
  if (inline.type !== 'reference') return inline
  const text = names.get(inline.target)
  if (text === undefined) throw new Error(`a reference points to ${inline.target}, which the report does not hold`)
  return { ...inline, text }
}
