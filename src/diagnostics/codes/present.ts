// Codes of the present stage: severity and one sentence of help each.
import type { CodeEntry } from './entry.ts'

export const presentCodes = {
  'present/unknown-template': { severity: 'error', help: 'The study names a template that does not exist' },
  'present/unknown-directive': { severity: 'error', help: 'A template names a directive that the program does not know' },
  'present/missing-directive': { severity: 'error', help: 'A template leaves out what a report cannot be signed without' },
  'present/unprinted-text': { severity: 'error', help: 'A text of the study would be printed nowhere' },
  'present/unknown-value': { severity: 'error', help: 'A template asks for a value that the record does not hold' },
  'present/unprintable-block': { severity: 'error', help: 'A template holds a kind of block that no report prints, such as HTML' },
  'present/typed-number': { severity: 'warning', help: 'A number typed by hand in a template stands beside a unit; it will not follow the data' },
  'present/unprintable-character': { severity: 'error', help: 'No font of the report has this character' },
} as const satisfies Record<string, CodeEntry>
