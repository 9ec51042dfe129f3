// Annexes: every row read and what became of it, every file with its digest, every default taken, every diagnostic.
import type { RecordedDataset, RecordedRow } from '../../assess/record.ts'
import { column, paragraph, row, sentence, table, textOf } from '../build.ts'
import type { ExhibitRow, ReportBlock } from '../document.ts'
import { count } from '../numbers.ts'
import { type Section, slug } from './section.ts'

const rowsPrintedAtMost = 5000 // above this the annex prints counts and the rows that decide; the attached record holds all

export function rawData(section: Section): readonly ReportBlock[] {
  const { datasets } = section.record
  const total = datasets.reduce((sum, dataset) => sum + dataset.rows.length, 0)
  const everything = total <= rowsPrintedAtMost
  return [
    ...(everything ? [] : [paragraph(sentence`The ${count(total)} rows read are more than this annex prints. It lists those that were excluded or hold a censored value; all stand in the attached record.json and in the attached raw files.`)]),
    ...datasets.flatMap((dataset) => datasetTable(dataset, everything)),
  ]
}

function datasetTable(dataset: RecordedDataset, everything: boolean): readonly ReportBlock[] {
  const fields = [...new Set(dataset.rows.flatMap((each) => Object.keys(each.cells)))]
  const rows = everything ? dataset.rows : dataset.rows.filter((each) => each.fate.kind === 'excluded' || Object.values(each.cells).some((cell) => cell.kind === 'below' || cell.kind === 'above' || cell.kind === 'not detected'))
  if (rows.length === 0) return []
  const names = [...new Set(dataset.rows.map((each) => each.file))]
  const groups = names.map((file) => rows.filter((each) => each.file === file)).filter((group) => group.length > 0)
  return [table({
    id: `raw-${slug(dataset.name)}`, caption: `Rows of dataset ${dataset.name}, as written in the files`,
    columns: [
      column('File:line', { align: 'text', rowHeader: true }), column('Became', { align: 'text' }),
      ...fields.map((field) => column(field, { align: 'text', unit: dataset.columns[field] === undefined ? '' : `“${dataset.columns[field]}”` })),
    ],
    groups: groups.map((group) => group.map((each) => rawRow(each, names.indexOf(each.file) + 1, fields))),
    notes: [`Files: ${names.map((name, index) => `${index + 1} is ${name}`).join(', ')}.`, 'Under each field stands the heading of its column in the file. Cells are printed letter by letter as they stand in the file.'],
  })]
}

function rawRow(each: RecordedRow, fileNumber: number, fields: readonly string[]): ExhibitRow {
  const became = each.fate.kind === 'excluded' ? `excluded (${each.fate.exclusion})` : each.fate.kind === 'not used' ? `not used: ${each.fate.rule}` : 'used'
  const made = row(`${fileNumber}:${each.line}`, became, ...fields.map((field) => each.cells[field]?.text ?? ''))
  return each.fate.kind === 'excluded' ? { ...made, tone: 'excluded' } : made
}

export function files(section: Section): readonly ReportBlock[] {
  const { inputs, datasets } = section.record
  return [
    table({
      id: 'files', caption: 'Every file read, with size and SHA-256',
      columns: [column('File', { align: 'text', rowHeader: true }), column('Role', { align: 'text' }), column('Size', { unit: 'bytes' }), column('SHA-256', { align: 'text' })],
      rows: inputs.map((input) => row(input.path, input.role, count(input.size), { type: 'inlineCode', value: input.sha256 })),
    }),
    table({
      id: 'reading', caption: 'How each raw file was read; rows read = used + not used + excluded',
      columns: [column('Dataset', { align: 'text', rowHeader: true }), column('File', { align: 'text' }), column('Encoding', { align: 'text' }), column('Delimiter', { align: 'text' }), column('Decimal', { align: 'text' }), column('Header line'), column('Rows read'), column('Used'), column('Not used'), column('Excluded')],
      rows: datasets.flatMap((dataset) => dataset.files.map((file) => row(dataset.name, file.file, file.encoding, file.delimiter, file.decimal, count(file.headerRow), count(file.rowsRead), count(file.used), count(file.notUsed), count(file.excluded)))),
    }),
  ]
}

export function defaults(section: Section): readonly ReportBlock[] {
  const { defaults: taken } = section.record
  if (taken.length === 0) return [paragraph(textOf('No default was taken; the study states everything itself.'))]
  return [table({ id: 'defaults', caption: 'Defaults taken where the study is silent', columns: [column('Key', { align: 'text', rowHeader: true }), column('Value taken', { align: 'text' })], rows: taken.map((each) => row(each.key, each.value)) })]
}

export function diagnostics(section: Section): readonly ReportBlock[] {
  const { diagnostics: found } = section.record
  if (found.length === 0) return [paragraph(textOf('Nothing was noticed.'))]
  return [table({
    id: 'diagnostics', caption: 'Everything the program noticed while reading and computing',
    columns: [column('Severity', { align: 'text', rowHeader: true }), column('What', { align: 'text' }), column('Where', { align: 'text' }), column('Code', { align: 'text' })],
    rows: found.map((each) => row(each.severity, each.message.replace(/`/g, ''), placeText(each.place), each.code)),
  })]
}

function placeText(place: Section['record']['diagnostics'][number]['place']): string {
  if (place === undefined) return ''
  return [place.file, place.sheet, place.cell, place.line, place.cell === undefined ? place.column : undefined].filter((part) => part !== undefined).join(':')
}
