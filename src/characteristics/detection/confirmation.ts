// Results at the quantitation limit → recovery and relative standard deviation per level. Fewer than six results confirm nothing, and a
// result that is no number makes its level not evaluable.
import type { FindingDraft, FindingInterval, NotEvaluable } from '../../assess/finding.ts'
import { evidenceOf } from '../../assess/measurements.ts'
import { diagnostic } from '../../diagnostics/diagnostic.ts'
import { meanInterval, standardDeviationInterval, summary } from '../../statistics/describe.ts'
import type { ConfirmationDetail, ConfirmedLevel } from './detail.ts'
import type { Setting } from './outcome.ts'
import { readSeries } from './series.ts'

/** Common practice, no source: fewer results say too little about scatter. */
const leastResults = 6

export interface ConfirmationOutcome {
  readonly detail?: ConfirmationDetail | undefined
  readonly findings: readonly FindingDraft[]
  readonly notEvaluable: readonly NotEvaluable[]
  /** Levels with enough numeric results, lowest first. */
  readonly confirmed: readonly number[]
}

export function confirmation(setting: Setting): ConfirmationOutcome {
  const { options, input, calibration } = setting
  if (options.confirmation === undefined) return { findings: [], notEvaluable: [], confirmed: [] }
  const series = readSeries(input, options.confirmation, calibration.line)
  if (series?.concentrations === undefined) return nothing(setting, `dataset ${options.confirmation} gave no results`)
  const { measurements, concentrations } = series
  const levels = [...new Set([...measurements.values, ...measurements.censored].flatMap((each) => each.level ?? []))].sort((left, right) => left - right)
  if (levels.length === 0) {
    setting.notice(diagnostic('assess/missing-field', `The confirmation dataset \`${options.confirmation}\` maps no level`, { place: input.block.place, expected: 'a column for `level`', mend: 'Map `level:`, the level that each result should have found' }))
    return nothing(setting, 'the confirmation results have no level')
  }
  const findings: FindingDraft[] = []
  const notEvaluable: NotEvaluable[] = []
  const details = levels.map((level): ConfirmedLevel => {
    const members = measurements.values.filter((each) => each.level === level)
    const values = concentrations.filter((_, index) => measurements.values[index]?.level === level)
    const censored = measurements.censored.filter((each) => each.level === level)
    const because = levelProblem(level, values, censored.map((each) => each.cell.text))
    if (because !== undefined) {
      setting.notice(diagnostic(censored.length > 0 ? 'assess/censored-value' : 'assess/too-few-values', `Confirmation of \`${input.measurand.id}\` at level ${level}: ${because}`, {
        place: censored[0]?.cell.place ?? input.block.place, actual: because, expected: 'six numeric results', mend: 'Complete the results at this level',
      }))
      notEvaluable.push({ metric: 'quantitation-recovery', level, because }, { metric: 'quantitation-rsd', level, because })
      return { level, values, n: values.length, because }
    }
    const found = recovered(level, values, input.confidence)
    const about = { level, n: values.length, df: values.length - 1, source: 'ICH Q2(R2), confirmation at the quantitation limit', evidence: evidenceOf(measurements, members) }
    findings.push(
      { ...about, metric: 'quantitation-recovery', value: found.recovery, interval: found.recoveryInterval, method: 'mean result over the level' },
      { ...about, metric: 'quantitation-rsd', value: found.relativeStandardDeviation, interval: found.scatterInterval, method: 'standard deviation over the mean' },
    )
    const { scatterInterval: _, ...detail } = found
    return { level, values, ...detail }
  })
  return {
    detail: { dataset: options.confirmation, levels: details, excluded: series.detail.excluded }, findings, notEvaluable,
    confirmed: details.filter((each) => each.because === undefined).map((each) => each.level),
  }
}

function levelProblem(level: number, values: readonly number[], censored: readonly string[]): string | undefined {
  if (censored.length > 0) return `${censored.length === 1 ? 'a result holds' : `${censored.length} results hold`} no number (${censored[0] ?? ''})`
  if (level <= 0) return 'a level of zero has no recovery'
  if (values.length < leastResults) return `${values.length} results are too few: six are the least`
  return summary(values).mean <= 0 ? 'the mean result is not above zero' : undefined
}

interface Recovered {
  readonly n: number
  readonly mean: number
  readonly standardDeviation: number
  readonly relativeStandardDeviation: number
  readonly recovery: number
  readonly recoveryInterval: FindingInterval
  readonly scatterInterval: FindingInterval
}

function recovered(level: number, values: readonly number[], confidence: number): Recovered {
  const { n, mean, standardDeviation } = summary(values)
  const around = meanInterval(values, confidence)
  const scatter = standardDeviation === 0 ? { low: 0, high: 0 } : standardDeviationInterval(standardDeviation, n - 1, confidence)
  const percentOfMean = 100 / mean
  return {
    n, mean, standardDeviation, relativeStandardDeviation: standardDeviation * percentOfMean, recovery: (100 * mean) / level,
    recoveryInterval: { low: (100 * around.low) / level, high: (100 * around.high) / level, confidence, method: 'Student t interval of the mean' },
    scatterInterval: { low: scatter.low * percentOfMean, high: scatter.high * percentOfMean, confidence, method: 'chi-square interval of the standard deviation, mean taken as known' },
  }
}

function nothing(setting: Setting, because: string): ConfirmationOutcome {
  setting.notice(diagnostic('assess/too-few-values', `No confirmation for \`${setting.input.measurand.id}\`: ${because}`, {
    place: setting.input.block.place, actual: because, expected: 'six results at the quantitation limit', mend: 'Complete the dataset, or take `confirmation` out',
  }))
  return { findings: [], notEvaluable: [{ metric: 'quantitation-recovery', because }, { metric: 'quantitation-rsd', because }], confirmed: [] }
}
