// Text of a cell → what it says: a number, a label, below or above a bound, not detected, or nothing. Each stays a different thing;
// a text that is none of them in a number column is an error.
import type { DecimalMark } from '../definition/study.ts'
import type { CellValue } from './dataset.ts'

/** Fields that hold numbers; every other field is a text. */
export const numberFields: ReadonlySet<string> = new Set(['level', 'response', 'result', 'added', 'native', 'reference', 'dilution', 'sample-amount', 'order', 'time', 'signal'])

/** Number fields that a measurement fills; only here can a value lie below or above a bound or be not detected. */
export const measuredFields: ReadonlySet<string> = new Set(['response', 'result', 'native', 'signal'])

/**
 * Texts that mean "not detected", letter case, dots and spaces ignored. Common practice, no source. `n.a.` and `n.b.` are left out on purpose:
 * laboratories write them for "not detected", "not analysed" and "not applicable", so a study has to say which.
 */
const notDetected: ReadonlySet<string> = new Set(['nd', 'notdetected', 'blq', 'bql', 'bdl', '<lod', '<loq', 'nn'])

export interface Tokens {
  readonly notDetected: readonly string[]
  readonly missing: readonly string[]
}

export interface Unreadable {
  readonly kind: 'unreadable'
  readonly why: 'text' | 'unit' | 'thousands' | 'other mark' | 'spreadsheet error' | 'formula' | 'too large' | 'too small'
  readonly rest?: string
}

/** Visible normalisation: no-break spaces, odd minus signs and invisible characters as they are meant, composed letters; nothing else is touched. */
export function tidied(text: string): string {
  if (!/[^\u0000-\u007f]/.test(text)) return text.trim()
  return text.normalize('NFC').replace(/[\u00a0\u2007\u202f]/g, ' ').replace(/[\u2010-\u2013\u2212]/g, '-').replace(/[\u00ad\u200b\u2060\ufeff]/g, '').trim()
}

/** `#N/A`, `#DIV/0!`, `#REF!`, `#NAME?` and their translations (`#NV`, `#BEZUG!`), `Err:502`. */
export function isSpreadsheetError(tidy: string): boolean {
  return /^(?:#(?:[\p{Lu}¡/0]+[!?]|N\/[ADV]|NV)|Err:\d+)$/u.test(tidy)
}

/** A heading as it is compared: line breaks are spaces, and the two characters for micro (U+00B5, U+03BC) are one, since nobody sees a difference. */
export function headingOf(text: string): string {
  return tidied(text).replace(/\s+/g, ' ').replaceAll('\u03bc', '\u00b5')
}

export function readNumber(text: string, decimal: DecimalMark, tokens: Tokens): CellValue | Unreadable {
  const tidy = tidied(text)
  if (tidy === '' || tokens.missing.includes(tidy)) return { kind: 'missing' }
  const value = plainNumber(tidy, decimal)
  if (typeof value === 'number') return { kind: 'number', value }
  if (tokens.notDetected.includes(tidy) || notDetected.has(tidy.toLowerCase().replace(/[.\s]/g, ''))) return { kind: 'not detected' }
  if (isSpreadsheetError(tidy) || /^#+$/.test(tidy)) return { kind: 'unreadable', why: 'spreadsheet error' } // a row of # is a column too narrow for its number
  if (tidy.startsWith('=')) return { kind: 'unreadable', why: 'formula' }
  const bound = /^([<>≤≥])=?\s*(.+)$/.exec(tidy)
  if (bound?.[1] !== undefined && bound[2] !== undefined) {
    const limit = plainNumber(bound[2], decimal)
    if (typeof limit === 'number') return { kind: bound[1] === '<' || bound[1] === '≤' ? 'below' : 'above', bound: limit }
    return { kind: 'unreadable', why: limit }
  }
  const withUnit = /^([+-]?[\d.,]+(?:[eE][+-]?\d+)?)\s*([^\d\s.,+-].*)$/.exec(tidy)
  if (value === 'text' && withUnit?.[1] !== undefined && typeof plainNumber(withUnit[1], decimal) === 'number') return { kind: 'unreadable', why: 'unit', rest: withUnit[2] ?? '' }
  return { kind: 'unreadable', why: value }
}

// No result in any unit of measurement lies beyond; the product of four such numbers (a fit of second degree) is still a finite number.
const farthest = 1e60
const nearest = 1e-60

const patterns: Readonly<Record<DecimalMark, RegExp>> = {
  comma: /^[+-]?(?:\d+(?:,\d*)?|,\d+)(?:[eE][+-]?\d+)?$/,
  point: /^[+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?$/,
}

function plainNumber(text: string, decimal: DecimalMark): number | Unreadable['why'] {
  if (patterns[decimal].test(text)) {
    const value = Number(decimal === 'comma' ? text.replace(',', '.') : text)
    if (Math.abs(value) > farthest) return 'too large'
    if (Math.abs(value) < nearest) return /^[^eE]*[1-9]/.test(text) ? 'too small' : 0 // never minus zero, which is no other value
    return value
  }
  if (/^[+-]?\d{1,3}(?:[ '’]\d{3})+(?:[.,]\d+)?$/.test(text)) return 'thousands'
  if (/^[+-]?\d{1,3}(?:[.,]\d{3})+[.,]\d+$/.test(text)) return 'thousands'
  return /^[+-]?\d*[.,]\d+(?:[eE][+-]?\d+)?$/.test(text) && text.includes(decimal === 'comma' ? '.' : ',') ? 'other mark' : 'text'
}
