// Codes of the data stage: severity and one sentence of help each.
import type { CodeEntry } from './entry.ts'

export const dataCodes = {
  'data/empty-file': { severity: 'error', help: 'A raw file holds nothing' },
  'data/not-text': { severity: 'error', help: 'A raw file is no text, or in another encoding than declared' },
  'data/too-long': { severity: 'error', help: 'A raw file or a line of it is longer than any table of a study' },
  'data/ambiguous-delimiter': { severity: 'error', help: 'More than one delimiter would fit the file' },
  'data/ambiguous-decimal': { severity: 'error', help: 'A number could be read in two ways that differ a thousandfold' },
  'data/mixed-decimal': { severity: 'error', help: 'One file holds decimal points and decimal commas' },
  'data/broken-row': { severity: 'error', help: 'A row has another number of cells than the headings, or a quote is not closed' },
  'data/no-header': { severity: 'error', help: 'No row holds the headings that the study maps' },
  'data/missing-column': { severity: 'error', help: 'A mapped column is not in the file' },
  'data/repeated-heading': { severity: 'error', help: 'A mapped heading stands over two columns' },
  'data/no-rows': { severity: 'error', help: 'No row is left after the selection' },
  'data/not-a-number': { severity: 'error', help: 'A text stands where a number is needed' },
  'data/unit-in-cell': { severity: 'error', help: 'A number carries a unit or percent sign in its cell' },
  'data/repeated-row': { severity: 'error', help: 'Two rows are equal in every cell' },
  'data/repeated-key': { severity: 'error', help: 'Two rows hold a value for one and the same reading' },
  'data/fixed-column': { severity: 'error', help: 'A field is stated for a whole file and stands in one of its columns too' },
  'data/spreadsheet-error': { severity: 'error', help: 'A cell holds an error of a spreadsheet instead of a value' },
  'data/empty-level': { severity: 'error', help: 'A value has no level, where others of its dataset have one' },
  'data/unknown-measurand': { severity: 'note', help: 'Rows name a measurand that the study does not hold; they are listed as not used' },
  'data/unmatched-exclusion': { severity: 'error', help: 'An exclusion does not match the rows it says' },
  'data/odd-character': { severity: 'note', help: 'Cells hold no-break spaces, typographic dashes or invisible characters, which were read as plain ones' },
  'data/preamble': { severity: 'note', help: 'Lines before the headings were skipped' },
  'data/encoding': { severity: 'note', help: 'The encoding was found out from the bytes' },
} as const satisfies Record<string, CodeEntry>
