// What a study may ask of a comparison of conditions.
import { datasetName, defaulted, listOf, object, oneOf, optional, quantity, type ReadBy, required, text } from '../../definition/fields.ts'

const conditions = object({
  column: required(text({ describe: 'Field that holds the condition', example: 'condition' })),
  reference: required(text({ describe: 'The condition the others are compared with', example: 'north' })),
  other: optional(text({ describe: 'The other condition', example: 'south' })),
  others: optional(listOf(text({ describe: 'A condition' }), { describe: 'The other conditions, when there are more than one' })),
}, { describe: 'Which conditions' })

export const comparisonOptions = object({
  data: required(datasetName({ describe: 'Dataset with a result and a condition', example: 'two-feeds' })),
  conditions: required(conditions),
  design: defaulted(oneOf(['replicates', 'alternating blocks', 'pairs'], { describe: 'Replicate readings under each condition; blocks of readings that alternate (A B A B …), analysed with a straight drift; or pairs' }), 'replicates'),
  block: defaulted(text({ describe: 'Field that names the blocks; readings of one condition in a row are a block when it is not mapped' }), 'block'),
  pair: defaulted(text({ describe: 'Field that names the pairs' }), 'pair'),
  question: required(oneOf(['difference', 'equivalence'], { describe: 'Whether a difference is looked for, or equivalence within a margin is to be shown' })),
  margin: optional(quantity({ describe: 'Largest difference that does not matter; needed for equivalence', example: '0.2 mg/L' })),
}, { describe: 'Two or more conditions compared' })

export type ComparisonOptions = ReadBy<typeof comparisonOptions>

export function otherConditions(options: ComparisonOptions): readonly string[] {
  return [...new Set([...(options.conditions.other === undefined ? [] : [options.conditions.other]), ...(options.conditions.others ?? [])])]
}
