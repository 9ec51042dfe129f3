// The key `exclusions`: rows taken out, by whom and why. Without a reason and a second person nothing is taken out.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import { datasetName, date, listOf, located, number, object, oneOf, optional, type ReadBy, type Reader, type Reading, required, text, unexpected } from './fields.ts'
import { checkKnown } from './names.ts'
import { pathInside } from './paths.ts'
import type { DatasetSource, Exclusion, Person, RowSelector } from './study.ts'
import type { MapEntry } from './study-node.ts'

const cellText = text({ describe: 'The text that stands in the column', example: 41 })
const rowCount = number({ describe: 'How many rows are meant; one when absent', integer: true, minimum: 1 })
const file = pathInside('The file, when the dataset has several')

/** Headings are the user's own words; `file` and `rows` are ours, and a column of that name cannot select. */
const selector: Reader<RowSelector> = {
  schema: { type: 'object', minProperties: 1, properties: { file: file.schema, rows: rowCount.schema }, additionalProperties: cellText.schema, description: 'Which row: heading of a column → text, for as many columns as it takes; also `file` and `rows`', examples: [{ Inj: 41 }] },
  read(node, reading) {
    if (node.kind !== 'map') return unexpected(node, reading, 'heading of a column → text')
    const entryOf = (key: string): MapEntry | undefined => node.entries.find((each) => each.key === key)
    const read = <T>(reader: Reader<T>, entry: MapEntry | undefined): T | undefined => (entry === undefined ? undefined : reader.read(entry.value, { ...reading, path: `${reading.path}.${entry.key}` }))
    const columns = node.entries.filter((each) => each.key !== 'file' && each.key !== 'rows')
    const matches = columns.map((entry) => ({ column: entry.key, text: read(cellText, entry) }))
    const named = read(file, entryOf('file'))
    const rows = read(rowCount, entryOf('rows'))
    if (columns.length === 0) return unexpected(node, reading, 'at least one heading of a column → text', 'Write which row is meant, such as `row: { Inj: 41 }`')
    if (entryOf('rows') === undefined) reading.took(`${reading.path}.rows`, '1')
    const isComplete = matches.every((each) => each.text !== undefined) && (named !== undefined) === (entryOf('file') !== undefined) && (rows !== undefined) === (entryOf('rows') !== undefined)
    return isComplete ? { matches: matches.map((each) => ({ column: each.column, text: each.text ?? '' })), file: named, rows: rows ?? 1 } : undefined
  },
}

const one = located(object({
  data: required(located(datasetName({ describe: 'Dataset of the row' }))),
  row: required(located(selector)),
  measurands: optional(listOf(located(text({ describe: 'Id of a measurand' })), { describe: 'Only these measurands; every measurand when absent', single: true, minimum: 1 })),
  class: required(oneOf(['assignable cause', 'rule of the plan', 'statistical only'], { describe: 'On what ground the row is taken out' })),
  reason: required(text({ describe: 'The reason in words' })),
  reference: optional(text({ describe: 'Number of the deviation or investigation' })),
  'requested-by': required(located(text({ describe: 'Id of the person who asks' }))),
  'approved-by': required(located(text({ describe: 'Id of another person, who approves' }))),
  date: required(located(date({ describe: 'Date of the approval' }))),
}, { describe: 'One exclusion' }))

export const exclusionsReader = listOf(one, { describe: 'Rows taken out; every result is shown with and without them' })

type ReadExclusions = ReadBy<typeof exclusionsReader>

export function exclusionsOf(read: ReadExclusions): readonly Exclusion[] {
  return read.map(({ value, place }, index) => ({
    number: index + 1, dataset: value.data, row: value.row.value, measurands: value.measurands?.map((each) => each.value), class: value.class, reason: value.reason, reference: value.reference,
    requestedBy: value['requested-by'].value, approvedBy: value['approved-by'].value, date: value.date.value, place,
  }))
}

export interface KnownToExclusions {
  readonly people: readonly Person[] | undefined
  readonly reportDate: string | undefined
  readonly measurands: ReadonlySet<string>
  readonly datasets: readonly DatasetSource[]
}

export function checkExclusions(read: ReadExclusions, known: KnownToExclusions, reading: Reading): void {
  for (const [index, { value }] of read.entries()) {
    const [requested, approved] = [value['requested-by'], value['approved-by']]
    for (const person of [requested, approved]) {
      if (known.people !== undefined) checkKnown(person, new Set(known.people.map((each) => each.id)), 'person', 'under `people`', reading)
    }
    if (requested.value === approved.value) {
      reading.report(diagnostic('definition/same-person', `Unexpected approval of exclusion ${index + 1} by \`${approved.value}\`, who requested it`, { place: approved.place, actual: approved.value, expected: 'another person than the one who requested it', mend: 'Have another person approve it, and write their id' }))
    }
    // Dates as year-month-day are in order when their texts are.
    if (known.reportDate !== undefined && value.date.value > known.reportDate) {
      reading.report(diagnostic('definition/contradiction', `Unexpected date \`${value.date.value}\` of exclusion ${index + 1}: the report is dated ${known.reportDate}`, { place: value.date.place, actual: value.date.value, expected: 'a day not later than the report', mend: 'Correct one of the two dates' }))
    }
    for (const measurand of value.measurands ?? []) checkKnown(measurand, known.measurands, 'measurand', 'under `measurands`', reading)
    const dataset = known.datasets.find((each) => each.name === value.data.value)
    const named = value.row.value.file
    if (named !== undefined && dataset !== undefined) checkKnown({ value: named, place: value.row.place }, dataset.files.map((each) => each.path), `file of dataset \`${dataset.name}\``, 'under `files`', reading)
  }
}
