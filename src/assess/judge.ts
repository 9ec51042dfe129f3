// A finding against its criterion → a verdict. It sees numbers and limits, never data; limits are inclusive for `at most`, `at least`
// and `between`, exclusive for `below` and `above`, and rounding happens in decimal arithmetic on the shortest text of the number.
import type { Metric } from '../definition/metric.ts'
import type { Criterion, Limit, NumericRules, Quantity } from '../definition/study.ts'
import { decimalsOf, roundHalfEven, roundHalfUp, roundSignificant, significantFiguresOf } from '../statistics/rounding.ts'
import type { Finding, Verdict, VerdictWord } from './finding.ts'

export interface Judging {
  readonly criterion: Criterion
  readonly decideBy: 'estimate' | 'interval'
  readonly rules: NumericRules
  readonly metric: Metric
}

/** The limit that holds for this measurand, and the phrase it was typed as. */
export function limitFor(criterion: Criterion, measurand: string): { readonly limit: Limit; readonly text: string } {
  return criterion.overrides[measurand] ?? { limit: criterion.limit, text: criterion.text }
}

export function judge(finding: Finding, { criterion, decideBy, rules, metric }: Judging): Verdict {
  const { limit, text } = limitFor(criterion, finding.measurand)
  const start = {
    finding: finding.id, measurand: finding.measurand, characteristic: finding.characteristic, block: finding.block, metric: finding.metric,
    ...(finding.level === undefined ? {} : { level: finding.level }), ...(finding.condition === undefined ? {} : { condition: finding.condition }),
    criterion: text, limit, ...(criterion.source === undefined ? {} : { source: criterion.source }), decideBy, required: true,
  }
  if (decideBy === 'interval' && finding.interval === undefined) {
    return { ...start, verdict: 'not evaluable', because: 'the decision is on the interval, and this finding has none' }
  }
  const ends = decideBy === 'interval' && finding.interval !== undefined ? [finding.interval.low, finding.interval.high] : [finding.value]
  const unrounded = metric.magnitude && limit.kind !== 'between' ? [Math.max(...ends.map(Math.abs))] : ends
  const rounded = unrounded.map((value) => roundedText(value, limit, rules))
  const onUnrounded = word(unrounded.map(withoutFloatNoise), limit)
  const onRounded = word(rounded.map(Number), limit)
  // A question that says itself what is decided on (equivalence: the whole interval within the margin) is a test; rounding is no part of it.
  const isRounded = rules.decideOn === 'rounded values' && criterion.decideBy === undefined
  const [verdict, other] = isRounded ? [onRounded, onUnrounded] : [onUnrounded, onRounded]
  return {
    ...start, unrounded, rounded,
    decisionValue: (isRounded ? rounded : unrounded.map((value) => String(withoutFloatNoise(value)))).join(' to '),
    verdict, ...(other === verdict ? {} : { otherwise: other }),
  }
}

/** Binary noise of a computation (5.000000000000001) is no part of a result: 12 significant digits are compared. */
function withoutFloatNoise(value: number): number {
  return Number(value.toPrecision(12))
}

function roundedText(value: number, limit: Limit, rules: NumericRules): string {
  const bounds: readonly Quantity[] = limit.kind === 'between' ? [limit.low, limit.high] : [limit.bound]
  const mode = rules.rounding
  if (rules.to === 'significant figures of the limit') return roundSignificant(withoutFloatNoise(value), Math.max(...bounds.map((bound) => significantFiguresOf(bound.text))), mode).text
  const decimals = Math.max(...bounds.map((bound) => decimalsOf(bound.text)))
  return (mode === 'half even' ? roundHalfEven : roundHalfUp)(withoutFloatNoise(value), decimals).text
}

function word(values: readonly number[], limit: Limit): VerdictWord {
  return values.every((value) => within(value, limit)) ? 'meets' : 'misses'
}

function within(value: number, limit: Limit): boolean {
  switch (limit.kind) {
    case 'at most': return value <= limit.bound.value
    case 'below': return value < limit.bound.value
    case 'at least': return value >= limit.bound.value
    case 'above': return value > limit.bound.value
    case 'between': return value >= limit.low.value && value <= limit.high.value
  }
}
