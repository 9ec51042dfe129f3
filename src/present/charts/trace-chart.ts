// A signal trace with the windows it was read in and the values read from it. No smoothing: every point is drawn.
import type { Chart } from '../document.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'

export interface TraceChartInput {
  readonly xTitle: string
  readonly yTitle: string
  readonly points: readonly { readonly x: number; readonly y: number }[]
  readonly windows: readonly { readonly from: number; readonly to: number; readonly label: string }[]
  readonly lines: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function traceChart(input: TraceChartInput): Chart {
  throw new Error(`to come: ${input.width ?? ''}`)
}
