// The key `characteristics`: which questions the study asks, in the order of the report. Options are read by the characteristic itself;
// what every block may say (name, measurands, decide-by, require) is read here.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import type { Located } from '../diagnostics/place.ts'
import { checkUnits, criteriaReader } from './criteria.ts'
import type { DefinitionPart } from './definition-part.ts'
import { below, type JsonSchema, listOf, located, object, oneOf, defaulted, optional, type Reading, reportUnknownKeys, text, unexpected } from './fields.ts'
import { checkKnown, checkNames } from './names.ts'
import type { Block, Criterion, Measurand } from './study.ts'
import type { MapNode, StudyNode } from './study-node.ts'

const general = object({
  name: optional(located(text({ describe: 'Tells several blocks of one characteristic apart', example: 'low-range' }))),
  measurands: optional(listOf(located(text({ describe: 'Id of a measurand' })), { describe: 'Only these measurands; every measurand when absent', single: true, minimum: 1 })),
  'decide-by': defaulted(oneOf(['estimate', 'interval'], { describe: 'Whether a criterion is held against the estimate or against both ends of its interval' }), 'estimate'),
}, { describe: 'What every block may say' })

/** What the blocks may refer to: measurands that could be read, and the names of all. */
export interface KnownMeasurands {
  readonly read: readonly Measurand[]
  readonly names: ReadonlySet<string>
}

/** Blocks without mistakes; the others are told and left out. */
export function readBlocks(node: StudyNode, reading: Reading, measurands: KnownMeasurands, catalogue: readonly DefinitionPart[]): readonly Block[] {
  if (node.kind !== 'map' || node.entries.length === 0) {
    unexpected(node, reading, 'characteristics, each with its block')
    return []
  }
  reportUnknownKeys(node, catalogue.map((part) => part.id), reading)
  const names: Located<string>[] = []
  const blocks = node.entries.flatMap((entry): readonly Block[] => {
    const part = catalogue.find((each) => each.id === entry.key)
    if (part === undefined) return []
    const inner = below(reading, entry.key)
    const { value } = entry
    if (value.kind === 'map') return readBlock(value, part, inner, measurands)
    if (value.kind !== 'list' || value.items.length === 0) {
      unexpected(value, inner, 'a block of keys, or a list of blocks')
      return []
    }
    return value.items.flatMap((item, index): readonly Block[] => {
      if (item.kind !== 'map') {
        unexpected(item, inner, 'a block of keys')
        return []
      }
      const name = nameOf(item)
      if (name === undefined) {
        reading.report(diagnostic('definition/missing-key', `Expected key \`name\` in block ${index + 1} of \`${inner.path}\``, { place: item.place, actual: 'no such key', expected: '`name`: what tells the blocks of the list apart', mend: 'Add `name:` here' }))
        return []
      }
      names.push({ value: `${part.id}.${name.value}`, place: name.place })
      return readBlock(item, part, inner, measurands)
    })
  })
  checkNames(names, 'block', reading)
  return blocks
}

/** The names by which a dataset may call a block (`through`), whether or not the block could be read. */
export function blockNames(node: StudyNode | undefined): readonly string[] {
  if (node?.kind !== 'map') return []
  return node.entries.flatMap((entry) => (entry.value.kind !== 'list' ? [entry.key] : entry.value.items.flatMap((item) => {
    const name = item.kind === 'map' ? nameOf(item)?.value : undefined
    return name === undefined ? [] : [name, `${entry.key}.${name}`]
  })))
}

function nameOf(node: MapNode): Located<string> | undefined {
  const name = node.entries.find((each) => each.key === 'name')?.value
  return name?.kind === 'scalar' && name.text !== '' ? { value: name.text, place: name.place } : undefined
}

function readBlock(node: MapNode, part: DefinitionPart, outer: Reading, measurands: KnownMeasurands): readonly Block[] {
  const own = nameOf(node)?.value
  const reading: Reading = own === undefined ? outer : { ...outer, path: `${outer.path}.${own}` }
  const isKnown = reportUnknownKeys(node, [...part.options.keys, ...general.keys, 'require'], reading)
  const said = general.readPart(node, reading)
  const chosen = said?.measurands
  const names = new Set(chosen?.map((each) => each.value) ?? measurands.names)
  const concerned = measurands.read.filter((each) => names.has(each.id))
  const options = part.options.readPart(node, { ...reading, measurands: concerned })
  if (chosen === undefined && said !== undefined) reading.took(`${reading.path}.measurands`, 'every measurand')
  const isChosen = checkChosen(chosen ?? [], measurands, below(reading, 'measurands'))
  const required = node.entries.find((each) => each.key === 'require')?.value
  const criteria = required === undefined ? [] : criteriaReader(part, concerned, names).read(required, below(reading, 'require'))
  const implied = options === undefined ? [] : impliedCriteria(part, options, node, concerned, reading)
  if (!isKnown || !isChosen || said === undefined || options === undefined || criteria === undefined || implied === undefined) return []
  return [{
    id: own === undefined ? part.id : `${part.id}.${own}`, characteristic: part.id, name: own, measurands: [...names], options, decideBy: said['decide-by'],
    criteria: [...criteria, ...implied], place: node.place,
  }]
}

function checkChosen(chosen: readonly Located<string>[], measurands: KnownMeasurands, reading: Reading): boolean {
  const areKnown = chosen.map((each) => checkKnown(each, measurands.names, 'measurand', 'under `measurands`', reading)).every(Boolean)
  return checkNames(chosen, 'measurand', reading) && areKnown
}

/** A criterion that follows from an option (a margin, a claim) is held to the same units as a typed one. */
function impliedCriteria(part: DefinitionPart, options: unknown, node: MapNode, measurands: readonly Measurand[], reading: Reading): readonly Criterion[] | undefined {
  const implied = (part.impliedCriteria?.(options) ?? []).map((each) => ({ ...each, place: each.place.file === '' ? node.place : each.place }))
  const areRight = implied.map((each) => {
    const metric = Object.hasOwn(part.metrics, each.metric) ? part.metrics[each.metric] : undefined
    if (metric === undefined) throw new Error(`${part.id} implies a criterion on ${each.metric}, which it does not declare`)
    return checkUnits(each, metric, measurands, reading, () => each.place)
  })
  return areRight.every(Boolean) ? implied : undefined
}

export function blocksSchema(catalogue: readonly DefinitionPart[]): JsonSchema {
  const properties = Object.fromEntries(catalogue.map((part) => {
    const [own, all] = [part.options.schema, general.schema] as readonly { readonly properties?: JsonSchema; readonly required?: readonly string[] }[]
    const block = {
      type: 'object', additionalProperties: false, required: own?.required ?? [],
      properties: { ...all?.properties, ...own?.properties, require: criteriaReader(part, [], new Set()).schema },
    }
    return [part.id, { description: part.title, anyOf: [block, { type: 'array', minItems: 1, items: { ...block, required: ['name', ...block.required] } }] }]
  }))
  return { type: 'object', additionalProperties: false, minProperties: 1, properties, description: 'Which performance characteristics the study shows, in the order of the report: a block, or a list of blocks with names' }
}
