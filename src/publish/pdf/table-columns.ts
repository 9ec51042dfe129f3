// How wide each column of a table is and where its decimal marks stand. Text columns wrap; a table that cannot fit at any size is split
// into parts that each repeat the row headers.
import type { ExhibitColumn, ExhibitTable, Inline } from '../../present/document.ts'
import { plainInline } from '../plain-inline.ts'
import { extentOf } from './words.ts'
import type { BlockContext } from './slab.ts'
import { page, resized, styles, tableSizes, type TextStyle } from './style.ts'

export interface ColumnLayout {
  readonly column: ExhibitColumn
  /** Position of its cells in a row. */
  readonly index: number
  readonly left: number
  readonly right: number
  readonly width: number
  /** Where decimal marks stand, for a column of numbers. */
  readonly mark?: number
}

export interface TablePart {
  readonly columns: readonly ColumnLayout[]
  readonly width: number
  readonly style: TextStyle
}

interface Wish {
  readonly column: ExhibitColumn
  readonly index: number
  /** Narrowest without breaking inside a word. */
  readonly least: number
  readonly natural: number
  /** Cells by their natural width, rounded up to whole points; the head counts as one more cell. */
  readonly lengths: ReadonlyMap<number, number>
  /** Widths before and after the decimal mark. */
  readonly before: number
  readonly after: number
}

const gap = { narrow: 9, wide: 22 } as const

/** A column of text is not squeezed below this while a smaller size can help. */
const comfortable = 62

/** Room for longer text below which columns are taken apart. */
const narrowest = 34

export function columnLayouts(table: ExhibitTable, context: BlockContext): readonly TablePart[] {
  for (const size of tableSizes) {
    const style = resized(styles.table, size)
    const wishes = wishesOf(table, style, context)
    const needed = wishes.reduce((sum, wish) => sum + Math.max(wish.least, Math.min(wish.natural, comfortable)), 0) + gap.narrow * (wishes.length - 1)
    if (needed <= page.textWidth) return [laidOut(wishes, style)]
  }
  const style = resized(styles.table, tableSizes[tableSizes.length - 1] ?? styles.table.size)
  const wishes = wishesOf(table, style, context).map((wish) => breakable(wish))
  const least = wishes.reduce((sum, wish) => sum + wish.least, 0) + gap.narrow * (wishes.length - 1)
  if (least <= page.textWidth) return [laidOut(wishes, style)]
  return split(wishes).map((part) => laidOut(part, style))
}

/** Long words of a text column may break; numbers never. */
function breakable(wish: Wish): Wish {
  return wish.column.align === 'number' ? wish : { ...wish, least: Math.min(wish.least, narrowest * 1.6) }
}

function split(wishes: readonly Wish[]): readonly (readonly Wish[])[] {
  const marked = wishes.filter((wish) => wish.column.rowHeader === true)
  const heads = (marked.length > 0 ? marked : wishes.slice(0, 1)).map((wish) => ({ ...wish, least: Math.min(wish.least, page.textWidth / 4), natural: Math.min(wish.natural, page.textWidth / 4) }))
  const headWidth = heads.reduce((sum, wish) => sum + wish.least + gap.narrow, 0)
  const parts: Wish[][] = []
  let filled = Infinity
  for (const wish of wishes.filter((each) => !heads.some((head) => head.index === each.index))) {
    const width = Math.min(wish.least, page.textWidth - headWidth)
    if (filled + width > page.textWidth - headWidth) {
      parts.push([])
      filled = 0
    }
    parts.at(-1)?.push({ ...wish, least: width, natural: Math.max(width, Math.min(wish.natural, page.textWidth - headWidth)) })
    filled += width + gap.narrow
  }
  return parts.map((part) => [...heads, ...part])
}

function wishesOf(table: ExhibitTable, style: TextStyle, context: BlockContext): readonly Wish[] {
  const headStyle = { ...styles.tableHead, size: style.size }
  const rows = table.groups.flat()
  return table.columns.map((column, index): Wish => {
    const header = extentOf([{ type: 'text', value: column.header }], headStyle, context)
    const unit = extentOf(column.unit === undefined ? [] : [{ type: 'text', value: column.unit }], style, context)
    let least = Math.max(header.least, unit.least)
    let natural = 0
    let before = 0
    let after = 0
    const lengths = new Map([[Math.ceil(header.natural), 1]])
    for (const row of rows) {
      const cell = row.cells[index] ?? []
      if (cell.length === 0) continue
      const cellStyle = row.tone === 'total' ? { ...style, face: style.bold } : style
      const extent = extentOf(cell, cellStyle, context)
      const length = Math.ceil(extent.natural)
      lengths.set(length, (lengths.get(length) ?? 0) + 1)
      const at = column.align === 'number' ? alignedAt(cell, cellStyle, context) : undefined
      if (at === undefined) {
        natural = Math.max(natural, extent.natural)
        least = Math.max(least, column.align === 'number' ? Math.min(extent.natural, 60) : extent.least)
      } else {
        before = Math.max(before, at)
        after = Math.max(after, extent.natural - at)
      }
    }
    least = Math.max(least, before + after)
    return { column, index, least, natural: Math.max(least, natural, unit.natural, Math.min(header.natural, Math.max(natural, 76))), lengths, before, after }
  })
}

/** Width before the decimal mark of a cell that begins as a number; undefined for words. */
export function alignedAt(cell: readonly Inline[], style: TextStyle, context: BlockContext): number | undefined {
  const first = cell[0]
  if (first === undefined) return undefined
  const text = first.type === 'number' ? first.text : first.type === 'text' ? first.value : plainInline(cell, context.pageOf)
  const whole = /^[<>≤≥≈±+\u2212-]?\s?\d+/.exec(text)?.[0]
  if (whole === undefined) return undefined
  return context.shaping.width(whole.replaceAll(' ', '\u00a0'), style.face, style.size)
}

function laidOut(wishes: readonly Wish[], style: TextStyle): TablePart {
  const gaps = wishes.length - 1
  const room = page.textWidth - gap.narrow * gaps
  const natural = wishes.reduce((sum, wish) => sum + wish.natural, 0)
  const widths = natural <= room ? wishes.map((wish) => wish.natural) : shared(wishes, room)
  const used = widths.reduce((sum, width) => sum + width, 0)
  const between = gaps === 0 ? 0 : Math.min(gap.wide, (page.textWidth - used) / gaps)
  let left = 0
  const columns = wishes.map((wish, index): ColumnLayout => {
    const width = widths[index] ?? 0
    const right = left + width
    const layout = { column: wish.column, index: wish.index, left, right, width, ...(wish.column.align === 'number' ? { mark: right - wish.after } : {}) }
    left = right + between
    return layout
  })
  return { columns, width: columns.at(-1)?.right ?? 0, style }
}

/** Widths go down in steps of this. */
const step = 4

/**
 * From the natural widths down to the room, each step where it costs the fewest additional lines for the width it frees: a column in
 * which a few cells are long wraps those, rather than one in which every cell would break.
 */
function shared(wishes: readonly Wish[], room: number): readonly number[] {
  const widths = wishes.map((wish) => Math.max(wish.least, Math.min(wish.natural, room)))
  const costs = wishes.map((wish, index) => linesAt(wish, widths[index] ?? 0))
  let excess = widths.reduce((sum, width) => sum + width, 0) - room
  while (excess > 0.01) {
    let best: { readonly index: number; readonly width: number; readonly cost: number; readonly penalty: number } | undefined
    wishes.forEach((wish, index) => {
      const width = widths[index] ?? 0
      const narrower = Math.max(wish.least, width - Math.min(step, excess))
      if (narrower > width - 0.01) return
      const cost = linesAt(wish, narrower)
      const penalty = (cost - (costs[index] ?? 0)) / (width - narrower)
      if (best === undefined || penalty < best.penalty || (penalty === best.penalty && width > (widths[best.index] ?? 0))) best = { index, width: narrower, cost, penalty }
    })
    if (best === undefined) break
    excess -= (widths[best.index] ?? 0) - best.width
    widths[best.index] = best.width
    costs[best.index] = best.cost
  }
  return widths
}

/** About how many lines the cells of a column take at a width. */
function linesAt(wish: Wish, width: number): number {
  let lines = 0
  for (const [natural, count] of wish.lengths) {
    // Broken lines are not filled to their end, hence a little more.
    const taken = Math.ceil((natural - 0.01) / width)
    lines += count * (taken <= 1 ? 1 : Math.max(taken, (1.08 * natural) / width))
  }
  return lines
}
