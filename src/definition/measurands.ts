// The key `measurands`: what is measured, in which unit; the order is the order of the report.
import { mapOf, object, optional, type ReadBy, type Reader, required, text } from './fields.ts'
import type { Measurand } from './study.ts'
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

export const measurandsReader = mapOf(object({
  unit: required(unit('Unit of results and levels', 'mg/L')),
  response: optional(unit('Unit of the response of the instrument', 'mAU·s')),
  name: optional(text({ describe: 'Printed name; the id when absent' })),
}, { describe: 'One measurand' }), { describe: 'What is measured: id → unit and names, in the order of the report' })

export function measurandsOf(read: ReadBy<typeof measurandsReader>): readonly Measurand[] {
  return read.map(({ key, entry, value }) => ({ id: key, name: value.name ?? key, unit: value.unit, responseUnit: value.response, place: entry.keyPlace }))
}
