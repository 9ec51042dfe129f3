// Results under two or more conditions → differences from the reference with intervals and tests. Drift is part of the model where
// conditions alternate in blocks; "no significant difference" is never a finding of equality.
import type { AssessInput, AssessOutput } from '../../assess/assessment-part.ts'
import type { FindingDraft, NotEvaluable } from '../../assess/finding.ts'
import { evidenceOf } from '../../assess/measurements.ts'
import { diagnostic } from '../../diagnostics/diagnostic.ts'
import { meanInterval, summary } from '../../statistics/describe.ts'
import { type Analysis, blocks, equivalenceLines, pairs, replicates, spreadLines } from './analyses.ts'
import type { ComparisonDetail } from './detail.ts'
import { type ComparisonOptions, otherConditions } from './options.ts'
import { type ConditionReading, readingsOf } from './readings.ts'

const judged = ['mean', 'difference', 'difference-relative', 'difference-probability', 'equivalence-probability', 'spread-ratio-probability', 'spread-probability', 'conditions-probability']

export function assessComparison(input: AssessInput<ComparisonOptions>): AssessOutput<ComparisonDetail> {
  const { options, place } = input.block
  const found = readingsOf(input)
  const others = otherConditions(options)
  const counts = [options.conditions.reference, ...others].map((condition) => found.readings.filter((each) => each.condition === condition).length)
  const design: Record<string, number> = { conditions: counts.filter((count) => count > 0).length, replicates: Math.min(...counts) }
  const nothing = (because: string, diagnostics = found.diagnostics): AssessOutput<ComparisonDetail> => ({
    detail: undefined, findings: [], notEvaluable: judged.map((metric): NotEvaluable => ({ metric, because, ...(isAsked(metric, input.block.options) ? {} : { notAsked: true }) })), design, diagnostics,
  })
  if (found.because !== undefined || found.measurements === undefined) return nothing(found.because ?? 'no results')
  const alpha = 1 - input.confidence
  // Two one-sided tests at α each belong to the interval of 1 − 2α.
  const level = options.question === 'equivalence' ? 1 - 2 * alpha : input.confidence
  const request = { readings: found.readings, reference: options.conditions.reference, others, field: options.design === 'pairs' ? options.pair : options.block, level }
  const outcome = attempt(() => ({ replicates, pairs, 'alternating blocks': blocks })[options.design](request))
  if ('because' in outcome) {
    return nothing(outcome.because, [...found.diagnostics, diagnostic('assess/too-few-values', `The conditions of \`${input.measurand.id}\` cannot be compared: ${outcome.because}`, { place, actual: outcome.because, expected: `enough readings for the design “${options.design}”`, mend: 'Add readings, or state the design that was carried out' })])
  }
  if (outcome.blocks.length > 0) design['blocks'] = outcome.blocks.length
  const detail: ComparisonDetail = {
    design: options.design, question: options.question, reference: options.conditions.reference, ...(options.margin === undefined ? {} : { margin: options.margin.value }), alpha,
    conditions: [options.conditions.reference, ...others].map((condition) => conditionLine(found.readings, condition, input.confidence)),
    orderIsKnown: found.readings.every((each) => each.measurement.numbers['order'] !== undefined),
    readings: found.readings.map(({ order, value, condition }) => ({ order, value, condition })),
    excluded: found.excluded.map((each) => ({ value: each.value, condition: each.factors[options.conditions.column] ?? '', exclusion: each.exclusion ?? 0 })),
    effects: outcome.effects, besides: outcome.besides, blocks: outcome.blocks, ...(outcome.drift === undefined ? {} : { drift: outcome.drift }),
    equivalence: options.margin === undefined ? [] : equivalenceLines(outcome.effects, options.margin.value, alpha), spreads: options.design === 'pairs' ? [] : spreadLines(request),
  }
  return { detail, findings: findingsOf(detail, input, found.readings, found.measurements), notEvaluable: absent(detail), design, diagnostics: found.diagnostics }
}

function isAsked(metric: string, options: ComparisonOptions): boolean {
  if (metric === 'equivalence-probability') return options.margin !== undefined
  if (metric === 'conditions-probability') return otherConditions(options).length > 1
  return options.design !== 'pairs' || !metric.startsWith('spread-')
}

function attempt(analyse: () => Analysis | { readonly because: string }): Analysis | { readonly because: string } {
  try {
    return analyse()
  } catch (error) {
    if (error instanceof RangeError) return { because: error.message }
    throw error
  }
}

function conditionLine(readings: readonly ConditionReading[], condition: string, confidence: number): ComparisonDetail['conditions'][number] {
  const values = readings.filter((each) => each.condition === condition).map((each) => each.value)
  const first = values[0] ?? 0
  if (values.length < 2) return { condition, n: values.length, mean: first }
  const { low, high } = meanInterval(values, confidence)
  return { condition, n: values.length, mean: summary(values).mean, standardDeviation: summary(values).standardDeviation, low, high }
}

function findingsOf(detail: ComparisonDetail, input: AssessInput<ComparisonOptions>, readings: readonly ConditionReading[], measurements: Parameters<typeof evidenceOf>[0]): readonly FindingDraft[] {
  const many = detail.effects.length > 1
  const named = (condition: string | undefined): Pick<FindingDraft, 'condition'> => (many && condition !== undefined ? { condition } : {})
  const source = { replicates: 'Welch, Biometrika 34 (1947) 28', pairs: 'ISO 3301', 'alternating blocks': 'analysis of covariance, Draper & Smith, 3rd ed., chapter 14' }[detail.design]
  const restsOn = (own: readonly ConditionReading[]): Pick<FindingDraft, 'n' | 'evidence'> => ({ n: own.length, evidence: evidenceOf(measurements, own.map((reading) => reading.measurement)) })
  const all = restsOn(readings)
  const two = (condition: string | undefined): typeof all => (condition === undefined ? all : restsOn(readings.filter((reading) => reading.condition === condition || reading.condition === detail.reference)))
  // With a drift in the model every reading bears on every difference.
  const compared = (condition: string): typeof all => (detail.design === 'alternating blocks' ? all : two(condition))
  return [
    ...detail.conditions.flatMap((each): readonly FindingDraft[] => (each.low === undefined || each.high === undefined ? [] : [{
      metric: 'mean', condition: each.condition, value: each.mean, interval: { low: each.low, high: each.high, confidence: input.confidence, method: 'Student t' }, df: each.n - 1, method: 'arithmetic mean of the readings', source: 'ISO 2602',
      ...restsOn(readings.filter((reading) => reading.condition === each.condition)),
    }])),
    ...detail.effects.flatMap((each): readonly FindingDraft[] => [
      { metric: 'difference', ...named(each.condition), ...compared(each.condition), value: each.difference, interval: { low: each.low, high: each.high, confidence: each.confidence, method: 'Student t' }, df: each.df, method: `${each.condition} − ${detail.reference}, ${each.method}`, source },
      ...(each.relative === undefined ? [] : [{ metric: 'difference-relative', ...named(each.condition), ...compared(each.condition), value: each.relative, df: each.df, method: 'difference in percent of the mean of the reference', source: 'common practice, no source' }]),
      { metric: 'difference-probability', ...named(each.condition), ...compared(each.condition), value: each.probability, df: each.df, method: `two-sided, ${each.method}`, source },
    ]),
    ...detail.equivalence.map((each): FindingDraft => ({ metric: 'equivalence-probability', ...named(each.condition), ...compared(each.condition), value: each.probability, method: 'larger probability of two one-sided tests', source: 'Schuirmann, J. Pharmacokin. Biopharm. 15 (1987) 657' })),
    ...detail.spreads.map((each): FindingDraft => ({
      metric: each.condition !== undefined ? 'spread-ratio-probability' : each.test.startsWith('Brown') ? 'spread-probability' : 'conditions-probability', ...named(each.condition), ...two(each.condition),
      value: each.probability, df: each.df2, method: each.test, source: each.condition !== undefined ? 'ISO 2854' : each.test.startsWith('Brown') ? 'Brown & Forsythe, J. Am. Stat. Assoc. 69 (1974) 364' : 'ISO 5725-2:2019',
    })),
  ]
}

function absent(detail: ComparisonDetail): readonly NotEvaluable[] {
  const spreadless = detail.design === 'pairs' ? { because: 'spreads are not compared where readings are paired', notAsked: true as const } : { because: 'the spreads of the conditions cannot be compared' }
  return [
    ...(detail.equivalence.length > 0 ? [] : [{ metric: 'equivalence-probability', because: 'the study states no margin', notAsked: true as const }]),
    ...(detail.spreads.some((each) => each.condition !== undefined) ? [] : [{ metric: 'spread-ratio-probability', ...spreadless }]),
    ...(detail.spreads.some((each) => each.test.startsWith('Brown')) ? [] : [{ metric: 'spread-probability', ...spreadless }]),
    ...(detail.conditions.length > 2 ? [] : [{ metric: 'conditions-probability', because: 'there are only two conditions', notAsked: true as const }]),
  ]
}
