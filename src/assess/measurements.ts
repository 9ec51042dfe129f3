// The independent values a characteristic computes with: injections already averaged as the study says, responses already
// turned into results where asked, censored values apart. What is called one measurement here is one degree of freedom.
import type { Cell } from '../data/dataset.ts'
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
