// What a study may ask of precision. Runs side by side and runs nested in days are two readings of the same data, so one of them is chosen.
import { datasetName, listOf, number, object, type ObjectReader, optional, type ReadBy, type Reading, required, text } from '../../definition/fields.ts'
import { diagnostic } from '../../diagnostics/diagnostic.ts'
import type { Place } from '../../diagnostics/place.ts'

const fields = object({
  data: required(datasetName({ describe: 'Dataset with a result, and a level where there are several', example: 'precision' })),
  runs: optional(listOf(text({ describe: 'A field' }), { describe: 'Fields whose occurring combinations are the runs; repeatability only when absent', single: true, example: ['day', 'analyst'] })),
  nested: optional(listOf(text({ describe: 'A field' }), { describe: 'Instead of runs: outer and inner field, such as day and run within day', example: ['day', 'run'], minimum: 2 })),
  'horwitz-factor': optional(number({ describe: 'Mass fraction (g/g) of one unit of the level, for the Horwitz ratio: 1e-6 for mg/kg', minimum: 0, maximum: 1, example: 0.000001 })),
}, { describe: 'Repeatability and intermediate precision' })

export type PrecisionOptions = ReadBy<typeof fields>

export const precisionOptions: ObjectReader<PrecisionOptions> = {
  ...fields,
  readPart(node, reading) {
    return consistent(fields.readPart(node, reading), node.place, reading)
  },
  read(node, reading) {
    return consistent(fields.read(node, reading), node.place, reading)
  },
}

function consistent(options: PrecisionOptions | undefined, place: Place, reading: Reading): PrecisionOptions | undefined {
  if (options?.runs === undefined || options.nested === undefined) return options
  reading.report(diagnostic('definition/contradiction', `\`${reading.path}\` has both \`runs\` and \`nested\``, {
    place, actual: `runs: ${options.runs.join(', ')}; nested: ${options.nested.join(', ')}`, expected: 'one of the two', mend: 'Keep `nested:` when runs lie within days, else `runs:`',
  }))
  return undefined
}
