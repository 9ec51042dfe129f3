// Exclusions of a study → rows marked as excluded. A selector matches exactly the number of source rows it says, or it is an error that
// lists what it matches; an excluded row stays in the dataset with its number.
import type { DatasetSource, Exclusion } from '../definition/study.ts'
import { counted } from '../diagnostics/counted.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { tidied } from './cells.ts'
import type { Observation, SourceRow } from './dataset.ts'
import type { HeadedRow } from './source-file.ts'

export interface ExcludeRequest {
  readonly source: DatasetSource
  readonly exclusions: readonly Exclusion[]
  readonly rows: readonly SourceRow[]
  readonly observations: readonly Observation[]
  /** Rows by heading, in the order of `rows`. */
  readonly headed: readonly HeadedRow[]
}

export interface ExcludedRows {
  readonly rows: readonly SourceRow[]
  readonly observations: readonly Observation[]
  readonly diagnostics: readonly Diagnostic[]
}

export function excludeRows({ source, exclusions, rows, observations, headed }: ExcludeRequest): ExcludedRows {
  const diagnostics: Diagnostic[] = []
  const excludedRows = new Map<number, number>()
  const excludedObservations = new Map<string, number>()
  for (const exclusion of exclusions) {
    const matching = headed.flatMap((row, index) => (matches(row, exclusion) ? [index] : []))
    const unused = matching.filter((index) => rows[index]?.fate.kind === 'not used')
    if (matching.length !== exclusion.row.rows || unused.length > 0) {
      const wanted = exclusion.row.matches.map((each) => `${each.column} = ${each.text}`).join(', ')
      diagnostics.push(diagnostic('data/unmatched-exclusion', unused.length > 0
        ? `Exclusion ${exclusion.number} (${wanted}) takes out a row that dataset \`${source.name}\` does not use`
        : `Exclusion ${exclusion.number} (${wanted}) matches ${counted(matching.length, 'row')} of dataset \`${source.name}\` instead of ${exclusion.row.rows}`, {
        place: exclusion.place, actual: matching.length === 0 ? unknownColumns(exclusion, headed) : counted(matching.length, 'row'), expected: counted(exclusion.row.rows, 'used row'),
        mend: matching.length === 0 ? 'Correct the headings and texts of `row:`' : 'Add a column that tells the rows apart, or say `rows:` with the number meant',
        related: matching.slice(0, 6).map((index) => ({ message: 'matches', place: { file: headed[index]?.file ?? '', line: headed[index]?.line } })),
      }))
      continue
    }
    for (const index of matching) {
      excludedRows.set(index, exclusion.number)
      for (const observation of observations) {
        if (observation.row === index && (exclusion.measurands === undefined || exclusion.measurands.includes(observation.measurand))) excludedObservations.set(`${index}/${observation.measurand}`, exclusion.number)
      }
    }
  }
  return {
    diagnostics,
    rows: rows.map((row, index) => {
      const number = excludedRows.get(index)
      return number === undefined ? row : { ...row, fate: { kind: 'excluded', exclusion: number } }
    }),
    observations: observations.map((observation) => {
      const number = excludedObservations.get(`${observation.row}/${observation.measurand}`)
      return number === undefined ? observation : { ...observation, excluded: number }
    }),
  }
}

function matches(row: HeadedRow, exclusion: Exclusion): boolean {
  if (exclusion.row.file !== undefined && exclusion.row.file !== row.file) return false
  return exclusion.row.matches.every((each) => row.cells[tidied(each.column)] === tidied(each.text))
}

function unknownColumns(exclusion: Exclusion, headed: readonly HeadedRow[]): string {
  const headings = new Set(headed.flatMap((row) => Object.keys(row.cells)))
  const unknown = exclusion.row.matches.filter((each) => !headings.has(tidied(each.column))).map((each) => each.column)
  return unknown.length > 0 ? `no column ${unknown.join(', ')}; there are ${[...headings].filter((heading) => heading !== '').slice(0, 12).join(', ')}` : 'no row with these texts'
}
