// A finding is a number, never an opinion; a verdict is what a criterion says of it. Both are plain data of the record.
import type { Limit } from '../definition/study.ts'

/** The cells a finding rests on: one field of some rows (indices into the rows of the dataset). */
export interface Evidence {
  readonly dataset: string
  readonly field: string
  readonly rows: readonly number[]
}

export interface FindingInterval {
  readonly low: number
  readonly high: number
  /** Two-sided confidence as a fraction. */
  readonly confidence: number
  /** Name of the interval's method, such as `modified large sample`. */
  readonly method: string
}

/** What a characteristic returns; the stage adds id, measurand, characteristic and unit. */
export interface FindingDraft {
  readonly metric: string
  readonly level?: number | undefined
  readonly condition?: string | undefined
  readonly value: number
  readonly interval?: FindingInterval | undefined
  readonly n?: number | undefined
  readonly df?: number | undefined
  /** How it was computed, in a few words. */
  readonly method: string
  /** Standard (edition, clause) or textbook method. */
  readonly source: string
  readonly evidence: readonly Evidence[]
}

export interface Finding extends FindingDraft {
  /** `characteristic[.block]/measurand/metric[@level][@condition]` */
  readonly id: string
  readonly measurand: string
  readonly characteristic: string
  /** Block id: `precision`, or `precision.low`. */
  readonly block: string
  readonly unit: string
}

export interface NotEvaluable {
  readonly metric: string
  readonly level?: number | undefined
  readonly condition?: string | undefined
  readonly because: string
  /** The study does not ask for it: told in the record, and in the report only where a criterion names it. */
  readonly notAsked?: true
}

export type VerdictWord = 'meets' | 'misses' | 'not evaluable' | 'not performed' | 'information only'

export interface Verdict {
  /** Id of the finding it judges (or would have judged). */
  readonly finding: string
  readonly measurand: string
  readonly characteristic: string
  readonly block: string
  readonly metric: string
  readonly level?: number | undefined
  readonly condition?: string | undefined
  /** The phrase as typed, such as `at most 5 %`. */
  readonly criterion: string
  readonly limit: Limit
  readonly source?: string | undefined
  readonly decideBy: 'estimate' | 'interval'
  /** The number or numbers that were decided on, before rounding; absolute where the metric is judged by magnitude. */
  readonly unrounded?: readonly number[] | undefined
  /** The same rounded to the limit under the study's rounding rule, as text. */
  readonly rounded?: readonly string[] | undefined
  /** What was compared: the unrounded or the rounded value, as text. */
  readonly decisionValue?: string | undefined
  readonly verdict: VerdictWord
  /** The verdict the other rounding policy would have given, when it differs. */
  readonly otherwise?: VerdictWord | undefined
  readonly because?: string | undefined
  readonly required: boolean
}
