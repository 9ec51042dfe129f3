// Formulas of lower limits, as plain numbers: critical and minimum detectable values, and the method detection limit of 40 CFR 136.
// Which of them governs, and what it is called, is decided elsewhere.
import { mean, standardDeviation } from './describe.ts'
import { studentQuantile } from './distributions.ts'
import { noncentralStudentDelta } from './noncentral-student.ts'
import { fitPolynomial } from './regression.ts'

/** Critical value of a net signal: t(1 − α)·s·factor. Throws without a degree of freedom. Source: Currie, Pure Appl. Chem. 67 (1995) 1699. */
export function currieCriticalValue(spread: number, df: number, alpha: number, factor: number): number {
  return studentQuantile(1 - alpha, df) * spread * factor
}

/** Minimum detectable value of a net signal: δ(α, β, df)·s·factor. Throws unless α + β < 1. Source: as above. */
export function currieMinimumDetectable(spread: number, df: number, alpha: number, beta: number, factor: number): number {
  return noncentralStudentDelta(df, alpha, beta) * spread * factor
}

export interface CapabilityOfDetection {
  readonly criticalResponse: number
  readonly criticalValue: number
  readonly minimumDetectable: number
  readonly delta: number
  readonly df: number
  readonly slope: number
  readonly intercept: number
  readonly residualStandardDeviation: number
}

/**
 * Critical and minimum detectable net concentration from a straight calibration of constant scatter, K measurements of the sample.
 * Throws without slope, and unless α + β < 1. Source: ISO 11843-2:2000, clause 5.2.
 */
export function iso11843({ x, y }: { readonly x: readonly number[]; readonly y: readonly number[] }, replicates: number, alpha: number, beta: number): CapabilityOfDetection {
  const fit = fitPolynomial({ x, y, degree: 1 })
  const [intercept = 0, slope = 0] = fit.coefficients
  if (slope === 0) throw new RangeError('the calibration has no slope')
  const spread = fit.residualStandardDeviation * Math.sqrt(1 / replicates + 1 / fit.n + fit.meanX ** 2 / fit.sumOfSquaresX)
  const t = studentQuantile(1 - alpha, fit.df)
  const delta = noncentralStudentDelta(fit.df, alpha, beta)
  return {
    criticalResponse: intercept + t * spread, criticalValue: (t * spread) / Math.abs(slope), minimumDetectable: (delta * spread) / Math.abs(slope), delta,
    df: fit.df, slope, intercept, residualStandardDeviation: fit.residualStandardDeviation,
  }
}

export type BlankRule = 'no blank gives a number' | 'highest blank' | 'mean plus t s' | '99th percentile'

export interface MethodDetectionLimit {
  readonly spikes: { readonly n: number; readonly mean: number; readonly standardDeviation: number; readonly t: number; readonly limit: number }
  readonly blanks: { readonly n: number; readonly numeric: number; readonly rule: BlankRule; readonly mean?: number; readonly standardDeviation?: number; readonly t?: number; readonly limit?: number }
  readonly limit: number
}

/**
 * The method detection limit from spikes and blanks; `undefined` is a blank that gave no number. The mean of the blanks counts as zero
 * when negative; negative blanks stay. From 100 blanks on the limit of the blanks is their 99th percentile, blanks without a number
 * ranking lowest. Throws below two spikes. Source: 40 CFR 136, appendix B, revision 2 (2017), sections 2 and 4.
 */
export function mdl({ spikes, blanks }: { readonly spikes: readonly number[]; readonly blanks: readonly (number | undefined)[] }): MethodDetectionLimit {
  const spikeT = studentQuantile(0.99, spikes.length - 1)
  const spikeSpread = standardDeviation(spikes)
  const ofSpikes = { n: spikes.length, mean: mean(spikes), standardDeviation: spikeSpread, t: spikeT, limit: spikeT * spikeSpread }
  const ofBlanks = limitOfBlanks(blanks)
  return { spikes: ofSpikes, blanks: ofBlanks, limit: Math.max(ofSpikes.limit, ofBlanks.limit ?? 0) }
}

function limitOfBlanks(blanks: readonly (number | undefined)[]): MethodDetectionLimit['blanks'] {
  const numeric = blanks.filter((value) => value !== undefined)
  const counted = { n: blanks.length, numeric: numeric.length }
  if (numeric.length === 0) return { ...counted, rule: 'no blank gives a number' }
  const ranked = blanks.length >= 100 ? percentile99(numeric, blanks.length) : undefined
  if (ranked !== undefined) return { ...counted, rule: '99th percentile', limit: ranked }
  if (numeric.length < blanks.length) return { ...counted, rule: 'highest blank', limit: numeric.reduce((highest, value) => Math.max(highest, value)) }
  const [centre, spread, t] = [mean(numeric), standardDeviation(numeric), studentQuantile(0.99, numeric.length - 1)]
  return { ...counted, rule: 'mean plus t s', mean: centre, standardDeviation: spread, t, limit: Math.max(0, centre) + t * spread }
}

/** The blank at rank n × 0.99, rounded to the nearest rank; undefined when that blank gave no number. */
function percentile99(numeric: readonly number[], n: number): number | undefined {
  const fromTop = n - Math.round(n * 0.99)
  return [...numeric].sort((left, right) => right - left)[fromTop]
}
