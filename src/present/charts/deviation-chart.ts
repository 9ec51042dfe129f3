// Deviations from what was expected (residuals, errors of back-calculated levels) against the level, about a zero line.
import type { Chart } from '../document.ts'
import type { ChartWidth, LabelledPoint, LabelledValue, SeriesPoint } from './chart-input.ts'

export interface DeviationChartInput {
  readonly xTitle: string
  readonly yTitle: string
  readonly points: readonly SeriesPoint[]
  readonly excluded: readonly LabelledPoint[]
  readonly limits: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function deviationChart(input: DeviationChartInput): Chart {
  throw new Error(`to come: ${input.width ?? ''}`)
}
