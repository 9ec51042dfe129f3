// Compares a number with a published figure: within half a unit of its last printed digit, or in a stated number of digits.
export interface Agreement {
  readonly agrees: boolean
  /** Significant digits to which both agree (log relative error), for reports. */
  readonly digits: number
}

export function agreesWithPublished(found: number, published: string): Agreement {
  const expected = Number(published)
  const match = /^[+-]?\d*(?:\.(\d+))?(?:[eE]([+-]?\d+))?$/.exec(published.trim())
  if (match === null || !Number.isFinite(expected)) throw new Error(`not a published figure: ${published}`)
  const unit = 10 ** (Number(match[2] ?? 0) - (match[1]?.length ?? 0))
  // A published tie (…5) may have been rounded either way, and the binary text of a tie is not exact.
  return { agrees: Math.abs(found - expected) <= unit * 0.5 * (1 + 1e-9), digits: agreedDigits(found, expected) }
}

export function agreesInDigits(found: number, expected: number, digits: number): Agreement {
  const reached = agreedDigits(found, expected)
  return { agrees: reached >= digits, digits: reached }
}

function agreedDigits(found: number, expected: number): number {
  if (found === expected) return 16
  const error = expected === 0 ? Math.abs(found) : Math.abs(found - expected) / Math.abs(expected)
  return Math.max(0, -Math.log10(error))
}
