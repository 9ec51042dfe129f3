// Datasets → their place in the record: every row read, where it stood, what stood there, what was read from it and what became of it.
import type { Cell, Dataset } from '../data/dataset.ts'
import type { RecordedCell, RecordedDataset } from './record.ts'

export function recordedDatasets(datasets: readonly Dataset[]): readonly RecordedDataset[] {
  return datasets.map((dataset) => {
    const columns: Record<string, string> = {}
    const rows = dataset.rows.map((row) => {
      const cells: Record<string, RecordedCell> = {}
      for (const [field, cell] of Object.entries(row.cells)) {
        columns[field] ??= cell.column
        cells[field] = recordedCell(cell)
      }
      return { file: row.file, line: row.line, ...(row.sheet === undefined ? {} : { sheet: row.sheet }), fate: row.fate, cells }
    })
    return { name: dataset.name, files: dataset.files, columns, rows }
  })
}

function recordedCell(cell: Cell): RecordedCell {
  const start = { column: cell.place.column ?? 0, text: cell.text, kind: cell.kind }
  if (cell.kind === 'number' || cell.kind === 'label') return { ...start, value: cell.value }
  if (cell.kind === 'below' || cell.kind === 'above') return { ...start, value: cell.bound }
  return start
}
