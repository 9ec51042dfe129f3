// A table → slabs: caption, head, one slab a row, notes. Columns get their width from their content, numbers align on the decimal mark;
// a table too wide is set smaller and is split by columns as the last resort. No cell is ever cut off.
import type { ExhibitRow, ExhibitTable, Inline } from '../../present/document.ts'
import { plainInline } from '../plain-inline.ts'
import type { Box } from './frames.ts'
import { type Line, lineBoxes, setLines } from './lines.ts'
import { baselineIn, type BlockContext, type Slab } from './slab.ts'
import { node, type StructureNode } from './structure.ts'
import { colours, emboldened, page, styles, tinted } from './style.ts'
import { paragraphSlabs } from './text-slabs.ts'
import { alignedAt, columnLayouts, type ColumnLayout, type TablePart } from './table-columns.ts'

/** Above and below the lines of a row. Long tables are looked up, not read, and stand closer. */
const padding = { short: 2.4, long: 1.3 } as const
const longTable = 40

interface Part extends TablePart {
  readonly padding: number
}

/** Rows of more lines than `tallest` are cut into pieces of `piece` lines, since a page might not hold them. */
const lines = { tallest: 18, piece: 6 } as const

export function tableSlabs(table: ExhibitTable, context: BlockContext): readonly Slab[] {
  const spoken = withWords(table, context)
  const rowCount = spoken.groups.reduce((count, group) => count + group.length, 0)
  const parts = columnLayouts(spoken, context).map((part): Part => ({ ...part, padding: rowCount > longTable ? padding.long : padding.short }))
  return parts.flatMap((part, index) => partSlabs(spoken, part, { index, count: parts.length }, context))
}

/** A table without rows says so; an excluded row does too, in its first cell unless another does. */
function withWords(table: ExhibitTable, context: BlockContext): ExhibitTable {
  const rows = table.groups.flat()
  if (rows.length === 0) return { ...table, groups: [[{ cells: table.columns.map((_, index) => (index === 0 ? [{ type: 'text', value: 'no\u00a0rows' }] : [])) }]] }
  const isUnsaid = (row: ExhibitRow): boolean => row.tone === 'excluded' && !row.cells.some((cell) => /excluded/i.test(plainInline(cell, context.pageOf)))
  if (!rows.some(isUnsaid)) return table
  const spoken = (row: ExhibitRow): ExhibitRow => (isUnsaid(row) ? { ...row, cells: row.cells.map((cell, index) => (index === 0 ? [...cell, { type: 'text', value: cell.length === 0 ? 'excluded' : ' (excluded)' }] : cell)) } : row)
  return { ...table, groups: table.groups.map((group) => group.map(spoken)) }
}

interface Position {
  readonly index: number
  readonly count: number
}

function partSlabs(table: ExhibitTable, part: Part, position: Position, context: BlockContext): readonly Slab[] {
  const tag = node('Table', context.root)
  const isLast = position.index === position.count - 1
  const head = headSlab(part, node('TR', node('THead', tag)), context)
  const title = table.number === undefined ? '' : `Table ${table.number}`
  const continuation = paragraphSlabs([{ type: 'text', value: title === '' ? 'continued' : `${title}, continued` }], { style: styles.note, tag: tag, left: 0, width: page.textWidth, spaceBefore: 0 }, context)
  const foot: Slab = { height: 0.6, spaceBefore: 0, boxes: [{ kind: 'rule', x: 0, y: 0.3, toX: part.width, toY: 0.3, width: 0.4, colour: colours.rule }] }
  const continued = { head: asDecoration(stacked([...continuation, head])), foot }
  const body = node('TBody', tag)
  const groups = table.groups.filter((group) => group.length > 0)
  const rows = groups.flatMap((group, groupIndex) => group.flatMap((row, rowIndex) => {
    const isGroupEnd = rowIndex === group.length - 1
    const isTableEnd = isGroupEnd && groupIndex === groups.length - 1
    const border = isTableEnd ? 'end' : isGroupEnd ? 'group' : 'row'
    const pieces = rowSlabs(row, part, node('TR', body), border, context)
    const hasNotes = isTableEnd && isLast && table.notes.length > 0
    // No row stands alone below the head or above the end.
    const isFirst = groupIndex === 0 && rowIndex === 0
    const isSecondLast = groupIndex === groups.length - 1 && rowIndex === group.length - 2
    const keep = hasNotes || (!isTableEnd && (isFirst || isSecondLast)) ? { keepWithNext: 'must' as const } : isGroupEnd ? {} : { keepWithNext: 'prefer' as const }
    return pieces.map((slab, at): Slab => ({ ...slab, continued, ...(at < pieces.length - 1 ? {} : keep) }))
  }))
  return [
    ...captionSlabs(table, tag, position, context),
    { ...head, keepWithNext: 'must', continued },
    ...rows,
    ...(isLast ? noteSlabs(table, context) : []),
    { height: 8, spaceBefore: 0, boxes: [] },
  ]
}

function captionSlabs(table: ExhibitTable, parent: StructureNode, position: Position, context: BlockContext): readonly Slab[] {
  const anchor: Box = { kind: 'anchor', y: 0, id: table.id }
  if (table.caption.length === 0 && table.number === undefined) return [{ height: 0, spaceBefore: 10, boxes: [], keepWithNext: 'must' }]
  const suffix: readonly Inline[] = position.count === 1 ? [] : [{ type: 'text', value: ` (columns, part ${position.index + 1} of ${position.count})` }]
  const inlines: readonly Inline[] = [{ type: 'strong', children: [{ type: 'text', value: `Table ${table.number ?? ''}`.trim() }] }, { type: 'text', value: '\u2002' }, ...table.caption, ...suffix]
  const lines = paragraphSlabs(inlines, { style: styles.caption, tag: node('Caption', parent), left: 0, width: page.textWidth, spaceBefore: 12, keepWithNext: 'must' }, context)
  const all = lines.map((slab, index): Slab => ({ ...slab, keepWithNext: 'must', boxes: index === 0 && position.index === 0 ? [anchor, ...slab.boxes] : slab.boxes }))
  return [...all, { height: 3, spaceBefore: 0, boxes: [], keepWithNext: 'must' }]
}

function headSlab(part: Part, row: StructureNode, context: BlockContext): Slab {
  const style = { ...styles.tableHead, size: part.style.size, leading: part.style.leading - 0.5 }
  const unitStyle = tinted({ ...style, face: styles.table.face }, colours.secondary)
  const cells = part.columns.map((column) => {
    const tag = node('TH', row, { scope: 'Column' })
    const names = setLines([{ type: 'text', value: column.column.header }], style, tag, column.width, context)
    const units = column.column.unit === undefined ? [] : setLines([{ type: 'text', value: column.column.unit }], unitStyle, tag, column.width, context)
    return { column, tag, lines: [...(units.length === 0 ? names : names.map(withSpace)), ...units] }
  })
  const count = Math.max(1, ...cells.map((cell) => cell.lines.length))
  const height = count * style.leading + 5
  // Heads stand on the rule below them.
  const boxes = cells.flatMap((cell) => [
    { kind: 'structure', tag: cell.tag } as const,
    ...cell.lines.flatMap((line, index) => {
      const x = cell.column.column.align === 'number' ? cell.column.right - line.width : cell.column.left
      return lineBoxes(line, x, 2 + (count - cell.lines.length + index) * style.leading + baselineIn(style.leading, style.size))
    }),
  ])
  return {
    height, spaceBefore: 0,
    boxes: [
      { kind: 'rule', x: 0, y: 0, toX: part.width, toY: 0, width: 0.9, colour: colours.ink },
      ...boxes,
      { kind: 'rule', x: 0, y: height - 0.5, toX: part.width, toY: height - 0.5, width: 0.5, colour: colours.rule },
    ],
  }
}

/** A space that is not seen, so that copied text keeps name and unit apart. */
function withSpace(line: Line): Line {
  return { ...line, pieces: line.pieces.map((piece, index) => (index === line.pieces.length - 1 && !piece.text.endsWith(' ') ? { ...piece, text: `${piece.text} ` } : piece)) }
}

const borders = {
  row: { width: 0.3, colour: colours.hairline },
  group: { width: 0.5, colour: colours.rule },
  end: { width: 0.9, colour: colours.ink },
} as const

function rowSlabs(row: ExhibitRow, part: Part, rowTag: StructureNode, border: keyof typeof borders, context: BlockContext): readonly Slab[] {
  const base = row.tone === 'excluded' ? tinted(part.style, colours.faint) : row.tone === 'total' ? emboldened(part.style) : part.style
  const cells = part.columns.map((column) => {
    const tag = column.column.rowHeader === true ? node('TH', rowTag, { scope: 'Row' }) : node('TD', rowTag)
    const given = row.cells[column.index] ?? []
    const inlines: readonly Inline[] = row.tone === 'excluded' && given.length > 0 && column.column.align === 'number' ? [{ type: 'delete', children: [...given] } as unknown as Inline] : given
    return { column, tag, lines: setLines(inlines, base, tag, column.width, context), inlines: given }
  })
  const count = Math.max(1, ...cells.map((cell) => cell.lines.length))
  const perSlab = count > lines.tallest ? lines.piece : count
  const slabs: Slab[] = []
  for (let from = 0; from < count; from += perSlab) {
    const to = Math.min(count, from + perSlab)
    const isEnd = to === count
    const height = part.padding * (isEnd ? 2 : 1) + (to - from) * base.leading
    const boxes = cells.flatMap((cell): readonly Box[] => [
      ...(from === 0 ? [{ kind: 'structure', tag: cell.tag } as const] : []),
      ...cell.lines.slice(from, to).flatMap((line, index) => lineBoxes(line, cellLeft(cell, line, base, context), part.padding + index * base.leading + baselineIn(base.leading, base.size))),
    ])
    const line = borders[border]
    slabs.push({ height, spaceBefore: 0, boxes: isEnd ? [...boxes, { kind: 'rule', x: 0, y: height, toX: part.width, toY: height, ...line }] : boxes })
  }
  return slabs
}

function cellLeft(cell: { readonly column: ColumnLayout; readonly lines: readonly unknown[]; readonly inlines: readonly Inline[] }, line: { readonly width: number }, style: TablePart['style'], context: BlockContext): number {
  const { column } = cell
  if (column.column.align === 'text') return column.left
  if (cell.lines.length > 1) return column.left
  const before = alignedAt(cell.inlines, style, context)
  if (before === undefined || column.mark === undefined) return column.right - line.width
  return Math.max(column.left, Math.min(column.mark - before, column.right - line.width))
}

function noteSlabs(table: ExhibitTable, context: BlockContext): readonly Slab[] {
  return table.notes.flatMap((note, index) => paragraphSlabs(note, { style: styles.note, tag: node('Note', context.root), left: 0, width: page.textWidth, spaceBefore: index === 0 ? 3 : 1.5 }, context))
}

function stacked(slabs: readonly Slab[]): Slab {
  let height = 0
  const boxes: Box[] = []
  for (const slab of slabs) {
    height += slab.spaceBefore
    for (const box of slab.boxes) boxes.push(shifted(box, height))
    height += slab.height
  }
  return { height, spaceBefore: 0, boxes }
}

function shifted(box: Box, down: number): Box {
  return box.kind === 'structure' ? box : box.kind === 'rule' ? { ...box, y: box.y + down, toY: box.toY + down } : { ...box, y: box.y + down }
}

/** The same look without a place in the logical tree. */
function asDecoration(slab: Slab): Slab {
  return { ...slab, boxes: slab.boxes.flatMap((box): readonly Box[] => (box.kind === 'text' ? [{ ...box, tag: undefined }] : box.kind === 'rule' || box.kind === 'panel' ? [box] : [])) }
}

