// Text and delimiter → rows of cells, each with the line and column it starts in. Every kind of line end counts, also mixed ones and those
// inside quotes; a quote that does not stand around a whole cell is told, never guessed at (RFC 4180, section 2).

export interface CsvRow {
  /** Line of its first character, from 1. */
  readonly line: number
  readonly cells: readonly string[]
  /** Column of each cell in its line, from 1. */
  readonly starts: readonly number[]
  /** Line of each cell, where a quoted cell makes the row go over several lines. */
  readonly lines?: readonly number[] | undefined
}

export interface BrokenQuote {
  readonly kind: 'not closed' | 'inside a cell' | 'text behind it'
  readonly line: number
  readonly column: number
}

/** The table goes on behind the last row that is read. */
export interface TooManyRows {
  readonly kind: 'too many rows'
  readonly line: number
}

export const mostRows = 1_000_000 // a table of more would not fit the memory of every machine, nor any dossier

const quote = 34
const lineFeed = 10
const carriageReturn = 13

export function splitRows(text: string, delimiter: string): readonly CsvRow[] | BrokenQuote | TooManyRows {
  const rows: CsvRow[] = []
  const sign = delimiter.charCodeAt(0)
  let at = 0
  let line = 1
  let lineStart = 0
  const broken = (kind: BrokenQuote['kind'], where: number): BrokenQuote => ({ kind, line, column: where - lineStart + 1 })
  while (at < text.length) {
    if (rows.length === mostRows) return { kind: 'too many rows', line }
    const first = line
    const cells: string[] = []
    const starts: number[] = []
    let lines: number[] | undefined
    for (;;) {
      starts.push(at - lineStart + 1)
      lines?.push(line)
      if (text.charCodeAt(at) === quote) {
        const end = closingQuote(text, at + 1)
        if (end < 0) return broken('not closed', at)
        const cell = text.slice(at + 1, end)
        cells.push(cell.includes('"') ? cell.replaceAll('""', '"') : cell)
        if (/[\r\n]/.test(cell)) {
          lines ??= starts.map(() => line)
          for (const lineEnd of cell.matchAll(/\r\n|\n|\r/g)) {
            line += 1
            lineStart = at + 1 + lineEnd.index + lineEnd[0].length
          }
        }
        at = end + 1
        if (at < text.length && !isCellEnd(text.charCodeAt(at), sign)) return broken('text behind it', at)
      } else {
        const start = at
        while (at < text.length && !isCellEnd(text.charCodeAt(at), sign)) {
          if (text.charCodeAt(at) === quote) return broken('inside a cell', at)
          at += 1
        }
        cells.push(text.slice(start, at))
      }
      if (at >= text.length || text.charCodeAt(at) !== sign) break
      at += 1
    }
    rows.push({ line: first, cells, starts, lines })
    at += text.charCodeAt(at) === carriageReturn && text.charCodeAt(at + 1) === lineFeed ? 2 : 1
    line += 1
    lineStart = at
  }
  return rows
}

function isCellEnd(character: number, sign: number): boolean {
  return character === sign || character === lineFeed || character === carriageReturn
}

/** Two quotes inside a quoted cell stand for one; -1 when it is not closed. */
function closingQuote(text: string, from: number): number {
  let end = text.indexOf('"', from)
  while (end >= 0 && text.charCodeAt(end + 1) === quote) end = text.indexOf('"', end + 2)
  return end
}
