// Codes of the definition stage: severity and one sentence of help each.
import type { CodeEntry } from './entry.ts'

export const definitionCodes = {
  'definition/wrong-type': { severity: 'error', help: 'A key holds another kind of value than the study format asks for' },
  'definition/unknown-unit': { severity: 'error', help: 'A unit is not in the table of units' },
  'definition/unknown-choice': { severity: 'error', help: 'A key holds a word that is not among its choices' },
  'definition/missing-key': { severity: 'error', help: 'A key that the study needs is absent' },
  'definition/unknown-key': { severity: 'error', help: 'A key is not known at this place' },
} as const satisfies Record<string, CodeEntry>
