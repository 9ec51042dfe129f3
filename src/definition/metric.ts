// What a characteristic says of a number it may find, so that criteria can be read and checked before any data are.

export type MetricUnit = 'measurand' | 'response' | 'response per measurand' | 'percent' | 'none'

export interface Metric {
  /** Printed name, lower case, such as `repeatability relative standard deviation`. */
  readonly label: string
  readonly unit: MetricUnit
  /** Criteria judge the absolute value (a signed error held to "at most 15 %"). */
  readonly magnitude?: true
  /** One sentence for the published schema. */
  readonly help: string
}
