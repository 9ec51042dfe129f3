// Least squares by Householder QR on scaled columns, with one step of refinement: never normal equations, which would square the
// condition of the problem. Columns that do not determine the coefficients are refused by name.
import { powerOfTwo, sum } from './describe.ts'

export interface LeastSquares {
  readonly coefficients: readonly number[]
  /** (XᵀWX)⁻¹, to be multiplied by the residual variance. */
  readonly unscaledCovariance: readonly (readonly number[])[]
  readonly fitted: readonly number[]
  /** y − fitted, unweighted. */
  readonly residuals: readonly number[]
  /** Σ w·residual² */
  readonly residualSumOfSquares: number
  readonly df: number
}

/**
 * `columns[k][i]` is the k-th regressor of observation i; `names` names them for the refusal.
 * Throws below one degree of freedom and on columns that depend on each other.
 * Source: Golub & Van Loan, Matrix Computations, 4th ed., sections 5.2 and 5.3 (Householder QR, iterative refinement).
 */
export function leastSquares(columns: readonly (readonly number[])[], y: readonly number[], names: readonly string[], weights?: readonly number[]): LeastSquares {
  const n = y.length
  const p = columns.length
  if (n <= p) throw new RangeError(`a fit of ${p} coefficients needs more than ${p} values`)
  const root = weights === undefined ? undefined : weights.map((weight) => {
    if (!(weight > 0) || !Number.isFinite(weight)) throw new RangeError('a weight must be positive and finite')
    return Math.sqrt(weight)
  })
  const heavy = root === undefined ? 1 : Math.max(...root)
  const size = scaleOf(y)
  const scales = columns.map(scaleOf)
  const weigh = (value: number, index: number): number => (root === undefined ? value : (value * (root[index] ?? 1)) / heavy)
  const matrix = columns.map((column, k) => column.map((value, i) => weigh(value / (scales[k] ?? 1), i)))
  const target = y.map((value, i) => weigh(value / size, i))
  const factor = householder(matrix, names)
  const scaled = factor.solve(target)
  const leftOver = (beta: readonly number[]): number[] => target.map((value, i) => value - sum(matrix.map((column, k) => (column[i] ?? 0) * (beta[k] ?? 0))))
  const correction = factor.solve(leftOver(scaled))
  const beta = scaled.map((value, k) => value + (correction[k] ?? 0))
  const rest = leftOver(beta)
  const coefficients = beta.map((value, k) => (value * size) / (scales[k] ?? 1))
  const inverse = factor.inverseOfRtR()
  const unscaledCovariance = inverse.map((line, k) => line.map((value, l) => value / ((scales[k] ?? 1) * (scales[l] ?? 1) * heavy * heavy)))
  const residuals = rest.map((value, i) => (root === undefined ? value : (value * heavy) / (root[i] ?? 1)) * size)
  const norm = Math.sqrt(sum(rest.map((value) => value * value)))
  return { coefficients, unscaledCovariance, residuals, fitted: y.map((value, i) => value - (residuals[i] ?? 0)), residualSumOfSquares: (norm * heavy * size) ** 2, df: n - p }
}

/** A power of two near the largest value: scaling by it costs no digit. */
function scaleOf(values: readonly number[]): number {
  const largest = values.reduce((most, value) => Math.max(most, Math.abs(value)), 0)
  return largest === 0 ? 1 : powerOfTwo(largest)
}

interface Factor {
  solve(target: readonly number[]): number[]
  inverseOfRtR(): number[][]
}

function householder(matrix: readonly (readonly number[])[], names: readonly string[]): Factor {
  const p = matrix.length
  const n = matrix[0]?.length ?? 0
  const work = matrix.map((column) => [...column])
  const reflectors: number[][] = []
  const diagonal: number[] = []
  for (let k = 0; k < p; k += 1) {
    const column = work[k] ?? []
    const before = Math.sqrt(sum((matrix[k] ?? []).map((value) => value * value)))
    const norm = Math.sqrt(sum(column.slice(k).map((value) => value * value)))
    if (!(norm > before * n * Number.EPSILON * 4)) throw new RangeError(`the values do not determine the ${names[k] ?? 'coefficient'}`)
    const alpha = (column[k] ?? 0) > 0 ? -norm : norm
    const reflector = column.map((value, i) => (i < k ? 0 : i === k ? value - alpha : value))
    const square = sum(reflector.map((value) => value * value))
    reflectors.push(reflector.map((value) => value / Math.sqrt(square)))
    diagonal.push(alpha)
    for (let l = k; l < p; l += 1) reflect(work[l] ?? [], reflectors[k] ?? [], k)
    ;(work[k] ?? [])[k] = alpha
  }
  const r = (i: number, k: number): number => (i === k ? (diagonal[k] ?? 1) : (work[k]?.[i] ?? 0))
  const backSubstitute = (given: readonly number[]): number[] => {
    const solution = given.slice(0, p)
    for (let i = p - 1; i >= 0; i -= 1) {
      let rest = solution[i] ?? 0
      for (let k = i + 1; k < p; k += 1) rest -= r(i, k) * (solution[k] ?? 0)
      solution[i] = rest / r(i, i)
    }
    return solution
  }
  return {
    solve(target) {
      const rotated = [...target]
      reflectors.forEach((reflector, k) => reflect(rotated, reflector, k))
      return backSubstitute(rotated)
    },
    inverseOfRtR() {
      const inverse = Array.from({ length: p }, (_, k) => backSubstitute(Array.from({ length: p }, (__, i) => (i === k ? 1 : 0))))
      return Array.from({ length: p }, (_, i) => Array.from({ length: p }, (__, l) => sum(inverse.map((column) => (column[i] ?? 0) * (column[l] ?? 0)))))
    },
  }
}

function reflect(vector: number[], reflector: readonly number[], from: number): void {
  let projection = 0
  for (let i = from; i < vector.length; i += 1) projection += (vector[i] ?? 0) * (reflector[i] ?? 0)
  for (let i = from; i < vector.length; i += 1) vector[i] = (vector[i] ?? 0) - 2 * projection * (reflector[i] ?? 0)
}
