// What a study maps and the rows of a file → the heading row and where each mapped field stands. The first row that holds every mapped
// heading is the heading row, unless the study says its line; a heading over two columns is never chosen between.
import type { DatasetSource, FileSource } from '../definition/study.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import type { Place } from '../diagnostics/place.ts'
import { headingOf } from './cells.ts'
import type { CsvRow } from './split-rows.ts'

/** A mapped column: `key` is the field, or `field/measurand` in a wide layout. */
export interface MappedColumn {
  readonly key: string
  readonly field: string
  readonly measurand?: string
  readonly heading: string
  readonly index: number
}

export interface Header {
  readonly row: CsvRow
  /** Index of the row in the table. */
  readonly at: number
  readonly headings: readonly string[]
  readonly columns: readonly MappedColumn[]
}

/** Every heading the study speaks of: mapped, or used to choose rows. */
export function neededHeadings(source: DatasetSource): readonly string[] {
  return [...new Set([...wantedColumns(source).map((each) => each.heading), ...source.rows.map((each) => headingOf(each.column))])]
}

export function findHeader(rows: readonly CsvRow[], file: FileSource, source: DatasetSource): Header | { readonly problems: readonly Diagnostic[] } {
  const needed = neededHeadings(source)
  const at = file.headerRow === undefined ? rows.findIndex((each) => held(each, needed) === needed.length) : rows.findIndex((each) => each.line === file.headerRow)
  const row = rows[at]
  if (row === undefined) {
    const best = rows.slice(0, 200).sort((left, right) => held(right, needed) - held(left, needed))[0]
    const place: Place = { file: file.path, line: file.headerRow ?? best?.line ?? 1, column: 1 }
    if (file.headerRow !== undefined || best === undefined || held(best, needed) === 0) {
      return { problems: [diagnostic('data/no-header', `No line of \`${file.path}\` holds the headings that dataset \`${source.name}\` maps`, { place, actual: (best?.cells ?? []).map(headingOf).filter((cell) => cell !== '').slice(0, 12).join(', '), expected: needed.join(', '), mend: 'Correct the headings under `columns:`, the `delimiter:`, or declare `header-row:`' })] }
    }
    return { problems: missing(needed, best.cells.map(headingOf), file, source, place) }
  }
  const headings = row.cells.map(headingOf)
  const problems = missing(needed, headings, file, source, { file: file.path, line: row.line, column: 1 })
  for (const heading of needed) {
    if (headings.filter((each) => each === heading).length > 1) problems.push(diagnostic('data/repeated-heading', `The heading \`${heading}\` stands over two columns of \`${file.path}\``, { place: { file: file.path, line: row.line, column: row.starts[headings.lastIndexOf(heading)] ?? 1 }, actual: heading, expected: 'each mapped heading once', mend: 'Rename one of the columns in the export, or map another heading' }))
  }
  return problems.length > 0 ? { problems } : { row, at, headings, columns: wantedColumns(source).map((each) => ({ ...each, index: headings.indexOf(each.heading) })) }
}

/** Where the cell of a column stands in its row. */
export function placeIn(file: string, row: CsvRow, column: MappedColumn): Place {
  const cell = row.cells[column.index]
  // A cell that is not there belongs behind the last one that is.
  if (cell === undefined) return { file, line: row.line, column: row.starts.at(-1) ?? 1, length: 1 }
  const shown = row.lines === undefined ? cell : (cell.split(/[\r\n]/, 1)[0] ?? cell)
  return { file, line: row.lines?.[column.index] ?? row.line, column: row.starts[column.index] ?? 1, length: Math.max(1, shown.length) }
}

function held(row: CsvRow, needed: readonly string[]): number {
  const headings = new Set(row.cells.map(headingOf))
  return needed.filter((heading) => headings.has(heading)).length
}

function missing(needed: readonly string[], headings: readonly string[], file: FileSource, source: DatasetSource, place: Place): Diagnostic[] {
  return needed.filter((heading) => !headings.includes(heading)).map((heading) => {
    const guess = nearest(heading, headings.filter((each) => each !== ''))
    const mapped = Object.values(source.columns).flatMap((each) => (each.kind === 'one' ? [{ heading: each.column, place: each.place }] : Object.values(each.columns).map((own) => ({ heading: own.value, place: own.place })))).find((each) => headingOf(each.heading) === heading)
    return diagnostic('data/missing-column', `\`${file.path}\` has no column \`${heading}\``, {
      place, actual: headings.filter((each) => each !== '').join(', '), expected: heading, mend: guess === undefined ? 'Map a heading that the file has' : `Map \`${guess}\``,
      related: mapped === undefined ? [] : [{ message: 'mapped here', place: mapped.place }],
    })
  })
}

function wantedColumns(source: DatasetSource): readonly Omit<MappedColumn, 'index'>[] {
  return Object.entries(source.columns).flatMap(([field, choice]): readonly Omit<MappedColumn, 'index'>[] => choice.kind === 'one'
    ? [{ key: field, field, heading: headingOf(choice.column) }]
    : Object.entries(choice.columns).map(([measurand, heading]) => ({ key: `${field}/${measurand}`, field, measurand, heading: headingOf(heading.value) })))
}
