// Rounding in decimal arithmetic on the shortest decimal text of a double, so that 2.675 rounds to 2.68 and not, as its binary value
// would, to 2.67. Ties go away from zero (half up) or to the even neighbour (half even); only the digits of the text are looked at.
// Digits beyond the fifteenth are noise of binary arithmetic and are rounded off first: 98.24999999999999 is a computed 98.25.

export type RoundingMode = 'half up' | 'half even'

export interface Rounded {
  /** The rounded number with every digit asked for, such as `2.70`. */
  readonly text: string
  readonly value: number
}

interface Decimal {
  readonly negative: boolean
  /** Digits without point and leading zeros. */
  readonly digits: string
  /** Value = 0.digits × 10^exponent */
  readonly exponent: number
}

/** Rounds to a number of decimals, ties away from zero (ISO 80000-1:2022, annex B, rule B for positive numbers). */
export function roundHalfUp(value: number, decimals: number): Rounded {
  return roundToDecimals(value, decimals, 'half up')
}

/** Rounds to a number of decimals, ties to the even neighbour (ISO 80000-1:2022, annex B, rule A; ASTM E29). */
export function roundHalfEven(value: number, decimals: number): Rounded {
  return roundToDecimals(value, decimals, 'half even')
}

/** Rounds to significant digits. Zero has none and stays `0`. Throws below one digit and on values that are not finite. */
export function roundSignificant(value: number, digits: number, mode: RoundingMode): Rounded {
  if (!(Number.isInteger(digits) && digits >= 1)) throw new RangeError('rounding needs at least one significant digit')
  if (value === 0) return { text: '0', value: 0 }
  const decimal = decimalOf(value)
  const decimals = digits - decimal.exponent
  const rounded = roundToDecimals(value, decimals, mode)
  // 9.996 to three digits is 10.00 by decimals; one digit less keeps three.
  return decimalOf(rounded.value).exponent > decimal.exponent ? roundToDecimals(value, decimals - 1, mode) : rounded
}

/** Decimals as typed: `5.0` has 1, `1e-3` has 3, `5` has none. Throws when the text is no number. */
export function decimalsOf(text: string): number {
  const match = /^[+-]?\d*(?:\.(\d*))?(?:[eE]([+-]?\d+))?$/.exec(text.trim())
  if (match === null) throw new RangeError('not the text of a number')
  return Math.max(0, (match[1]?.length ?? 0) - Number(match[2] ?? 0))
}

/** Significant figures as typed: `0.050` has 2, `100` has 3 (trailing zeros of a whole number count, since they were typed). Throws when the text is no number. */
export function significantFiguresOf(text: string): number {
  const match = /^[+-]?(\d*)(?:\.(\d*))?(?:[eE][+-]?\d+)?$/.exec(text.trim())
  if (match === null) throw new RangeError('not the text of a number')
  return Math.max(1, `${match[1] ?? ''}${match[2] ?? ''}`.replace(/^0+/, '').length)
}

function roundToDecimals(value: number, decimals: number, mode: RoundingMode): Rounded {
  if (!Number.isFinite(value)) throw new RangeError('rounding needs a finite number')
  if (!Number.isInteger(decimals)) throw new RangeError('rounding needs a whole number of decimals')
  const { negative, digits, exponent } = decimalOf(value)
  const kept = exponent + decimals
  let head = kept <= 0 ? '0' : digits.slice(0, kept).padEnd(kept, '0')
  const tail = kept < 0 ? '0'.repeat(Math.min(-kept, 1)) + digits : digits.slice(Math.max(0, kept))
  if (roundsUp(head, tail, mode)) head = (BigInt(head) + 1n).toString()
  const padded = decimals > 0 ? head.padStart(decimals + 1, '0') : head + '0'.repeat(-decimals)
  const text = decimals > 0 ? `${padded.slice(0, -decimals)}.${padded.slice(-decimals)}` : padded
  const plain = text.replace(/^0+(?=\d)/, '')
  const signed = negative && /[1-9]/.test(plain) ? `-${plain}` : plain
  return { text: signed, value: Number(signed) }
}

function roundsUp(head: string, tail: string, mode: RoundingMode): boolean {
  const first = tail[0] ?? '0'
  if (first !== '5') return first > '5'
  if (/[1-9]/.test(tail.slice(1))) return true
  return mode === 'half up' || Number(head.at(-1)) % 2 === 1
}

function decimalOf(value: number): Decimal {
  const shortest = Math.abs(value).toExponential()
  const [mantissa = '0', exponent = '0'] = (shortest.indexOf('e') > 16 ? Math.abs(value).toExponential(14) : shortest).split('e')
  return { negative: value < 0, digits: mantissa.replace('.', ''), exponent: Number(exponent) + 1 }
}
