// Exclusions of a study → rows marked as excluded. A selector matches exactly the number of source rows it says, or it is an error that
// lists what it matches; an excluded row stays in the dataset with its number.
import type { DatasetSource, Exclusion } from '../definition/study.ts'
import { counted } from '../diagnostics/counted.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import { headingOf, tidied } from './cells.ts'
import type { Observation, SourceRow } from './dataset.ts'
import type { HeadedRows } from './source-file.ts'

export interface ExcludeRequest {
  readonly source: DatasetSource
  readonly exclusions: readonly Exclusion[]
  readonly rows: readonly SourceRow[]
  readonly observations: readonly Observation[]
  /** The same rows under their headings, file after file. */
  readonly headed: readonly HeadedRows[]
}

export interface ExcludedRows {
  readonly rows: readonly SourceRow[]
  readonly observations: readonly Observation[]
  readonly diagnostics: readonly Diagnostic[]
}

export function excludeRows({ source, exclusions, rows, observations, headed }: ExcludeRequest): ExcludedRows {
  if (exclusions.length === 0) return { rows, observations, diagnostics: [] }
  const diagnostics: Diagnostic[] = []
  const excludedRows = new Map<number, number>()
  const excludedObservations = new Map<string, Exclusion>()
  const byRow = new Map<number, Observation[]>()
  for (const observation of observations) {
    const own = byRow.get(observation.row)
    if (own === undefined) byRow.set(observation.row, [observation])
    else own.push(observation)
  }
  for (const exclusion of exclusions) {
    const repeated = repeatedHeading(exclusion, headed)
    if (repeated !== undefined) {
      diagnostics.push(repeated)
      continue
    }
    const matching = matchingRows(exclusion, headed)
    const unused = matching.filter((index) => rows[index]?.fate.kind === 'not used')
    if (matching.length !== exclusion.row.rows || unused.length > 0) {
      diagnostics.push(unmatched(exclusion, source, matching.map((index) => rows[index]).filter((row) => row !== undefined), unused.length > 0, headed))
      continue
    }
    for (const index of matching) {
      const held = byRow.get(index) ?? []
      for (const measurand of exclusion.measurands ?? []) {
        if (!held.some((each) => each.measurand === measurand)) diagnostics.push(notHeld(exclusion, measurand, rows[index], held))
      }
      for (const observation of held) {
        if (exclusion.measurands !== undefined && !exclusion.measurands.includes(observation.measurand)) continue
        const key = `${index}/${observation.measurand}`
        const earlier = excludedObservations.get(key)
        if (earlier === undefined) excludedObservations.set(key, exclusion)
        else diagnostics.push(takenTwice(exclusion, earlier, rows[index], observation.measurand))
      }
      excludedRows.set(index, excludedRows.get(index) ?? exclusion.number)
    }
  }
  return {
    diagnostics,
    rows: rows.map((row, index) => {
      const number = excludedRows.get(index)
      return number === undefined ? row : { ...row, fate: { kind: 'excluded', exclusion: number } }
    }),
    observations: observations.map((observation) => {
      const exclusion = excludedObservations.get(`${observation.row}/${observation.measurand}`)
      return exclusion === undefined ? observation : { ...observation, excluded: exclusion.number }
    }),
  }
}

function matchingRows(exclusion: Exclusion, headed: readonly HeadedRows[]): readonly number[] {
  const wanted = exclusion.row.matches.map((each) => ({ heading: headingOf(each.column), text: tidied(each.text) }))
  const matching: number[] = []
  let first = 0
  for (const { file, headings, rows } of headed) {
    const tests = wanted.map((each) => ({ index: headings.indexOf(each.heading), text: each.text }))
    if ((exclusion.row.file === undefined || exclusion.row.file === file) && tests.every((each) => each.index >= 0)) {
      rows.forEach((row, index) => {
        if (tests.every((each) => tidied(row.cells[each.index] ?? '') === each.text)) matching.push(first + index)
      })
    }
    first += rows.length
  }
  return matching
}

function unmatched(exclusion: Exclusion, source: DatasetSource, matching: readonly SourceRow[], isUnused: boolean, headed: readonly HeadedRows[]): Diagnostic {
  const wanted = exclusion.row.matches.map((each) => `${each.column} = ${each.text}`).join(', ')
  return diagnostic('data/unmatched-exclusion', isUnused
    ? `Exclusion ${exclusion.number} (${wanted}) takes out a row that dataset \`${source.name}\` does not use`
    : `Exclusion ${exclusion.number} (${wanted}) matches ${counted(matching.length, 'row')} of dataset \`${source.name}\` instead of ${exclusion.row.rows}`, {
    place: exclusion.place, actual: matching.length === 0 ? nothingFound(exclusion, headed) : counted(matching.length, 'row'), expected: counted(exclusion.row.rows, 'used row'),
    mend: matching.length === 0 ? 'Correct the headings and texts of `row:`' : 'Add a column that tells the rows apart, or say `rows:` with the number meant',
    related: matching.slice(0, 6).map((row) => ({ message: 'matches', place: { file: row.file, line: row.line } })),
  })
}

const mostCompared = 5000 // texts of a column that a mistyped one is compared with

/** Why nothing matches: a heading that is not there, a text that is not there (and the nearest), or texts that never stand in one row. */
function nothingFound({ row }: Exclusion, headed: readonly HeadedRows[]): string {
  const looked = headed.filter((each) => row.file === undefined || row.file === each.file)
  if (looked.length === 0) return `no file ${row.file ?? ''} in the dataset; there are ${headed.map((each) => each.file).join(', ')}`
  const headings = new Set(looked.flatMap((each) => each.headings))
  const unknown = row.matches.filter((each) => !headings.has(headingOf(each.column))).map((each) => each.column)
  if (unknown.length > 0) return `no column ${unknown.join(', ')}; there are ${[...headings].filter((heading) => heading !== '').slice(0, 12).join(', ')}`
  for (const { column, text } of row.matches) {
    const texts = new Set(looked.flatMap((each) => {
      const index = each.headings.indexOf(headingOf(column))
      return index < 0 ? [] : each.rows.map((own) => tidied(own.cells[index] ?? ''))
    }))
    if (texts.has(tidied(text))) continue
    const guess = nearest(tidied(text), [...texts].filter((each) => each !== '').slice(0, mostCompared))
    return `no row with ${column} = ${text}${guess === undefined ? '' : `; the nearest is ${guess}`}`
  }
  return 'each of these texts, but never in one row'
}

/** A heading that stands over two columns cannot say which of them is meant. */
function repeatedHeading(exclusion: Exclusion, headed: readonly HeadedRows[]): Diagnostic | undefined {
  for (const { file, headings } of headed) {
    if (exclusion.row.file !== undefined && exclusion.row.file !== file) continue
    const twice = exclusion.row.matches.find((each) => headings.filter((heading) => heading === headingOf(each.column)).length > 1)
    if (twice === undefined) continue
    return diagnostic('data/unmatched-exclusion', `Exclusion ${exclusion.number} names \`${twice.column}\`, which stands over two columns of \`${file}\``, {
      place: exclusion.place, actual: twice.column, expected: 'a heading that stands once', mend: 'Choose the row by another column, or rename one of the two in the export',
    })
  }
  return undefined
}

/** It would take out nothing, and the report would name it as if it had. */
function notHeld(exclusion: Exclusion, measurand: string, row: SourceRow | undefined, held: readonly Observation[]): Diagnostic {
  return diagnostic('data/unmatched-exclusion', `Exclusion ${exclusion.number} names \`${measurand}\`, of which its row says nothing`, {
    place: exclusion.place, actual: `a row about ${held.map((each) => each.measurand).join(', ')}`, expected: `a row about ${measurand}`, mend: 'Correct `measurands:` or `row:`',
    related: [{ message: 'the row', place: { file: row?.file ?? exclusion.place.file, line: row?.line } }],
  })
}

function takenTwice(exclusion: Exclusion, earlier: Exclusion, row: SourceRow | undefined, measurand: string): Diagnostic {
  return diagnostic('data/unmatched-exclusion', `Exclusion ${exclusion.number} takes out \`${measurand}\` of a row that exclusion ${earlier.number} takes out already`, {
    place: exclusion.place, actual: `line ${row?.line ?? 0} of ${row?.file ?? ''}`, expected: 'one reason for each row', mend: 'Remove one of the two exclusions, or give each its own measurands',
    related: [{ message: 'the first', place: earlier.place }],
  })
}
