// Results by level and run → repeatability and intermediate precision of one measurand. Injections are already averaged; a run is one
// occurring combination of the run fields; factors that always change together are named and never split.
import type { AssessInput, AssessOutput } from '../../assess/assessment-part.ts'
import type { FindingDraft, NotEvaluable } from '../../assess/finding.ts'
import { type CensoredMeasurement, evidenceOf, fieldGap, type Measurement, type Measurements } from '../../assess/measurements.ts'
import { diagnostic, type Diagnostic } from '../../diagnostics/diagnostic.ts'
import { grubbs } from '../../statistics/outliers.ts'
import { confoundedFields, designGaps } from './design.ts'
import type { PrecisionDetail, PrecisionLevel } from './detail.ts'
import { precisionLevel } from './level.ts'
import type { PrecisionOptions } from './options.ts'

const perLevel = ['mean', 'repeatability-sd', 'repeatability-rsd', 'repeatability-limit', 'between-run-sd', 'intermediate-precision-sd', 'intermediate-precision-rsd', 'horwitz-ratio']
const outlierAlpha = 0.01 // ISO 5725-2 calls what exceeds it an outlier; a flag only

export function assessPrecision(input: AssessInput<PrecisionOptions>): AssessOutput<PrecisionDetail> {
  const { options, place } = input.block
  const measurements = input.results(options.data)
  if (measurements === undefined) return { detail: undefined, findings: [], notEvaluable: perLevel.map((metric) => ({ metric, because: `dataset ${options.data} gives no results` })), design: {}, diagnostics: [] }
  const fields = options.nested ?? options.runs ?? []
  const runOf = (each: Pick<Measurement, 'factors'>, among: readonly string[] = fields): string => among.map((field) => each.factors[field] ?? '').join(' · ')
  const diagnostics: Diagnostic[] = []
  const gap = fieldGap(input, measurements, fields)
  if (gap !== undefined) {
    return { detail: undefined, findings: [], notEvaluable: perLevel.map((metric) => ({ metric, because: 'a result does not tell its run' })), design: {}, diagnostics: [gap] }
  }
  const levels = [...new Set([...measurements.values, ...measurements.censored].map((each) => each.level))].sort((left, right) => (left ?? 0) - (right ?? 0))
  const done: PrecisionLevel[] = []
  const findings: FindingDraft[] = []
  const notEvaluable: NotEvaluable[] = []
  for (const level of levels) {
    const own = measurements.values.filter((each) => each.level === level)
    const censored = measurements.censored.find((each) => each.level === level)
    const because = censored === undefined ? undefined : tellCensored(censored, input, diagnostics)
    const outcome = because ?? attempt(() => precisionLevel({
      level, runs: [...new Set(own.map((each) => runOf(each)))].map((run) => ({ run, outer: options.nested === undefined ? undefined : runOf(own.find((each) => runOf(each) === run) ?? { factors: {} }, options.nested.slice(0, -1)), values: own.filter((each) => runOf(each) === run).map((each) => each.value) })),
      excluded: measurements.excluded.filter((each) => each.level === level).map((each) => ({ run: runOf(each), value: each.value, exclusion: each.exclusion ?? 0 })),
      confidence: input.confidence, isNested: options.nested !== undefined, horwitzFactor: options['horwitz-factor'],
    }))
    if (typeof outcome === 'string') {
      notEvaluable.push(...perLevel.map((metric): NotEvaluable => ({ metric, ...(level === undefined ? {} : { level }), because: outcome, ...(metric === 'horwitz-ratio' && options['horwitz-factor'] === undefined ? { notAsked: true } : {}) })))
      if (because === undefined) diagnostics.push(diagnostic('assess/too-few-values', `The precision of \`${input.measurand.id}\`${level === undefined ? '' : ` at ${level}`} cannot be computed: ${outcome}`, { place, actual: `${own.length} values`, expected: 'at least two scattering values, in each run at least one, in some run two', mend: 'Add replicates' }))
      continue
    }
    done.push(outcome)
    findings.push(...levelFindings(outcome, own, measurements, input))
    notEvaluable.push(...absent(outcome, fields.length > 0))
    diagnostics.push(...outlierFlag(outcome, own, (each) => runOf(each), input))
  }
  const confounded = confoundedFields(measurements.values, fields)
  if (confounded.length > 0) diagnostics.push(diagnostic('assess/confounded-factors', `Run fields of \`${input.measurand.id}\` change together: ${confounded.join('; ')}`, { place, actual: confounded.join('; '), expected: 'each combination of the fields at least once', mend: 'Nothing, if only their sum is wanted; their contributions cannot be separated' }))
  diagnostics.push(...designGaps(measurements.values, (each) => runOf(each), input))
  const cells = done.flatMap((level) => level.runs.map((run) => run.values.length))
  return {
    detail: done.length === 0 ? undefined : { runFields: fields, isNested: options.nested !== undefined, levels: done, confounded },
    findings, notEvaluable: done.length === 0 && notEvaluable.length === 0 ? perLevel.map((metric) => ({ metric, because: 'there are no results' })) : notEvaluable,
    design: { levels: done.length, runs: Math.min(...done.map((level) => level.runs.length), Infinity) === Infinity ? 0 : Math.min(...done.map((level) => level.runs.length)), replicates: cells.length === 0 ? 0 : Math.min(...cells) }, diagnostics,
  }
}

function attempt(compute: () => PrecisionLevel): PrecisionLevel | string {
  try {
    return compute()
  } catch (error) {
    if (error instanceof RangeError) return error.message
    throw error
  }
}

function tellCensored(censored: CensoredMeasurement, input: AssessInput<PrecisionOptions>, diagnostics: Diagnostic[]): string {
  const { cell } = censored
  diagnostics.push(diagnostic('assess/censored-value', `A censored value of \`${input.measurand.id}\` stands among the precision results`, { place: cell.place, actual: cell.text.trim(), expected: 'a number', mend: 'Nothing is put in its place; the level is not evaluable' }))
  return `a censored value (${cell.text.trim()} in ${cell.place.file}:${cell.place.line ?? ''}) stands at this level`
}

function levelFindings(level: PrecisionLevel, own: readonly Measurement[], measurements: Measurements, input: AssessInput<PrecisionOptions>): readonly FindingDraft[] {
  const evidence = evidenceOf(measurements, own)
  const start = { ...(level.level === undefined ? {} : { level: level.level }), n: level.n, evidence }
  const within = level.runs.length < 2 ? 'standard deviation of all values' : 'within-run mean square of the analysis of variance'
  const source = 'ISO 5725-2:2019, clause 7; ISO 5725-3:1994'
  const chi = { confidence: input.confidence, method: 'chi-square' }
  const { repeatability, intermediate } = level
  const scaled = (estimate: { readonly low: number; readonly high: number }, confidence: { readonly confidence: number; readonly method: string }): FindingDraft['interval'] =>
    ({ low: (100 * estimate.low) / Math.abs(level.mean), high: (100 * estimate.high) / Math.abs(level.mean), confidence: confidence.confidence, method: `${confidence.method}, mean taken as exact` })
  const mls = { confidence: input.confidence, method: intermediate?.intervalMethod ?? '' }
  return [
    { ...start, metric: 'mean', value: level.mean, method: 'arithmetic mean of all values', source: 'ISO 2602' },
    { ...start, df: repeatability.df, metric: 'repeatability-sd', value: repeatability.value, interval: { low: repeatability.low, high: repeatability.high, ...chi }, method: within, source },
    ...(repeatability.relative === undefined ? [] : [{ ...start, df: repeatability.df, metric: 'repeatability-rsd', value: repeatability.relative, interval: scaled(repeatability, chi), method: `${within}, relative to the mean`, source }]),
    { ...start, df: repeatability.df, metric: 'repeatability-limit', value: 2.8 * repeatability.value, method: '2.8 times the repeatability standard deviation', source: 'ISO 5725-6:1994, clause 4' },
    ...(level.betweenRuns === undefined ? [] : [{ ...start, metric: 'between-run-sd', value: level.betweenRuns, method: level.truncated ? 'component between runs, a negative estimate taken as zero' : 'component between runs', source }]),
    ...(intermediate === undefined ? [] : [
      { ...start, df: intermediate.satterthwaiteDf, metric: 'intermediate-precision-sd', value: intermediate.value, interval: { low: intermediate.low, high: intermediate.high, ...mls }, method: 'square root of the sum of the components; df by Satterthwaite', source },
      ...(intermediate.relative === undefined ? [] : [{ ...start, df: intermediate.satterthwaiteDf, metric: 'intermediate-precision-rsd', value: intermediate.relative, interval: scaled(intermediate, mls), method: 'square root of the sum of the components, relative to the mean; df by Satterthwaite', source }]),
    ]),
    ...(level.horwitz === undefined ? [] : [{ ...start, metric: 'horwitz-ratio', value: level.horwitz.ratioIntermediate ?? level.horwitz.ratioRepeatability, method: `${level.horwitz.ratioIntermediate === undefined ? 'repeatability' : 'intermediate precision'} over the predicted reproducibility`, source: 'Horwitz, Anal. Chem. 54 (1982) 67A' }]),
  ]
}

function absent(level: PrecisionLevel, namesRuns: boolean): readonly NotEvaluable[] {
  const at = level.level === undefined ? {} : { level: level.level }
  return [
    ...(level.intermediate === undefined ? ['between-run-sd', 'intermediate-precision-sd', 'intermediate-precision-rsd'].map((metric) => ({ metric, ...at, because: namesRuns ? 'the data hold one run only' : 'the study names no runs' })) : []),
    ...(level.repeatability.relative === undefined ? ['repeatability-rsd', 'intermediate-precision-rsd'].map((metric) => ({ metric, ...at, because: 'the mean is zero' })) : []),
    ...(level.horwitz === undefined ? [{ metric: 'horwitz-ratio', ...at, because: 'the study states no mass fraction for a level', notAsked: true as const }] : []),
  ]
}

/** Grubbs' test on the deviations from the run means: differences between runs are no outliers. */
function outlierFlag(level: PrecisionLevel, own: readonly Measurement[], runOf: (each: Measurement) => string, input: AssessInput<PrecisionOptions>): readonly Diagnostic[] {
  const means = new Map(level.runs.map((run) => [run.run, run.mean]))
  const deviations = own.map((each) => each.value - (means.get(runOf(each)) ?? level.mean))
  if (deviations.length < 6) return []
  try {
    const test = grubbs(deviations)
    const flagged = own[test.index]
    if (test.G <= test.critical01 || flagged === undefined) return []
    const cells = input.observations(input.block.options.data).find((each) => each.row === flagged.rows[0])?.fields
    return [diagnostic('assess/outlier-flag', `${flagged.value} of \`${input.measurand.id}\`${level.level === undefined ? '' : ` at ${level.level}`} lies far from its run (Grubbs, ${outlierAlpha}); it stays in`, { place: (cells?.['result'] ?? cells?.['response'])?.place ?? input.block.place, actual: String(flagged.value), expected: 'a look into the raw data; statistics alone are no reason to remove a result' })]
  } catch (error) {
    if (error instanceof RangeError) return []
    throw error
  }
}
