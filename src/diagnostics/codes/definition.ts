// Codes of the definition stage: severity and one sentence of help each.
import type { CodeEntry } from './entry.ts'

export const definitionCodes = {
} as const satisfies Record<string, CodeEntry>
