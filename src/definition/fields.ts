// Small readers that together describe a study: each turns one node into a value, says everything wrong with it, and
// knows its own JSON Schema, so that the published schema and the program can never disagree.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import type { Located } from '../diagnostics/place.ts'
import { below, described, type Described, type Reader, type Reading, unexpected } from './reading.ts'
import type { MapEntry, MapNode } from './study-node.ts'

export { below, type JsonSchema, kindOf, type ReadBy, type Reader, type Reading, type Reference, unexpected } from './reading.ts'
export { datasetName, date, flag, number, oneOf, quantity, text } from './scalars.ts'

/** One value or a list of them. */
export function listOf<T>(item: Reader<T>, about: Described & { readonly single?: true; readonly minimum?: number }): Reader<readonly T[]> {
  const list = { type: 'array', items: item.schema, ...(about.minimum === undefined ? {} : { minItems: about.minimum }) }
  return {
    schema: described(about.single ? { anyOf: [item.schema, list] } : list, about),
    read(node, reading) {
      if (node.kind !== 'list') {
        if (!about.single) return unexpected(node, reading, 'a list')
        const value = item.read(node, reading)
        return value === undefined ? undefined : [value]
      }
      if (node.items.length < (about.minimum ?? 0)) return unexpected(node, reading, `a list of at least ${about.minimum}`)
      const values = node.items.map((each, index) => item.read(each, { ...reading, path: `${reading.path}[${index + 1}]` }))
      const read = values.filter((value): value is Awaited<T> & T => value !== undefined)
      return read.length === values.length ? read : undefined
    },
  }
}

/** A map with keys of the user's choosing, in the order typed. */
export function mapOf<T>(value: Reader<T>, about: Described & { readonly minimum?: number }): Reader<readonly { readonly key: string; readonly entry: MapEntry; readonly value: T }[]> {
  return {
    schema: described({ type: 'object', additionalProperties: value.schema, ...(about.minimum === undefined ? {} : { minProperties: about.minimum }) }, about),
    read(node, reading) {
      if (node.kind !== 'map') return unexpected(node, reading, 'a map of keys')
      if (node.entries.length < (about.minimum ?? 0)) return unexpected(node, reading, 'at least one entry')
      const read = node.entries.flatMap((entry) => {
        const each = value.read(entry.value, below(reading, entry.key))
        return each === undefined ? [] : [{ key: entry.key, entry, value: each }]
      })
      return read.length === node.entries.length ? read : undefined
    },
  }
}

export function located<T>(inner: Reader<T>): Reader<Located<T>> {
  return {
    schema: inner.schema,
    read(node, reading) {
      const value = inner.read(node, reading)
      return value === undefined ? undefined : { value, place: node.place }
    },
  }
}

/** One key of an object: required, optional, or with a default that is then listed among the defaults taken. */
export interface Field<T> {
  readonly reader: Reader<T>
  readonly need: 'required' | 'optional' | 'default'
  readonly fallback?: T
  /** How the default is written in the list of defaults taken. */
  readonly fallbackText?: string
}

export function required<T>(reader: Reader<T>): Field<T> {
  return { reader, need: 'required' }
}

export function optional<T>(reader: Reader<T>): Field<T | undefined> {
  return { reader, need: 'optional' }
}

export function defaulted<T>(reader: Reader<T>, fallback: NoInfer<T>, fallbackText?: string): Field<T> {
  return { reader, need: 'default', fallback, fallbackText: fallbackText ?? String(fallback) }
}

export type Fields = Readonly<Record<string, Field<never> | Field<unknown>>>
export type ReadFields<F> = { readonly [K in keyof F]: F[K] extends Field<infer T> ? T : never }

export interface ObjectReader<T> extends Reader<T> {
  /** Reads only its own keys and leaves the others to whoever asked for them. */
  readPart(node: MapNode, reading: Reading): T | undefined
  readonly keys: readonly string[]
}

/** A map with exactly these keys; an unknown key is an error that names the nearest known one. */
export function object<F extends Readonly<Record<string, unknown>>>(fields: F & Fields, about: Described): ObjectReader<ReadFields<F>> {
  const keys = Object.keys(fields)
  const schema = described({
    type: 'object', additionalProperties: false,
    properties: Object.fromEntries(keys.map((key) => {
      const field = (fields as Fields)[key]
      return [key, field?.need === 'default' ? { ...field.reader.schema, default: field.fallbackText } : field?.reader.schema]
    })),
    required: keys.filter((key) => (fields as Fields)[key]?.need === 'required'),
  }, about)
  function readPart(node: MapNode, reading: Reading): ReadFields<F> | undefined {
    const { value, isComplete } = readSome(fields, node, reading)
    return isComplete ? (value as ReadFields<F>) : undefined
  }
  return {
    schema, keys, readPart,
    read(node, reading) {
      if (node.kind !== 'map') return unexpected(node, reading, 'a map of keys')
      const known = reportUnknownKeys(node, keys, reading)
      const value = readPart(node, reading)
      return known ? value : undefined
    },
  }
}

/** What could be read of the fields; what could not has been told. */
export function readSome<F extends Readonly<Record<string, unknown>>>(fields: F & Fields, node: MapNode, reading: Reading): { readonly value: Partial<ReadFields<F>>; readonly isComplete: boolean } {
  let isComplete = true
  const result: Record<string, unknown> = {}
  for (const [key, field] of Object.entries(fields as Fields)) {
    const entry = node.entries.find((each) => each.key === key)
    const inner = below(reading, key)
    if (entry !== undefined) {
      const value = field.reader.read(entry.value, inner)
      if (value === undefined) isComplete = false
      else result[key] = value
    } else if (field.need === 'required') {
      isComplete = false
      reading.report(diagnostic('definition/missing-key', `Expected key \`${key}\` in ${reading.path === '' ? 'the study' : `\`${reading.path}\``}`, {
        place: node.place, actual: 'no such key', expected: `\`${key}\`: ${String(field.reader.schema['description'] ?? '')}`, mend: `Add \`${key}:\` here`,
      }))
    } else if (field.need === 'default') {
      result[key] = field.fallback
      reading.took(inner.path, field.fallbackText ?? '')
    }
  }
  return { value: result as Partial<ReadFields<F>>, isComplete }
}

export function reportUnknownKeys(node: MapNode, known: readonly string[], reading: Reading): boolean {
  const strangers = node.entries.filter((entry) => !known.includes(entry.key))
  for (const entry of strangers) {
    const guess = nearest(entry.key, known)
    // `{ limit: at most 2,5 % }` is read as a second key `5 %`.
    const isCutNumber = /^\d/.test(entry.key) && entry.value.kind === 'scalar' && entry.value.value === null
    reading.report(diagnostic('definition/unknown-key', `Unexpected key \`${entry.key}\`${reading.path === '' ? '' : ` in \`${reading.path}\``}`, {
      place: entry.keyPlace, actual: entry.key, expected: known.length === 0 ? 'no key' : `one of: ${known.join(', ')}`,
      mend: isCutNumber ? 'A comma between `{` and `}` begins a new key: write the number with a point' : guess === undefined ? 'Remove the key, or write a known one' : `Write \`${guess}\``,
    }))
  }
  return strangers.length === 0
}
