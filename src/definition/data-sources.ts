// The key `data`: which files hold which rows, how they are written, which column is which field, and what one independent value is.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import {
  datasetName, type Field, listOf, located, mapOf, number, object, oneOf, optional, type ReadBy, type Reader, type Reading, required, text, unexpected,
} from './fields.ts'
import type { ColumnChoice, DatasetSource, FileSource } from './study.ts'
import type { StudyNode } from './study-node.ts'

/** A path inside the study's folder, with `/`. */
export function pathInside(describe: string): Reader<string> {
  const inner = text({ describe, example: 'raw/calibration.csv' })
  return {
    schema: inner.schema,
    read(node, reading) {
      const path = inner.read(node, reading)
      if (path === undefined) return undefined
      const parts = path.split('/')
      let depth = 0
      const leaves = parts.some((part) => (depth += part === '..' ? -1 : part === '.' || part === '' ? 0 : 1) < 0)
      if (!leaves && !path.startsWith('/') && !/^[A-Za-z]:/.test(path) && !path.includes('\\')) return parts.filter((part) => part !== '.' && part !== '').join('/')
      reading.report(diagnostic('definition/path-outside', `The path \`${path}\` is outside the folder of the study, or written with other signs than \`/\``, {
        place: node.place, actual: path, expected: 'a path relative to the study, with `/`, that stays in its folder', mend: 'Copy the file beside the study and write its relative path',
      }))
      return undefined
    },
  }
}

const fixedValues = mapOf(text({ describe: 'The value' }), { describe: 'Values that hold for every row of the file, by field', example: { day: '2026-03-02' } })

const dialect = {
  delimiter: optional(oneOf(['comma', 'semicolon', 'tab', 'pipe'], { describe: 'What separates the columns; found out when absent' })),
  decimal: optional(oneOf(['point', 'comma'], { describe: 'The decimal mark; found out when absent, refused when ambiguous' })),
  encoding: optional(oneOf(['utf-8', 'utf-16le', 'utf-16be', 'windows-1252'], { describe: 'The character encoding; found out when absent' })),
  'header-row': optional(number({ describe: 'Line of the column headings, from 1; found out when absent', integer: true, minimum: 1 })),
  fixed: optional(fixedValues),
} as const

const fileMap = object({ file: required(pathInside('Path of the file')), ...dialect }, { describe: 'A file that is written differently from the others' })
const plainPath = pathInside('Path of the file, relative to the study')

const file: Reader<{ readonly node: StudyNode; readonly value: ReadBy<typeof fileMap> }> = {
  schema: { anyOf: [plainPath.schema, fileMap.schema] },
  read(node, reading) {
    if (node.kind === 'map') {
      const value = fileMap.read(node, reading)
      return value === undefined ? undefined : { node, value }
    }
    const path = plainPath.read(node, reading)
    return path === undefined ? undefined : { node, value: { file: path } as ReadBy<typeof fileMap> }
  },
}

const column: Reader<ColumnChoice> = {
  schema: { anyOf: [{ type: ['string', 'number'] }, { type: 'object', additionalProperties: { type: ['string', 'number'] } }], description: 'Heading of the column; or, when each measurand has its own column, measurand → heading', examples: ['Area'] },
  read(node, reading) {
    if (node.kind === 'scalar' && node.text !== '') return { kind: 'one', column: node.text, place: node.place }
    if (node.kind !== 'map') return unexpected(node, reading, 'the heading of a column, or measurand → heading')
    const columns: Record<string, { value: string; place: typeof node.place }> = {}
    for (const entry of node.entries) {
      if (entry.value.kind !== 'scalar' || entry.value.text === '') return unexpected(entry.value, reading, 'the heading of a column')
      columns[entry.key] = { value: entry.value.text, place: entry.value.place }
    }
    return { kind: 'per measurand', columns, place: node.place }
  },
}

const accepted = listOf(text({ describe: 'A text that stands in the column' }), { describe: 'One text or several', single: true, minimum: 1 })
const word = text({ describe: 'A text that stands for no number' })

const datasetReader = object({
  files: required(listOf(file, { describe: 'The raw files, read in this order', single: true, minimum: 1 })),
  ...dialect,
  rows: optional(mapOf(accepted, { describe: 'Keep only rows with these texts: heading → text or texts; the rest is listed as not used', example: { Type: 'STD' } })),
  columns: required(mapOf(column, { describe: 'Field → heading of its column. Numbers: level, response, result, added, native, reference, dilution, sample-amount, order, time, signal; all others are texts (day, analyst, condition, …)' })),
  replicate: optional(located(text({ describe: 'Field that names the independent unit; its rows are averaged', example: 'vial' }))),
  average: optional(listOf(located(text({ describe: 'A field' })), { describe: 'Fields averaged over before any statistic', single: true, example: ['injection'] })),
  tokens: optional(object({
    'not-detected': optional(listOf(word, { describe: 'Texts that mean: not detected', single: true })),
    missing: optional(listOf(word, { describe: 'Texts that mean: no value', single: true })),
  }, { describe: 'Texts in number columns and what they mean, beside the usual ones' })),
  through: optional(located(text({ describe: 'Linearity block that turns responses into results', example: 'linearity' }))),
  'subtract-blank': optional(located(datasetName({ describe: 'Dataset whose mean response is subtracted from each response first' }))),
  reportable: optional(oneOf(['result', 'recomputed'], { describe: 'When a result and a response are both mapped: which one is reported' })),
} satisfies Record<string, Field<never> | Field<unknown>>, { describe: 'One dataset' })

export const dataReader = mapOf(located(datasetReader), { describe: 'Datasets: name → files and columns' })

export function datasetsOf(read: ReadBy<typeof dataReader>): readonly DatasetSource[] {
  return read.map(({ key, entry, value: { value } }) => ({
    name: key,
    files: value.files.map(({ node, value: own }): FileSource => ({
      path: own.file, place: node.place, delimiter: own.delimiter ?? value.delimiter, decimal: own.decimal ?? value.decimal, encoding: own.encoding ?? value.encoding,
      headerRow: own['header-row'] ?? value['header-row'], fixed: Object.fromEntries([...(value.fixed ?? []), ...(own.fixed ?? [])].map((each) => [each.key, each.value])),
    })),
    rows: (value.rows ?? []).map((each) => ({ column: each.key, accepted: each.value, place: each.entry.keyPlace })),
    columns: Object.fromEntries(value.columns.map((each) => [each.key, each.value])),
    replicate: value.replicate, average: value.average ?? [],
    tokens: { notDetected: value.tokens?.['not-detected'] ?? [], missing: value.tokens?.missing ?? [] },
    through: value.through, subtractBlank: value['subtract-blank'], reportable: value.reportable, place: entry.keyPlace,
  }))
}

/** Averaged fields and the independent unit must be mapped; wide columns must name measurands. */
export function checkDatasets(datasets: readonly DatasetSource[], measurands: ReadonlySet<string>, reading: Reading): void {
  for (const dataset of datasets) {
    const fields = Object.keys(dataset.columns)
    for (const each of [...dataset.average, ...(dataset.replicate === undefined ? [] : [dataset.replicate])]) {
      if (!fields.includes(each.value) && !dataset.files.some((source) => each.value in source.fixed)) {
        reading.report(diagnostic('definition/unknown-name', `Dataset \`${dataset.name}\` maps no column for \`${each.value}\``, { place: each.place, actual: each.value, expected: fields.join(', '), mend: `Add \`${each.value}:\` under \`columns:\`` }))
      }
    }
    for (const choice of Object.values(dataset.columns)) {
      if (choice.kind !== 'per measurand') continue
      for (const [name, heading] of Object.entries(choice.columns)) {
        if (!measurands.has(name)) reading.report(diagnostic('definition/unknown-name', `No measurand is named \`${name}\``, { place: heading.place, actual: name, expected: [...measurands].join(', '), mend: 'Write the id of a measurand' }))
      }
    }
  }
}
