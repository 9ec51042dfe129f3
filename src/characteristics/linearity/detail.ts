// What the exhibits of linearity are made of: plain numbers, all finite.
import type { FitKind, WeightKind } from './options.ts'

export interface Coefficient {
  readonly name: 'intercept' | 'slope' | 'curvature'
  readonly value: number
  readonly standardError: number
  readonly low: number
  readonly high: number
}

export interface StandardPoint {
  readonly level: number
  readonly response: number
  readonly fitted: number
  readonly residual: number
  /** Back-calculated level and its error in percent; absent where there is no root, or the level is zero. */
  readonly found?: number
  readonly error?: number
  readonly run?: string
}

export interface LevelLine {
  readonly level: number
  readonly n: number
  readonly meanResponse: number
  readonly meanError?: number
  /** Error of the standard furthest off, signed. */
  readonly worstError?: number
}

export interface WeightCandidate {
  readonly weights: WeightKind
  readonly chosen: boolean
  /** Why it cannot be computed; the figures are then absent. */
  readonly impossible?: string
  readonly sumOfErrors?: number
  readonly largestError?: number
  readonly relativeStandardError?: number
  readonly lowestLevelError?: number
}

export interface FTest {
  readonly F: number
  readonly df1: number
  readonly df2: number
  readonly probability: number
}

export interface LinearityDetail {
  readonly fit: FitKind
  readonly weights: WeightKind
  readonly n: number
  readonly df: number
  readonly coefficients: readonly Coefficient[]
  readonly residualStandardDeviation: number
  readonly rSquared?: number
  readonly correlation?: number
  /** Lowest and highest level: results are read inside only. */
  readonly range: { readonly low: number; readonly high: number }
  readonly points: readonly StandardPoint[]
  readonly excluded: readonly { readonly level: number; readonly response: number; readonly exclusion: number }[]
  readonly levels: readonly LevelLine[]
  readonly line: readonly { readonly x: number; readonly y: number }[]
  readonly band: readonly { readonly x: number; readonly low: number; readonly high: number }[]
  readonly candidates: readonly WeightCandidate[]
  readonly lackOfFit?: FTest & { readonly largestDeviation?: number }
  readonly lackOfFitAbsent?: string
  readonly mandel?: FTest & { readonly curvature: number }
  readonly mandelAbsent?: string
  readonly interceptRelative?: { readonly level: number; readonly value: number; readonly low: number; readonly high: number }
  readonly straightTo?: { readonly level: number; readonly highest: number; readonly probability: number }
  readonly topSensitivity?: number
  readonly runs: readonly { readonly run: string; readonly n: number; readonly slope: number; readonly intercept: number; readonly residualStandardDeviation: number }[]
  /** Runs that cannot be fitted on their own; their standards stay in the common fit. */
  readonly runsLeftOut: readonly { readonly run: string; readonly n: number; readonly because: string }[]
  readonly slopeRsdBetweenRuns?: number
}
