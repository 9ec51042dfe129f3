// The noncentral t distribution, by fixed Gauss-Legendre panels over the density of s/σ, so that the same digits come out everywhere.
import gammaln from '@stdlib/math-base-special-gammaln'
import { chiSquareQuantile, normalCdf, studentQuantile } from './distributions.ts'

const panels = 24 // against fixtures/certified/reference-noncentral-student: 16 leave 1e-13 at df = 1, 24 leave rounding only
const nodes = gaussLegendre(32)

/** P(T ≤ t) for noncentrality delta. Throws outside df > 0 and finite arguments. Source: Owen, Technometrics 10 (1968) 445 (T as a normal over an independent s/σ). */
export function noncentralStudentCdf(t: number, df: number, delta: number): number {
  if (!(df > 0) || !Number.isFinite(t) || !Number.isFinite(delta)) throw new RangeError('the noncentral t probability has no value for these arguments')
  const low = Math.sqrt(chiSquareQuantile(1e-17, df) / df)
  const high = Math.sqrt((df + 90 + 12 * Math.sqrt(2 * df)) / df)
  const constant = Math.log(2) + (df / 2) * Math.log(df / 2) - gammaln(df / 2)
  const over = (from: number, to: number): number => {
    const width = (to - from) / panels
    let total = 0
    for (let panel = 0; panel < panels; panel += 1) {
      const centre = from + (panel + 0.5) * width
      for (const node of nodes) {
        const s = centre + (node.x * width) / 2
        const density = Math.exp(constant + (df - 1) * Math.log(s) - (df * s * s) / 2)
        total += ((node.weight * width) / 2) * density * normalCdf(t * s - delta)
      }
    }
    return total
  }
  // The normal steps from 0 to 1 within 9/|t| around s = delta/t; where that is narrow, it gets panels of its own.
  const edges = [low, (delta - 9) / t, (delta + 9) / t, high].map((edge) => Math.min(high, Math.max(low, edge))).sort((left, right) => left - right)
  const steep = 18 / Math.abs(t) < (high - low) / 3
  const total = steep ? edges.slice(1).reduce((sum, edge, k) => sum + over(edges[k] ?? low, edge), 0) : over(low, high)
  return Math.min(1, Math.max(0, total))
}

/**
 * The noncentrality at which the critical value t(1 − alpha) is missed with probability beta. Throws unless 0 < alpha, 0 < beta and
 * alpha + beta < 1: with more, nothing is detected better than by tossing a coin. Source: ISO 11843-2:2000, clause 5.
 */
export function noncentralStudentDelta(df: number, alpha: number, beta: number): number {
  if (!(df > 0 && alpha > 0 && beta > 0 && alpha + beta < 1)) throw new RangeError('error rates must be above zero and below one together')
  const key = `${df}/${alpha}/${beta}`
  const delta = known.get(key) ?? solveDelta(df, alpha, beta)
  known.set(key, delta)
  return delta
}

/** Hundreds of measurands share one design; a solution costs ten milliseconds and depends on nothing but its arguments. */
const known = new Map<string, number>()

function solveDelta(df: number, alpha: number, beta: number): number {
  const critical = studentQuantile(1 - alpha, df)
  let [low, high] = [0, 2 * critical + 10]
  // With one or two degrees of freedom and small rates the noncentrality is far beyond twice the critical value.
  while (noncentralStudentCdf(critical, df, high) > beta) high *= 2
  for (let step = 0; step < 200 && high - low > 1e-14 * high; step += 1) {
    const middle = (low + high) / 2
    if (noncentralStudentCdf(critical, df, middle) > beta) low = middle
    else high = middle
  }
  return (low + high) / 2
}

function gaussLegendre(count: number): readonly { readonly x: number; readonly weight: number }[] {
  return Array.from({ length: count }, (_, index) => {
    let x = Math.cos((Math.PI * (index + 0.75)) / (count + 0.5))
    let slope = 1
    for (let step = 0; step < 100; step += 1) {
      let [before, now] = [1, x]
      for (let k = 2; k <= count; k += 1) [before, now] = [now, ((2 * k - 1) * x * now - (k - 1) * before) / k]
      slope = (count * (x * now - before)) / (x * x - 1)
      const shift = now / slope
      x -= shift
      if (Math.abs(shift) < 1e-16) break
    }
    return { x, weight: 2 / ((1 - x * x) * slope * slope) }
  })
}
