// Responses against levels with the fitted line and its band: the picture of a calibration. The band is drawn only where the caller computed it.
import type { Chart } from '../document.ts'
import type { ChartWidth, LabelledPoint, SeriesPoint } from './chart-input.ts'

export interface ResponseChartInput {
  readonly xTitle: string
  readonly yTitle: string
  readonly points: readonly SeriesPoint[]
  readonly excluded: readonly LabelledPoint[]
  readonly line: readonly { readonly x: number; readonly y: number }[]
  readonly band?: readonly { readonly x: number; readonly low: number; readonly high: number }[] | undefined
  readonly width?: ChartWidth | undefined
}

export function responseChart(input: ResponseChartInput): Chart {
  throw new Error(`to come: ${input.width ?? ''}`)
}
