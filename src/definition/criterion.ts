// A criterion phrase ("at most 5 %", "between 98 % and 102 %") → a limit. The phrase is closed: what cannot be read is an error, not a guess.
import { parseQuantity } from './quantity.ts'
import type { Limit, Quantity } from './study.ts'

export type ParsedCriterion =
  | { readonly kind: 'limit'; readonly limit: Limit }
  | { readonly kind: 'unreadable'; readonly found: string; readonly mend: string }

const phrase = 'Write “at most 5 %”, “at least 0.995”, “between 98 % and 102 %”, “above 0” or “below 10 %”'

export function parseCriterion(typed: string): ParsedCriterion {
  const text = typed.trim().replace(/\s+/g, ' ')
  const one = /^(at most|at least|above|below) (.+)$/.exec(text)
  if (one?.[1] !== undefined && one[2] !== undefined) {
    const bound = quantityOf(one[2])
    return 'mend' in bound ? bound : { kind: 'limit', limit: { kind: one[1] as 'at most' | 'at least' | 'above' | 'below', bound } }
  }
  const two = /^between (.+) and (.+)$/.exec(text)
  if (two?.[1] === undefined || two[2] === undefined) return { kind: 'unreadable', found: text, mend: suggestion(text) }
  const [low, high] = [quantityOf(two[1]), quantityOf(two[2])]
  if ('mend' in low) return low
  if ('mend' in high) return high
  if (low.unit !== high.unit) return { kind: 'unreadable', found: `${low.unit} and ${high.unit}`, mend: 'Write both ends of the range with the same unit' }
  if (low.value > high.value) return { kind: 'unreadable', found: text, mend: 'Write the lower end first' }
  return { kind: 'limit', limit: { kind: 'between', low, high } }
}

function quantityOf(text: string): Quantity | (ParsedCriterion & { readonly kind: 'unreadable' }) {
  const parsed = parseQuantity(text)
  switch (parsed.kind) {
    case 'quantity': return parsed.quantity
    case 'unknown unit': return { kind: 'unreadable', found: parsed.unit, mend: parsed.nearest === undefined ? 'Write a unit of the table of units' : `Write the unit as \`${parsed.nearest}\`` }
    case 'decimal comma': return { kind: 'unreadable', found: text, mend: `Write the number with a point: \`${parsed.meant}\`` }
    case 'not a quantity': return { kind: 'unreadable', found: text, mend: phrase }
  }
}

function suggestion(text: string): string {
  const symbol = /^(<=|≤|>=|≥|<|>)\s*(.+)$/.exec(text)
  if (symbol?.[1] === undefined) return phrase
  const word = { '<=': 'at most', '≤': 'at most', '>=': 'at least', '≥': 'at least', '<': 'below', '>': 'above' }[symbol[1]]
  return `Write \`${word ?? 'at most'} ${symbol[2] ?? ''}\``
}
