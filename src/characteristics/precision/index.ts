// Precision: what a study may ask of replicates and runs and what may be found.
import type { Characteristic } from '../characteristic.ts'
import { assessPrecision } from './assess.ts'
import type { PrecisionDetail } from './detail.ts'
import { type PrecisionOptions, precisionOptions } from './options.ts'
import { presentPrecision } from './present.ts'

export const precision: Characteristic<PrecisionOptions, PrecisionDetail> = {
  id: 'precision',
  title: 'Precision',
  options: precisionOptions,
  metrics: {
    mean: { label: 'mean', unit: 'measurand', help: 'Mean of all results of a level' },
    'repeatability-sd': { label: 'repeatability standard deviation', unit: 'measurand', help: 'Scatter within runs' },
    'repeatability-rsd': { label: 'repeatability relative standard deviation', unit: 'percent', help: 'Scatter within runs, relative to the mean' },
    'repeatability-limit': { label: 'repeatability limit', unit: 'measurand', help: '2.8 times the repeatability standard deviation' },
    'between-run-sd': { label: 'between-run standard deviation', unit: 'measurand', help: 'Component of variance between runs' },
    'intermediate-precision-sd': { label: 'intermediate-precision standard deviation', unit: 'measurand', help: 'Scatter over runs: within and between together' },
    'intermediate-precision-rsd': { label: 'intermediate-precision relative standard deviation', unit: 'percent', help: 'Scatter over runs, relative to the mean' },
    'horwitz-ratio': { label: 'Horwitz ratio', unit: 'none', help: 'Relative standard deviation over the reproducibility predicted from the mass fraction' },
  },
  assess: assessPrecision,
  present: presentPrecision,
}
