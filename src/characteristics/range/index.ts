// Range: what a study may claim and what may be found. The claim is a criterion by itself.
import type { Characteristic } from '../characteristic.ts'
import { assessRange, type RangeDetail } from './assess.ts'
import { type RangeOptions, rangeOptions } from './options.ts'
import { presentRange } from './present.ts'

export const range: Characteristic<RangeOptions, RangeDetail> = {
  id: 'range',
  title: 'Range',
  after: ['linearity', 'accuracy', 'precision'],
  options: rangeOptions,
  metrics: {
    'range-low': { label: 'lower end of the range', unit: 'measurand', help: 'Lowest tested level at which everything required holds' },
    'range-high': { label: 'upper end of the range', unit: 'measurand', help: 'Highest tested level at which everything required holds' },
  },
  impliedCriteria({ claim }) {
    if (claim === undefined) return []
    const about = { source: 'range claimed in the study', overrides: {}, place: { file: '' } }
    return [
      { ...about, metric: 'range-low', limit: { kind: 'at most', bound: claim.low }, text: `at most ${claim.low.text} ${claim.low.unit}` },
      { ...about, metric: 'range-high', limit: { kind: 'at least', bound: claim.high }, text: `at least ${claim.high.text} ${claim.high.unit}` },
    ]
  },
  assess: assessRange,
  present: presentRange,
}
