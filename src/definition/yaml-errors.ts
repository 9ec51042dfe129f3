// An error code of the YAML reader → a diagnostic in our words: what stands there, what was expected, how to mend it.
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { Place } from '../diagnostics/place.ts'

/** `found` is the character at the place, where that helps. */
export function explainYamlError(code: string, place: Place, found: string): Diagnostic {
  const here = found.trim() === '' ? 'end of the line' : `\`${found}\``
  const unreadable = (message: string, expected: string, mend: string): Diagnostic => diagnostic('definition/not-yaml', message, { place, expected, mend })
  switch (code) {
    case 'TAB_AS_INDENT':
      return diagnostic('definition/tab', 'Unexpected tab', { place, actual: 'a tab', expected: 'spaces', mend: 'Replace the tab by spaces' })
    case 'TAG_RESOLVE_FAILED':
      return diagnostic('definition/yaml-feature', 'Unexpected tag', { place, expected: 'plain YAML: keys, lists and texts, each written out', mend: 'Remove the tag; put a text into quotes instead' })
    case 'BAD_INDENT':
      return unreadable('Unexpected indentation', 'lines of one level that begin in the same column, and brackets that are closed', 'Align the line with its neighbours, or close a bracket that is open above')
    case 'MISSING_CHAR':
      return unreadable('Unexpected end: a quote or a bracket is still open, or a comma is missing', 'a closing quote or bracket', 'Close what was opened, here or above')
    case 'BLOCK_AS_IMPLICIT_KEY': case 'MULTILINE_IMPLICIT_KEY': case 'BLOCK_IN_FLOW':
      return unreadable('Unexpected second colon in one line', '`key: value`', 'Put a text that holds a colon into quotes, or begin a new line')
    case 'BAD_SCALAR_START':
      return unreadable(`Unexpected ${here} at the beginning of a text`, 'a letter or a digit', 'Put the text into quotes')
    case 'BAD_DQ_ESCAPE':
      return unreadable('Unexpected escape in double quotes', 'an escape that YAML knows, or single quotes', 'Write single quotes around a text with a backslash')
    default:
      return unreadable(`Unexpected ${here}`, '`key: value`, a list or a text', 'Correct the line; a text with a colon, a number sign or brackets needs quotes')
  }
}
