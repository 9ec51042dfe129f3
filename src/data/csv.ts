// Text of a raw file → rows of cells with their line numbers. One delimiter is chosen before anything is split: a file that two delimiters
// would fit is refused until the study says which.
import { parse } from 'csv-parse/sync'
import type { Delimiter } from '../definition/study.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'

export interface CsvRow {
  /** Line of its first character, from 1. */
  readonly line: number
  readonly cells: readonly string[]
  /** Where each cell starts in its line, counted from 1; for a row of one line. */
  readonly starts: readonly number[]
}

export interface CsvTable {
  readonly delimiter: Delimiter
  readonly rows: readonly CsvRow[]
}

const signs: Readonly<Record<Delimiter, string>> = { comma: ',', semicolon: ';', tab: '\t', pipe: '|' }

export function readCsv(text: string, file: string, declared: Delimiter | undefined): CsvTable | { readonly problem: Diagnostic } {
  const delimiter = declared ?? sniffDelimiter(text)
  if (typeof delimiter !== 'string') {
    return { problem: diagnostic('data/ambiguous-delimiter', `Cannot tell what separates the columns of \`${file}\``, {
      place: { file, line: 1, column: 1 }, actual: delimiter.fitting.length === 0 ? 'no delimiter found' : delimiter.fitting.join(' and '), expected: 'one of comma, semicolon, tab, pipe', mend: 'Declare `delimiter:` for the file',
    }) }
  }
  try {
    const records = parse(text, { delimiter: signs[delimiter], relax_column_count: true, skip_empty_lines: false, info: true, relax_quotes: false }) as unknown as readonly { readonly record: readonly string[]; readonly info: { readonly lines: number } }[]
    const lines = text.split(/\r\n|\n|\r/)
    let line = 1
    const rows = records.map(({ record, info }): CsvRow => {
      const start = line
      line = info.lines + 1
      return { line: start, cells: record, starts: cellStarts(lines[start - 1] ?? '', record) }
    })
    return { delimiter, rows }
  } catch (error) {
    if (!(error instanceof Error && 'code' in error)) throw error
    const line = 'lines' in error && typeof error.lines === 'number' ? error.lines : 1
    return { problem: diagnostic('data/broken-row', `Cannot split line ${line} of \`${file}\` into cells`, {
      place: { file, line, column: 1 }, actual: error.code === 'CSV_QUOTE_NOT_CLOSED' ? 'a quote that is not closed' : 'a quote inside a cell', expected: 'quotes around whole cells, doubled inside', mend: 'Export the file again, or mend the quote',
    }) }
  }
}

/** A quoted cell is longer in its line than in itself: by its quotes, and by each quote doubled inside. */
function cellStarts(line: string, cells: readonly string[]): readonly number[] {
  let at = 0
  return cells.map((cell) => {
    const start = at + 1
    at += (line[at] === '"' ? cell.length + 2 + (cell.split('"').length - 1) : cell.length) + 1
    return start
  })
}

/**
 * A delimiter fits when most lines have one and the same number of cells under it, more than one. A comma that stands between digits only
 * is a decimal mark and no delimiter. Two that fit are undecided; a file without any has one column.
 */
function sniffDelimiter(text: string): Delimiter | { readonly fitting: readonly Delimiter[] } {
  const lines = text.split(/\r\n|\n|\r/, 400).map(unquoted).filter((line) => line.trim() !== '').slice(0, 200)
  const commaIsMark = lines.every((line) => !/(?:^|[^\d]),|,(?:[^\d]|$)/.test(line))
  const fitting = (Object.keys(signs) as Delimiter[]).filter((delimiter) => {
    const counts = new Map<number, number>()
    for (const line of lines) {
      const cells = line.split(signs[delimiter]).length
      if (cells > 1) counts.set(cells, (counts.get(cells) ?? 0) + 1)
    }
    return Math.max(0, ...counts.values()) > lines.length / 2
  })
  const separating = fitting.filter((delimiter) => delimiter !== 'comma' || !commaIsMark)
  if (separating.length === 1 && separating[0] !== undefined) return separating[0]
  if (separating.length > 1) return { fitting: separating }
  // One column: any delimiter that does not occur leaves the lines whole.
  const absent = (['semicolon', 'tab', 'pipe'] as const).find((delimiter) => lines.every((line) => !line.includes(signs[delimiter])))
  return commaIsMark && absent !== undefined ? absent : { fitting }
}

function unquoted(line: string): string {
  return line.replace(/"(?:[^"]|"")*"/g, '')
}
