// Recoveries or biases of preparations → means with intervals by level and over all levels. Whether the mean or its whole interval decides
// is the study's word; results nested in runs get their interval from the spread between runs.
import type { AssessInput, AssessOutput } from '../../assess/assessment-part.ts'
import type { FindingDraft, NotEvaluable } from '../../assess/finding.ts'
import { evidenceOf, type Measurements } from '../../assess/measurements.ts'
import { diagnostic, type Diagnostic } from '../../diagnostics/diagnostic.ts'
import { mean, standardDeviation } from '../../statistics/describe.ts'
import { studentQuantile } from '../../statistics/distributions.ts'
import { grubbs } from '../../statistics/outliers.ts'
import { type MeanSquareTerm, nestedMeanInterval, oneWay, satterthwaite } from '../../statistics/variance-components.ts'
import type { AccuracyDetail, AccuracyLevel } from './detail.ts'
import type { AccuracyOptions } from './options.ts'
import { levelOf, type Preparation, preparationsOf } from './preparations.ts'

const outlierAlpha = 0.01 // a flag only

export function assessAccuracy(input: AssessInput<AccuracyOptions>): AssessOutput<AccuracyDetail> {
  const { options, place } = input.block
  const found = preparationsOf(input)
  const metrics = options.mode === 'recovery' ? ['recovery', 'recovery-sd', 'recovery-rsd', 'recovery-overall'] : ['bias', 'bias-relative', 'bias-overall']
  const other = options.mode === 'recovery' ? ['bias', 'bias-relative', 'bias-overall'] : ['recovery', 'recovery-sd', 'recovery-rsd', 'recovery-overall']
  const foreign = other.map((metric): NotEvaluable => ({ metric, because: `the study asks for ${options.mode}`, notAsked: true }))
  if (found.because !== undefined || found.measurements === undefined) {
    return { detail: undefined, findings: [], notEvaluable: [...metrics.map((metric) => ({ metric, because: found.because ?? 'no results' })), ...foreign], design: {}, diagnostics: found.diagnostics }
  }
  const { measurements, preparations } = found
  const diagnostics: Diagnostic[] = [...found.diagnostics]
  const blocked = new Map(measurements.censored.map((each) => {
    const target = levelOf(each, options)
    diagnostics.push(diagnostic('assess/censored-value', `A censored value of \`${input.measurand.id}\` stands among the accuracy results`, { place: each.cell.place, actual: each.cell.text.trim(), expected: 'a number', mend: 'Nothing is put in its place; the level is not evaluable' }))
    return [target, `a censored value (${each.cell.text.trim()} in ${each.cell.place.file}:${each.cell.place.line ?? ''}) stands at this level`] as const
  }))
  const names = [...new Set([...preparations.map((each) => each.level), ...blocked.keys()])].sort((left, right) => (left ?? 0) - (right ?? 0))
  const levels: AccuracyLevel[] = []
  const findings: FindingDraft[] = []
  const notEvaluable: NotEvaluable[] = [...foreign]
  for (const level of names) {
    const own = preparations.filter((each) => each.level === level)
    const because = blocked.get(level) ?? (own.length === 0 ? 'there are no results' : undefined)
    if (because !== undefined) {
      notEvaluable.push(...metrics.slice(0, -1).map((metric): NotEvaluable => ({ metric, ...(level === undefined ? {} : { level }), because })))
      continue
    }
    const line = levelLine(level, own, input)
    levels.push(line)
    findings.push(...levelFindings(line, own, measurements, found.nativeEvidence, input))
    if (line.standardDeviation === undefined && options.mode === 'recovery') notEvaluable.push(...['recovery-sd', 'recovery-rsd'].map((metric): NotEvaluable => ({ metric, ...(level === undefined ? {} : { level }), because: 'one value has no scatter' })))
    diagnostics.push(...flagged(own, level, input))
  }
  const all = blocked.size === 0 ? overallOf(preparations, levels, input) : { because: 'a level holds a censored value' }
  const overallMetric = metrics.at(-1) ?? ''
  if ('because' in all) notEvaluable.push({ metric: overallMetric, because: all.because })
  else findings.push(finding(overallMetric, all.overall, evidence(preparations, measurements, found.nativeEvidence), `mean over all levels, which agree (analysis of variance)`, input))
  const counts = levels.map((level) => level.n)
  if (levels.length === 0) diagnostics.push(diagnostic('assess/too-few-values', `No level of \`${input.measurand.id}\` gives an accuracy`, { place, actual: 'no usable result', expected: 'at least one result at one level', mend: 'Check the dataset' }))
  return {
    detail: levels.length === 0 ? undefined : {
      mode: options.mode, nativeCorrected: preparations.some((each) => each.native !== undefined),
      preparations: preparations.map((each) => ({ ...(each.level === undefined ? {} : { level: each.level }), found: each.found, target: each.target, ...(each.native === undefined ? {} : { native: each.native }), value: each.value, sample: Object.values(each.measurement.factors).join(' · ') })),
      excluded: found.excluded.map((each) => ({ ...(each.level === undefined ? {} : { level: each.level }), found: each.found, value: each.value, exclusion: each.measurement.exclusion ?? 0 })),
      levels, ...('overall' in all ? { overall: all.overall } : {}), ...(all.agreement === undefined ? {} : { agreement: all.agreement }),
    },
    findings, notEvaluable, diagnostics, design: { levels: levels.length, replicates: counts.length === 0 ? 0 : Math.min(...counts) },
  }
}

function levelLine(level: number | undefined, own: readonly Preparation[], input: AssessInput<AccuracyOptions>): AccuracyLevel {
  const values = own.map((each) => each.value)
  const start = { ...(level === undefined ? {} : { level }), n: values.length, mean: mean(values) }
  const relativeBias = input.block.options.mode === 'bias' && own.every((each) => each.target !== 0) ? { relative: mean(own.map((each) => (100 * each.value) / each.target)) } : {}
  if (values.length < 2) return { ...start, ...relativeBias }
  const spread = standardDeviation(values)
  return {
    ...start, standardDeviation: spread, ...intervalOf(own, spread, input),
    ...(input.block.options.mode === 'recovery' ? (start.mean === 0 ? {} : { relative: (100 * spread) / Math.abs(start.mean) }) : relativeBias),
  }
}

/**
 * mean ± t·√(s²/n + u²(native)); in place of s²/n the between-run mean square over n when the study names runs. A native content known from
 * few results has few degrees of freedom, which the interval takes over by its share (GUM, JCGM 100:2008, G.4).
 */
function intervalOf(own: readonly Preparation[], spread: number, input: AssessInput<AccuracyOptions>): Pick<AccuracyLevel, 'low' | 'high' | 'df' | 'intervalMethod'> {
  const { standardError, df, method } = nestedError(own, input) ?? { standardError: spread / Math.sqrt(own.length), df: own.length - 1, method: 'Student t' }
  const centre = mean(own.map((each) => each.value))
  const natives = nativeTerms(own)
  const whole = natives.length === 0 ? { variance: standardError ** 2, df } : satterthwaite([{ coefficient: 1, meanSquare: standardError ** 2, df }, ...natives])
  const half = studentQuantile((1 + input.confidence) / 2, whole.df) * Math.sqrt(whole.variance)
  return { low: centre - half, high: centre + half, df: whole.df, intervalMethod: natives.length > 0 ? `${method}, uncertainty of the native content included` : method }
}

function nestedError(own: readonly Preparation[], input: AssessInput<AccuracyOptions>): { readonly standardError: number; readonly df: number; readonly method: string } | undefined {
  const fields = input.block.options.runs ?? []
  const runOf = (each: Preparation): string => fields.map((field) => each.measurement.factors[field] ?? '').join(' · ')
  const runs = [...new Set(own.map(runOf))]
  if (fields.length === 0 || runs.length === own.length) return undefined
  if (runs.length < 2) return { standardError: standardDeviation(own.map((each) => each.value)) / Math.sqrt(own.length), df: own.length - 1, method: 'Student t within the only run' }
  const groups = runs.map((run) => own.filter((each) => runOf(each) === run).map((each) => each.value))
  const method = 'Student t on the between-run mean square'
  try {
    const { standardError, df } = nestedMeanInterval(oneWay(groups), input.confidence)
    return { standardError, df, method }
  } catch (error) {
    if (!(error instanceof RangeError)) throw error
    // Results that do not scatter within their runs: the run is the independent unit all the more.
    const centre = mean(groups.flat())
    const meanSquareBetween = groups.reduce((sum, group) => sum + group.length * (mean(group) - centre) ** 2, 0) / (groups.length - 1)
    return { standardError: Math.sqrt(meanSquareBetween / own.length), df: groups.length - 1, method }
  }
}

/** Values of one unspiked sample carry one and the same error of its content; those of different samples carry independent ones. */
function nativeTerms(own: readonly Preparation[]): readonly MeanSquareTerm[] {
  return [...new Set(own.map((each) => each.nativeSample))].flatMap((sample): readonly MeanSquareTerm[] => {
    const sharing = own.filter((each) => each.nativeSample === sample)
    const meanSquare = sharing.reduce((sum, each) => sum + Math.sqrt(each.nativeVariance) / own.length, 0) ** 2
    return meanSquare > 0 ? [{ coefficient: 1, meanSquare, df: sharing[0]?.nativeDf ?? 0 }] : []
  })
}

function evidence(own: readonly Preparation[], measurements: Measurements, natives: FindingDraft['evidence']): FindingDraft['evidence'] {
  return [...evidenceOf(measurements, own.map((each) => each.measurement)), ...natives]
}

function finding(metric: string, line: AccuracyLevel, on: FindingDraft['evidence'], method: string, input: AssessInput<AccuracyOptions>): FindingDraft {
  return {
    metric, ...(line.level === undefined ? {} : { level: line.level }), value: line.mean, n: line.n, ...(line.df === undefined ? {} : { df: line.df }), method, source: 'ICH Q2(R2), 2023, section 3.3.1; ISO 2602', evidence: on,
    ...(line.low === undefined || line.high === undefined ? {} : { interval: { low: line.low, high: line.high, confidence: input.confidence, method: line.intervalMethod ?? 'Student t' } }),
  }
}

function levelFindings(line: AccuracyLevel, own: readonly Preparation[], measurements: Measurements, natives: FindingDraft['evidence'], input: AssessInput<AccuracyOptions>): readonly FindingDraft[] {
  const on = evidence(own, measurements, natives)
  const start = { ...(line.level === undefined ? {} : { level: line.level }), n: line.n, evidence: on, source: 'common practice, no source' }
  if (input.block.options.mode === 'bias') {
    return [
      finding('bias', line, on, 'mean of found − reference', input),
      ...(line.relative === undefined ? [] : [{ ...start, metric: 'bias-relative', value: line.relative, method: 'mean of (found − reference) in percent of the reference' }]),
    ]
  }
  return [
    finding('recovery', line, on, own.some((each) => each.native !== undefined) ? 'mean of 100·(found − native)/added' : 'mean of 100·found/added', input),
    ...(line.standardDeviation === undefined ? [] : [{ ...start, df: line.n - 1, metric: 'recovery-sd', value: line.standardDeviation, method: 'standard deviation of the recoveries, in percentage points' }]),
    ...(line.standardDeviation === undefined || line.relative === undefined ? [] : [{ ...start, df: line.n - 1, metric: 'recovery-rsd', value: line.relative, method: 'relative standard deviation of the recoveries' }]),
  ]
}

type Overall = { readonly agreement?: AccuracyDetail['agreement'] } & ({ readonly overall: AccuracyLevel } | { readonly because: string })

/** One value over all levels only where the levels agree; else it would average a dependence on the level away. */
function overallOf(preparations: readonly Preparation[], levels: readonly AccuracyLevel[], input: AssessInput<AccuracyOptions>): Overall {
  if (preparations.length < 2) return { because: 'there are fewer than two results' }
  if (levels.length < 2) return { overall: levelLine(undefined, preparations, input) }
  try {
    const { F, dfBetween, dfWithin, probability } = oneWay(levels.map((level) => preparations.filter((each) => each.level === level.level).map((each) => each.value)))
    const agreement = { F, df1: dfBetween, df2: dfWithin, probability, agree: probability >= 1 - input.confidence }
    return agreement.agree ? { overall: levelLine(undefined, preparations, input), agreement } : { because: 'the levels differ by more than chance', agreement }
  } catch (error) {
    if (error instanceof RangeError) return { because: `the levels cannot be compared: ${error.message}` }
    throw error
  }
}

function flagged(own: readonly Preparation[], level: number | undefined, input: AssessInput<AccuracyOptions>): readonly Diagnostic[] {
  if (own.length < 4) return []
  try {
    const test = grubbs(own.map((each) => each.value))
    const value = own[test.index]
    if (test.G <= test.critical01 || value === undefined) return []
    return [diagnostic('assess/outlier-flag', `${value.found} of \`${input.measurand.id}\`${level === undefined ? '' : ` at ${level}`} lies far from the others (Grubbs, ${outlierAlpha}); it stays in`, { place: input.observations(input.block.options.data).find((each) => each.row === value.measurement.rows[0])?.fields[value.measurement.averaged.length > 1 ? 'response' : 'result']?.place ?? input.block.place, actual: String(value.found), expected: 'a look into the raw data; statistics alone are no reason to remove a result' })]
  } catch (error) {
    if (error instanceof RangeError) return []
    throw error
  }
}
