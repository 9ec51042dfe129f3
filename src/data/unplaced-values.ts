// Values of a dataset → those without a level, where others have one. A line of means under a table does this; as a level of its own it would
// be computed with.
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { Observation, SourceRow } from './dataset.ts'
import { holdsValue } from './observations.ts'

export function unplacedValues(observations: readonly Observation[], rows: readonly SourceRow[]): readonly Diagnostic[] {
  const values = observations.filter((each) => each.excluded === undefined && each.fields['level'] !== undefined && holdsValue(each))
  const unplaced = new Map(values.filter((each) => each.fields['level']?.kind === 'missing').map((each) => [each.row, each]))
  // A column that is empty throughout says nothing of any value: blanks share the columns of standards.
  if (values.every((each) => each.fields['level']?.kind === 'missing')) return []
  return [...unplaced.values()].map((each) => diagnostic('data/empty-level', `Line ${rows[each.row]?.line ?? 0} of \`${rows[each.row]?.file ?? ''}\` holds a value and no level`, {
    place: each.fields['level']?.place, actual: 'an empty cell', expected: 'the level the value belongs to', mend: 'Fill the cell; keep lines of means and other kinds of rows out by `rows:`, or exclude the row with a reason',
  }))
}
