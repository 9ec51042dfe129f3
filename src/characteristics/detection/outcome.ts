// What one definition of a lower limit gives: its part of the detail and its findings, or the reason why it gave nothing.
import type { AssessInput } from '../../assess/assessment-part.ts'
import type { Evidence, FindingDraft, NotEvaluable } from '../../assess/finding.ts'
import type { Diagnostic } from '../../diagnostics/diagnostic.ts'
import type { LineOutcome } from './calibration-line.ts'
import type { DefinitionDetail } from './detail.ts'
import { type DefinitionName, detectionOnly } from './definitions.ts'
import type { DetectionOptions } from './options.ts'
import type { Series } from './series.ts'

/** Everything the definitions share, read once. */
export interface Setting {
  readonly input: AssessInput<DetectionOptions>
  readonly options: DetectionOptions
  readonly calibration: LineOutcome
  readonly blanks: Series | undefined
  readonly spikes: Series | undefined
  notice(found: Diagnostic): void
}

export interface Outcome {
  readonly detail: DefinitionDetail
  readonly evidence: readonly Evidence[]
  readonly findings: readonly FindingDraft[]
  readonly notEvaluable: readonly NotEvaluable[]
}

/** A definition that gave its limits; `extra` are findings beside the limits themselves. */
export function limitsFound(detail: DefinitionDetail, evidence: readonly Evidence[], extra: readonly FindingDraft[] = []): Outcome {
  const about = { condition: detail.definition, method: detail.method, source: detail.source, evidence, ...(detail.n === undefined ? {} : { n: detail.n }), ...(detail.df === undefined ? {} : { df: detail.df }) }
  const limits: FindingDraft[] = []
  if (detail.detectionLimit !== undefined) limits.push({ ...about, metric: 'detection-limit-by-definition', value: detail.detectionLimit, ...(detail.interval === undefined ? {} : { interval: detail.interval }) })
  if (detail.quantitationLimit !== undefined) limits.push({ ...about, metric: 'quantitation-limit-by-definition', value: detail.quantitationLimit, method: detail.quantitationMethod ?? detail.method, ...quantitationInterval(detail) })
  return { detail, evidence, findings: [...limits, ...extra], notEvaluable: [] }
}

/** A definition that gave nothing, and why. `extra` names further metrics that fall with it. */
export function nothingFound(detail: DefinitionDetail & { readonly because: string }, extra: readonly NotEvaluable[] = []): Outcome {
  const { definition, because } = detail
  return {
    detail, evidence: [], findings: [], notEvaluable: [
      { metric: 'detection-limit-by-definition', condition: definition, because },
      ...(detectionOnly.includes(definition) ? [] : [{ metric: 'quantitation-limit-by-definition', condition: definition, because }]),
      ...extra,
    ],
  }
}

/** Both limits are multiples of one scatter, so their intervals are too. */
export function quantitationInterval({ interval, detectionLimit, quantitationLimit }: DefinitionDetail): Pick<FindingDraft, 'interval'> {
  if (interval === undefined || detectionLimit === undefined || quantitationLimit === undefined) return {}
  const ratio = quantitationLimit / detectionLimit
  return { interval: { ...interval, low: interval.low * ratio, high: interval.high * ratio } }
}

export function blankProblem(setting: Setting, definition: DefinitionName): string | undefined {
  const { blanks, input, options } = setting
  if (blanks === undefined) return `dataset ${options.blanks ?? 'of blanks'} gave no values`
  const censored = blanks.measurements.censored
  if (censored.length > 0) {
    return `${censored.length} of ${censored.length + blanks.values.length} blanks hold no number (${[...new Set(censored.map((each) => each.cell.text))].slice(0, 3).join(', ')}), so their scatter is unknown`
  }
  if (blanks.values.length < 3) return `${blanks.values.length} blanks are too few for ${definition}: three are the least`
  if (blanks.concentrations === undefined) return setting.calibration.because ?? `the blanks of ${input.measurand.name} are responses, and no calibration turns them into concentrations`
  return undefined
}
