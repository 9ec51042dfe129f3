// Values at each level (recoveries, biases) with mean and interval against acceptance limits.
import type { Chart } from '../document.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'

export interface LevelIntervalChartInput {
  readonly xTitle: string
  readonly yTitle: string
  readonly points: readonly { readonly level: string; readonly value: number; readonly series?: string | undefined }[]
  readonly excluded: readonly { readonly level: string; readonly value: number; readonly label: string }[]
  readonly means: readonly { readonly level: string; readonly mean: number; readonly low?: number | undefined; readonly high?: number | undefined }[]
  readonly limits: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function levelIntervalChart(input: LevelIntervalChartInput): Chart {
  throw new Error(`to come: ${input.width ?? ''}`)
}
