// Accuracy: what a study may ask of spiked or reference samples and what may be found.
import type { Characteristic } from '../characteristic.ts'
import { assessAccuracy } from './assess.ts'
import type { AccuracyDetail } from './detail.ts'
import { type AccuracyOptions, accuracyOptions } from './options.ts'
import { presentAccuracy } from './present.ts'

export const accuracy: Characteristic<AccuracyOptions, AccuracyDetail> = {
  id: 'accuracy',
  title: 'Accuracy',
  options: accuracyOptions,
  metrics: {
    recovery: { label: 'mean recovery', unit: 'percent', help: 'Mean recovery of the added amount at each level' },
    'recovery-sd': { label: 'standard deviation of recoveries', unit: 'percent', help: 'Scatter of the recoveries of a level, in percentage points' },
    'recovery-rsd': { label: 'relative standard deviation of recoveries', unit: 'percent', help: 'Scatter of the recoveries of a level, relative to their mean' },
    'recovery-overall': { label: 'mean recovery over all levels', unit: 'percent', help: 'Mean over all levels, where the levels agree' },
    bias: { label: 'bias', unit: 'measurand', magnitude: true, help: 'Mean difference from the reference value' },
    'bias-relative': { label: 'relative bias', unit: 'percent', magnitude: true, help: 'Mean difference from the reference value, in percent of it' },
    'bias-overall': { label: 'bias over all levels', unit: 'measurand', magnitude: true, help: 'Mean difference over all levels, where the levels agree' },
  },
  assess: assessAccuracy,
  present: presentAccuracy,
}
