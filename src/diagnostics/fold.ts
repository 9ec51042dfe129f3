// Many diagnostics of one kind → one that stands for all. Folding is for reading only: the record and the JSON keep every one.
import type { Diagnostic } from './diagnostic.ts'

const most = 5 // this many of a kind are still told one by one; more hide the other kinds

export interface FoldedDiagnostic {
  readonly diagnostic: Diagnostic
  /** The others of its kind, in order; empty when it stands alone. */
  readonly others: readonly Diagnostic[]
}

export function foldDiagnostics(diagnostics: readonly Diagnostic[]): readonly FoldedDiagnostic[] {
  const kinds = new Map<string, Diagnostic[]>()
  for (const each of diagnostics) {
    const kind = kindOf(each)
    const known = kinds.get(kind)
    if (known === undefined) kinds.set(kind, [each])
    else known.push(each)
  }
  return diagnostics.flatMap((diagnostic): readonly FoldedDiagnostic[] => {
    const same = kinds.get(kindOf(diagnostic)) ?? []
    if (same.length <= most) return [{ diagnostic, others: [] }]
    return same[0] === diagnostic ? [{ diagnostic, others: same.slice(1) }] : []
  })
}

/** Code and message without what was typed in it: back-ticked texts and numbers. */
function kindOf(each: Diagnostic): string {
  return `${each.code} ${each.message.replace(/`[^`]*`/g, '`…`').replace(/\d+/g, '0')}`
}
