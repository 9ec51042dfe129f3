// What the table of codes says about one code.

export interface CodeEntry {
  readonly severity: 'error' | 'warning' | 'note'
  /** One sentence for a person who meets this code for the first time. */
  readonly help: string
}
