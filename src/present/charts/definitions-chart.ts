// Several definitions of one limit side by side; filled marks govern. Logarithmic when the values span more than two decades.
import type { Chart } from '../document.ts'
import type { ChartWidth, LabelledValue } from './chart-input.ts'

export interface DefinitionsChartInput {
  readonly xTitle: string
  readonly items: readonly { readonly label: string; readonly value: number; readonly kind: string; readonly governing?: boolean | undefined }[]
  readonly lines: readonly LabelledValue[]
  readonly width?: ChartWidth | undefined
}

export function definitionsChart(input: DefinitionsChartInput): Chart {
  throw new Error(`to come: ${input.width ?? ''}`)
}
