// The keys `exclusions` and `not-performed`: what was taken out or left out, by whom and why. Without a reason and a second person nothing is taken out.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import { type Place } from '../diagnostics/place.ts'
import { date, datasetName, listOf, located, mapOf, number, object, oneOf, optional, type ReadBy, type Reading, required, text } from './fields.ts'
import type { Exclusion, Person, RowSelector } from './study.ts'

const selector = mapOf(text({ describe: 'The text that stands in the column' }), { describe: 'Which row: heading of a column → text; also `file: …` to name the file and `rows: N` when more than one row is meant', example: { Inj: 41 } })

const one = object({
  data: required(located(datasetName({ describe: 'Dataset of the row' }))),
  row: required(located(selector)),
  measurands: optional(listOf(text({ describe: 'Measurand' }), { describe: 'Only these measurands; all when absent', single: true })),
  class: required(oneOf(['assignable cause', 'rule of the plan', 'statistical only'], { describe: 'Why a row may be taken out' })),
  reason: required(text({ describe: 'The reason in words' })),
  reference: optional(text({ describe: 'Number of the deviation or investigation' })),
  'requested-by': required(text({ describe: 'Id of the person who asks' })),
  'approved-by': required(text({ describe: 'Id of another person who approves' })),
  date: required(date({ describe: 'Date of the approval' })),
}, { describe: 'One exclusion' })

export const exclusionsReader = listOf(located(one), { describe: 'Rows taken out; every result is shown with and without them' })

export function exclusionsOf(read: ReadBy<typeof exclusionsReader>): readonly Exclusion[] {
  return read.map(({ value, place }, index) => ({
    number: index + 1, dataset: value.data, row: selectorOf(value.row.value), measurands: value.measurands, class: value.class, reason: value.reason, reference: value.reference,
    requestedBy: value['requested-by'], approvedBy: value['approved-by'], date: value.date, place,
  }))
}

function selectorOf(read: ReadBy<typeof selector>): RowSelector {
  const file = read.find((each) => each.key === 'file')?.value
  const rows = read.find((each) => each.key === 'rows')?.value
  return { matches: read.filter((each) => each.key !== 'file' && each.key !== 'rows').map((each) => ({ column: each.key, text: each.value })), file, rows: rows === undefined ? 1 : Number(rows) }
}

export function checkExclusions(exclusions: readonly Exclusion[], people: readonly Person[], measurands: ReadonlySet<string>, reading: Reading): void {
  const ids = [...new Set(people.map((person) => person.id))]
  for (const exclusion of exclusions) {
    const { place } = exclusion
    for (const id of [exclusion.requestedBy, exclusion.approvedBy]) {
      if (!ids.includes(id)) reading.report(diagnostic('definition/unknown-name', `No person has the id \`${id}\``, { place, actual: id, expected: ids.join(', '), mend: 'Write the id of a person under `people`' }))
    }
    if (exclusion.requestedBy === exclusion.approvedBy) reading.report(diagnostic('definition/same-person', `Exclusion ${exclusion.number} is requested and approved by one person`, { place, actual: exclusion.requestedBy, expected: 'two different persons', mend: 'Have another person approve it' }))
    if (exclusion.row.matches.length === 0) reading.report(diagnostic('definition/missing-key', `Exclusion ${exclusion.number} names no column of its row`, { place, expected: 'heading → text', mend: 'Write which row is meant, such as `row: { Inj: 41 }`' }))
    if (!(Number.isInteger(exclusion.row.rows) && exclusion.row.rows > 0)) reading.report(diagnostic('definition/wrong-type', `Unexpected \`rows\` of exclusion ${exclusion.number}`, { place, expected: 'a whole number of at least 1', mend: 'Write how many rows are meant' }))
    for (const name of exclusion.measurands ?? []) unknownMeasurand(name, measurands, place, reading)
  }
}

export function unknownMeasurand(name: string, measurands: ReadonlySet<string>, place: Place, reading: Reading): void {
  if (!measurands.has(name)) reading.report(diagnostic('definition/unknown-name', `No measurand is named \`${name}\``, { place, actual: name, expected: [...measurands].slice(0, 20).join(', '), mend: 'Write the id of a measurand' }))
}

export const notPerformedReader = mapOf(text({ describe: 'The justification' }), { describe: 'Characteristics not performed, each with its justification', example: { robustness: 'covered by the development study' } })

export const designReader = mapOf(mapOf(number({ describe: 'How many', minimum: 0 }), { describe: 'Word → count' }), { describe: 'The design that was planned, by characteristic: levels, runs, replicates, blocks, blanks, spikes → count', example: { precision: { levels: 3, runs: 6, replicates: 3 } } })
