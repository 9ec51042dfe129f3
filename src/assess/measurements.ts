// The independent values a characteristic computes with: injections already averaged as the study says, responses already
// turned into results where asked, censored values apart. What is called one measurement here is one degree of freedom.
import type { Cell } from '../data/dataset.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { AssessInput } from './assessment-part.ts'
import type { Evidence } from './finding.ts'

export interface Measurement {
  readonly value: number
  readonly level?: number | undefined
  /** Text of every other mapped field (`day`, `analyst`, `condition`, …). */
  readonly factors: Readonly<Record<string, string>>
  /** Parsed value of every other mapped field that holds a number (`native`, `added`, `order`, …). */
  readonly numbers: Readonly<Record<string, number>>
  /** Rows of the dataset it rests on. */
  readonly rows: readonly number[]
  /** The values that were averaged; one when nothing was. */
  readonly averaged: readonly number[]
  /** Number of the exclusion, in `excluded` only. */
  readonly exclusion?: number | undefined
}

export interface CensoredMeasurement {
  readonly level?: number | undefined
  readonly factors: Readonly<Record<string, string>>
  /** As in a measurement: an amount added to a sample is known, whatever was found in it. */
  readonly numbers: Readonly<Record<string, number>>
  readonly cell: Cell
  readonly rows: readonly number[]
}

export interface Measurements {
  readonly dataset: string
  /** The field they come from: `response`, `result`. */
  readonly field: string
  /** In file order. */
  readonly values: readonly Measurement[]
  readonly censored: readonly CensoredMeasurement[]
  /** Taken out by an exclusion; for charts and tables only, never for statistics. */
  readonly excluded: readonly Measurement[]
  /** How a response became a result, in words, step by step; empty when the value was read as it stands. */
  readonly chain: readonly string[]
}

/** Evidence of some measurements of one dataset; the level and factor columns belong to it as well as the value. */
export function evidenceOf(measurements: Measurements, values: readonly { readonly rows: readonly number[] }[] = measurements.values): readonly Evidence[] {
  const rows = [...new Set(values.flatMap((each) => each.rows))].sort((left, right) => left - right)
  return [{ dataset: measurements.dataset, field: measurements.field, rows }]
}

/** Tells the first of `fields` that a value lacks; values without a name would otherwise make a group of their own. `role` is what the fields name. */
export function fieldGap(input: Pick<AssessInput<unknown>, 'block' | 'observations'>, measurements: Measurements, fields: readonly string[], role = 'run'): Diagnostic | undefined {
  for (const field of fields) {
    const bare = measurements.values.find((each) => each.factors[field] === undefined)
    if (bare === undefined) continue
    const cell = input.observations(measurements.dataset).find((each) => each.row === bare.rows[0])?.fields[field]
    const mapped = Object.keys(bare.factors).filter((name) => name !== field)
    return cell === undefined
      ? diagnostic('assess/missing-field', `\`${input.block.id}\` names the ${role} field \`${field}\`, which dataset \`${measurements.dataset}\` does not map`, {
        place: input.block.place, actual: field, expected: mapped.length === 0 ? 'a column for it' : mapped.join(', '), mend: `Add \`${field}:\` under \`columns:\``,
      })
      : diagnostic('assess/missing-field', `A result of dataset \`${measurements.dataset}\` has no \`${field}\`, which \`${input.block.id}\` names as a ${role} field`, {
        place: cell.place, actual: cell.text.trim() === '' ? 'an empty cell' : cell.text.trim(), expected: `the ${role} it belongs to`, mend: 'Fill the cell, or exclude the row with a reason',
      })
  }
  return undefined
}
