// What is said of a unit that is not in the table, wherever it is typed.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import type { Place } from '../diagnostics/place.ts'
import type { Reading } from './reading.ts'

export function unknownUnit(found: { readonly unit: string; readonly nearest?: string | undefined }, place: Place, reading: Reading): undefined {
  reading.report(diagnostic('definition/unknown-unit', `Unexpected unit \`${found.unit}\` for \`${reading.path}\``, {
    place, actual: found.unit, expected: 'a unit of the table of units, or known ones joined by `/` and `·`',
    mend: found.nearest === undefined ? 'Write a unit such as mg/L, µg/kg, %, mAU·s or counts' : `Write \`${found.nearest}\``,
  }))
  return undefined
}
