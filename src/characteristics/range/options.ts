// What a study may ask of the range: the claim, as two quantities in one phrase.
import { defaulted, number, object, optional, type ReadBy, type Reader, unexpected } from '../../definition/fields.ts'
import { parseQuantity } from '../../definition/quantity.ts'
import type { Quantity } from '../../definition/study.ts'

export interface Claim {
  readonly low: Quantity
  readonly high: Quantity
}

const claim: Reader<Claim> = {
  schema: { type: 'string', description: 'The range that is claimed, with units', examples: ['0.1 mg/L to 20 mg/L'] },
  read(node, reading) {
    const match = node.kind === 'scalar' ? /^(.+) to (.+)$/.exec(node.text) : null
    const [low, high] = [parseQuantity(match?.[1] ?? ''), parseQuantity(match?.[2] ?? '')]
    if (low.kind !== 'quantity' || high.kind !== 'quantity') return unexpected(node, reading, 'a range such as 0.1 mg/L to 20 mg/L')
    if (low.quantity.unit !== high.quantity.unit || low.quantity.value >= high.quantity.value) return unexpected(node, reading, 'a range with one unit, the lower end first')
    return { low: low.quantity, high: high.quantity }
  },
}

export const rangeOptions = object({
  claim: optional(claim),
  'level-tolerance': defaulted(number({ describe: 'How far levels of different datasets may lie apart and count as one, as a fraction of the level', minimum: 0, maximum: 0.2 }), 0, 'exact'),
}, { describe: 'The range over which linearity, accuracy and precision all hold' })

export type RangeOptions = ReadBy<typeof rangeOptions>
