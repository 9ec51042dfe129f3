// What a study may ask of accuracy.
import { datasetName, defaulted, listOf, object, oneOf, optional, quantity, type ReadBy, required, text } from '../../definition/fields.ts'

export const accuracyOptions = object({
  data: required(datasetName({ describe: 'Dataset with results of known or spiked samples', example: 'spikes' })),
  mode: defaulted(oneOf(['recovery', 'bias'], { describe: 'Recovery of an added amount, or bias against a reference value' }), 'recovery'),
  native: optional(datasetName({ describe: 'Dataset with results of the unspiked sample, when no column `native` holds them' })),
  'native-by': optional(listOf(text({ describe: 'A field' }), { describe: 'Fields that tell which unspiked sample belongs to a spiked one', single: true, example: ['sample'] })),
  reference: optional(quantity({ describe: 'Reference value, when no column `reference` holds it', example: '5.00 mg/L', of: 'measurand' })),
  runs: optional(listOf(text({ describe: 'A field' }), { describe: 'Fields whose combinations are runs; the interval of a mean then rests on the spread between runs', single: true })),
}, { describe: 'Recovery or bias' })

export type AccuracyOptions = ReadBy<typeof accuracyOptions>
