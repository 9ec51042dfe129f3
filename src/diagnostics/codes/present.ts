// Codes of the present stage: severity and one sentence of help each.
import type { CodeEntry } from './entry.ts'

export const presentCodes = {
} as const satisfies Record<string, CodeEntry>
