// Components (of variance, of uncertainty, of an effect) as horizontal bars with their intervals.
import type { Chart } from '../document.ts'
import type { ChartWidth } from './chart-input.ts'

export interface ComponentBarsChartInput {
  readonly xTitle: string
  readonly bars: readonly { readonly component: string; readonly value: number; readonly low?: number | undefined; readonly high?: number | undefined }[]
  readonly width?: ChartWidth | undefined
}

export function componentBarsChart(input: ComponentBarsChartInput): Chart {
  throw new Error(`to come: ${input.width ?? ''}`)
}
