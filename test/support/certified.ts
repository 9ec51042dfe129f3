// Certified cases: one folder each under fixtures/certified, with source, data and published digits; and how expected leaves are compared.
import { readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { parse } from 'yaml'
import { agreesInDigits, agreesWithPublished } from './published-figure.ts'

export interface CertifiedCase {
  readonly id: string
  readonly source: string
  readonly provenance: string
  readonly statistic: string
  /** `half a unit in the last published digit`, or `9 digits`. */
  readonly agreement: string
  /** Path → absolute tolerance, where the source itself rounded; `*` for all. */
  readonly tolerances?: Readonly<Record<string, number>>
  /** Path → why it is not compared. */
  readonly 'not-checked'?: Readonly<Record<string, string>>
  readonly data: Readonly<Record<string, unknown>>
  readonly expected: unknown
}

const root = fileURLToPath(new URL('../../fixtures/certified', import.meta.url))

export const certifiedCases: readonly CertifiedCase[] = readdirSync(root).sort().map((id) => parse(readFileSync(join(root, id, 'case.yaml'), 'utf8')) as CertifiedCase)

/** Figures by path (`between.F`, `ci.0`); texts that are no figure are left out. */
export function leaves(value: unknown, path = ''): ReadonlyMap<string, string> {
  const inner = (key: string): string => (path === '' ? key : `${path}.${key}`)
  if (typeof value === 'number') return new Map([[path, String(value)]])
  if (typeof value === 'string') return /^[+-]?(\d+\.?\d*|\.\d+)([eE][+-]?\d+)?$/.test(value.trim()) ? new Map([[path, value]]) : new Map()
  if (typeof value !== 'object' || value === null) return new Map()
  return new Map(Object.entries(value).flatMap(([key, member]) => [...leaves(member, inner(key))]))
}

export interface Comparison {
  readonly path: string
  readonly published: string
  readonly found: number | undefined
  readonly agrees: boolean
  readonly digits: number
}

export function compareCase(each: CertifiedCase, computed: unknown): readonly Comparison[] {
  const found = new Map([...leaves(computed)].map(([path, text]) => [path, Number(text)]))
  const excused = Object.keys(each['not-checked'] ?? {})
  const digits = /^(\d+) digits$/.exec(each.agreement)?.[1]
  return [...leaves(each.expected)].filter(([path]) => !excused.some((key) => path === key || path.startsWith(`${key}.`))).map(([path, published]) => {
    const value = found.get(path)
    if (value === undefined) return { path, published, found: undefined, agrees: false, digits: 0 }
    const tolerance = each.tolerances?.[path] ?? each.tolerances?.['*']
    if (tolerance !== undefined) return { path, published, found: value, agrees: Math.abs(value - Number(published)) <= tolerance, digits: agreesInDigits(value, Number(published), 0).digits }
    const zero = Number(published) === 0
    if (digits !== undefined) return { path, published, found: value, agrees: zero ? Math.abs(value) < 1e-6 : agreesInDigits(value, Number(published), Number(digits)).agrees, digits: zero && Math.abs(value) < 1e-6 ? 15 : agreesInDigits(value, Number(published), 0).digits }
    return { path, published, found: value, agrees: agreesWithPublished(value, published).agrees, digits: agreesInDigits(value, Number(published), 0).digits }
  })
}
