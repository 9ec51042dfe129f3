// Rows of a dataset → those that count one reading twice: a row copied in every cell, or a second value under the same names. Equal rows of
// few cells may be real and stay.
import type { DatasetSource } from '../definition/study.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { Place } from '../diagnostics/place.ts'
import { numberFields, tidied } from './cells.ts'
import type { CsvRow } from './split-rows.ts'
import type { Observation, SourceRow } from './dataset.ts'
import { holdsValue, valueFields } from './observations.ts'

const telling = 5 // filled cells from which a row equal in all of them is a copy; fewer can be a chance. Common practice, no source

/** `seen` lives as long as the dataset is read, so that a copy in another file is found too. `stated` are the values fixed for the file. */
export function copiedRows(rows: readonly CsvRow[], file: string, stated: string, seen: Map<string, Place>): readonly Diagnostic[] {
  const diagnostics: Diagnostic[] = []
  for (const row of rows) {
    const filled = row.cells.reduce((count, cell) => (cell === '' ? count : count + 1), 0)
    if (filled < telling) continue
    const key = `${stated}\u0000${row.cells.join('\u0000')}`
    const earlier = seen.get(key)
    if (earlier === undefined) {
      seen.set(key, { file, line: row.line, column: 1 })
      continue
    }
    diagnostics.push(diagnostic('data/repeated-row', `Line ${row.line} of \`${file}\` repeats line ${earlier.line ?? 0}${earlier.file === file ? '' : ` of \`${earlier.file}\``}`, {
      place: { file, line: row.line, column: 1 }, actual: row.cells.slice(0, 6).join(', '), expected: 'each reading once', mend: 'Remove the copy, or export a column that tells readings apart', related: [{ message: 'first here', place: earlier }],
    }))
  }
  return diagnostics
}

/**
 * Two values that agree in every name a reading has, among them one that tells readings apart: reprocessed rows counted twice do this.
 * What is averaged by `average:` is held apart where it is averaged.
 */
export function repeatedKeys(observations: readonly Observation[], rows: readonly SourceRow[], source: DatasetSource): readonly Diagnostic[] {
  const identity = source.average.length > 0 ? undefined : ['injection', ...(source.replicate === undefined ? ['replicate'] : []), 'order'].find((field) => field in source.columns)
  if (identity === undefined) return []
  const names = [...new Set([...Object.keys(source.columns), ...source.files.flatMap((file) => Object.keys(file.fixed))])].filter((field) => !(valueFields as readonly string[]).includes(field) && (!numberFields.has(field) || ['level', 'added', 'order'].includes(field)))
  const seen = new Map<string, Observation>()
  const diagnostics: Diagnostic[] = []
  for (const observation of observations) {
    if (observation.excluded !== undefined || !holdsValue(observation)) continue
    const own = observation.fields[identity]
    if (own === undefined || own.kind === 'missing') continue
    const file = identity === 'order' ? (rows[observation.row]?.file ?? '') : '' // a sequence starts anew in each file
    const key = [file, observation.measurand, ...names.map((name) => tidied(observation.fields[name]?.text ?? ''))].join('\u0000')
    const earlier = seen.get(key)
    if (earlier === undefined) {
      seen.set(key, observation)
      continue
    }
    const [place, first] = [placeOf(observation, rows), placeOf(earlier, rows)]
    diagnostics.push(diagnostic('data/repeated-key', `Line ${place.line ?? 0} and line ${first.line ?? 0} hold two values for one reading of \`${observation.measurand}\``, {
      place, actual: `two values under the same ${names.join(', ')}`, expected: 'each reading once',
      mend: 'Remove the row that was reprocessed, take it out by an exclusion, or map the column that tells the two apart', related: [{ message: 'first here', place: first }],
    }))
  }
  return diagnostics
}

function placeOf(observation: Observation, rows: readonly SourceRow[]): Place {
  const row = rows[observation.row]
  return { file: row?.file ?? '', line: row?.line, column: 1 }
}
