// One raw file of a dataset → its rows with every mapped cell, and the observations they hold. Lines before the headings, rows of another
// kind and footers are kept as "not used" with the rule that says so; nothing is skipped without a word.
import type { DatasetSource, FileSource, Measurand } from '../definition/study.ts'
import { counted } from '../diagnostics/counted.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import type { Place } from '../diagnostics/place.ts'
import { headingOf, tidied } from './cells.ts'
import { findHeader, type Header, type MappedColumn, neededHeadings, placeIn } from './columns.ts'
import type { TableReader } from './csv.ts'
import type { Cell, FileReading, Observation, SourceRow } from './dataset.ts'
import { decimalMark } from './decimal-mark.ts'
import { observationReader } from './observations.ts'
import { copiedRows } from './repeated-rows.ts'
import { fixedCells, labelCells, rowCells } from './row-cells.ts'
import type { CsvRow } from './split-rows.ts'

export interface SourceFileRequest {
  readonly bytes: Uint8Array
  readonly file: FileSource
  readonly source: DatasetSource
  readonly measurands: readonly Measurand[]
  readonly tables: TableReader
  /** Rows of the dataset before this file. */
  readonly firstRow: number
  /** Rows of the dataset by their texts, for copies in another file. */
  readonly seen: Map<string, Place>
}

/** The rows of one file under their headings, for row selectors; in the order of the rows of the dataset. */
export interface HeadedRows {
  readonly file: string
  readonly headings: readonly string[]
  readonly rows: readonly CsvRow[]
}

export interface SourceFileRead {
  readonly rows: readonly SourceRow[]
  readonly observations: readonly Observation[]
  readonly headed?: HeadedRows
  readonly reading?: Omit<FileReading, 'used' | 'notUsed' | 'excluded'>
  readonly diagnostics: readonly Diagnostic[]
}

export function readSourceFile(request: SourceFileRequest): SourceFileRead {
  const { file, source, measurands } = request
  const { table, diagnostics: told } = request.tables.read(file, request.bytes, neededHeadings(source))
  const diagnostics: Diagnostic[] = [...told]
  const failed = (...problems: readonly Diagnostic[]): SourceFileRead => ({ rows: [], observations: [], diagnostics: [...diagnostics, ...problems] })
  if (table === undefined) return failed()
  const header = findHeader(table.rows, file, source)
  if ('problems' in header) return failed(...header.problems)
  const { columns, headings } = header
  const preamble = table.rows.slice(0, header.at).filter(isFilled)
  if (preamble.length > 0 && file.headerRow === undefined) {
    diagnostics.push(diagnostic('data/preamble', `${counted(preamble.length, 'line')} before the headings of \`${file.path}\` skipped`, { place: { file: file.path, line: header.row.line }, actual: `headings in line ${header.row.line}` }))
  }
  const body = table.rows.slice(header.at + 1).filter(isFilled)
  const refusal = refusalOf(header, source)
  const accepted = body.map((row) => ({ row, refused: refusal(row) }))
  const usable = accepted.filter((each) => each.refused === undefined).map((each) => each.row)
  if (usable.length === 0) {
    return failed(diagnostic('data/no-rows', `No row of \`${file.path}\` is left for dataset \`${source.name}\``, {
      place: { file: file.path, line: header.row.line }, actual: body.length === 0 ? 'the headings only, no data' : `${counted(body.length, 'row')}, none accepted: ${accepted[0]?.refused ?? ''}`, expected: 'at least one row', mend: 'Correct `rows:` of the dataset, or the file',
    }))
  }
  const mark = file.decimal === undefined ? decimalMark(usable, columns, file.path) : { decimal: file.decimal }
  if ('problem' in mark) return failed(mark.problem)
  for (const each of copiedRows(usable, file.path, JSON.stringify(file.fixed), request.seen)) diagnostics.push(each)
  const fixed = fixedCells(file, columns, source, diagnostics)
  const observationsOf = observationReader(columns, measurands)
  const rows: SourceRow[] = []
  const observations: Observation[] = []
  const strangers: { readonly line: number; readonly name: string }[] = []
  for (const { row, refused } of accepted) {
    if (refused !== undefined) {
      rows.push({ file: file.path, line: row.line, cells: labelCells(row, columns, file.path), fate: { kind: 'not used', rule: refused } })
      continue
    }
    if (isRagged(row, headings.length)) {
      // Its cells may stand under wrong headings, so nothing more is said of them.
      diagnostics.push(ragged(row, headings.length, file.path))
      rows.push({ file: file.path, line: row.line, cells: labelCells(row, columns, file.path), fate: { kind: 'used' } })
      continue
    }
    const read = rowCells(row, columns, mark.decimal, file, source, diagnostics)
    const cells: Record<string, Cell> = Object.keys(fixed).length === 0 ? read : { ...fixed, ...read }
    const own = observationsOf(request.firstRow + rows.length, cells)
    if (own.length === 0) strangers.push({ line: row.line, name: tidied(cells['measurand']?.text ?? '') })
    rows.push({ file: file.path, line: row.line, cells, fate: own.length === 0 ? { kind: 'not used', rule: 'its measurand is not in the study' } : { kind: 'used' } })
    for (const each of own) observations.push(each)
  }
  diagnostics.push(...noticedStrangers(strangers, usable.length, request), ...oddCharacters(usable, columns, file.path))
  return {
    rows, observations, diagnostics, headed: { file: file.path, headings, rows: body },
    reading: { file: file.path, encoding: table.encoding, delimiter: table.delimiter, decimal: mark.decimal, headerRow: header.row.line, rowsRead: body.length },
  }
}

function isFilled(row: CsvRow): boolean {
  return row.cells.some((cell) => cell.trim() !== '')
}

/** Why a row is not used, or undefined. */
function refusalOf({ headings, columns }: Header, source: DatasetSource): (row: CsvRow) => string | undefined {
  const rules = source.rows.map((rule) => ({ index: headings.indexOf(headingOf(rule.column)), accepted: new Set(rule.accepted.map(tidied)), told: `${rule.column} is not ${rule.accepted.join(' or ')}` }))
  return (row) => rules.find((rule) => !rule.accepted.has(tidied(row.cells[rule.index] ?? '')))?.told
    ?? (columns.every((column) => tidied(row.cells[column.index] ?? '') === '') ? 'no mapped column holds anything' : undefined)
}

/** Empty cells behind the last heading are what a trailing delimiter leaves. */
function isRagged(row: CsvRow, width: number): boolean {
  return row.cells.length !== width && (row.cells.length < width || row.cells.slice(width).some((cell) => cell.trim() !== ''))
}

function ragged(row: CsvRow, width: number, file: string): Diagnostic {
  return diagnostic('data/broken-row', `Line ${row.line} of \`${file}\` has ${counted(row.cells.length, 'cell')}, the headings have ${width}`, {
    place: { file, line: row.line, column: 1 }, actual: counted(row.cells.length, 'cell'), expected: counted(width, 'cell'),
    mend: 'Export the file again; a decimal comma in a comma-separated file or a cut last line does this; a footer is kept out by `rows:`',
  })
}

/** Rows of other measurands are common in an export; a file that holds no others is a mistake. */
function noticedStrangers(strangers: readonly { readonly line: number; readonly name: string }[], usable: number, { file, source, measurands }: SourceFileRequest): readonly Diagnostic[] {
  const first = strangers[0]
  if (first === undefined) return []
  const known = [...new Set(measurands.flatMap((each) => [each.id, each.name]))]
  const names = [...new Set(strangers.map((each) => each.name))].slice(0, 8)
  const guesses = names.flatMap((name) => {
    const guess = nearest(name, known)
    return guess === undefined ? [] : [`\`${name}\` is near to \`${guess}\``]
  })
  const details = { place: { file: file.path, line: first.line, column: 1 }, actual: names.map((name) => (name === '' ? 'an empty cell' : name)).join(', ') }
  if (strangers.length === usable) {
    return [diagnostic('data/no-rows', `No row of \`${file.path}\` for dataset \`${source.name}\` is about a measurand of the study`, { ...details, expected: known.slice(0, 12).join(', '), mend: `Write ids or names under \`measurands:\` as the file does${guesses.length === 0 ? '' : `: ${guesses.join(', ')}`}` })]
  }
  return [diagnostic('data/unknown-measurand', `${counted(strangers.length, 'row')} of \`${file.path}\` with a measurand that the study does not hold`, { ...details, expected: 'ids or names of measurands', mend: `Nothing, if these are meant to be left out; they are listed as not used${guesses.length === 0 ? '' : `. But ${guesses.join(', ')}`}` })]
}

/** What is read as something else than it looks is said, once for each column: the cell keeps its text. */
function oddCharacters(rows: readonly CsvRow[], columns: readonly MappedColumn[], file: string): readonly Diagnostic[] {
  return columns.flatMap((column) => {
    const odd = rows.filter((row) => isOdd(row.cells[column.index] ?? ''))
    const first = odd[0]
    if (first === undefined) return []
    const text = first.cells[column.index] ?? ''
    return [diagnostic('data/odd-character', `${counted(odd.length, 'cell')} in column \`${column.heading}\` of \`${file}\` with characters that look like others`, {
      place: placeIn(file, first, column), actual: [...text.trim()].map((character) => (/[^\u0000-\u007f]/.test(character) ? `(U+${(character.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, '0')})` : character)).join(''), expected: `read as ${tidied(text)}`, mend: 'Nothing, if this is what is meant',
    })]
  })
}

function isOdd(text: string): boolean {
  return /[^\u0000-\u007f]/.test(text) && tidied(text) !== text.trim()
}
