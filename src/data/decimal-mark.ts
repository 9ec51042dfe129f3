// The number cells of one file → its decimal mark. A file that could be read in two ways, or that holds both marks, is refused until the
// study says which: the two readings differ a thousandfold.
import type { DecimalMark } from '../definition/study.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { numberFields, tidied } from './cells.ts'
import { type MappedColumn, placeIn } from './columns.ts'
import type { CsvRow } from './split-rows.ts'

interface Seen {
  readonly row: CsvRow
  readonly column: MappedColumn
}

export function decimalMark(rows: readonly CsvRow[], columns: readonly MappedColumn[], file: string): { readonly decimal: DecimalMark } | { readonly problem: Diagnostic } {
  const numeric = columns.filter((column) => numberFields.has(column.field))
  const first: { point?: Seen; comma?: Seen; unsure?: Seen } = {}
  for (const row of rows) {
    for (const column of numeric) {
      const hint = markOf(row.cells[column.index] ?? '')
      if (hint !== undefined) first[hint] ??= { row, column }
    }
  }
  const { point, comma, unsure } = first
  if (point !== undefined && comma !== undefined) {
    return { problem: diagnostic('data/mixed-decimal', `\`${file}\` holds decimal points and decimal commas`, {
      place: placeIn(file, comma.row, comma.column), actual: `\`${textOf(point)}\` and \`${textOf(comma)}\``, expected: 'one decimal mark in a file',
      mend: 'Export the file again; if one of the marks separates thousands, remove it in the export', related: [{ message: 'a decimal point here', place: placeIn(file, point.row, point.column) }],
    }) }
  }
  if (unsure !== undefined && point === undefined && comma === undefined) {
    return { problem: diagnostic('data/ambiguous-decimal', `\`${textOf(unsure)}\` can be read in two ways`, {
      place: placeIn(file, unsure.row, unsure.column), actual: textOf(unsure), expected: 'a declared decimal mark', mend: 'Declare `decimal: point` or `decimal: comma` for the file',
    }) }
  }
  return { decimal: comma === undefined ? 'point' : 'comma' }
}

function textOf(seen: Seen): string {
  return tidied(seen.row.cells[seen.column.index] ?? '')
}

/** One mark before exactly three digits may separate thousands; a leading zero or more than three digits before it cannot. */
function markOf(text: string): 'point' | 'comma' | 'unsure' | undefined {
  const match = /^(?:[<>≤≥]=?\s*)?[+-]?(\d*)([.,])(\d+)(?:([eE])[+-]?\d+)?$/.exec(tidied(text))
  if (match === null) return undefined
  if (match[3]?.length === 3 && match[4] === undefined && /^[1-9]\d{0,2}$/.test(match[1] ?? '')) return 'unsure'
  return match[2] === '.' ? 'point' : 'comma'
}
