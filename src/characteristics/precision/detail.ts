// What the exhibits of precision are made of: plain numbers, all finite.

export interface SpreadEstimate {
  readonly value: number
  readonly low: number
  readonly high: number
  readonly df: number
  /** In percent of the mean; absent when the mean is zero. */
  readonly relative?: number
}

export interface ComponentLine {
  readonly component: string
  /** Variance as estimated, which may be negative, and as used. */
  readonly raw: number
  readonly variance: number
  readonly standardDeviation: number
  readonly share: number
}

export interface AnovaLine {
  readonly source: string
  readonly df: number
  readonly sumOfSquares: number
  readonly meanSquare: number
}

export interface RunLine {
  readonly run: string
  readonly values: readonly number[]
  readonly mean: number
}

export interface PrecisionLevel {
  readonly level?: number
  readonly n: number
  readonly mean: number
  readonly runs: readonly RunLine[]
  readonly excluded: readonly { readonly run: string; readonly value: number; readonly exclusion: number }[]
  readonly repeatability: SpreadEstimate
  readonly intermediate?: SpreadEstimate & { readonly satterthwaiteDf: number; readonly satterthwaiteLow: number; readonly satterthwaiteHigh: number; readonly intervalMethod: string }
  readonly betweenRuns?: number
  readonly components: readonly ComponentLine[]
  readonly anova: readonly AnovaLine[]
  readonly n0?: number
  readonly truncated: boolean
  readonly horwitz?: { readonly massFraction: number; readonly predicted: number; readonly ratioRepeatability: number; readonly ratioIntermediate?: number }
}

export interface PrecisionDetail {
  readonly runFields: readonly string[]
  readonly isNested: boolean
  readonly levels: readonly PrecisionLevel[]
  readonly confounded: readonly string[]
}
