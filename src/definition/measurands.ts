// The key `measurands`: what is measured, in which unit; the order is the order of the report.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import { mapOf, object, optional, type ReadBy, type Reader, required, text } from './fields.ts'
import type { Measurand } from './study.ts'
import { checkUnit } from './units.ts'

function unit(describe: string, example: string): Reader<string> {
  const inner = text({ describe, example })
  return {
    schema: inner.schema,
    read(node, reading) {
      const typed = inner.read(node, reading)
      if (typed === undefined) return undefined
      const checked = checkUnit(typed)
      if (checked.known) return typed
      reading.report(diagnostic('definition/unknown-unit', `Unexpected unit \`${typed}\` for \`${reading.path}\``, {
        place: node.place, actual: typed, expected: 'a unit of the table of units', mend: checked.nearest === undefined ? 'Write a unit such as mg/L, µg/kg, %, mAU·s or counts' : `Write \`${checked.nearest}\``,
      }))
      return undefined
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
