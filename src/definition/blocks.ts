// The key `characteristics`: which questions the study asks. Options are read by the characteristic itself; criteria are read here and held
// against the metrics it declares, units included, so that a limit can never be compared with a number of another kind.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import { parseCriterion } from './criterion.ts'
import type { DefinitionPart } from './definition-part.ts'
import { below, type JsonSchema, type Reading, reportUnknownKeys, unexpected } from './fields.ts'
import type { Metric } from './metric.ts'
import { unitOfMetric } from './metric-unit.ts'
import type { Block, Criterion, Limit, Measurand } from './study.ts'
import type { MapNode, StudyNode } from './study-node.ts'
import { unknownMeasurand } from './exclusions.ts'

const generalKeys = ['name', 'measurands', 'decide-by', 'require'] as const

export function readBlocks(node: StudyNode, reading: Reading, measurands: readonly Measurand[], catalogue: readonly DefinitionPart[]): readonly Block[] {
  if (node.kind !== 'map') {
    unexpected(node, reading, 'characteristics, each with its block')
    return []
  }
  reportUnknownKeys(node, catalogue.map((part) => part.id), reading)
  const ids = new Set<string>()
  return node.entries.flatMap((entry): readonly Block[] => {
    const part = catalogue.find((each) => each.id === entry.key)
    if (part === undefined) return []
    const inner = below(reading, entry.key)
    const nodes = entry.value.kind === 'list' ? entry.value.items : [entry.value]
    return nodes.flatMap((each): readonly Block[] => {
      if (each.kind !== 'map') {
        unexpected(each, inner, 'a block of keys')
        return []
      }
      const block = readBlock(each, entry.value.kind === 'list', part, inner, measurands)
      if (block === undefined) return []
      if (ids.has(block.id)) {
        reading.report(diagnostic('definition/contradiction', `Two blocks are named \`${block.id}\``, { place: block.place, actual: block.id, expected: 'a name for each block of a list', mend: 'Give one of them another `name`' }))
        return []
      }
      ids.add(block.id)
      return [block]
    })
  })
}

function readBlock(node: MapNode, inList: boolean, part: DefinitionPart, reading: Reading, measurands: readonly Measurand[]): Block | undefined {
  const known = reportUnknownKeys(node, [...generalKeys, ...part.options.keys], reading)
  const entry = (key: string): MapNode['entries'][number] | undefined => node.entries.find((each) => each.key === key)
  const name = entry('name')?.value
  if (inList && (name?.kind !== 'scalar' || name.text === '')) {
    reading.report(diagnostic('definition/missing-key', `A block in a list needs a \`name\``, { place: node.place, expected: '`name:`', mend: 'Add a name that tells the blocks apart' }))
    return undefined
  }
  const options = part.options.readPart(node, reading)
  const chosen = chosenMeasurands(entry('measurands')?.value, below(reading, 'measurands'), measurands)
  const decide = entry('decide-by')?.value
  const decideBy = decide === undefined ? 'estimate' : decide.kind === 'scalar' && (decide.text === 'estimate' || decide.text === 'interval') ? decide.text : unexpected(decide, below(reading, 'decide-by'), 'estimate or interval')
  if (decide === undefined) reading.took(`${reading.path}.decide-by`, 'estimate')
  const concerned = measurands.filter((each) => chosen.includes(each.id))
  const criteria = entry('require') === undefined ? [] : readCriteria(entry('require')?.value, below(reading, 'require'), part, concerned)
  if (!known || options === undefined || decideBy === undefined || criteria === undefined) return undefined
  const own = name?.kind === 'scalar' && name.text !== '' ? name.text : undefined
  return {
    id: own === undefined ? part.id : `${part.id}.${own}`, characteristic: part.id, name: own, measurands: chosen, options, decideBy,
    criteria: [...criteria, ...(part.impliedCriteria?.(options) ?? [])], place: node.place,
  }
}

function chosenMeasurands(node: StudyNode | undefined, reading: Reading, measurands: readonly Measurand[]): readonly string[] {
  const all = new Set(measurands.map((each) => each.id))
  if (node === undefined) return [...all]
  const items = node.kind === 'list' ? node.items : [node]
  return items.flatMap((item) => {
    if (item.kind !== 'scalar') return unexpected(item, reading, 'the id of a measurand') ?? []
    unknownMeasurand(item.text, all, item.place, reading)
    return all.has(item.text) ? [item.text] : []
  })
}

function readCriteria(node: StudyNode | undefined, reading: Reading, part: DefinitionPart, measurands: readonly Measurand[]): readonly Criterion[] | undefined {
  if (node === undefined || node.kind !== 'map') return node === undefined ? [] : unexpected(node, reading, 'metric → limit')
  let complete = reportUnknownKeys(node, Object.keys(part.metrics), reading)
  const criteria = node.entries.flatMap((entry): readonly Criterion[] => {
    const metric = part.metrics[entry.key]
    if (metric === undefined) return []
    const criterion = readCriterion(entry.key, entry.value, metric, below(reading, entry.key), measurands)
    if (criterion === undefined) complete = false
    return criterion === undefined ? [] : [criterion]
  })
  return complete ? criteria : undefined
}

function readCriterion(key: string, node: StudyNode, metric: Metric, reading: Reading, measurands: readonly Measurand[]): Criterion | undefined {
  if (node.kind === 'scalar') {
    const limit = readLimit(node, metric, reading, measurands)
    return limit === undefined ? undefined : { metric: key, limit, text: node.text, overrides: {}, place: node.place }
  }
  if (node.kind === 'list') return unexpected(node, reading, 'a phrase such as “at most 5 %”')
  const known = reportUnknownKeys(node, ['limit', 'source', 'for'], reading)
  const entry = (name: string): StudyNode | undefined => node.entries.find((each) => each.key === name)?.value
  const phrase = entry('limit')
  const source = entry('source')
  if (phrase?.kind !== 'scalar') return unexpected(phrase ?? node, below(reading, 'limit'), '`limit:` with a phrase such as “at most 5 %”')
  if (source !== undefined && source.kind !== 'scalar') return unexpected(source, below(reading, 'source'), 'a text')
  const own = entry('for')
  if (own !== undefined && own.kind !== 'map') return unexpected(own, below(reading, 'for'), 'measurand → phrase')
  const named = new Set(own?.entries.map((each) => each.key))
  const limit = readLimit(phrase, metric, reading, measurands.filter((each) => !named.has(each.id)))
  const overrides: Record<string, { readonly limit: Limit; readonly text: string }> = {}
  let complete = known && limit !== undefined
  for (const each of own?.entries ?? []) {
    const measurand = measurands.find((candidate) => candidate.id === each.key)
    if (measurand === undefined) unknownMeasurand(each.key, new Set(measurands.map((candidate) => candidate.id)), each.keyPlace, reading)
    const special = each.value.kind === 'scalar' ? readLimit(each.value, metric, reading, measurand === undefined ? [] : [measurand]) : unexpected(each.value, reading, 'a phrase such as “at most 5 %”')
    if (measurand === undefined || special === undefined || each.value.kind !== 'scalar') complete = false
    else overrides[each.key] = { limit: special, text: each.value.text }
  }
  return !complete || limit === undefined ? undefined : { metric: key, limit, text: phrase.text, source: source?.text, overrides, place: node.place }
}

function readLimit(node: StudyNode & { readonly kind: 'scalar' }, metric: Metric, reading: Reading, measurands: readonly Measurand[]): Limit | undefined {
  const parsed = parseCriterion(node.text)
  if (parsed.kind === 'unreadable') {
    const guess = nearest(node.text.split(' ').slice(0, 2).join(' '), ['at most', 'at least', 'between', 'above', 'below'])
    reading.report(diagnostic('definition/unreadable-criterion', `Cannot read the criterion \`${node.text}\``, {
      place: node.place, actual: parsed.found, expected: 'a phrase such as “at most 5 %”, “at least 0.995”, “between 98 % and 102 %”, “above 0”, “below 10 %”', mend: guess === undefined || node.text.startsWith(guess) ? parsed.mend : `Begin with “${guess}”`,
    }))
    return undefined
  }
  const { limit } = parsed
  const typed = limit.kind === 'between' ? limit.low.unit : limit.bound.unit
  const wrong = measurands.find((each) => unitOfMetric(metric.unit, each) !== typed)
  if (wrong === undefined) return limit
  const needed = unitOfMetric(metric.unit, wrong)
  reading.report(diagnostic('definition/unit-mismatch', `The limit \`${node.text}\` has ${typed === '' ? 'no unit' : `the unit \`${typed}\``}; ${metric.label} of \`${wrong.id}\` has ${needed === '' ? 'none' : `\`${needed}\``}`, {
    place: node.place, actual: typed === '' ? 'no unit' : typed, expected: needed === '' ? 'no unit' : needed, mend: needed === '' ? 'Remove the unit' : `Write the limit in ${needed}${measurands.length > 1 ? ', with `for:` where measurands have other units' : ''}`,
  }))
  return undefined
}

export function blocksSchema(catalogue: readonly DefinitionPart[]): JsonSchema {
  const phrase = { type: ['string', 'number'], description: 'A phrase such as “at most 5 %”', examples: ['at most 5 %', 'at least 0.995', 'between 98 % and 102 %'] }
  const properties = Object.fromEntries(catalogue.map((part) => {
    const options = part.options.schema as { readonly properties: Record<string, unknown>; readonly required: readonly string[] }
    const block = {
      type: 'object', additionalProperties: false, required: options.required,
      properties: {
        name: { type: 'string', description: 'Tells several blocks of one characteristic apart' },
        measurands: { description: 'Only these measurands; all when absent', anyOf: [{ type: 'string' }, { type: 'array', items: { type: 'string' } }] },
        'decide-by': { enum: ['estimate', 'interval'], description: 'Whether a criterion is held against the estimate or the whole interval', default: 'estimate' },
        require: {
          type: 'object', additionalProperties: false, description: 'Acceptance criteria: metric → phrase',
          properties: Object.fromEntries(Object.entries(part.metrics).map(([key, metric]) => [key, {
            description: metric.help,
            anyOf: [phrase, { type: 'object', additionalProperties: false, required: ['limit'], properties: { limit: phrase, source: { type: 'string', description: 'Where the limit comes from' }, for: { type: 'object', additionalProperties: phrase, description: 'Measurand → its own limit' } } }],
          }])),
        },
        ...options.properties,
      },
    }
    return [part.id, { description: part.title, anyOf: [block, { type: 'array', items: block }] }]
  }))
  return { type: 'object', additionalProperties: false, properties, description: 'Which performance characteristics the study shows, in report order' }
}
