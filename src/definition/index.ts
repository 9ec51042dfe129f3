// YAML text of a study → StudyDefinition, with everything that is wrong told in one pass. Keys not written take their documented default,
// and each default taken is listed.
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import { hasErrors, type StageResult } from '../diagnostics/stage-result.ts'
import { readBlocks } from './blocks.ts'
import { checkDatasets, dataReader, datasetsOf } from './data-sources.ts'
import type { DefinitionPart } from './definition-part.ts'
import { checkExclusions, designReader, exclusionsOf, exclusionsReader, notPerformedReader } from './exclusions.ts'
import { below, type Field, listOf, mapOf, number, object, optional, type Reading, type Reference, reportUnknownKeys, required, text, unexpected } from './fields.ts'
import { measurandsOf, measurandsReader } from './measurands.ts'
import { checkPeople, peopleOf, peopleReader } from './people.ts'
import { checkReport, methodReader, numericRules, reportReader, rulesReader } from './report.ts'
import type { DefaultTaken, RegisterEntry, StudyDefinition } from './study.ts'
import { readYaml } from './yaml.ts'

const register = listOf(mapOf(text({ describe: 'Text' }), { describe: 'Column title → text' }), { describe: 'Rows of a register: column title → text' })

/** Everything but `characteristics`, which the catalogue reads, and `rules`, which has a default throughout. */
export const studyFields = {
  format: required(number({ describe: 'Format of the study definition', integer: true, minimum: 1, maximum: 1, example: 1 })),
  report: required(reportReader),
  method: required(methodReader),
  'intended-use': required(text({ describe: 'What the results are used for, in the words of the laboratory' })),
  people: required(peopleReader),
  measurands: required(measurandsReader),
  data: required(dataReader),
  exclusions: optional(exclusionsReader),
  design: optional(designReader),
  'not-performed': optional(notPerformedReader),
  texts: optional(mapOf(text({ describe: 'The text' }), { describe: 'The laboratory’s own words, shown as such: discussion, conclusion' })),
  deviations: optional(register),
  equipment: optional(register),
  materials: optional(register),
} satisfies Record<string, Field<never> | Field<unknown>>

export const studyReader = object(studyFields, { describe: 'A study definition' })

export function readDefinition(source: { readonly file: string; readonly text: string }, catalogue: readonly DefinitionPart[]): StageResult<StudyDefinition> {
  const tree = readYaml(source)
  if (tree.value === undefined) return { value: undefined, diagnostics: tree.diagnostics }
  const diagnostics: Diagnostic[] = []
  const defaults: DefaultTaken[] = []
  const references: Reference[] = []
  const reading: Reading = {
    path: '', report: (found) => diagnostics.push(found), took: (key, value) => defaults.push({ key, value }), refersTo: (reference) => references.push(reference),
  }
  const node = tree.value
  if (node.kind !== 'map') {
    unexpected(node, { ...reading, path: 'the study' }, 'keys such as `format:`, `report:` and `measurands:`')
    return { value: undefined, diagnostics }
  }
  const known = reportUnknownKeys(node, [...Object.keys(studyFields), 'rules', 'characteristics'], reading)
  const read = studyReader.readPart(node, reading)
  const rulesNode = node.entries.find((entry) => entry.key === 'rules')?.value
  const rules = rulesReader.read(rulesNode ?? { kind: 'map', entries: [], place: node.place }, below(reading, 'rules'))

  // Blocks are read even when another part is wrong, so that everything is told in one pass; then without measurands to hold units against.
  const measurandsNode = node.entries.find((entry) => entry.key === 'measurands')?.value
  const measurands = read === undefined
    ? (measurandsNode === undefined ? [] : measurandsOf(measurandsReader.read(measurandsNode, { ...below(reading, 'measurands'), report: () => undefined, took: () => undefined }) ?? []))
    : measurandsOf(read.measurands)
  const characteristics = node.entries.find((entry) => entry.key === 'characteristics')
  if (characteristics === undefined) diagnostics.push(diagnostic('definition/missing-key', 'Expected key `characteristics` in the study', { place: node.place, actual: 'no such key', expected: '`characteristics:` with at least one block', mend: 'Add `characteristics:` here' }))
  const blocks = characteristics === undefined ? [] : readBlocks(characteristics.value, below(reading, 'characteristics'), measurands, catalogue)
  if (read === undefined || rules === undefined || !known) return { value: undefined, diagnostics }

  const people = peopleOf(read.people)
  const datasets = datasetsOf(read.data)
  const exclusions = exclusionsOf(read.exclusions ?? [])
  const ids = new Set(measurands.map((each) => each.id))
  diagnostics.push(...checkReport(read.report, node.entries.find((entry) => entry.key === 'report')?.keyPlace), ...checkPeople(people))
  checkDatasets(datasets, ids, reading)
  checkExclusions(exclusions, Object.values(people).flat(), ids, reading)
  for (const reference of references.filter((each) => !datasets.some((dataset) => dataset.name === each.name))) {
    const guess = nearest(reference.name, datasets.map((dataset) => dataset.name))
    diagnostics.push(diagnostic('definition/unknown-name', `No dataset is named \`${reference.name}\``, { place: reference.place, actual: reference.name, expected: datasets.map((dataset) => dataset.name).join(', '), mend: guess === undefined ? 'Add it under `data:`' : `Write \`${guess}\`` }))
  }
  const notPerformed = (read['not-performed'] ?? []).map((each) => ({ characteristic: each.key, justification: each.value, place: each.entry.keyPlace }))
  for (const each of notPerformed) {
    if (blocks.some((block) => block.characteristic === each.characteristic)) diagnostics.push(diagnostic('definition/contradiction', `\`${each.characteristic}\` is asked for and stands under \`not-performed\``, { place: each.place, actual: 'both', expected: 'one of the two', mend: 'Remove one of the two' }))
  }
  const design = (read.design ?? []).map((each) => ({ characteristic: each.key, counts: Object.fromEntries(each.value.map((count) => [count.key, count.value])), place: each.entry.keyPlace }))
  for (const each of design) {
    if (!catalogue.some((part) => part.id === each.characteristic)) diagnostics.push(diagnostic('definition/unknown-name', `No characteristic is named \`${each.characteristic}\``, { place: each.place, actual: each.characteristic, expected: catalogue.map((part) => part.id).join(', '), mend: 'Write the name of a characteristic' }))
  }
  const registerOf = (entries: typeof read.deviations): readonly RegisterEntry[] => (entries ?? []).map((entry) => Object.fromEntries(entry.map((each) => [each.key, each.value])))
  const study: StudyDefinition = {
    file: source.file, report: read.report, method: read.method, intendedUse: read['intended-use'], people, rules: numericRules(rules), measurands, datasets, exclusions, blocks, design, notPerformed,
    texts: Object.fromEntries((read.texts ?? []).map((each) => [each.key, each.value])),
    deviations: registerOf(read.deviations), equipment: registerOf(read.equipment), materials: registerOf(read.materials), defaults,
  }
  return { value: hasErrors(diagnostics) ? undefined : study, diagnostics }
}
