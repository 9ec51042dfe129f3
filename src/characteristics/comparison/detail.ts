// What the exhibits of a comparison are made of: plain numbers, all finite.

export interface ConditionLine {
  readonly condition: string
  readonly n: number
  readonly mean: number
  /** Absent for a single reading. */
  readonly standardDeviation?: number
  readonly low?: number
  readonly high?: number
}

export interface EffectLine {
  readonly condition: string
  readonly method: string
  readonly difference: number
  readonly standardError: number
  readonly df: number
  readonly t: number
  readonly probability: number
  readonly low: number
  readonly high: number
  /** Confidence of the interval. */
  readonly confidence: number
  /** In percent of the mean of the reference. */
  readonly relative?: number
}

export interface EquivalenceLine {
  readonly condition: string
  readonly lowerT: number
  readonly lowerProbability: number
  readonly upperT: number
  readonly upperProbability: number
  readonly probability: number
}

export interface SpreadLine {
  readonly test: string
  readonly condition?: string
  readonly F: number
  readonly df1: number
  readonly df2: number
  readonly probability: number
}

export interface ComparisonDetail {
  readonly design: 'replicates' | 'alternating blocks' | 'pairs'
  readonly question: 'difference' | 'equivalence'
  readonly reference: string
  readonly margin?: number
  /** Probability below which a one-sided test shows equivalence. */
  readonly alpha: number
  readonly conditions: readonly ConditionLine[]
  /** Did the data say in which order the readings were made? Otherwise `order` is that of the file. */
  readonly orderIsKnown: boolean
  readonly readings: readonly { readonly order: number; readonly value: number; readonly condition: string }[]
  readonly excluded: readonly { readonly value: number; readonly condition: string; readonly exclusion: number }[]
  /** First the deciding analysis for each condition, then what stands beside it. */
  readonly effects: readonly EffectLine[]
  readonly besides: readonly EffectLine[]
  readonly equivalence: readonly EquivalenceLine[]
  readonly spreads: readonly SpreadLine[]
  readonly blocks: readonly { readonly block: string; readonly condition: string; readonly order: number; readonly n: number; readonly mean: number }[]
  readonly drift?: { readonly value: number; readonly standardError: number }
}
