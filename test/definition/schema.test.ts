// The published schema and the readers say the same: every key of a study that is read is in the schema, and the other way round.
import { expect, test } from 'vitest'
import { readYaml } from '../../src/definition/yaml.ts'
import { studySchema } from '../../src/definition/schema.ts'
import type { StudyNode } from '../../src/definition/study-node.ts'
import { tinyCatalogue } from '../support/tiny-catalogue.ts'
import { exampleStudy } from './example-study.ts'

interface Schema {
  readonly type?: string | readonly string[]
  readonly properties?: Readonly<Record<string, Schema>>
  readonly required?: readonly string[]
  readonly additionalProperties?: boolean | Schema
  readonly items?: Schema
  readonly anyOf?: readonly Schema[]
  readonly enum?: readonly string[]
  readonly description?: string
}

const schema = studySchema(tinyCatalogue) as Schema

/** The keywords of draft-07 that the schema uses, and no more. */
function mistakes(node: StudyNode, against: Schema, path: string): readonly string[] {
  if (against.anyOf !== undefined) {
    const each = against.anyOf.map((one) => mistakes(node, one, path))
    return each.some((found) => found.length === 0) ? [] : (each.find((found) => found.length > 0) ?? [])
  }
  if (against.enum !== undefined) return node.kind === 'scalar' && against.enum.includes(node.text) ? [] : [`${path}: not in the list`]
  const types = [against.type ?? []].flat()
  const own = node.kind === 'map' ? ['object'] : node.kind === 'list' ? ['array'] : typeof node.value === 'number' ? ['number', ...(Number.isInteger(node.value) ? ['integer'] : [])] : [typeof node.value]
  if (types.length > 0 && !own.some((type) => types.includes(type))) return [`${path}: is ${own.join()}, not ${types.join()}`]
  if (node.kind === 'list') return node.items.flatMap((item, index) => mistakes(item, against.items ?? {}, `${path}[${index}]`))
  if (node.kind !== 'map') return []
  const keys = node.entries.map((entry) => entry.key)
  return [
    ...(against.required ?? []).filter((key) => !keys.includes(key)).map((key) => `${path}: needs ${key}`),
    ...node.entries.flatMap(({ key, value }) => {
      const inner = against.properties?.[key] ?? against.additionalProperties
      return inner === false ? [`${path}: no key ${key}`] : mistakes(value, typeof inner === 'object' ? inner : {}, `${path}.${key}`)
    }),
  ]
}

test('the example study is valid', () => {
  const { value } = readYaml({ file: 'study.yaml', text: exampleStudy })
  expect(value === undefined ? ['no YAML'] : mistakes(value, schema, 'study')).toEqual([])
})

test.each([['kind: full validation', 'kind: full'], ['technique:', 'tecnique:'], ['format: 1', 'format: one'], ['fit: straight line', 'fit: strait'], ['back-calculation-error:', 'back-calculated-error:'], ['unit: mg/L', 'units: mg/L']])('%s → %s is invalid', (from, to) => {
  const { value } = readYaml({ file: 'study.yaml', text: exampleStudy.replace(from, to) })
  expect(value === undefined ? [] : mistakes(value, schema, 'study')).not.toEqual([])
})

test('every key and every criterion has a description', () => {
  const bare: string[] = []
  const visit = (node: Schema, path: string): void => {
    for (const [key, inner] of Object.entries(node.properties ?? {})) {
      if ((inner.description ?? '') === '') bare.push(`${path}.${key}`)
      visit(inner, `${path}.${key}`)
    }
    for (const inner of [...(node.anyOf ?? []), ...(node.items === undefined ? [] : [node.items]), ...(typeof node.additionalProperties === 'object' ? [node.additionalProperties] : [])]) visit(inner, path)
  }
  visit(schema, '')
  expect(bare).toEqual([])
})
