// Tables as CSV, read again by a CSV reader: full-precision values, units in the head, marks of excluded rows.
import { parse } from 'csv-parse/sync'
import { expect, test } from 'vitest'
import type { ExhibitTable } from '../../src/present/document.ts'
import { tableToCsv } from '../../src/publish/tables-csv.ts'
import { number, text } from './sample-document.ts'

const table: ExhibitTable = {
  type: 'exhibitTable', id: 't', caption: [], notes: [],
  columns: [{ header: 'Item, “name”', align: 'text', rowHeader: true }, { header: 'Level', unit: 'mg/L', align: 'number' }, { header: 'Interval', align: 'number' }, { header: 'Verdict', align: 'text' }],
  groups: [
    [{ cells: [[text('a, "b"\nc')], [number(1 / 3, '0.3333')], [number(1.5), text(' to '), number(2)], [{ type: 'verdict', word: 'not evaluable' }]] }],
    [{ cells: [[text(' spaced ')], [number(-1e-9, '\u22121.000 × 10⁻⁹')], [], [{ type: 'pageReference', target: 'x' }]], tone: 'excluded' }],
  ],
}

test('values come at full precision, texts as printed', () => {
  expect(parse(tableToCsv(table))).toEqual([
    ['Item, “name”', 'Level [mg/L]', 'Interval', 'Verdict', 'row'],
    ['a, "b"\nc', '0.3333333333333333', '1.5 to 2', 'not evaluable', ''],
    [' spaced ', '-1e-9', '', '', 'excluded'],
  ])
})

test('lines end as RFC 4180, section 2 says, and no byte order mark comes before them', () => {
  const csv = tableToCsv({ ...table, columns: table.columns.slice(1, 2), groups: [[{ cells: [[], [number(2)]] }]] })
  expect(csv).toBe('Level [mg/L]\r\n\r\n')
})
