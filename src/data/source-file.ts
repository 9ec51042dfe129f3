// One raw file of a dataset → its rows with every mapped cell, and the observations they hold. Lines before the headings, rows of another
// kind and footers are kept as "not used" with the rule that says so; nothing is skipped without a word.
import type { DatasetSource, DecimalMark, FileSource, Measurand } from '../definition/study.ts'
import { counted } from '../diagnostics/counted.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import type { Place } from '../diagnostics/place.ts'
import { numberFields, readNumber, sniffDecimal, tidied } from './cells.ts'
import { type CsvRow, readCsv } from './csv.ts'
import type { Cell, FileReading, Observation, SourceRow } from './dataset.ts'
import { decode } from './text.ts'

export interface SourceFileRequest {
  readonly bytes: Uint8Array
  readonly file: FileSource
  readonly source: DatasetSource
  readonly measurands: readonly Measurand[]
  /** Rows of the dataset before this file. */
  readonly firstRow: number
}

export interface HeadedRow {
  readonly file: string
  readonly line: number
  /** Every cell of the row by its heading, for row selectors. */
  readonly cells: Readonly<Record<string, string>>
}

export interface SourceFileRead {
  readonly rows: readonly SourceRow[]
  readonly observations: readonly Observation[]
  readonly headed: readonly HeadedRow[]
  readonly reading?: Omit<FileReading, 'used' | 'notUsed' | 'excluded'>
  readonly diagnostics: readonly Diagnostic[]
}

/** A mapped column: `key` is the field, or `field/measurand` in a wide layout. */
interface MappedColumn {
  readonly key: string
  readonly field: string
  readonly measurand?: string
  readonly heading: string
  readonly index: number
}

export function readSourceFile(request: SourceFileRequest): SourceFileRead {
  const { file, source } = request
  const failed = (...diagnostics: readonly Diagnostic[]): SourceFileRead => ({ rows: [], observations: [], headed: [], diagnostics })
  const decoded = decode(request.bytes, file.path, file.encoding)
  if ('problem' in decoded) return failed(decoded.problem)
  const table = readCsv(decoded.text, file.path, file.delimiter)
  if ('problem' in table) return failed(table.problem)
  const header = findHeader(table.rows, request)
  if ('problems' in header) return failed(...header.problems)
  const { columns, headings, row: headerRow } = header
  const body = table.rows.slice(table.rows.indexOf(headerRow) + 1).filter((row) => row.cells.some((cell) => cell.trim() !== ''))
  const diagnostics: Diagnostic[] = []
  if (decoded.encoding === 'windows-1252' && file.encoding === undefined) {
    diagnostics.push(diagnostic('data/encoding', `\`${file.path}\` is no UTF-8 and was read as windows-1252`, { place: { file: file.path, line: 1 }, expected: 'a declared `encoding:` when this is wrong' }))
  }
  const preamble = table.rows.slice(0, table.rows.indexOf(headerRow)).filter((row) => row.cells.some((cell) => cell.trim() !== ''))
  if (preamble.length > 0 && file.headerRow === undefined) {
    diagnostics.push(diagnostic('data/preamble', `${counted(preamble.length, 'line')} before the headings of \`${file.path}\` skipped`, { place: { file: file.path, line: headerRow.line }, actual: `headings in line ${headerRow.line}` }))
  }
  const accepted = body.map((row) => ({ row, refused: refusal(row, headings, columns, request) }))
  const usable = accepted.filter((each) => each.refused === undefined).map((each) => each.row)
  const decimal = decimalOf(usable, columns, file, diagnostics)
  if (body.length === 0 || usable.length === 0) {
    diagnostics.push(diagnostic('data/no-rows', `No row of \`${file.path}\` is left for dataset \`${source.name}\``, {
      place: { file: file.path, line: headerRow.line }, actual: body.length === 0 ? 'the headings only, no data' : `${counted(body.length, 'row')}, none accepted: ${accepted[0]?.refused ?? ''}`, expected: 'at least one row', mend: 'Correct `rows:` of the dataset, or the file',
    }))
  }
  if (decimal === undefined) return { rows: [], observations: [], headed: [], diagnostics }
  reportRepeated(usable, file.path, diagnostics)
  const rows: SourceRow[] = []
  const observations: Observation[] = []
  for (const { row, refused } of accepted) {
    const cells = refused === undefined ? cellsOf(row, columns, headings.length, decimal, request, diagnostics) : labelsOf(row, columns, file.path)
    const index = request.firstRow + rows.length
    const own = refused === undefined ? observationsOf(index, cells, columns, request, row) : []
    const stranger = refused === undefined && own.length === 0 ? 'its measurand is not in the study' : undefined
    rows.push({ file: file.path, line: row.line, cells, fate: refused ?? stranger ? { kind: 'not used', rule: refused ?? stranger ?? '' } : { kind: 'used' } })
    observations.push(...own)
  }
  noteStrangers(rows, file.path, diagnostics)
  return {
    rows, observations, diagnostics,
    headed: body.map((row) => ({ file: file.path, line: row.line, cells: Object.fromEntries(headings.map((heading, index) => [heading, tidied(row.cells[index] ?? '')])) })),
    reading: { file: file.path, encoding: decoded.encoding, delimiter: table.delimiter, decimal, headerRow: headerRow.line, rowsRead: body.length },
  }
}

type Header = { readonly row: CsvRow; readonly headings: readonly string[]; readonly columns: readonly MappedColumn[] }

function findHeader(rows: readonly CsvRow[], request: SourceFileRequest): Header | { readonly problems: readonly Diagnostic[] } {
  const { file, source } = request
  const wanted = wantedColumns(source)
  const needed = [...wanted.map((each) => each.heading), ...source.rows.map((each) => each.column)]
  const headingsOf = (row: CsvRow): readonly string[] => row.cells.map(tidied)
  const declared = file.headerRow === undefined ? undefined : rows.find((row) => row.line === file.headerRow)
  const row = declared ?? (file.headerRow === undefined ? rows.find((each) => needed.every((heading) => headingsOf(each).includes(heading))) : undefined)
  if (row === undefined) {
    const best = rows.slice(0, 200).sort((left, right) => held(right, needed) - held(left, needed))[0]
    const place: Place = { file: file.path, line: file.headerRow ?? best?.line ?? 1, column: 1 }
    if (file.headerRow !== undefined || best === undefined || held(best, needed) === 0) {
      return { problems: [diagnostic('data/no-header', `No line of \`${file.path}\` holds the headings that dataset \`${source.name}\` maps`, { place, actual: (best?.cells ?? []).map(tidied).filter((cell) => cell !== '').slice(0, 12).join(', '), expected: needed.join(', '), mend: 'Correct the headings under `columns:`, the `delimiter:`, or declare `header-row:`' })] }
    }
    return { problems: missing(needed, headingsOf(best), request, place) }
  }
  const headings = headingsOf(row)
  const problems = missing(needed, headings, request, { file: file.path, line: row.line, column: 1 })
  for (const heading of new Set(needed)) {
    if (headings.filter((each) => each === heading).length > 1) problems.push(diagnostic('data/repeated-heading', `The heading \`${heading}\` stands over two columns of \`${file.path}\``, { place: { file: file.path, line: row.line, column: 1 }, actual: heading, expected: 'each mapped heading once', mend: 'Rename one of the columns in the export, or map another heading' }))
  }
  return problems.length > 0 ? { problems } : { row, headings, columns: wanted.map((each) => ({ ...each, index: headings.indexOf(each.heading) })) }
}

function held(row: CsvRow, needed: readonly string[]): number {
  const headings = row.cells.map(tidied)
  return needed.filter((heading) => headings.includes(heading)).length
}

function missing(needed: readonly string[], headings: readonly string[], request: SourceFileRequest, place: Place): Diagnostic[] {
  return [...new Set(needed)].filter((heading) => !headings.includes(heading)).map((heading) => {
    const guess = nearest(heading, headings.filter((each) => each !== ''))
    const choice = Object.values(request.source.columns).find((each) => each.kind === 'one' && each.column === heading)
    return diagnostic('data/missing-column', `\`${request.file.path}\` has no column \`${heading}\``, {
      place, actual: headings.filter((each) => each !== '').join(', '), expected: heading, mend: guess === undefined ? 'Map a heading that the file has' : `Map \`${guess}\``,
      related: choice === undefined ? [] : [{ message: 'mapped here', place: choice.place }],
    })
  })
}

function wantedColumns(source: DatasetSource): readonly Omit<MappedColumn, 'index'>[] {
  return Object.entries(source.columns).flatMap(([field, choice]): readonly Omit<MappedColumn, 'index'>[] => choice.kind === 'one'
    ? [{ key: field, field, heading: tidied(choice.column) }]
    : Object.entries(choice.columns).map(([measurand, heading]) => ({ key: `${field}/${measurand}`, field, measurand, heading: tidied(heading.value) })))
}

/** Why a row is not used, or undefined. */
function refusal(row: CsvRow, headings: readonly string[], columns: readonly MappedColumn[], { source }: SourceFileRequest): string | undefined {
  for (const rule of source.rows) {
    const found = tidied(row.cells[headings.indexOf(tidied(rule.column))] ?? '')
    if (!rule.accepted.map(tidied).includes(found)) return `${rule.column} is not ${rule.accepted.join(' or ')}`
  }
  return columns.every((column) => tidied(row.cells[column.index] ?? '') === '') ? 'no mapped column holds anything' : undefined
}

function decimalOf(rows: readonly CsvRow[], columns: readonly MappedColumn[], file: FileSource, diagnostics: Diagnostic[]): DecimalMark | undefined {
  if (file.decimal !== undefined) return file.decimal
  const numeric = columns.filter((column) => numberFields.has(column.field))
  const texts = rows.flatMap((row) => numeric.map((column) => ({ text: row.cells[column.index] ?? '', row, column })))
  const sniffed = sniffDecimal(texts.map((each, at) => ({ text: each.text, at })))
  if ('decimal' in sniffed) return sniffed.decimal
  const placeOf = (at: number): Place => placeIn(file.path, texts[at]?.row, texts[at]?.column)
  const textOf = (at: number): string => texts[at]?.text ?? ''
  if ('ambiguous' in sniffed) {
    diagnostics.push(diagnostic('data/ambiguous-decimal', `\`${textOf(sniffed.ambiguous)}\` can be read in two ways`, { place: placeOf(sniffed.ambiguous), actual: textOf(sniffed.ambiguous), expected: 'a declared decimal mark', mend: 'Declare `decimal: point` or `decimal: comma` for the file' }))
    return undefined
  }
  const [point, comma] = sniffed.mixed
  diagnostics.push(diagnostic('data/mixed-decimal', `\`${file.path}\` holds decimal points and decimal commas`, {
    place: placeOf(comma), actual: `\`${textOf(point)}\` and \`${textOf(comma)}\``, expected: 'one decimal mark in a file', mend: 'Export the file again; if one of the marks separates thousands, remove it in the export', related: [{ message: 'a decimal point here', place: placeOf(point) }],
  }))
  return undefined
}

function cellsOf(row: CsvRow, columns: readonly MappedColumn[], width: number, decimal: DecimalMark, { file, source }: SourceFileRequest, diagnostics: Diagnostic[]): Readonly<Record<string, Cell>> {
  if (row.cells.length < width || row.cells.slice(width).some((cell) => cell.trim() !== '')) {
    diagnostics.push(diagnostic('data/broken-row', `Line ${row.line} of \`${file.path}\` has ${counted(row.cells.length, 'cell')}, the headings have ${width}`, { place: { file: file.path, line: row.line, column: 1 }, expected: counted(width, 'cell'), mend: 'Export the file again; a decimal comma in a comma-separated file or a cut last line does this' }))
  }
  const cells: Record<string, Cell> = {}
  for (const [field, value] of Object.entries(file.fixed)) cells[field] = fixedCell(field, value, file.place)
  for (const column of columns) {
    const text = row.cells[column.index] ?? ''
    const place = placeIn(file.path, row, column)
    const start = { text, column: column.heading, place }
    if (!numberFields.has(column.field)) {
      const label = tidied(text)
      cells[column.key] = label === '' ? { ...start, kind: 'missing' } : { ...start, kind: 'label', value: label }
      continue
    }
    const read = readNumber(text, decimal, source.tokens)
    if (read.kind !== 'unreadable') cells[column.key] = { ...start, ...read }
    else {
      diagnostics.push(unreadable(text, read, column, place, decimal))
      cells[column.key] = { ...start, kind: 'missing' }
    }
  }
  return cells
}

function placeIn(file: string, row: CsvRow | undefined, column: MappedColumn | undefined): Place {
  const index = column?.index ?? 0
  return { file, line: row?.line, column: row?.starts[index] ?? 1, length: Math.max(1, row?.cells[index]?.length ?? 1) }
}

function fixedCell(field: string, value: string, place: Place): Cell {
  const start = { text: value, column: 'stated for the file', place }
  const number = Number(value)
  return numberFields.has(field) && value.trim() !== '' && Number.isFinite(number) ? { ...start, kind: 'number', value: number } : { ...start, kind: 'label', value }
}

function labelsOf(row: CsvRow, columns: readonly MappedColumn[], file: string): Readonly<Record<string, Cell>> {
  return Object.fromEntries(columns.map((column): [string, Cell] => {
    const text = row.cells[column.index] ?? ''
    const start = { text, column: column.heading, place: placeIn(file, row, column) }
    return [column.key, tidied(text) === '' ? { ...start, kind: 'missing' } : { ...start, kind: 'label', value: tidied(text) }]
  }))
}

function unreadable(text: string, read: ReturnType<typeof readNumber> & { readonly kind: 'unreadable' }, column: MappedColumn, place: Place, decimal: DecimalMark): Diagnostic {
  const mark = decimal === 'comma' ? 'comma' : 'point'
  const told = {
    text: { message: 'no number', mend: 'Correct the file, or say under `tokens:` what the text means' },
    unit: { message: `a number with \`${read.rest ?? ''}\` in its cell`, mend: 'Export numbers without units, and state the unit in the study' },
    thousands: { message: 'a number with a separator of thousands', mend: 'Export the file without separators of thousands' },
    'other mark': { message: `a number with another decimal mark than the ${mark} of the file`, mend: 'Declare the right `decimal:` for the file' },
    'spreadsheet error': { message: 'an error of a spreadsheet', mend: 'Mend the formula and export the file again' },
    'not finite': { message: 'a number too large to hold', mend: 'Correct the file' },
  }[read.why]
  return diagnostic(read.why === 'unit' ? 'data/unit-in-cell' : 'data/not-a-number', `Unexpected \`${text.trim().slice(0, 60)}\` in column \`${column.heading}\`: ${told.message}`, {
    place, actual: text.trim().slice(0, 60), expected: `a number with a decimal ${mark}, \`<0.05\`, \`>500\`, ND, or an empty cell`, mend: told.mend,
  })
}

function observationsOf(row: number, cells: Readonly<Record<string, Cell>>, columns: readonly MappedColumn[], { measurands }: SourceFileRequest, source: CsvRow): readonly Observation[] {
  const common = Object.fromEntries(Object.entries(cells).filter(([key]) => !key.includes('/')))
  const wide = [...new Set(columns.flatMap((column) => column.measurand ?? []))]
  if (wide.length > 0) {
    return wide.map((measurand) => ({ row, measurand, fields: { ...common, ...Object.fromEntries(columns.filter((column) => column.measurand === measurand).flatMap((column) => (cells[column.key] === undefined ? [] : [[column.field, cells[column.key]]]))) as Record<string, Cell> } }))
  }
  const named = common['measurand']
  if (named === undefined) {
    // Without a measurand column every row is about every measurand that there is: right for one, and for values that all share.
    if (source.cells.length === 0) throw new Error('a row without cells')
    return measurands.map((measurand) => ({ row, measurand: measurand.id, fields: common }))
  }
  const measurand = measurands.find((each) => each.id === tidied(named.text) || each.name === tidied(named.text))
  return measurand === undefined ? [] : [{ row, measurand: measurand.id, fields: common }]
}

function reportRepeated(rows: readonly CsvRow[], file: string, diagnostics: Diagnostic[]): void {
  const seen = new Map<string, CsvRow>()
  for (const row of rows) {
    const key = row.cells.map(tidied).join('\u0000')
    const earlier = seen.get(key)
    if (earlier === undefined) seen.set(key, row)
    // Without a column that numbers or times rows, equal readings can be real; such a file holds few columns.
    else if (row.cells.filter((cell) => cell.trim() !== '').length >= 5) {
      diagnostics.push(diagnostic('data/repeated-row', `Line ${row.line} of \`${file}\` repeats line ${earlier.line}`, { place: { file, line: row.line, column: 1 }, actual: row.cells.slice(0, 6).join(', '), expected: 'each reading once', mend: 'Remove the copy, or export a column that tells readings apart', related: [{ message: 'first here', place: { file, line: earlier.line, column: 1 } }] }))
    }
  }
}

function noteStrangers(rows: readonly SourceRow[], file: string, diagnostics: Diagnostic[]): void {
  const strangers = rows.filter((row) => row.fate.kind === 'not used' && row.cells['measurand'] !== undefined && row.fate.rule.startsWith('its measurand'))
  const first = strangers[0]
  if (first === undefined) return
  const names = [...new Set(strangers.map((row) => row.cells['measurand']?.text.trim() ?? ''))]
  diagnostics.push(diagnostic('data/unknown-measurand', `${counted(strangers.length, 'row')} of \`${file}\` with a measurand that the study does not hold`, { place: { file, line: first.line, column: 1 }, actual: names.slice(0, 8).join(', '), expected: 'ids or names of measurands', mend: 'Nothing, if these are meant to be left out; they are listed as not used' }))
}
