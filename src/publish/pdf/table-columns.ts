// How wide each column of a table is and where its decimal marks stand. Text columns wrap; a table that cannot fit at any size is split
// into parts that each repeat the row headers.
import type { ExhibitColumn, ExhibitTable, Inline } from '../../present/document.ts'
import { extentOf, plainText } from './inline.ts'
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
    for (const row of rows) {
      const cell = row.cells[index] ?? []
      if (cell.length === 0) continue
      const cellStyle = row.tone === 'total' ? { ...style, face: style.bold } : style
      const extent = extentOf(cell, cellStyle, context)
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
    return { column, index, least, natural: Math.max(least, natural, unit.natural, Math.min(header.natural, Math.max(natural, 76))), before, after }
  })
}

/** Width before the decimal mark of a cell that begins as a number; undefined for words. */
export function alignedAt(cell: readonly Inline[], style: TextStyle, context: BlockContext): number | undefined {
  const first = cell[0]
  if (first === undefined) return undefined
  const text = first.type === 'number' ? first.text : first.type === 'text' ? first.value : plainText(cell, context)
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
    const numbers = wish.before + wish.after
    // The block of numbers is centred below a head wider than itself, at most a little from the right.
    const inset = wish.column.align === 'number' && numbers > 0 ? Math.max(0, Math.min(width - numbers, 0)) : 0
    const layout = { column: wish.column, index: wish.index, left, right, width, ...(wish.column.align === 'number' ? { mark: right - inset - wish.after } : {}) }
    left = right + between
    return layout
  })
  return { columns, width: columns.at(-1)?.right ?? 0, style }
}

/** Least widths first, then the rest by what each column still wishes, evenly enough that no column starves. */
function shared(wishes: readonly Wish[], room: number): readonly number[] {
  const widths = wishes.map((wish) => wish.least)
  let rest = room - widths.reduce((sum, width) => sum + width, 0)
  // The square root tames one very long text beside several short ones.
  for (let round = 0; round < 8 && rest > 0.5; round += 1) {
    const pulls = wishes.map((wish, index) => Math.sqrt(Math.max(0, wish.natural - (widths[index] ?? 0))))
    const total = pulls.reduce((sum, pull) => sum + pull, 0)
    if (total === 0) break
    const given = rest
    pulls.forEach((pull, index) => {
      const add = Math.min((given * pull) / total, (wishes[index]?.natural ?? 0) - (widths[index] ?? 0))
      widths[index] = (widths[index] ?? 0) + add
      rest -= add
    })
  }
  return widths
}
