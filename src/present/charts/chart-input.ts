// What the charts take in common: points, labelled values, the two widths.
export interface SeriesPoint {
  readonly x: number
  readonly y: number
  readonly series?: string | undefined
}

export interface LabelledPoint {
  readonly x: number
  readonly y: number
  readonly label: string
}

export interface LabelledValue {
  readonly value: number
  readonly label: string
}

/** `full` is the text width of a page (165 mm); two of `half` (80 mm) stand side by side. */
export type ChartWidth = 'full' | 'half'
