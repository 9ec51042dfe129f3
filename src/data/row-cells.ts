// One row of a file → its mapped cells by field, each with its text and place. A text that is no number where one is needed is told,
// and its cell holds nothing: it never becomes a number.
import type { DatasetSource, DecimalMark, FileSource } from '../definition/study.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { isSpreadsheetError, measuredFields, numberFields, readNumber, tidied, type Unreadable } from './cells.ts'
import { type MappedColumn, placeIn } from './columns.ts'
import type { CsvRow } from './split-rows.ts'
import type { Cell } from './dataset.ts'

export function rowCells(row: CsvRow, columns: readonly MappedColumn[], decimal: DecimalMark, file: FileSource, source: DatasetSource, diagnostics: Diagnostic[]): Record<string, Cell> {
  const cells: Record<string, Cell> = {}
  for (const column of columns) {
    if (!numberFields.has(column.field)) {
      const label = labelCell(row, column, file.path)
      if (label.kind === 'label' && isSpreadsheetError(label.value)) diagnostics.push(unreadable(label.text, { kind: 'unreadable', why: 'spreadsheet error' }, column, label.place, decimal))
      cells[column.key] = label
      continue
    }
    const text = row.cells[column.index] ?? ''
    const place = placeIn(file.path, row, column)
    const read = readNumber(text, decimal, source.tokens)
    const start = { text, column: column.heading, place }
    if (read.kind === 'number') cells[column.key] = { kind: 'number', value: read.value, text, column: column.heading, place }
    else if (read.kind === 'unreadable') {
      diagnostics.push(unreadable(text, read, column, place, decimal))
      cells[column.key] = { ...start, kind: 'missing' }
    } else if (read.kind !== 'missing' && !measuredFields.has(column.field)) {
      diagnostics.push(diagnostic('data/not-a-number', `Unexpected \`${shown(text)}\` in column \`${column.heading}\`: field \`${column.field}\` is not measured, so it has a value`, { place, actual: shown(text), expected: 'a number, or an empty cell', mend: 'Correct the file, or keep such rows out by `rows:`' }))
      cells[column.key] = { ...start, kind: 'missing' }
    } else cells[column.key] = { ...start, ...read }
  }
  return cells
}

/** Cells of a row that is not used: their texts only. */
export function labelCells(row: CsvRow, columns: readonly MappedColumn[], file: string): Record<string, Cell> {
  return Object.fromEntries(columns.map((column): [string, Cell] => [column.key, labelCell(row, column, file)]))
}

/** The values that the study states for a whole file. */
export function fixedCells(file: FileSource, columns: readonly MappedColumn[], source: DatasetSource, diagnostics: Diagnostic[]): Record<string, Cell> {
  return Object.fromEntries(Object.entries(file.fixed).map(([field, text]): [string, Cell] => {
    const start = { text, column: 'stated for the file', place: file.place }
    const column = columns.find((each) => each.field === field)
    if (column !== undefined) {
      diagnostics.push(diagnostic('data/fixed-column', `Field \`${field}\` is stated for the whole of \`${file.path}\` and stands in its column \`${column.heading}\` too`, { place: file.place, actual: text, expected: 'one of the two', mend: 'Remove it under `fixed:`, or the column under `columns:`' }))
    }
    if (!numberFields.has(field)) return [field, { ...start, kind: 'label', value: tidied(text) }]
    const read = readNumber(text, 'point', source.tokens)
    if (read.kind === 'number') return [field, { ...start, ...read }]
    diagnostics.push(diagnostic('data/not-a-number', `Unexpected \`${shown(text)}\` for field \`${field}\` of \`${file.path}\`: no number`, { place: file.place, actual: shown(text), expected: 'a number with a decimal point', mend: 'Correct `fixed:`' }))
    return [field, { ...start, kind: 'missing' }]
  }))
}

function labelCell(row: CsvRow, column: MappedColumn, file: string): Cell {
  const text = row.cells[column.index] ?? ''
  const value = tidied(text)
  const place = placeIn(file, row, column)
  return value === '' ? { kind: 'missing', text, column: column.heading, place } : { kind: 'label', value, text, column: column.heading, place }
}

const longestShown = 60 // characters of a cell in a message

function shown(text: string): string {
  return text.trim().slice(0, longestShown)
}

function unreadable(text: string, read: Unreadable, column: MappedColumn, place: Cell['place'], decimal: DecimalMark): Diagnostic {
  const mark = decimal === 'comma' ? 'comma' : 'point'
  const told = {
    text: { message: 'no number', mend: 'Correct the file, or say under `tokens:` what the text means' },
    unit: { message: `a number with \`${read.rest ?? ''}\` in its cell`, mend: 'Export numbers without units, and state the unit in the study' },
    thousands: { message: 'a number with a separator of thousands', mend: 'Export the file without separators of thousands' },
    'other mark': { message: `a number with another decimal mark than the ${mark} of the file`, mend: 'Declare the right `decimal:` for the file' },
    'spreadsheet error': { message: 'an error of a spreadsheet', mend: 'Mend the formula and export the file again' },
    formula: { message: 'a formula of a spreadsheet', mend: 'Export values, not formulas' },
    'too small': { message: 'a number too small to compute with', mend: 'Correct the file' },
    'too large': { message: 'a number too large to compute with', mend: 'Correct the file' },
  }[read.why]
  const code = read.why === 'unit' ? 'data/unit-in-cell' : read.why === 'spreadsheet error' ? 'data/spreadsheet-error' : 'data/not-a-number'
  return diagnostic(code, `Unexpected \`${shown(text)}\` in column \`${column.heading}\`: ${told.message}`, {
    place, actual: shown(text), expected: !numberFields.has(column.field) ? 'a text, or an empty cell' : measuredFields.has(column.field) ? `a number with a decimal ${mark}, \`<0${decimal === 'comma' ? ',' : '.'}05\`, \`>500\`, ND, or an empty cell` : `a number with a decimal ${mark}, or an empty cell`, mend: told.mend,
  })
}
