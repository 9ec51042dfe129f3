// What a study may ask of precision.
import { datasetName, listOf, number, object, optional, type ReadBy, required, text } from '../../definition/fields.ts'

export const precisionOptions = object({
  data: required(datasetName({ describe: 'Dataset with a result, and a level where there are several', example: 'precision' })),
  runs: optional(listOf(text({ describe: 'A field' }), { describe: 'Fields whose occurring combinations are the runs; repeatability only when absent', single: true, example: ['day', 'analyst'] })),
  nested: optional(listOf(text({ describe: 'A field' }), { describe: 'Instead of runs: outer and inner field, such as day and run within day', example: ['day', 'run'], minimum: 2 })),
  'horwitz-factor': optional(number({ describe: 'Mass fraction (g/g) of one unit of the level, for the Horwitz ratio: 1e-6 for mg/kg', minimum: 0, maximum: 1, example: 0.000001 })),
}, { describe: 'Repeatability and intermediate precision' })

export type PrecisionOptions = ReadBy<typeof precisionOptions>
