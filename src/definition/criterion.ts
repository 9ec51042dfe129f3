// A criterion phrase (“at most 5 %”, “between 98 % and 102 %”) → a limit. The phrase is closed: what cannot be read is an error, not a guess.
// `at most`, `at least` and `between` include the limit; `above` and `below` do not.
import { nearest } from '../diagnostics/nearest.ts'
import { parseQuantity } from './quantity.ts'
import type { Limit, Quantity } from './study.ts'

export type ParsedCriterion =
  | { readonly kind: 'limit'; readonly limit: Limit }
  | { readonly kind: 'unreadable'; readonly found: string; readonly mend: string }

type Unreadable = ParsedCriterion & { readonly kind: 'unreadable' }

export function parseCriterion(typed: string): ParsedCriterion {
  const phrase = typed.trim().replace(/\s+/g, ' ')
  const one = /^(at most|at least|above|below) (.+)$/.exec(phrase)
  if (one?.[1] !== undefined && one[2] !== undefined) {
    const bound = quantityOf(one[2], phrase)
    return 'mend' in bound ? bound : { kind: 'limit', limit: { kind: one[1] as 'at most' | 'at least' | 'above' | 'below', bound } }
  }
  const two = /^between (.+) and (.+)$/.exec(phrase)
  if (two?.[1] === undefined || two[2] === undefined) return { kind: 'unreadable', found: phrase, mend: inOurWords(phrase) }
  const [low, high] = [quantityOf(two[1], phrase), quantityOf(two[2], phrase)]
  if ('mend' in low) return low
  if ('mend' in high) return high
  if (low.unit !== high.unit) {
    const unit = low.unit === '' ? high.unit : high.unit === '' ? low.unit : undefined
    return { kind: 'unreadable', found: phrase, mend: unit === undefined ? 'Write both ends in the same unit' : `Write \`between ${low.text} ${unit} and ${high.text} ${unit}\`` }
  }
  return low.value <= high.value ? { kind: 'limit', limit: { kind: 'between', low, high } } : { kind: 'unreadable', found: phrase, mend: `Write the lower end first: \`between ${two[2]} and ${two[1]}\`` }
}

function quantityOf(typed: string, phrase: string): Quantity | Unreadable {
  const parsed = parseQuantity(typed)
  const replaced = (meant: string): string => `Write \`${phrase.replace(typed, () => meant)}\``
  switch (parsed.kind) {
    case 'quantity': return parsed.quantity
    case 'unknown unit': return { kind: 'unreadable', found: parsed.unit, mend: parsed.nearest === undefined ? 'Write a unit of the table of units' : replaced(typed.replace(parsed.unit, () => parsed.nearest ?? '')) }
    case 'decimal comma': return { kind: 'unreadable', found: typed, mend: replaced(parsed.meant) }
    case 'not a quantity': {
      const plainMinus = typed.replace(/^[−–]\s?(?=[\d.])/, '-') // the long dashes that word processors make of a minus
      return { kind: 'unreadable', found: typed, mend: plainMinus === typed ? examples : replaced(plainMinus) }
    }
  }
}

const examples = 'Write a phrase such as `at most 5 %`, `at least 0.995` or `between 98 % and 102 %`'

/** Signs and phrases used elsewhere → ours. */
const otherwise: readonly (readonly [RegExp, string])[] = [
  [/^(<=|≤|=<|max\.?|maximum|not more than|no more than|nmt|up to) ?(?=[\d.+-])/i, 'at most '],
  [/^(>=|≥|=>|min\.?|minimum|not less than|no less than|nlt) ?(?=[\d.+-])/i, 'at least '],
  [/^(<|less than|under) ?(?=[\d.+-])/i, 'below '],
  [/^(>|more than|greater than|over) ?(?=[\d.+-])/i, 'above '],
]

function inOurWords(phrase: string): string {
  const match = otherwise.find(([sign]) => sign.test(phrase))
  if (match !== undefined) return `Write \`${phrase.replace(match[0], match[1])}\``
  const bounds = /^(?:from )?([\d.]+) ?([^\d\s–-]*) ?(?:-|–|to|\.\.) ?([\d.]+) ?(\S*)$/.exec(phrase)
  if (bounds !== null) {
    const unit = bounds[4] === '' ? '' : ` ${bounds[4]}`
    return `Write \`between ${bounds[1]}${unit} and ${bounds[3]}${unit}\``
  }
  const around = /^([\d.]+) ?± ?([\d.]+) ?(\S*)$/.exec(phrase)
  if (around !== null) return 'Write both ends, such as `between 95 % and 105 %`'
  const words = /^[^\d+-]*/.exec(phrase)?.[0].trim() ?? ''
  const guess = words === '' ? undefined : nearest(words, ['at most', 'at least', 'between', 'above', 'below'])
  return guess === undefined || guess === words ? examples : `Write \`${guess}${phrase.slice(words.length)}\``
}
