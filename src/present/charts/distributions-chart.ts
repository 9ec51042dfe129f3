// Density curves that the caller computed, told apart by line style, with the values that divide them.
import type { Chart } from '../document.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'

export interface DistributionsChartInput {
  readonly xTitle: string
  readonly curves: readonly { readonly name: string; readonly points: readonly { readonly x: number; readonly density: number }[] }[]
  readonly lines: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function distributionsChart(input: DistributionsChartInput): Chart {
  throw new Error(`to come: ${input.width ?? ''}`)
}
