// The files a study names → datasets. Every row read ends as used, not used (with the rule) or excluded (with the number of the exclusion),
// and everything wrong with the files is told in one pass.
import type { DatasetSource, StudyDefinition } from '../definition/study.ts'
import type { Diagnostic } from '../diagnostics/diagnostic.ts'
import { hasErrors, type StageResult } from '../diagnostics/stage-result.ts'
import type { Dataset, FileReading, Observation, SourceRow } from './dataset.ts'
import { excludeRows } from './exclude-rows.ts'
import { readSourceFile } from './source-file.ts'

export function readData(study: StudyDefinition, files: ReadonlyMap<string, Uint8Array>): StageResult<readonly Dataset[]> {
  const diagnostics: Diagnostic[] = []
  const datasets = study.datasets.map((source) => readDataset(source, study, files, diagnostics))
  return { value: hasErrors(diagnostics) ? undefined : datasets, diagnostics }
}

function readDataset(source: DatasetSource, study: StudyDefinition, files: ReadonlyMap<string, Uint8Array>, diagnostics: Diagnostic[]): Dataset {
  const rows: SourceRow[] = []
  const observations: Observation[] = []
  const readings: Omit<FileReading, 'used' | 'notUsed' | 'excluded'>[] = []
  const headed: { readonly file: string; readonly line: number; readonly cells: Readonly<Record<string, string>> }[] = []
  for (const file of source.files) {
    const bytes = files.get(file.path)
    if (bytes === undefined) continue // the file could not be read, which has been told where it was tried
    const read = readSourceFile({ bytes, file, source, measurands: study.measurands, firstRow: rows.length })
    diagnostics.push(...read.diagnostics)
    rows.push(...read.rows)
    observations.push(...read.observations)
    headed.push(...read.headed)
    if (read.reading !== undefined) readings.push(read.reading)
  }
  const excluded = excludeRows({ source, exclusions: study.exclusions.filter((each) => each.dataset.value === source.name), rows, observations, headed })
  diagnostics.push(...excluded.diagnostics)
  const fates = (file: string, kind: string): number => excluded.rows.filter((row) => row.file === file && row.fate.kind === kind).length
  return {
    name: source.name, rows: excluded.rows, observations: excluded.observations,
    fields: [...new Set([...Object.keys(source.columns), ...source.files.flatMap((file) => Object.keys(file.fixed))])],
    files: readings.map((reading) => ({ ...reading, used: fates(reading.file, 'used'), notUsed: fates(reading.file, 'not used'), excluded: fates(reading.file, 'excluded') })),
  }
}
