// What the present stage asks of a characteristic: exhibits and sentences of one assessment. It computes nothing.
import type { Finding, NotEvaluable, Verdict } from '../assess/finding.ts'
import type { Metric } from '../definition/metric.ts'
import type { Measurand } from '../definition/study.ts'
import type { ReportBlock } from './document.ts'

export interface Presented<Detail> {
  readonly title: string
  /** Block id, `linearity` or `linearity.low`; prefix of every exhibit id together with the measurand: `linearity-dye-fit`. */
  readonly block: string
  readonly measurand: Measurand
  /** Prefix for exhibit ids, safe in file names. */
  readonly prefix: string
  readonly detail: Detail
  readonly findings: readonly Finding[]
  readonly verdicts: readonly Verdict[]
  readonly notEvaluable: readonly NotEvaluable[]
  readonly metrics: Readonly<Record<string, Metric>>
  readonly confidence: number
  /** Whether secondary exhibits are shown too. */
  readonly everything: boolean
}

export interface PresentationPart<Detail = unknown> {
  readonly id: string
  /** Only called when there is a detail. The verdict table, the design and the exclusions are added by the stage. */
  present(presented: Presented<Detail>): readonly ReportBlock[]
}
