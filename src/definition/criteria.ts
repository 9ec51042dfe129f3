// The key `require` of a block: metric → phrase. Each limit is held against the metric the characteristic declares, unit included, so
// that a limit can never be compared with a number of another kind.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import type { Place } from '../diagnostics/place.ts'
import { parseCriterion } from './criterion.ts'
import type { DefinitionPart } from './definition-part.ts'
import { below, mapOf, object, optional, type Reader, type Reading, reportUnknownKeys, required, text, unexpected } from './fields.ts'
import type { Metric } from './metric.ts'
import { unitOfMetric } from './metric-unit.ts'
import { checkKnown, keyPlaces } from './names.ts'
import type { Criterion, Limit, Measurand } from './study.ts'

interface Phrase {
  readonly limit: Limit
  readonly text: string
  readonly place: Place
}

const phrase: Reader<Phrase> = {
  schema: { type: 'string', description: 'A phrase: at most, at least, between … and …, above, below', examples: ['at most 5 %', 'at least 0.995', 'between 98 % and 102 %'] },
  read(node, reading) {
    if (node.kind !== 'scalar' || node.text === '') return unexpected(node, reading, 'a phrase such as “at most 5 %”')
    const parsed = parseCriterion(node.text)
    if (parsed.kind === 'limit') return { limit: parsed.limit, text: node.text, place: node.place }
    reading.report(diagnostic('definition/unreadable-criterion', `Cannot read the criterion \`${node.text}\` for \`${reading.path}\``, {
      place: node.place, actual: parsed.found, expected: '“at most 5 %”, “at least 0.995”, “between 98 % and 102 %”, “above 0 %” or “below 10 %”', mend: parsed.mend,
    }))
    return undefined
  },
}

const detailed = object({
  limit: required(phrase),
  source: optional(text({ describe: 'Where the limit comes from', example: 'SOP-7' })),
  for: optional(mapOf(phrase, { describe: 'Measurand → its own limit instead of the general one' })),
}, { describe: 'A limit with its source, and other limits for single measurands' })

/** `measurands` are those of the block, as far as they could be read; `names` are all names of the block's measurands. */
export function criteriaReader(part: DefinitionPart, measurands: readonly Measurand[], names: ReadonlySet<string>): Reader<readonly Criterion[]> {
  const schemas = Object.entries(part.metrics).map(([id, metric]) => [id, { description: `${metric.help} (${unitWords[metric.unit]})`, anyOf: [phrase.schema, detailed.schema] }])
  return {
    schema: { type: 'object', additionalProperties: false, properties: Object.fromEntries(schemas), description: 'Acceptance criteria: metric → phrase' },
    read(node, reading) {
      if (node.kind !== 'map') return unexpected(node, reading, 'metric → phrase')
      const isCut = node.entries.some((entry) => /^\d/.test(entry.key)) // a decimal comma made two keys of one phrase: its unit is the second
      let isComplete = reportUnknownKeys(node, Object.keys(part.metrics), reading)
      const criteria = node.entries.flatMap((entry): readonly Criterion[] => {
        const metric = Object.hasOwn(part.metrics, entry.key) ? part.metrics[entry.key] : undefined
        const inner = below(reading, entry.key)
        if (metric === undefined) return []
        const own = entry.value.kind === 'map' ? detailed.read(entry.value, inner) : undefined
        const plain = entry.value.kind === 'map' ? own?.limit : phrase.read(entry.value, inner)
        if (plain === undefined) {
          isComplete = false
          return []
        }
        const special = own?.for ?? []
        for (const name of keyPlaces(special.map((each) => each.entry))) isComplete = checkKnown(name, names, 'measurand of this block', 'under `measurands`', inner) && isComplete
        const criterion: Criterion = {
          metric: entry.key, limit: plain.limit, text: plain.text, source: own?.source, place: entry.value.place,
          overrides: Object.fromEntries(special.map(({ key, value }) => [key, { limit: value.limit, text: value.text }])),
        }
        const places = new Map(special.map(({ key, value }) => [key, value.place]))
        isComplete = (isCut || checkUnits(criterion, metric, measurands, inner, (measurand) => places.get(measurand) ?? plain.place)) && isComplete
        return [criterion]
      })
      return isComplete ? criteria : undefined
    },
  }
}

const unitWords = { measurand: 'in the unit of the measurand', response: 'in the unit of the response', 'response per measurand': 'in the unit of the response over that of the measurand', percent: 'in %', none: 'without unit' } as const

/** Holds the unit of each limit against the metric, once per wrong limit. */
export function checkUnits(criterion: Criterion, metric: Metric, measurands: readonly Measurand[], reading: Reading, placeOf: (measurand: string) => Place): boolean {
  const told = new Set<string>()
  for (const measurand of measurands) {
    const { limit, text: typed } = Object.hasOwn(criterion.overrides, measurand.id) ? (criterion.overrides[measurand.id] ?? criterion) : criterion
    const unit = limit.kind === 'between' ? limit.low.unit : limit.bound.unit
    const needed = unitOfMetric(metric.unit, measurand)
    const needsResponse = metric.unit.startsWith('response') && measurand.responseUnit === undefined
    if ((unit === needed || (needed === '1' && unit === '')) && !needsResponse) continue
    const place = placeOf(measurand.id)
    const spot = `${place.line}:${place.column}`
    if (told.has(spot)) continue
    told.add(spot)
    const found = unit === '' ? 'no unit' : `the unit \`${unit}\``
    reading.report(diagnostic('definition/unit-mismatch', needsResponse
      ? `Unexpected criterion \`${typed}\`: \`${measurand.id}\` has no unit of response`
      : `Unexpected unit of the limit \`${typed.trim()}\`: it has ${found}, and ${metric.label} of \`${measurand.id}\` has ${needed === '' ? 'none' : `\`${needed}\``}`, {
      place, actual: found, expected: needsResponse ? '`response:` of the measurand' : needed === '' ? 'a limit without unit' : `a limit in ${needed}`,
      mend: needsResponse ? `Add \`response:\` with its unit to the measurand \`${measurand.id}\`` : mended(typed, unit, needed, measurand.id, measurands.length),
    }))
  }
  return told.size === 0
}

function mended(typed: string, unit: string, needed: string, measurand: string, concerned: number): string {
  const own = concerned > 1 ? `; measurands with other units need their own limit under \`for: { ${measurand}: … }\`` : ''
  if (needed === '') return `Write it without unit${own}`
  if (unit !== '') return `Convert the limit to ${needed}${own}`
  if (!/^(at |above|below|between)/.test(typed)) return `Write the number with its unit, ${needed}${own}` // it follows from an option
  return `Write \`${typed.replace(/(\d)(?= and |$)/g, `$1 ${needed}`)}\`${own}`
}
