// Verdicts of many rows by column as tiles with a mark and a tone, so that the few that need attention stand out.
import type { Chart } from '../document.ts'
import type { ChartWidth } from './chart-input.ts'

export interface HeatTableInput {
  readonly rowTitle: string
  readonly cells: readonly { readonly row: string; readonly column: string; readonly word: string }[]
  readonly width?: ChartWidth | undefined
}

export function heatTable(input: HeatTableInput): Chart {
  throw new Error(`to come: ${input.width ?? ''}`)
}
