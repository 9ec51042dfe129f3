// The keys of a study and how each is read, in the order of the published schema. `characteristics` is left as a node:
// only the catalogue knows what its blocks may say.
import { dataReader } from './data-sources.ts'
import { exclusionsReader } from './exclusions.ts'
import { listOf, mapOf, number, optional, type Reader, required, text } from './fields.ts'
import { measurandsReader } from './measurands.ts'
import { peopleReader } from './people.ts'
import { designReader, notPerformedReader } from './promises.ts'
import { methodReader, reportReader, rulesReader } from './report.ts'
import type { StudyNode } from './study-node.ts'

function register(describe: string, example: Readonly<Record<string, string>>): Reader<readonly (readonly { readonly key: string; readonly value: string }[])[]> {
  return listOf(mapOf(text({ describe: 'The entry' }), { describe: 'Column title → entry', minimum: 1 }), { describe, example: [example] })
}

const asTyped: Reader<StudyNode> = { schema: {}, read: (node) => node }

export const studyFields = {
  format: required(number({ describe: 'Format of the study definition', integer: true, minimum: 1, maximum: 1, example: 1 })),
  report: required(reportReader),
  method: required(methodReader),
  'intended-use': required(text({ describe: 'What the results are used for, in the words of the laboratory' })),
  people: required(peopleReader),
  rules: optional(rulesReader),
  measurands: required(measurandsReader),
  data: required(dataReader),
  exclusions: optional(exclusionsReader),
  design: optional(designReader),
  characteristics: required(asTyped),
  'not-performed': optional(notPerformedReader),
  texts: optional(mapOf(text({ describe: 'The text' }), { describe: 'The laboratory’s own words, by name (`discussion`, `conclusion`, …), shown as such' })),
  deviations: optional(register('Deviations from the plan', { Number: 'DEV-9', Deviation: 'air bubble in the loop' })),
  equipment: optional(register('Equipment used', { Equipment: 'balance', Number: 'B-3' })),
  materials: optional(register('Materials used', { Material: 'standard solution', Lot: '417' })),
}
