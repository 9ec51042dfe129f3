// The key `measurands`: what is measured, in which unit; the order is the order of the report.
import { mapOf, object, optional, type Reader, required, text } from './fields.ts'
import type { Measurand } from './study.ts'
import type { MapEntry, StudyNode } from './study-node.ts'
import { readUnit } from './units.ts'
import { unknownUnit } from './unknown-unit.ts'

function unit(describe: string, example: string): Reader<string> {
  const inner = text({ describe, example })
  return {
    schema: inner.schema,
    read(node, reading) {
      const typed = inner.read(node, reading)
      if (typed === undefined) return undefined
      const found = readUnit(typed)
      return found.known ? found.unit : unknownUnit({ unit: typed, nearest: found.nearest }, node.place, reading)
    },
  }
}

const measurand = object({
  unit: required(unit('Unit of results and levels; `1` for a number without unit', 'mg/L')),
  response: optional(unit('Unit of the response of the instrument', 'mAU·s')),
  name: optional(text({ describe: 'Printed name; the id when absent' })),
}, { describe: 'One measurand' })

const measurands = mapOf(measurand, { describe: 'What is measured: id → unit and names, in the order of the report', minimum: 1 })

export const measurandsReader: Reader<readonly Measurand[]> = {
  schema: measurands.schema,
  read: (node, reading) => measurands.read(node, reading)?.map(({ entry, value }) => measurandOf(entry, value)),
}

function measurandOf(entry: MapEntry, value: { readonly unit: string; readonly response: string | undefined; readonly name: string | undefined }): Measurand {
  return { id: entry.key, name: value.name ?? entry.key, unit: value.unit, responseUnit: value.response, place: entry.keyPlace }
}

/** Those without mistakes, in silence: enough to check what refers to them when others have mistakes, which are told elsewhere. */
export function readableMeasurands(node: StudyNode | undefined): readonly Measurand[] {
  if (node?.kind !== 'map') return []
  const silent = { path: 'measurands', report: () => undefined, took: () => undefined }
  return node.entries.flatMap((entry) => {
    const value = measurand.read(entry.value, silent)
    return value === undefined ? [] : [measurandOf(entry, value)]
  })
}
