// Single values by group (run, day, analyst, instrument) with group means, and one panel a level where there are several.
import type { Chart } from '../document.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'

export interface GroupedValuesChartInput {
  readonly groupTitle: string
  readonly yTitle: string
  readonly values: readonly { readonly group: string; readonly value: number; readonly series?: string | undefined; readonly panel?: string | undefined }[]
  readonly excluded: readonly { readonly group: string; readonly value: number; readonly label: string; readonly panel?: string | undefined }[]
  readonly means: readonly { readonly group: string; readonly mean: number; readonly panel?: string | undefined }[]
  readonly overall?: number | undefined
  readonly limits: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function groupedValuesChart(input: GroupedValuesChartInput): Chart {
  throw new Error(`to come: ${input.width ?? ''}`)
}
