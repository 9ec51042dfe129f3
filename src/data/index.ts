// The files a study names → datasets. Every row read ends as used, not used (with the rule) or excluded (with the number of the exclusion),
// and everything wrong with the files is told in one pass.
import type { DatasetSource, FileSource, StudyDefinition } from '../definition/study.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { Place } from '../diagnostics/place.ts'
import { hasErrors, type StageResult } from '../diagnostics/stage-result.ts'
import { type TableReader, tableReader } from './csv.ts'
import type { Dataset, Fate, FileReading, Observation, SourceRow } from './dataset.ts'
import { excludeRows } from './exclude-rows.ts'
import { repeatedKeys } from './repeated-rows.ts'
import { type HeadedRows, readSourceFile } from './source-file.ts'
import { unplacedValues } from './unplaced-values.ts'

export function readData(study: StudyDefinition, files: ReadonlyMap<string, Uint8Array>): StageResult<readonly Dataset[]> {
  const diagnostics: Diagnostic[] = []
  const tables = tableReader()
  const datasets = study.datasets.map((source) => readDataset(source, study, files, tables, diagnostics))
  return { value: hasErrors(diagnostics) ? undefined : datasets, diagnostics: notesOnce(diagnostics) }
}

/** What is noted of a file is noted once, however many datasets read it. */
function notesOnce(diagnostics: readonly Diagnostic[]): readonly Diagnostic[] {
  const seen = new Set<string>()
  return diagnostics.filter((each) => {
    const key = `${each.code}\u0000${each.message}\u0000${each.place?.line ?? 0}`
    const isRepeat = each.severity === 'note' && seen.has(key)
    seen.add(key)
    return !isRepeat
  })
}

function readDataset(source: DatasetSource, study: StudyDefinition, files: ReadonlyMap<string, Uint8Array>, tables: TableReader, diagnostics: Diagnostic[]): Dataset {
  const rows: SourceRow[] = []
  const observations: Observation[] = []
  const readings: Omit<FileReading, 'used' | 'notUsed' | 'excluded'>[] = []
  const headed: HeadedRows[] = []
  const seen = new Map<string, Place>()
  const before = diagnostics.length
  let isWhole = true
  source.files.forEach((file, index) => {
    const bytes = files.get(file.path)
    if (bytes === undefined) { // the file could not be read, which has been told where it was tried
      isWhole = false
      return
    }
    const twin = source.files.slice(0, index).find((earlier) => isTwin(file, earlier, files))
    if (twin !== undefined) {
      diagnostics.push(sameContent(file, twin))
      isWhole = false
      return
    }
    const read = readSourceFile({ bytes, file, source, measurands: study.measurands, tables, firstRow: rows.length, seen })
    // One by one: a call takes no more arguments than its stack holds.
    for (const each of read.diagnostics) diagnostics.push(each)
    for (const each of read.rows) rows.push(each)
    for (const each of read.observations) observations.push(each)
    if (read.headed !== undefined) headed.push(read.headed)
    if (read.reading === undefined) isWhole = false
    else readings.push(read.reading)
  })
  // What a selector matches is known only when every file could be read.
  const exclusions = isWhole ? study.exclusions.filter((each) => each.dataset.value === source.name) : []
  const excluded = excludeRows({ source, exclusions, rows, observations, headed })
  for (const each of excluded.diagnostics) diagnostics.push(each)
  for (const each of repeatedKeys(excluded.observations, rows, source)) diagnostics.push(each)
  // A cell that could not be read is empty here, and has been told.
  if (!hasErrors(diagnostics.slice(before))) for (const each of unplacedValues(excluded.observations, rows)) diagnostics.push(each)
  const counts = fatesByFile(excluded.rows)
  return {
    name: source.name, rows: excluded.rows, observations: excluded.observations,
    fields: [...new Set([...Object.keys(source.columns), ...source.files.flatMap((file) => Object.keys(file.fixed))])],
    files: readings.map((reading) => ({ ...reading, used: counts(reading.file, 'used'), notUsed: counts(reading.file, 'not used'), excluded: counts(reading.file, 'excluded') })),
  }
}

function fatesByFile(rows: readonly SourceRow[]): (file: string, kind: Fate['kind']) => number {
  const counts = new Map<string, Record<Fate['kind'], number>>()
  for (const { file, fate } of rows) {
    const own = counts.get(file) ?? { used: 0, 'not used': 0, excluded: 0 }
    own[fate.kind] += 1
    counts.set(file, own)
  }
  return (file, kind) => counts.get(file)?.[kind] ?? 0
}

/** One file under two names counts each reading twice. Values stated for the files may tell them apart, since short files can come out equal. */
function isTwin(file: FileSource, earlier: FileSource, files: ReadonlyMap<string, Uint8Array>): boolean {
  const [own, other] = [files.get(file.path), files.get(earlier.path)]
  if (own === undefined || other === undefined || file.path === earlier.path || own.length !== other.length) return false
  return own.every((byte, at) => byte === other[at]) && JSON.stringify(file.fixed) === JSON.stringify(earlier.fixed)
}

function sameContent(file: FileSource, twin: FileSource): Diagnostic {
  return diagnostic('data/repeated-row', `\`${file.path}\` holds the same bytes as \`${twin.path}\``, {
    place: { file: file.path, line: 1, column: 1 }, actual: 'a copy of the whole file', expected: 'each reading once', mend: 'Remove one of the two, or name the file that was meant',
    related: [{ message: 'named here', place: file.place }, { message: 'and here', place: twin.place }],
  })
}
