// One thing wrong (or worth knowing) in the user's files, as data: printing is somebody else's work.
// A missed acceptance criterion is never a diagnostic, it is a verdict.
import type { Place } from './place.ts'
import { codes, type Code } from './codes.ts'

export type Severity = 'error' | 'warning' | 'note'

export interface Diagnostic {
  readonly code: Code
  readonly severity: Severity
  /** "Unexpected X" in one short sentence without full stop; what was typed stands in back-ticks. */
  readonly message: string
  readonly place?: Place | undefined
  /** What was found, as written. */
  readonly actual?: string | undefined
  readonly expected?: string | undefined
  /** What to type or do, in the imperative. */
  readonly mend?: string | undefined
  readonly related?: readonly { readonly message: string; readonly place: Place }[] | undefined
}

export interface DiagnosticDetails {
  readonly place?: Place | undefined
  readonly actual?: string | undefined
  readonly expected?: string | undefined
  readonly mend?: string | undefined
  readonly related?: readonly { readonly message: string; readonly place: Place }[] | undefined
}

/** The severity comes from the closed table of codes, so one code never has two. */
export function diagnostic(code: Code, message: string, details: DiagnosticDetails = {}): Diagnostic {
  return { code, severity: codes[code].severity, message, ...details }
}
