// What was measured, after reading and before any computation. Every row read stays here with what became of it,
// and every cell keeps its original text; censored values are never numbers.
import type { DecimalMark, Delimiter, Encoding } from '../definition/study.ts'
import type { Place } from '../diagnostics/place.ts'

export type CellValue =
  | { readonly kind: 'number'; readonly value: number }
  | { readonly kind: 'label'; readonly value: string }
  /** `<0.05` */
  | { readonly kind: 'below'; readonly bound: number }
  /** `>500` */
  | { readonly kind: 'above'; readonly bound: number }
  /** `ND`, `n.d.` and what the study adds */
  | { readonly kind: 'not detected' }
  /** an empty cell, or a text the study declares as no value */
  | { readonly kind: 'missing' }

export type Cell = CellValue & {
  readonly text: string
  /** Header of the column it stands in. */
  readonly column: string
  readonly place: Place
}

export type Fate =
  | { readonly kind: 'used' }
  | { readonly kind: 'not used'; readonly rule: string }
  | { readonly kind: 'excluded'; readonly exclusion: number }

/** One line of a raw file. `cells` are the mapped ones, by field, or `field/measurand` in a wide layout. */
export interface SourceRow {
  readonly file: string
  readonly sheet?: string | undefined
  /** Line in the file (or row of the sheet), counted from 1. */
  readonly line: number
  readonly cells: Readonly<Record<string, Cell>>
  readonly fate: Fate
}

/** What one source row says about one measurand. A wide row gives several observations. */
export interface Observation {
  /** Index into `Dataset.rows`. */
  readonly row: number
  readonly measurand: string
  /** By field; wide columns already resolved, values fixed per file included. */
  readonly fields: Readonly<Record<string, Cell>>
  /** Number of the exclusion that takes it out; kept so that everything can be shown with and without. */
  readonly excluded?: number | undefined
}

export interface FileReading {
  readonly file: string
  readonly encoding: Encoding
  readonly delimiter: Delimiter
  readonly decimal: DecimalMark
  readonly headerRow: number
  readonly rowsRead: number
  readonly used: number
  readonly notUsed: number
  readonly excluded: number
}

export interface Dataset {
  readonly name: string
  readonly files: readonly FileReading[]
  readonly rows: readonly SourceRow[]
  /** Of used and excluded rows, in file order. */
  readonly observations: readonly Observation[]
  /** Mapped field names. */
  readonly fields: readonly string[]
}
