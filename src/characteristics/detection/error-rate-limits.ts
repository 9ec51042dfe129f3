// Limits with stated risks: the critical value claims detection wrongly with probability alpha, the minimum detectable value is missed
// with probability beta. The scatter is estimated, so the second uses the noncentral t distribution and not twice the first.
import type { FindingDraft, NotEvaluable } from '../../assess/finding.ts'
import { evidenceOf } from '../../assess/measurements.ts'
import { diagnostic } from '../../diagnostics/diagnostic.ts'
import { standardDeviation } from '../../statistics/describe.ts'
import { currieCriticalValue, currieMinimumDetectable, iso11843 } from '../../statistics/detection.ts'
import type { DefinitionDetail, DistributionDetail } from './detail.ts'
import { blankProblem, limitsFound, nothingFound, type Outcome, type Setting } from './outcome.ts'
import { blankFindings, netFactorOf, noteWideRange } from './scatter-limits.ts'

export interface ErrorRateOutcome extends Outcome {
  readonly distribution?: DistributionDetail | undefined
}

const currie = { definition: 'critical value', method: 'critical value by Student t, minimum detectable value by noncentral t, of the net signal of blanks', quantitationMethod: '10 × net standard deviation of blanks, in concentration', source: 'IUPAC Recommendations 1995, Pure Appl. Chem. 67, 1699' } as const
const iso = { definition: 'ISO 11843-2', method: 'critical and minimum detectable net value from the calibration line, noncentral t, constant standard deviation', source: 'ISO 11843-2:2000, basic method' } as const

export function criticalValue(setting: Setting): ErrorRateOutcome {
  const { blanks, calibration, options } = setting
  const because = blankProblem(setting, 'critical value')
  if (because !== undefined || blanks?.concentrations === undefined) return nothing(setting, currie, because ?? 'no blanks')
  const concentration = standardDeviation(blanks.concentrations)
  if (concentration === 0) return nothing(setting, currie, 'the blanks have no scatter')
  const df = blanks.values.length - 1
  const netFactor = netFactorOf(setting)
  const critical = currieCriticalValue(concentration, df, options.alpha, netFactor)
  const detectionLimit = currieMinimumDetectable(concentration, df, options.alpha, options.beta, netFactor)
  const slope = blanks.quantity === 'response' ? calibration.line?.detail.slope : undefined
  const evidence = [...evidenceOf(blanks.measurements), ...(slope === undefined ? [] : calibration.line?.evidence ?? [])]
  const detail: DefinitionDetail = {
    ...currie, scatter: { kind: 'standard deviation of blanks', value: standardDeviation(blanks.values), unit: blanks.quantity === 'response' ? 'response' : 'measurand' },
    detectionFactor: detectionLimit / (concentration * netFactor), quantitationFactor: 10, ...(netFactor === 1 ? {} : { netFactor }), ...(slope === undefined ? {} : { slope }),
    criticalValue: critical, detectionLimit, quantitationLimit: 10 * concentration * netFactor, n: blanks.values.length, df,
  }
  const outcome = found(detail, evidence, concentration * netFactor)
  const scatter = { value: standardDeviation(blanks.values), unit: blanks.quantity === 'response' ? 'response' : 'measurand', concentration, n: blanks.values.length, df, evidence } as const
  return { ...outcome, findings: [...outcome.findings, ...blankFindings(scatter)] }
}

export function isoLimits(setting: Setting): ErrorRateOutcome {
  const { line, because } = setting.calibration
  const { options } = setting
  if (line === undefined) return nothing(setting, iso, because ?? 'no calibration')
  if (line.isExact) return nothing(setting, iso, 'the calibration line has no scatter')
  noteWideRange(setting, line)
  const limits = iso11843(line.points, options.replicates, options.alpha, options.beta)
  const scatter = line.own.residualStandardDeviation
  const slope = line.detail.own.slope
  const detail: DefinitionDetail = {
    ...iso, scatter: { kind: 'residual standard deviation of the calibration line', value: scatter, unit: 'response' }, detectionFactor: limits.delta, slope,
    criticalValue: limits.criticalValue, detectionLimit: limits.minimumDetectable, n: line.used.length, df: line.own.df,
  }
  return found(detail, line.evidence, limits.minimumDetectable / limits.delta)
}

function found(detail: DefinitionDetail, evidence: Outcome['evidence'], netStandardDeviation: number): ErrorRateOutcome {
  const { definition, criticalValue: critical = 0, detectionLimit = 0 } = detail
  const about = { condition: definition, method: detail.method, source: detail.source, evidence, ...(detail.n === undefined ? {} : { n: detail.n }), ...(detail.df === undefined ? {} : { df: detail.df }) }
  const extra: readonly FindingDraft[] = [{ ...about, metric: 'critical-value', value: critical }, { ...about, metric: 'minimum-detectable-value', value: detectionLimit }]
  return { ...limitsFound(detail, evidence, extra), distribution: distributionOf(definition, critical, detectionLimit, netStandardDeviation) }
}

/** Normal densities of a blank and of a sample at the minimum detectable value, on one net scale. */
function distributionOf(definition: DefinitionDetail['definition'], critical: number, detectionLimit: number, standardDeviation: number): DistributionDetail {
  const steps = 120
  const [from, to] = [-4 * standardDeviation, detectionLimit + 4 * standardDeviation]
  const density = (x: number, centre: number): number => Math.exp(-(((x - centre) / standardDeviation) ** 2) / 2) / (standardDeviation * Math.sqrt(2 * Math.PI))
  const curve = (name: string, centre: number): DistributionDetail['curves'][number] => ({
    name, points: Array.from({ length: steps + 1 }, (_, index) => from + ((to - from) * index) / steps).map((x) => ({ x, density: density(x, centre) })),
  })
  return { definition, criticalValue: critical, detectionLimit, standardDeviation, curves: [curve('blank', 0), curve('sample', detectionLimit)] }
}

function nothing(setting: Setting, about: typeof currie | typeof iso, because: string): ErrorRateOutcome {
  setting.notice(diagnostic('assess/too-few-values', `No limit by ${about.definition} for \`${setting.input.measurand.id}\`: ${because}`, {
    place: setting.input.block.place, actual: because, mend: `Mend the data, or take \`${about.definition}\` out of \`by\` for this measurand`,
  }))
  const falls: readonly NotEvaluable[] = ['critical-value', 'minimum-detectable-value'].map((metric) => ({ metric, condition: about.definition, because }))
  return nothingFound({ ...about, because }, falls)
}
