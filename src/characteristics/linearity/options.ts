// What a study may ask of linearity.
import { datasetName, defaulted, listOf, object, oneOf, optional, quantity, required, text, type ReadBy } from '../../definition/fields.ts'

export const fitKinds = ['straight line', 'through zero', 'quadratic'] as const
export const weightKinds = ['none', '1/x', '1/x^2', '1/y', '1/y^2', '1/s^2'] as const

export type FitKind = (typeof fitKinds)[number]
export type WeightKind = (typeof weightKinds)[number]

export const linearityOptions = object({
  data: required(datasetName({ describe: 'Dataset with `level` and `response`', example: 'calibration' })),
  fit: defaulted(oneOf(fitKinds, { describe: 'Model of the response' }), 'straight line'),
  weights: defaulted(oneOf(weightKinds, { describe: 'Weights of the fit; 1/s^2 takes the variance of the replicates of each level' }), 'none'),
  runs: optional(listOf(text({ describe: 'A field' }), { describe: 'Fields whose combinations are independent calibrations, compared with each other', single: true, example: ['day'] })),
  'full-response': optional(quantity({ describe: 'Level whose response counts as 100 % for the relative intercept; the highest level when absent', example: '20 mg/L', of: 'measurand' })),
}, { describe: 'Response against level: model, weights, deviations' })

export type LinearityOptions = ReadBy<typeof linearityOptions>
