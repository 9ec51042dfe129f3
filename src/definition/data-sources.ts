// The key `data`: which files hold which rows, how they are written, which column is which field, and what one independent value is.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import {
  below, datasetName, type Field, flag, listOf, located, mapOf, number, object, oneOf, optional, type ReadBy, type Reader, type Reading, required, text,
} from './fields.ts'
import { checkKnown, checkNames } from './names.ts'
import { pathBeside, pathInside, reportOutside } from './paths.ts'
import type { ColumnChoice, DatasetSource, FileSource } from './study.ts'
import type { StudyNode } from './study-node.ts'

const fixedValues = mapOf(text({ describe: 'The value' }), { describe: 'Values that hold for every row of the file, by field', example: { day: '2026-03-02' } })

const dialect = {
  delimiter: optional(oneOf(['comma', 'semicolon', 'tab', 'pipe'], { describe: 'What separates the columns; found out when absent' })),
  decimal: optional(oneOf(['point', 'comma'], { describe: 'The decimal mark; found out when absent, refused when ambiguous' })),
  encoding: optional(oneOf(['utf-8', 'utf-16le', 'utf-16be', 'windows-1252'], { describe: 'The character encoding; found out when absent' })),
  'header-row': optional(number({ describe: 'Line of the column headings, from 1; found out when absent', integer: true, minimum: 1 })),
  fixed: optional(fixedValues),
} as const

const fileMap = object({
  file: required(pathBeside('Path of the file', 'raw/calibration.csv')), outside: optional(flag({ describe: 'The file lies outside the folder of the study, and this is meant' })), ...dialect,
}, { describe: 'A file that is written differently from the others' })
const plainPath = pathInside('Path of the file, relative to the study')

const file: Reader<{ readonly node: StudyNode; readonly value: ReadBy<typeof fileMap> }> = {
  schema: { anyOf: [plainPath.schema, fileMap.schema] },
  read(node, reading) {
    if (node.kind === 'map') {
      const value = fileMap.read(node, reading)
      if (value === undefined) return undefined
      if (value.outside === true || !value.file.startsWith('../')) return { node, value }
      reportOutside(value.file, node, reading)
      return undefined
    }
    const path = plainPath.read(node, reading)
    return path === undefined ? undefined : { node, value: { file: path } as ReadBy<typeof fileMap> }
  },
}

const heading = text({ describe: 'Heading of the column', example: 'Area' })
const headings = mapOf(located(heading), { describe: 'When each measurand has its own column: measurand → heading', minimum: 1 })

const column: Reader<ColumnChoice> = {
  schema: { anyOf: [heading.schema, headings.schema], description: 'Heading of the column; or, when each measurand has its own column, measurand → heading', examples: ['Area'] },
  read(node, reading) {
    if (node.kind !== 'map') {
      const one = heading.read(node, reading)
      return one === undefined ? undefined : { kind: 'one', column: one, place: node.place }
    }
    const each = headings.read(node, reading)
    return each === undefined ? undefined : { kind: 'per measurand', columns: Object.fromEntries(each.map(({ key, value }) => [key, value])), place: node.place }
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

export const dataReader = mapOf(located(datasetReader), { describe: 'Datasets: name → files and columns', minimum: 1 })

export function datasetsOf(read: ReadBy<typeof dataReader>): readonly DatasetSource[] {
  return read.map(({ key, entry, value: { value } }) => ({
    name: key,
    files: value.files.map(({ node, value: own }): FileSource => ({
      path: own.file, place: node.place, ...(own.outside === true ? { outside: true as const } : {}), delimiter: own.delimiter ?? value.delimiter, decimal: own.decimal ?? value.decimal, encoding: own.encoding ?? value.encoding,
      headerRow: own['header-row'] ?? value['header-row'], fixed: Object.fromEntries([...(value.fixed ?? []), ...(own.fixed ?? [])].map((each) => [each.key, each.value])),
    })),
    rows: (value.rows ?? []).map((each) => ({ column: each.key, accepted: each.value, place: each.entry.keyPlace })),
    columns: Object.fromEntries(value.columns.map((each) => [each.key, each.value])),
    replicate: value.replicate, average: value.average ?? [],
    tokens: { notDetected: value.tokens?.['not-detected'] ?? [], missing: value.tokens?.missing ?? [] },
    through: value.through, subtractBlank: value['subtract-blank'], reportable: value.reportable, place: entry.keyPlace,
  }))
}

/** What one dataset says of another, of measurands and of its own fields. `measurands` and `blocks` are names, whether or not the thing itself could be read. */
export function checkDatasets(datasets: readonly DatasetSource[], known: { readonly measurands: ReadonlySet<string>; readonly blocks: readonly string[] }, reading: Reading): void {
  for (const dataset of datasets) {
    const inner = below(below(reading, 'data'), dataset.name)
    const columns = Object.entries(dataset.columns)
    checkNames(columns.map(([value, choice]) => ({ value, place: choice.place })), 'field', inner)
    const fields = [...new Set([...Object.keys(dataset.columns), ...dataset.files.flatMap((each) => Object.keys(each.fixed))])]
    for (const each of [...dataset.average, ...(dataset.replicate === undefined ? [] : [dataset.replicate])]) checkKnown(each, fields, `field of dataset \`${dataset.name}\``, 'under `columns`', inner)
    const wide = columns.flatMap(([, choice]) => (choice.kind === 'per measurand' ? [choice] : []))
    for (const choice of wide) for (const [value, heading] of Object.entries(choice.columns)) checkKnown({ value, place: heading.place }, known.measurands, 'measurand', 'under `measurands`', inner)
    const [long, first] = [dataset.columns['measurand'], wide[0]]
    if (long !== undefined && first !== undefined) {
      reading.report(diagnostic('definition/contradiction', `Unexpected column \`measurand\` in dataset \`${dataset.name}\`, where each measurand has its own column`, { place: long.place, expected: 'one of the two layouts', mend: 'Remove `measurand:`, or give each field one column', related: [{ message: 'one column for each measurand', place: first.place }] }))
    }
    if (dataset.through !== undefined) checkKnown(dataset.through, known.blocks, 'block', 'under `characteristics`', inner)
    checkFiles(dataset, inner)
  }
}

function checkFiles(dataset: DatasetSource, reading: Reading): void {
  dataset.files.forEach((file, index) => {
    const earlier = dataset.files.slice(0, index).find((other) => other.path === file.path)
    if (earlier === undefined) return
    reading.report(diagnostic('definition/duplicate-name', `Unexpected second file \`${file.path}\` in dataset \`${dataset.name}\``, { place: file.place, actual: file.path, expected: 'each file once, since its rows would count twice', mend: 'Remove one of the two', related: [{ message: 'the first', place: earlier.place }] }))
  })
}
