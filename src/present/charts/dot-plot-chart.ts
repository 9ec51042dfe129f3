// Every single value on one axis, a row a group; values known only as below or above a bound are arrows, never dots.
import type { Chart } from '../document.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'

export interface DotPlotChartInput {
  readonly xTitle: string
  readonly dots: readonly { readonly group: string; readonly value: number }[]
  readonly censored: readonly { readonly group: string; readonly bound: number; readonly direction: 'below' | 'above' }[]
  readonly lines: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function dotPlotChart(input: DotPlotChartInput): Chart {
  throw new Error(`to come: ${input.width ?? ''}`)
}
