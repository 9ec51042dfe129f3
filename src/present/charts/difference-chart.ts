// Differences (or effects) with their intervals against a margin: whether the whole interval lies inside is seen at a glance.
import type { Chart } from '../document.ts'
import type { ChartWidth } from './chart-input.ts'

export interface DifferenceChartInput {
  readonly xTitle: string
  readonly items: readonly { readonly label: string; readonly estimate: number; readonly low: number; readonly high: number }[]
  readonly margins?: { readonly low: number; readonly high: number; readonly label: string } | undefined
  /** Draw a line at zero. */
  readonly zero?: boolean | undefined
  readonly width?: ChartWidth | undefined
}

export function differenceChart(input: DifferenceChartInput): Chart {
  throw new Error(`to come: ${input.width ?? ''}`)
}
