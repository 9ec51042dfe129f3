// Numbers of the record as printed text: how many digits, true minus, ten-powers. It rounds for reading only; decisions are made
// elsewhere and print their own text.
import { roundHalfUp, roundSignificant } from '../statistics/rounding.ts'
import type { NumberNode } from './document.ts'

const minus = '\u2212'
const superscripts = '⁰¹²³⁴⁵⁶⁷⁸⁹'

/** `significant` digits (default 4) or fixed `decimals`. */
export interface NumberFormat {
  readonly significant?: number
  readonly decimals?: number
}

/** A number of the record with `significant` digits (4 unless said) or fixed decimals. Throws on NaN and Infinity: they never belong in a record. */
export function printed(value: number, format: NumberFormat = {}): NumberNode {
  return { type: 'number', value, text: numberText(value, format) }
}

/** A whole number (n, degrees of freedom that are counts, levels). */
export function count(value: number): NumberNode {
  return { type: 'number', value, text: withTrueMinus(String(value)) }
}

/** Degrees of freedom: whole ones plain, effective ones with two decimals. */
export function degreesOfFreedom(value: number): NumberNode {
  return Number.isInteger(value) ? count(value) : printed(value, { decimals: 2 })
}

/** A probability: four decimals, or `<0.0001` said by the caller through `probabilityText`. */
export function probability(value: number): NumberNode {
  return { type: 'number', value, text: value < 0.0001 ? '<0.0001' : numberText(value, { decimals: 4 }) }
}

/** A value as it was typed or measured: the shortest text of the double. */
export function asTyped(value: number): NumberNode {
  return { type: 'number', value, text: exponentText(withTrueMinus(String(value))) }
}

/** A finding: as it stands when it is a short number (a tested level), with four significant digits otherwise. */
export function asFound(value: number): NumberNode {
  const shortest = asTyped(value)
  return shortest.text.replace(/[^0-9]/g, '').replace(/^0+/, '').length <= 4 && !shortest.text.includes('×') ? shortest : printed(value)
}

/** A measured value: as it stands when it was read, with seven significant digits when it is a mean of several. */
export function asMeasured(value: number): NumberNode {
  const shortest = asTyped(value)
  return shortest.text.replace(/[^0-9]/g, '').length <= 8 ? shortest : { ...shortest, text: asTyped(Number(value.toPrecision(7))).text }
}

/** A fraction of the record (0.95) as percent (95), without its sign. */
export function asPercent(fraction: number): NumberNode {
  return { type: 'number', value: fraction, text: String(Number((fraction * 100).toPrecision(6))) }
}

export function numberText(value: number, format: NumberFormat = {}): string {
  if (!Number.isFinite(value)) throw new Error('a number of the record is not finite')
  if (format.decimals !== undefined) return withTrueMinus(roundHalfUp(value, format.decimals).text)
  const digits = format.significant ?? 4
  const magnitude = Math.abs(value)
  if (value !== 0 && (magnitude < 1e-4 || magnitude >= 1e6)) {
    const [mantissa, exponent] = value.toExponential(digits - 1).split('e')
    return `${withTrueMinus(mantissa ?? '')} × 10${raised(Number(exponent))}`
  }
  return withTrueMinus(roundSignificant(value, digits, 'half up').text)
}

/** The decimals at which every value of a column shows at least `significant` digits of its largest magnitude, so that the column aligns. */
export function columnDecimals(values: readonly number[], significant = 4): number {
  const largest = Math.max(...values.map(Math.abs), 0)
  if (largest === 0) return 0
  return Math.max(0, Math.min(12, significant - 1 - Math.floor(Math.log10(largest))))
}

function withTrueMinus(text: string): string {
  return text.startsWith('-') ? minus + text.slice(1) : text
}

function exponentText(text: string): string {
  const match = /^(.*)e([+-]?\d+)$/.exec(text)
  return match === null ? text : `${match[1]} × 10${raised(Number(match[2]))}`
}

function raised(exponent: number): string {
  return (exponent < 0 ? '⁻' : '') + [...String(Math.abs(exponent))].map((digit) => superscripts[Number(digit)] ?? '').join('')
}
