// Signature block: for each person what the signature means, the printed name and position, and lines for signature, date and time.
import type { SignOffBlock } from '../../present/document.ts'
import type { Box } from './frames.ts'
import { lineBoxes, setLines } from './lines.ts'
import { baselineIn, type BlockContext, type Slab } from './slab.ts'
import { node, type StructureNode } from './structure.ts'
import { colours, emboldened, page, resized, styles, type TextStyle, tinted } from './style.ts'
import { paragraphSlabs } from './text-slabs.ts'

const rightColumn = 232
const dateWidth = 96

const name: TextStyle = emboldened(styles.table)
const small: TextStyle = resized(tinted(styles.table, colours.secondary), 7.5)
const lineLabel: TextStyle = resized(tinted(styles.table, colours.secondary), 6.5)

export function signOffSlabs(block: SignOffBlock, context: BlockContext): readonly Slab[] {
  if (block.people.length === 0) return []
  const people = block.people.map((person, index): Slab => personSlab(person, index === 0 ? 8 : 0, context))
  return [
    ...people.map((slab): Slab => ({ ...slab, keepWithNext: 'prefer' })),
    ...(block.note.length === 0 ? [] : paragraphSlabs(block.note, { style: styles.note, tag: node('P', context.root), left: 0, width: page.textWidth, spaceBefore: 5 }, context)),
  ]
}

function personSlab(person: SignOffBlock['people'][number], spaceBefore: number, context: BlockContext): Slab {
  const group = node('Div', context.root)
  const boxes: Box[] = [{ kind: 'rule', x: 0, y: 0, toX: page.textWidth, toY: 0, width: 0.5, colour: colours.rule }]
  let y = 7
  const set = (text: string, style: TextStyle, left: number, width: number, tag: StructureNode): void => {
    for (const line of setLines([{ type: 'text', value: text }], style, tag, width, context)) {
      boxes.push(...lineBoxes(line, left, y + baselineIn(style.leading, style.size)))
      y += style.leading
    }
  }
  const width = rightColumn - 18
  set(person.name, name, 0, width, node('P', group))
  if (person.position !== '') set(person.position, styles.table, 0, width, node('P', group))
  set(person.meaning, small, 0, width, node('P', group))
  const height = Math.max(60, y + 7)
  const line = height - 17
  const dateLeft = page.textWidth - dateWidth
  boxes.push(
    { kind: 'rule', x: rightColumn, y: line, toX: dateLeft - 14, toY: line, width: 0.5, colour: colours.ink },
    { kind: 'rule', x: dateLeft, y: line, toX: page.textWidth, toY: line, width: 0.5, colour: colours.ink },
  )
  y = line + 1.5
  set(`Signature (${person.role})`, lineLabel, rightColumn, dateLeft - 14 - rightColumn, node('P', group))
  y = line + 1.5
  set('Date, time and zone', lineLabel, dateLeft, dateWidth, node('P', group))
  return { height, spaceBefore, boxes }
}
