// Text of a cell → what it says: a number, a label, below or above a bound, not detected, or nothing. Each stays a different thing;
// a text that is none of them in a number column is an error.
import type { DecimalMark } from '../definition/study.ts'
import type { CellValue } from './dataset.ts'

/** Fields that hold numbers; every other field is a text. */
export const numberFields: ReadonlySet<string> = new Set(['level', 'response', 'result', 'added', 'native', 'reference', 'dilution', 'sample-amount', 'order', 'time', 'signal'])

/** Texts that mean "not detected", letter case and dots ignored. Common practice, no source. */
const notDetected: ReadonlySet<string> = new Set(['nd', 'notdetected', 'blq', 'bql', '<lod', '<loq', 'na', 'nn', 'nb'])

export interface Tokens {
  readonly notDetected: readonly string[]
  readonly missing: readonly string[]
}

export type ReadNumber = CellValue | { readonly kind: 'unreadable'; readonly why: 'text' | 'unit' | 'thousands' | 'other mark' | 'spreadsheet error' | 'not finite'; readonly rest?: string }

/** Visible normalisation: no-break spaces and odd minus signs as they are meant; nothing else is touched. */
export function tidied(text: string): string {
  return text.replace(/[\u00a0\u2007\u202f]/g, ' ').replace(/[\u2212\u2012\u2013]/g, '-').trim()
}

export function readNumber(text: string, decimal: DecimalMark, tokens: Tokens): ReadNumber {
  const tidy = tidied(text)
  if (tidy === '' || tokens.missing.includes(tidy)) return { kind: 'missing' }
  if (tokens.notDetected.includes(tidy) || notDetected.has(tidy.toLowerCase().replace(/[.\s]/g, ''))) return { kind: 'not detected' }
  if (/^#[A-Z/0!?]+$/.test(tidy)) return { kind: 'unreadable', why: 'spreadsheet error' }
  const bound = /^([<>≤≥])=?\s*(.+)$/.exec(tidy)
  if (bound?.[1] !== undefined && bound[2] !== undefined) {
    const value = plainNumber(bound[2], decimal)
    if (typeof value === 'number') return { kind: bound[1] === '<' || bound[1] === '≤' ? 'below' : 'above', bound: value }
    return { kind: 'unreadable', why: value }
  }
  const value = plainNumber(tidy, decimal)
  if (typeof value === 'number') return { kind: 'number', value }
  const withUnit = /^([+-]?[\d.,]+(?:[eE][+-]?\d+)?)\s*([^\d\s.,+-].*)$/.exec(tidy)
  if (value === 'text' && withUnit?.[1] !== undefined && typeof plainNumber(withUnit[1], decimal) === 'number') return { kind: 'unreadable', why: 'unit', rest: withUnit[2] ?? '' }
  return { kind: 'unreadable', why: value }
}

function plainNumber(text: string, decimal: DecimalMark): number | 'text' | 'thousands' | 'other mark' | 'not finite' {
  const [mark, other] = decimal === 'comma' ? [',', '.'] : ['.', ',']
  if (/^[+-]?\d{1,3}(?:[ '’]\d{3})+(?:[.,]\d+)?$/.test(text)) return 'thousands'
  if (/^[+-]?\d{1,3}(?:[.,]\d{3})+[.,]\d+$/.test(text)) return 'thousands'
  const pattern = decimal === 'comma' ? /^[+-]?(?:\d+(?:,\d*)?|,\d+)(?:[eE][+-]?\d+)?$/ : /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?$/
  if (pattern.test(text)) {
    const value = Number(text.replace(mark, '.'))
    return Number.isFinite(value) ? value : 'not finite'
  }
  return /^[+-]?\d*[.,]\d+(?:[eE][+-]?\d+)?$/.test(text) && text.includes(other) ? 'other mark' : 'text'
}

/** Decimal mark of some number texts: declared by what they hold; undefined when a text could be read in two ways, or both marks occur. */
export function sniffDecimal(texts: readonly { readonly text: string; readonly at: number }[]): { readonly decimal: DecimalMark } | { readonly ambiguous: number } | { readonly mixed: readonly [number, number] } {
  let point: number | undefined
  let comma: number | undefined
  let unsure: number | undefined
  for (const { text, at } of texts) {
    const tidy = tidied(text).replace(/^[<>≤≥]=?\s*/, '')
    const match = /^[+-]?(\d*)([.,])(\d+)(?:[eE][+-]?\d+)?$/.exec(tidy)
    if (match === null) continue
    // One mark before exactly three digits may separate thousands; a leading zero or more than three digits before it cannot.
    const couldBeThousands = match[3]?.length === 3 && /^[1-9]\d{0,2}$/.test(match[1] ?? '') && !/[eE]/.test(tidy)
    if (couldBeThousands) unsure ??= at
    else if (match[2] === '.') point ??= at
    else comma ??= at
  }
  if (point !== undefined && comma !== undefined) return { mixed: [point, comma] }
  if (point !== undefined || comma !== undefined) return { decimal: comma !== undefined ? 'comma' : 'point' }
  return unsure === undefined ? { decimal: 'point' } : { ambiguous: unsure }
}
