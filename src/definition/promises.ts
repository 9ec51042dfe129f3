// The keys `design` and `not-performed`: what the study promised of its design, and what it leaves out with a justification.
// A promise about a characteristic that the study does not ask for is told: it would otherwise be held against nothing.
import { diagnostic } from '../diagnostics/diagnostic.ts'
import type { DefinitionPart } from './definition-part.ts'
import { below, mapOf, number, quantity, type ReadBy, type Reader, type Reading, text, unexpected } from './fields.ts'
import { checkKnown } from './names.ts'
import type { Block, DesignPromise, Quantity } from './study.ts'

/** Performance characteristics of analytical procedures that the trade names, beside those of the catalogue (ICH Q2(R2), Eurachem, ISO 5725 use these words; a study may justify leaving out any of them). */
const otherCharacteristics = ['specificity', 'selectivity', 'robustness', 'ruggedness', 'stability', 'reproducibility', 'uncertainty', 'matrix-effect', 'carry-over', 'dilution-integrity', 'system-suitability', 'transfer']

const count = number({ describe: 'How many', integer: true, minimum: 1 })
const assumedRsd = quantity({ describe: 'Relative standard deviation that the design was planned for', unit: '%', example: '2 %' })

const promise: Reader<Pick<DesignPromise, 'counts' | 'assumedRsd'>> = {
  schema: { type: 'object', properties: { 'assumed-rsd': assumedRsd.schema }, additionalProperties: count.schema, description: 'Word → count: levels, runs, replicates, blocks, …' },
  read(node, reading) {
    if (node.kind !== 'map') return unexpected(node, reading, 'word → count')
    let assumed: Quantity | undefined
    let isComplete = true
    const counts = node.entries.flatMap((entry): readonly (readonly [string, number])[] => {
      const inner = below(reading, entry.key)
      if (entry.key === 'assumed-rsd') {
        assumed = assumedRsd.read(entry.value, inner)
        isComplete &&= assumed !== undefined
        return []
      }
      const value = count.read(entry.value, inner)
      isComplete &&= value !== undefined
      return value === undefined ? [] : [[entry.key, value]]
    })
    return isComplete ? { counts: Object.fromEntries(counts), assumedRsd: assumed } : undefined
  },
}

export const designReader = mapOf(promise, { describe: 'The design that was planned, by characteristic; the report holds it against the design found', example: { precision: { levels: 3, runs: 6, replicates: 3 } } })

export function designOf(read: ReadBy<typeof designReader>): readonly DesignPromise[] {
  return read.map(({ key, entry, value }) => ({ characteristic: key, ...value, place: entry.keyPlace }))
}

export const notPerformedReader = mapOf(text({ describe: 'The justification' }), { describe: 'Characteristics not performed, each with its justification', example: { robustness: 'covered by the development study' } })

/** `asked` are the characteristics under `characteristics`, read or not. */
export function checkPromises(
  { design, notPerformed, asked, catalogue }: { readonly design: readonly DesignPromise[]; readonly notPerformed: ReadBy<typeof notPerformedReader>; readonly asked: ReadonlySet<Block['characteristic']>; readonly catalogue: readonly DefinitionPart[] },
  reading: Reading,
): void {
  const known = catalogue.map((part) => part.id)
  for (const each of design) {
    const name = { value: each.characteristic, place: each.place }
    if (!checkKnown(name, known, 'characteristic', 'under `characteristics`', reading) || asked.has(name.value)) continue
    reading.report(diagnostic('definition/contradiction', `Unexpected design of \`${name.value}\`, which the study does not ask for`, { place: name.place, actual: `no block \`${name.value}\``, expected: 'a block under `characteristics`', mend: 'Add the block, or remove the design and give a justification under `not-performed`' }))
  }
  for (const { key, entry } of notPerformed) {
    const name = { value: key, place: entry.keyPlace }
    if (!checkKnown(name, [...known, ...otherCharacteristics], 'characteristic', 'in one of the known words', reading) || !asked.has(key)) continue
    reading.report(diagnostic('definition/contradiction', `Unexpected \`${key}\` under \`not-performed\`: the study asks for it`, { place: name.place, actual: 'a block and a justification', expected: 'one of the two', mend: 'Remove one of the two' }))
  }
}
