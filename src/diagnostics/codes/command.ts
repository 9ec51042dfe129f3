// Codes of the command stage: severity and one sentence of help each.
import type { CodeEntry } from './entry.ts'

export const commandCodes = {
  'command/unreadable-file': { severity: 'error', help: 'A file the study names cannot be read' },
  'command/unknown-study': { severity: 'error', help: 'The study file cannot be read' },
  'command/outside-study': { severity: 'error', help: 'A path leaves the folder of the study' },
  'command/locked-dossier': { severity: 'error', help: 'Another run is writing to the same dossier' },
  'command/signed-revision': { severity: 'error', help: 'A signed revision is never written over' },
  'command/unwritable-output': { severity: 'error', help: 'The output folder cannot be written' },
} as const satisfies Record<string, CodeEntry>
