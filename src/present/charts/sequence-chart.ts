// Results in the order they were measured, conditions told apart, with the line of the model where there is one.
import type { Chart } from '../document.ts'
import type { ChartWidth } from './chart-input.ts'

export interface SequenceChartInput {
  readonly orderTitle: string
  readonly yTitle: string
  readonly points: readonly { readonly order: number; readonly value: number; readonly condition: string }[]
  readonly line?: readonly { readonly order: number; readonly value: number; readonly condition: string }[] | undefined
  readonly width?: ChartWidth | undefined
}

export function sequenceChart(input: SequenceChartInput): Chart {
  throw new Error(`to come: ${input.width ?? ''}`)
}
