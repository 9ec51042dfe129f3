// Where something stands in a file the user gave us. Lines and columns count from 1; `file` is relative to the study's folder, with `/`.

export interface Place {
  readonly file: string
  readonly sheet?: string | undefined
  readonly line?: number | undefined
  readonly column?: number | undefined
  /** How many characters the code frame underlines. */
  readonly length?: number | undefined
  /** Spreadsheet address, such as `B7`. */
  readonly cell?: string | undefined
}

/** A value that remembers where it was written. */
export interface Located<T> {
  readonly value: T
  readonly place: Place
}
