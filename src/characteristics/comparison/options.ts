// What a study may ask of a comparison of conditions. Beyond reading each key it checks that there is something to compare, and that
// equivalence has a margin: without one no data can show it.
import { datasetName, defaulted, listOf, object, type ObjectReader, oneOf, optional, quantity, type ReadBy, type Reading, required, text } from '../../definition/fields.ts'
import { diagnostic } from '../../diagnostics/diagnostic.ts'
import type { Place } from '../../diagnostics/place.ts'

const conditions = object({
  column: required(text({ describe: 'Field that holds the condition', example: 'condition' })),
  reference: required(text({ describe: 'The condition the others are compared with', example: 'north' })),
  other: optional(text({ describe: 'The other condition', example: 'south' })),
  others: optional(listOf(text({ describe: 'A condition' }), { describe: 'The other conditions, when there are more than one' })),
}, { describe: 'Which conditions' })

const fields = object({
  data: required(datasetName({ describe: 'Dataset with a result and a condition', example: 'two-feeds' })),
  conditions: required(conditions),
  design: defaulted(oneOf(['replicates', 'alternating blocks', 'pairs'], { describe: 'Replicate readings under each condition; blocks of readings that alternate (A B A B …), analysed with a straight drift; or pairs' }), 'replicates'),
  block: defaulted(text({ describe: 'Field that names the blocks; readings of one condition in a row are a block when it is not mapped' }), 'block'),
  pair: defaulted(text({ describe: 'Field that names the pairs' }), 'pair'),
  question: required(oneOf(['difference', 'equivalence'], { describe: 'Whether a difference is looked for, or equivalence within a margin is to be shown' })),
  margin: optional(quantity({ describe: 'Largest difference that does not matter; needed for equivalence', example: '0.2 mg/L', of: 'measurand' })),
}, { describe: 'Two or more conditions compared' })

export type ComparisonOptions = ReadBy<typeof fields>

export const comparisonOptions: ObjectReader<ComparisonOptions> = {
  ...fields,
  readPart(node, reading) {
    return consistent(fields.readPart(node, reading), node.place, reading)
  },
  read(node, reading) {
    return consistent(fields.read(node, reading), node.place, reading)
  },
}

function consistent(options: ComparisonOptions | undefined, place: Place, reading: Reading): ComparisonOptions | undefined {
  if (options === undefined) return undefined
  const { conditions, margin, question } = options
  const others = otherConditions(options)
  const problems = [
    ...(others.length > 0 ? [] : [diagnostic('definition/missing-key', `Expected key \`other\` in \`${reading.path}.conditions\``, { place, actual: 'the reference alone', expected: '`other`, or `others` for more than one', mend: 'Add `other:` with the condition to compare' })]),
    ...(others.includes(conditions.reference) ? [diagnostic('definition/contradiction', `\`${reading.path}\` compares \`${conditions.reference}\` with itself`, { place, actual: conditions.reference, expected: 'another condition than the reference', mend: 'Correct `reference:` or `other:`' })] : []),
    ...(question === 'equivalence' && margin === undefined ? [diagnostic('definition/missing-key', `Expected key \`margin\` in \`${reading.path}\`: equivalence is shown within a margin`, { place, actual: 'no such key', expected: '`margin`: the largest difference that does not matter', mend: 'Add `margin:` here, settled before the data' })] : []),
    ...(margin !== undefined && !(margin.value > 0) ? [diagnostic('definition/wrong-type', `Unexpected \`${margin.text}\` for \`${reading.path}.margin\``, { place, actual: margin.text, expected: 'a margin above zero, which holds on both sides', mend: 'Write it without a sign' })] : []),
  ]
  for (const each of problems) reading.report(each)
  return problems.length === 0 ? options : undefined
}

export function otherConditions(options: ComparisonOptions): readonly string[] {
  return [...new Set([...(options.conditions.other === undefined ? [] : [options.conditions.other]), ...(options.conditions.others ?? [])])]
}
