// Text → rows. Expected rows and places are written by hand from RFC 4180, section 2; random texts are also compared with csv-parse, a
// general-purpose reader.
import { parse } from 'csv-parse/sync'
import fc from 'fast-check'
import { describe, expect, test } from 'vitest'
import { type BrokenQuote, type CsvRow, mostRows, splitRows } from '../../src/data/split-rows.ts'

function cellsOf(text: string, sign = ','): readonly (readonly (number | string)[])[] {
  const rows = splitRows(text, sign)
  if ('kind' in rows) throw new Error(`${rows.kind} ${rows.line}`)
  return rows.map((row) => [row.line, ...row.cells])
}

describe('rows with the line they start in', () => {
  test.each<readonly [string, string, readonly (readonly (number | string)[])[]]>([
    ['line feeds', 'a,b\n1,2\n', [[1, 'a', 'b'], [2, '1', '2']]],
    ['carriage returns with line feeds', 'a,b\r\n1,2\r\n', [[1, 'a', 'b'], [2, '1', '2']]],
    ['carriage returns alone', 'a,b\r1,2\r3,4', [[1, 'a', 'b'], [2, '1', '2'], [3, '3', '4']]],
    ['mixed line ends', 'a\r\nb\nc\rd\r\ne', [[1, 'a'], [2, 'b'], [3, 'c'], [4, 'd'], [5, 'e']]],
    ['no line end behind the last row', 'a,b\n1,2', [[1, 'a', 'b'], [2, '1', '2']]],
    ['blank lines', 'a,b\n\n\r\n1,2\n\n', [[1, 'a', 'b'], [2, ''], [3, ''], [4, '1', '2'], [5, '']]],
    ['a quoted line end', 'a,b\n"x\ny",2\n3,4\n', [[1, 'a', 'b'], [2, 'x\ny', '2'], [4, '3', '4']]],
    ['a quoted line end of another kind', 'a,b\n"x\r\ny\rz",2\n3,4\n', [[1, 'a', 'b'], [2, 'x\r\ny\rz', '2'], [5, '3', '4']]],
    ['a quoted delimiter', 'a,b\n"1,5","2,5"\n', [[1, 'a', 'b'], [2, '1,5', '2,5']]],
    ['doubled quotes', '"say ""x""",""""\n"""",""\n', [[1, 'say "x"', '"'], [2, '"', '']]],
    ['ragged rows', 'a,b\n1\n1,2,3\n', [[1, 'a', 'b'], [2, '1'], [3, '1', '2', '3']]],
    ['trailing delimiters', 'a,b,\n1,2,\n,,', [[1, 'a', 'b', ''], [2, '1', '2', ''], [3, '', '', '']]],
    ['a column without a name', ',a\n1,2\n', [[1, '', 'a'], [2, '1', '2']]],
    ['spaces, which belong to their cell', ' a , b\n', [[1, ' a ', ' b']]],
  ])('%s', (_, text, expected) => expect(cellsOf(text)).toEqual(expected))

  test.each([';', '\t', '|'])('separated by %j', (sign) => expect(cellsOf(`a${sign}b,c\n"1${sign}2"${sign}3\n`, sign)).toEqual([[1, 'a', 'b,c'], [2, `1${sign}2`, '3']]))
})

test('a cell knows its line and column, also behind a quoted line end', () => {
  const rows = splitRows('id,"a ""b""",c\n1,"x\ny\r\nzz",33,"4"\n', ',') as readonly CsvRow[]
  expect(rows[0]).toMatchObject({ line: 1, starts: [1, 4, 14], lines: undefined })
  expect(rows[1]).toMatchObject({ line: 2, starts: [1, 3, 5, 8], lines: [2, 2, 4, 4] })
})

describe('a quote that stands wrong', () => {
  test.each<readonly [string, string, BrokenQuote]>([
    ['never closed', 'a,b\n1,"2\n3,4\n', { kind: 'not closed', line: 2, column: 3 }],
    ['never closed behind a closed one of two lines', '"a\nb","c', { kind: 'not closed', line: 2, column: 4 }],
    ['inside a cell', 'a,b\n1,5" column\n', { kind: 'inside a cell', line: 2, column: 4 }],
    ['behind a space', 'a, "b"\n', { kind: 'inside a cell', line: 1, column: 4 }],
    ['with text behind it', 'a,"b" c\n', { kind: 'text behind it', line: 1, column: 6 }],
    ['tripled', '"a"""b"\n', { kind: 'text behind it', line: 1, column: 6 }],
  ])('%s', (_, text, expected) => expect(splitRows(text, ',')).toEqual(expected))
})

test('agrees with a general-purpose reader on every text of quotes, delimiters and line ends', () => {
  const text = fc.array(fc.constantFrom('a', '5', ',', ',', '\n', '\r', '\r\n', '"', '""', '"a"', '"\n"', ' ', 'é'), { maxLength: 24 }).map((parts) => parts.join(''))
  fc.assert(fc.property(text, (given) => {
    const own = splitRows(given, ',')
    let other: readonly (readonly string[])[] | undefined
    try {
      other = parse(given, { delimiter: ',', record_delimiter: ['\r\n', '\n', '\r'], relax_column_count: true, skip_empty_lines: false })
    } catch {
      other = undefined
    }
    expect('kind' in own ? undefined : own.map((row) => row.cells)).toEqual(other)
  }), { numRuns: 3000, seed: 20260504 })
})

test('takes time in step with the length of the text', () => {
  const started = process.cpuUsage().user
  for (const text of ['"'.repeat(200_001), `${'""'.repeat(100_000)}`, `"${'\n'.repeat(200_000)}"`, `${'\r'.repeat(200_000)}`, ','.repeat(200_000), `${'"a",'.repeat(200_000)}"`]) splitRows(text, ',')
  expect(process.cpuUsage().user - started).toBeLessThan(1_000_000)
})

test('a table ends at its most rows', () => {
  expect((splitRows('1\n'.repeat(mostRows), ',') as readonly CsvRow[]).length).toBe(mostRows)
  expect(splitRows('1\n'.repeat(mostRows + 1), ',')).toEqual({ kind: 'too many rows', line: mostRows + 1 })
})
