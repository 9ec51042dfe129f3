// What every stage returns: a value or none, and everything it noticed on the way. No value means at least one error.
import type { Diagnostic } from './diagnostic.ts'

export interface StageResult<T> {
  readonly value: T | undefined
  readonly diagnostics: readonly Diagnostic[]
}

export function hasErrors(diagnostics: readonly Diagnostic[]): boolean {
  return diagnostics.some((each) => each.severity === 'error')
}
