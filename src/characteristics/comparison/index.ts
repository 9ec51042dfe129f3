// Comparison of conditions: what a study may ask and what may be found. A stated margin is a criterion by itself.
import type { Characteristic } from '../characteristic.ts'
import { assessComparison } from './assess.ts'
import type { ComparisonDetail } from './detail.ts'
import { type ComparisonOptions, comparisonOptions } from './options.ts'
import { presentComparison } from './present.ts'

export const comparison: Characteristic<ComparisonOptions, ComparisonDetail> = {
  id: 'comparison',
  title: 'Comparison of conditions',
  options: comparisonOptions,
  metrics: {
    mean: { label: 'mean', unit: 'measurand', help: 'Mean of the readings under each condition' },
    difference: { label: 'difference from the reference', unit: 'measurand', magnitude: true, help: 'Condition minus reference' },
    'difference-relative': { label: 'relative difference from the reference', unit: 'percent', magnitude: true, help: 'Difference in percent of the mean of the reference' },
    'difference-probability': { label: 'probability of the difference', unit: 'none', help: 'Two-sided probability of the test of no difference; a large one proves nothing' },
    'equivalence-probability': { label: 'probability of the equivalence tests', unit: 'none', help: 'Larger probability of the two one-sided tests against the margin' },
    'spread-ratio-probability': { label: 'probability of the variance ratio', unit: 'none', help: 'Two-sided probability of the F test of the variances' },
    'spread-probability': { label: 'probability of the spreads', unit: 'none', help: 'Probability of the Brown-Forsythe test' },
    'conditions-probability': { label: 'probability over all conditions', unit: 'none', help: 'Probability of the one-way analysis of variance of three or more conditions' },
  },
  impliedCriteria(options) {
    if (options.question !== 'equivalence' || options.margin === undefined) return []
    const { value, unit, text } = options.margin
    const low = { value: -value, unit, text: `-${text}` }
    return [{ metric: 'difference', limit: { kind: 'between', low, high: options.margin }, text: `within ±${text} ${unit}`, overrides: {}, decideBy: 'interval', source: 'margin stated in the study', place: { file: '' } }]
  },
  assess: assessComparison,
  present: presentComparison,
}
