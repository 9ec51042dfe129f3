// Small readers that together describe a study: each turns one node into a value, says everything wrong with it, and
// knows its own JSON Schema, so that the published schema and the program can never disagree.
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import type { Located, Place } from '../diagnostics/place.ts'
import { parseQuantity } from './quantity.ts'
import type { Quantity } from './study.ts'
import type { MapEntry, MapNode, StudyNode } from './study-node.ts'

export type JsonSchema = { readonly [key: string]: unknown }

/** Where readers put what they notice. `path` is the key of the node, such as `characteristics.linearity.fit`. */
export interface Reading {
  readonly path: string
  report(found: Diagnostic): void
  /** A default was taken for `path`. */
  took(path: string, value: string): void
  /** A name is used that something else of the study must declare. */
  refersTo?(reference: Reference): void
}

export interface Reference {
  readonly kind: 'dataset'
  readonly name: string
  readonly place: Place
}

/** Returns undefined after reporting at least one error. */
export interface Reader<T> {
  read(node: StudyNode, reading: Reading): T | undefined
  readonly schema: JsonSchema
}

export type ReadBy<R> = R extends Reader<infer T> ? T : never

export function below(reading: Reading, key: string): Reading {
  return { ...reading, path: reading.path === '' ? key : `${reading.path}.${key}` }
}

export function kindOf(node: StudyNode): string {
  if (node.kind === 'list') return 'a list'
  if (node.kind === 'map') return 'a map of keys'
  return node.text === '' ? 'nothing' : `\`${node.text}\``
}

export function unexpected(node: StudyNode, reading: Reading, expected: string, mend?: string): undefined {
  reading.report(diagnostic('definition/wrong-type', `Unexpected ${kindOf(node)} for \`${reading.path}\``, {
    place: node.place, actual: kindOf(node), expected, mend: mend ?? `Write ${expected}`,
  }))
  return undefined
}

interface Described {
  readonly describe: string
  readonly example?: unknown
}

function described(schema: JsonSchema, about: Described): JsonSchema {
  return { ...schema, description: about.describe, ...(about.example === undefined ? {} : { examples: [about.example] }) }
}

/** Any scalar, as typed: `4`, `2026-03-02` and `yes` written as text are kept letter by letter. */
export function text(about: Described): Reader<string> {
  return {
    schema: described({ type: ['string', 'number', 'boolean'] }, about),
    read(node, reading) {
      if (node.kind !== 'scalar' || node.text.trim() === '') return unexpected(node, reading, 'a text')
      return node.text
    },
  }
}

export function date(about: Described): Reader<string> {
  return {
    schema: described({ type: 'string', pattern: '^\\d{4}-\\d{2}-\\d{2}$' }, about),
    read(node, reading) {
      if (node.kind !== 'scalar' || !isCalendarDate(node.text)) return unexpected(node, reading, 'a date as year-month-day, such as 2026-04-17')
      return node.text
    },
  }
}

function isCalendarDate(candidate: string): boolean {
  const match = /^(\d{4})-(\d{2})-(\d{2})$/.exec(candidate)
  if (match === null) return false
  const [year, month, day] = [Number(match[1]), Number(match[2]), Number(match[3])]
  const leap = (year % 4 === 0 && year % 100 !== 0) || year % 400 === 0
  const lengths = [31, leap ? 29 : 28, 31, 30, 31, 30, 31, 31, 30, 31, 30, 31]
  return month >= 1 && month <= 12 && day >= 1 && day <= (lengths[month - 1] ?? 0)
}

export function number(about: Described & { readonly minimum?: number; readonly maximum?: number; readonly integer?: true }): Reader<number> {
  const bounds = [about.minimum === undefined ? '' : ` of at least ${about.minimum}`, about.maximum === undefined ? '' : ` of at most ${about.maximum}`].join(',').replace(/^,|,$/g, '')
  const expected = `${about.integer ? 'a whole number' : 'a number'}${bounds}`
  return {
    schema: described({
      type: about.integer ? 'integer' : 'number',
      ...(about.minimum === undefined ? {} : { minimum: about.minimum }), ...(about.maximum === undefined ? {} : { maximum: about.maximum }),
    }, about),
    read(node, reading) {
      if (node.kind === 'scalar' && /^[+-]?\d+,\d+$/.test(node.text)) return unexpected(node, reading, expected, `Write the number with a point: \`${node.text.replace(',', '.')}\``)
      if (node.kind !== 'scalar' || node.quoted || typeof node.value !== 'number' || !Number.isFinite(node.value)) return unexpected(node, reading, expected)
      if ((about.integer && !Number.isInteger(node.value)) || node.value < (about.minimum ?? -Infinity) || node.value > (about.maximum ?? Infinity)) return unexpected(node, reading, expected)
      return node.value
    },
  }
}

/** A number with its unit, such as `0.2 mg/L` or `5 %`. `unit` fixes the unit that must be typed ('' for none); without it any known unit is read. */
export function quantity(about: Described & { readonly unit?: string }): Reader<Quantity> {
  return {
    schema: described({ type: ['string', 'number'] }, about),
    read(node, reading) {
      const expected = `a number with its unit${about.unit === undefined ? '' : ` ${about.unit}`}, such as ${about.example ?? '0.2 mg/L'}`
      if (node.kind !== 'scalar') return unexpected(node, reading, expected)
      const parsed = parseQuantity(node.text)
      if (parsed.kind === 'unknown unit') {
        reading.report(diagnostic('definition/unknown-unit', `Unexpected unit \`${parsed.unit}\` for \`${reading.path}\``, {
          place: node.place, actual: parsed.unit, expected: 'a unit of the table of units', mend: parsed.nearest === undefined ? 'Write a unit such as mg/L, µg/kg or %' : `Write \`${parsed.nearest}\``,
        }))
        return undefined
      }
      if (parsed.kind === 'decimal comma') return unexpected(node, reading, expected, `Write the number with a point: \`${node.text.replace(',', '.')}\``)
      if (parsed.kind === 'not a quantity') return unexpected(node, reading, expected)
      if (about.unit !== undefined && parsed.quantity.unit !== about.unit) return unexpected(node, reading, expected)
      return parsed.quantity
    },
  }
}

export function oneOf<const T extends string>(choices: readonly T[], about: Described): Reader<T> {
  return {
    schema: described({ enum: choices }, about),
    read(node, reading) {
      const typed = node.kind === 'scalar' ? node.text : undefined
      const match = choices.find((choice) => choice === typed)
      if (match !== undefined) return match
      const guess = typed === undefined ? undefined : nearest(typed, choices)
      reading.report(diagnostic('definition/unknown-choice', `Unexpected ${kindOf(node)} for \`${reading.path}\``, {
        place: node.place, actual: kindOf(node), expected: choices.join(' | '), mend: guess === undefined ? `Write one of: ${choices.join(', ')}` : `Write \`${guess}\``,
      }))
      return undefined
    },
  }
}

export function flag(about: Described): Reader<boolean> {
  return {
    schema: described({ type: 'boolean' }, about),
    read(node, reading) {
      if (node.kind !== 'scalar' || node.quoted || typeof node.value !== 'boolean') {
        const word = node.kind === 'scalar' ? node.text.toLowerCase() : ''
        const mend = ['yes', 'on', 'y'].includes(word) ? 'Write `true`: `yes` and `on` are texts here' : ['no', 'off', 'n'].includes(word) ? 'Write `false`: `no` and `off` are texts here' : undefined
        return unexpected(node, reading, 'true or false', mend)
      }
      return node.value
    },
  }
}

/** The name of a dataset of the study; that it exists is checked once all are known. */
export function datasetName(about: Described): Reader<string> {
  const inner = text(about)
  return {
    schema: inner.schema,
    read(node, reading) {
      const name = inner.read(node, reading)
      if (name !== undefined) reading.refersTo?.({ kind: 'dataset', name, place: node.place })
      return name
    },
  }
}

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
export function mapOf<T>(value: Reader<T>, about: Described): Reader<readonly { readonly key: string; readonly entry: MapEntry; readonly value: T }[]> {
  return {
    schema: described({ type: 'object', additionalProperties: value.schema }, about),
    read(node, reading) {
      if (node.kind !== 'map') return unexpected(node, reading, 'a map of keys')
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
    let complete = true
    const result: Record<string, unknown> = {}
    for (const key of keys) {
      const field = (fields as Fields)[key]
      if (field === undefined) continue
      const entry = node.entries.find((each) => each.key === key)
      const inner = below(reading, key)
      if (entry !== undefined) {
        const value = field.reader.read(entry.value, inner)
        if (value === undefined) complete = false
        else result[key] = value
      } else if (field.need === 'required') {
        complete = false
        reading.report(diagnostic('definition/missing-key', `Expected key \`${key}\` in ${reading.path === '' ? 'the study' : `\`${reading.path}\``}`, {
          place: node.place, actual: 'no such key', expected: `\`${key}\`: ${String(field.reader.schema.description ?? '')}`, mend: `Add \`${key}:\` here`,
        }))
      } else if (field.need === 'default') {
        result[key] = field.fallback
        reading.took(inner.path, field.fallbackText ?? '')
      }
    }
    return complete ? (result as ReadFields<F>) : undefined
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

export function reportUnknownKeys(node: MapNode, known: readonly string[], reading: Reading): boolean {
  const strangers = node.entries.filter((entry) => !known.includes(entry.key))
  for (const entry of strangers) {
    const guess = nearest(entry.key, known)
    reading.report(diagnostic('definition/unknown-key', `Unexpected key \`${entry.key}\`${reading.path === '' ? '' : ` in \`${reading.path}\``}`, {
      place: entry.keyPlace, actual: entry.key, expected: `one of: ${known.join(', ')}`, mend: guess === undefined ? 'Remove the key, or write a known one' : `Write \`${guess}\``,
    }))
  }
  return strangers.length === 0
}
