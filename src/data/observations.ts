// The cells of one used row → what it says about each measurand: one observation in a long layout, one for each measurand in a wide one.
// A row whose measurand the study does not hold gives none.
import type { Measurand } from '../definition/study.ts'
import { tidied } from './cells.ts'
import type { MappedColumn } from './columns.ts'
import type { Cell, Observation } from './dataset.ts'

/** Fields that hold what was measured. */
export const valueFields = ['response', 'result', 'signal'] as const

export function holdsValue(observation: Observation): boolean {
  return valueFields.some((field) => (observation.fields[field]?.kind ?? 'missing') !== 'missing')
}

export type ObservationReader = (row: number, cells: Readonly<Record<string, Cell>>) => readonly Observation[]

export function observationReader(columns: readonly MappedColumn[], measurands: readonly Measurand[]): ObservationReader {
  const wide = new Map<string, MappedColumn[]>()
  for (const column of columns) {
    if (column.measurand === undefined) continue
    const own = wide.get(column.measurand)
    if (own === undefined) wide.set(column.measurand, [column])
    else own.push(column)
  }
  const byName = new Map([...measurands.map((each): [string, string] => [tidied(each.name), each.id]), ...measurands.map((each): [string, string] => [each.id, each.id])])
  if (wide.size > 0) {
    return (row, cells) => {
      const common = Object.fromEntries(Object.entries(cells).filter(([key]) => !key.includes('/')))
      return [...wide].map(([measurand, own]) => {
        const fields: Record<string, Cell> = { ...common }
        for (const column of own) {
          const cell = cells[column.key]
          if (cell !== undefined) fields[column.field] = cell
        }
        return { row, measurand, fields }
      })
    }
  }
  return (row, cells) => {
    const named = cells['measurand']
    // Without a measurand column every row is about every measurand that there is: right for one, and for values that all share.
    if (named === undefined) return measurands.map((measurand) => ({ row, measurand: measurand.id, fields: cells }))
    const measurand = byName.get(tidied(named.text))
    return measurand === undefined ? [] : [{ row, measurand, fields: cells }]
  }
}
