// What all readers of a study share: where they report, how they name what they found, and that each knows its own JSON Schema.
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { Place } from '../diagnostics/place.ts'
import type { Measurand } from './study.ts'
import type { StudyNode } from './study-node.ts'

export type JsonSchema = { readonly [key: string]: unknown }

/** Where readers put what they notice. `path` is the key of the node, such as `characteristics.linearity.fit`. */
export interface Reading {
  readonly path: string
  report(found: Diagnostic): void
  /** A default was taken for `path`. */
  took(path: string, value: string): void
  /** A name is used that something else of the study must declare. */
  refersTo?(reference: Reference): void
  /** Inside a block: the measurands it concerns. */
  readonly measurands?: readonly Measurand[]
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
  const found = kindOf(node)
  reading.report(diagnostic('definition/wrong-type', found === 'nothing' ? `Expected ${expected} for \`${reading.path}\`` : `Unexpected ${found.replace(/^a /, '')} for \`${reading.path}\``, {
    place: node.place, actual: found, expected, mend: mend ?? `Write ${expected}`,
  }))
  return undefined
}

export interface Described {
  readonly describe: string
  readonly example?: unknown
}

export function described(schema: JsonSchema, about: Described): JsonSchema {
  return { ...schema, description: about.describe, ...(about.example === undefined ? {} : { examples: [about.example] }) }
}
