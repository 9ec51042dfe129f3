// What the assess stage asks of a characteristic. `assess` sees data and options of one measurand, never a limit.
import type { Observation } from '../data/dataset.ts'
import type { Block, Measurand } from '../definition/study.ts'
import type { Diagnostic } from '../diagnostics/diagnostic.ts'
import type { Finding, FindingDraft, NotEvaluable, Verdict } from './finding.ts'
import type { Measurements } from './measurements.ts'

export interface AssessInput<Options> {
  readonly block: Block<Options>
  readonly measurand: Measurand
  /** Two-sided confidence of every interval, as a fraction. */
  readonly confidence: number
  /** Responses of a dataset for this measurand; undefined after the stage has reported why there are none. */
  responses(dataset: string): Measurements | undefined
  /** Results of a dataset for this measurand, as reported or through the calibration. */
  results(dataset: string): Measurements | undefined
  /** Rows as read, in file order, without exclusions: for traces and other raw series. */
  observations(dataset: string): readonly Observation[]
  /** Earlier assessments of the same measurand by a characteristic named in `after`. */
  prior(characteristic: string): readonly PriorAssessment[]
}

export interface PriorAssessment {
  readonly block: string
  readonly detail: unknown
  readonly findings: readonly Finding[]
  readonly verdicts: readonly Verdict[]
}

export interface AssessOutput<Detail> {
  /** Plain data for the exhibits; undefined when nothing could be computed. Numbers are finite. */
  readonly detail: Detail | undefined
  readonly findings: readonly FindingDraft[]
  readonly notEvaluable: readonly NotEvaluable[]
  /** The design found: word (`levels`, `runs`, `replicates`, …) → count, to set beside what was planned. */
  readonly design: Readonly<Record<string, number>>
  readonly diagnostics: readonly Diagnostic[]
}

/** What inverse prediction gives for one response. */
export type Inverted = { readonly result: number } | { readonly outside: 'below' | 'above' }

export interface AssessmentPart<Options = unknown, Detail = unknown> {
  readonly id: string
  /** Characteristics whose assessments it reads. */
  readonly after?: readonly string[]
  assess(input: AssessInput<Options>): AssessOutput<Detail>
  /** Given by a characteristic that can turn a response into a result. */
  invert?(detail: Detail, response: number): Inverted
}
