// Codes of the data stage: severity and one sentence of help each.
import type { CodeEntry } from './entry.ts'

export const dataCodes = {
} as const satisfies Record<string, CodeEntry>
