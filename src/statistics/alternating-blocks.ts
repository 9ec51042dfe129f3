// Conditions measured in alternating blocks (A B A B …) under a straight drift: block mean = condition + drift over block order.
// Pairing neighbours or comparing block means by Welch takes drift for an effect or hides one; this model does neither.
import { type DifferenceTest, differenceTest } from './compare.ts'
import { squarable } from './describe.ts'
import { leastSquares } from './least-squares.ts'

export interface Block {
  /** 0 is the reference. */
  readonly condition: number
  readonly mean: number
  /** Place in time, evenly spaced or not. */
  readonly order: number
}

export interface BlockEffect extends DifferenceTest {
  readonly condition: number
}

export interface AlternatingBlocks {
  /** One for each condition but the reference: condition − reference. */
  readonly effects: readonly BlockEffect[]
  /** Change of a block mean per unit of order. */
  readonly drift: number
  readonly driftStandardError: number
  readonly residualStandardDeviation: number
  readonly df: number
}

/** df = blocks − conditions − 1. Throws when condition and drift cannot be separated. Source: analysis of covariance, Draper & Smith, 3rd ed., chapter 14. */
export function alternatingBlocks(blocks: readonly Block[], level: number): AlternatingBlocks {
  const conditions = Math.max(...blocks.map((block) => block.condition)) + 1
  if (conditions < 2) throw new RangeError('a comparison needs two conditions')
  const middle = blocks.reduce((total, block) => total + block.order, 0) / blocks.length
  const columns = [
    blocks.map(() => 1),
    ...Array.from({ length: conditions - 1 }, (_, k) => blocks.map((block) => (block.condition === k + 1 ? 1 : 0))),
    blocks.map((block) => block.order - middle),
  ]
  const names = ['mean of the reference', ...Array.from({ length: conditions - 1 }, (_, k) => `effect of condition ${k + 1} apart from drift`), 'drift apart from the conditions']
  const fit = leastSquares(columns, squarable(blocks.map((block) => block.mean)), names)
  const variance = fit.residualSumOfSquares / fit.df
  const error = (k: number): number => Math.sqrt(variance * (fit.unscaledCovariance[k]?.[k] ?? 0))
  const last = columns.length - 1
  return {
    effects: Array.from({ length: conditions - 1 }, (_, k) => ({ condition: k + 1, ...differenceTest(fit.coefficients[k + 1] ?? 0, error(k + 1), fit.df, level) })),
    drift: fit.coefficients[last] ?? 0, driftStandardError: error(last), residualStandardDeviation: Math.sqrt(variance), df: fit.df,
  }
}
