// YAML text of a study → StudyDefinition, with everything that is wrong told in one pass. Keys not written take their documented default,
// and each default taken is listed. A part that cannot be read hides no mistake of another: references are held against the names typed.
import type { Diagnostic } from '../diagnostics/diagnostic.ts'
import { hasErrors, type StageResult } from '../diagnostics/stage-result.ts'
import { blockNames, readBlocks } from './blocks.ts'
import { checkDatasets, datasetsOf } from './data-sources.ts'
import type { DefinitionPart } from './definition-part.ts'
import { checkExclusions, exclusionsOf } from './exclusions.ts'
import { below, type ReadFields, type Reading, type Reference, readSome, reportUnknownKeys, unexpected } from './fields.ts'
import { readableMeasurands } from './measurands.ts'
import { checkKnown, checkNames, keyPlaces } from './names.ts'
import { checkPeople, peopleOf } from './people.ts'
import { checkPromises, designOf } from './promises.ts'
import { checkReport, numericRules, rulesReader } from './report.ts'
import type { Block, DefaultTaken, RegisterEntry, StudyDefinition } from './study.ts'
import { studyFields } from './study-fields.ts'
import type { MapNode, StudyNode } from './study-node.ts'
import { readYaml } from './yaml.ts'

type Read = ReadFields<typeof studyFields>

export function readDefinition(source: { readonly file: string; readonly text: string }, catalogue: readonly DefinitionPart[]): StageResult<StudyDefinition> {
  const tree = readYaml(source)
  const diagnostics: Diagnostic[] = [...tree.diagnostics]
  if (tree.value === undefined) return { value: undefined, diagnostics }
  const defaults: DefaultTaken[] = []
  const references: Reference[] = []
  const reading: Reading = {
    path: '', report: (found) => diagnostics.push(found), took: (key, value) => defaults.push({ key, value }), refersTo: (reference) => references.push(reference),
  }
  const root = tree.value
  if (root.kind !== 'map') {
    unexpected(root, { ...reading, path: source.file }, 'keys such as `format:`, `report:` and `measurands:`')
    return { value: undefined, diagnostics }
  }
  reportUnknownKeys(root, Object.keys(studyFields), reading)
  const { value: read } = readSome(studyFields, root, reading)
  const rules = read.rules ?? (valueAt(root, 'rules') === undefined ? rulesReader.readPart({ kind: 'map', entries: [], place: root.place }, below(reading, 'rules')) : undefined)
  const measurands = { read: read.measurands ?? readableMeasurands(valueAt(root, 'measurands')), names: keysAt(root, 'measurands') }
  const blocks = read.characteristics === undefined ? [] : readBlocks(read.characteristics, below(reading, 'characteristics'), measurands, catalogue)
  checkReferences({ root, read, references, catalogue }, reading)
  const isComplete = !hasErrors(diagnostics) && rules !== undefined
  return { value: isComplete ? { file: source.file, ...studyOf(read as Read, blocks), rules: numericRules(rules), defaults } : undefined, diagnostics }
}

function studyOf(read: Read, blocks: readonly Block[]): Omit<StudyDefinition, 'file' | 'rules' | 'defaults'> {
  const registerOf = (entries: Read['deviations']): readonly RegisterEntry[] => (entries ?? []).map((entry) => Object.fromEntries(entry.map((each) => [each.key, each.value])))
  return {
    report: read.report, method: read.method, intendedUse: read['intended-use'], people: peopleOf(read.people), measurands: read.measurands, datasets: datasetsOf(read.data),
    exclusions: exclusionsOf(read.exclusions ?? []), blocks, design: designOf(read.design ?? []),
    notPerformed: (read['not-performed'] ?? []).map((each) => ({ characteristic: each.key, justification: each.value, place: each.entry.keyPlace })),
    texts: Object.fromEntries((read.texts ?? []).map((each) => [each.key, each.value])),
    deviations: registerOf(read.deviations), equipment: registerOf(read.equipment), materials: registerOf(read.materials),
  }
}

interface Referring {
  readonly root: MapNode
  readonly read: Partial<Read>
  readonly references: readonly Reference[]
  readonly catalogue: readonly DefinitionPart[]
}

/** What one part says of another. */
function checkReferences({ root, read, references, catalogue }: Referring, reading: Reading): void {
  for (const [key, what] of [['measurands', 'measurand'], ['data', 'dataset']] as const) {
    const node = valueAt(root, key)
    if (node?.kind === 'map') checkNames(keyPlaces(node.entries), what, below(reading, key))
  }
  const [measurands, datasetNames] = [keysAt(root, 'measurands'), keysAt(root, 'data')]
  for (const { name, place } of references) checkKnown({ value: name, place }, datasetNames, 'dataset', 'under `data`', reading)
  const report = root.entries.find((entry) => entry.key === 'report')
  if (read.report !== undefined && report !== undefined) checkReport(read.report, reading, report.keyPlace)
  const people = read.people === undefined ? undefined : peopleOf(read.people)
  if (people !== undefined) checkPeople(people, reading)
  const datasets = read.data === undefined ? [] : datasetsOf(read.data)
  checkDatasets(datasets, { measurands, blocks: blockNames(valueAt(root, 'characteristics')) }, reading)
  checkExclusions(read.exclusions ?? [], { people: people === undefined ? undefined : Object.values(people).flat(), reportDate: read.report?.date, measurands, datasets }, reading)
  checkPromises({ design: designOf(read.design ?? []), notPerformed: read['not-performed'] ?? [], asked: keysAt(root, 'characteristics'), catalogue }, reading)
}

function valueAt(root: MapNode, key: string): StudyNode | undefined {
  return root.entries.find((entry) => entry.key === key)?.value
}

function keysAt(root: MapNode, key: string): ReadonlySet<string> {
  const node = valueAt(root, key)
  return new Set(node?.kind === 'map' ? node.entries.map((entry) => entry.key) : [])
}
