// What the exhibits of accuracy are made of: plain numbers, all finite.

export interface PreparationLine {
  readonly level?: number
  readonly found: number
  /** Added amount or reference value. */
  readonly target: number
  readonly native?: number
  /** Recovery in percent, or bias in the unit of results. */
  readonly value: number
  readonly sample: string
}

export interface AccuracyLevel {
  readonly level?: number
  readonly n: number
  readonly mean: number
  readonly standardDeviation?: number
  readonly low?: number
  readonly high?: number
  readonly df?: number
  readonly intervalMethod?: string
  /** Relative standard deviation of recoveries, or relative bias, in percent. */
  readonly relative?: number
}

export interface AccuracyDetail {
  readonly mode: 'recovery' | 'bias'
  readonly nativeCorrected: boolean
  readonly preparations: readonly PreparationLine[]
  readonly excluded: readonly { readonly level?: number; readonly found: number; readonly value: number; readonly exclusion: number }[]
  readonly levels: readonly AccuracyLevel[]
  readonly overall?: AccuracyLevel
  /** Do the levels agree? One-way analysis of variance of the values by level. */
  readonly agreement?: { readonly F: number; readonly df1: number; readonly df2: number; readonly probability: number; readonly agree: boolean }
}
