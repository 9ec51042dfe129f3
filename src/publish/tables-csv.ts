// A table of the report → CSV (RFC 4180, UTF-8, decimal point everywhere). A cell that is one number gives its full-precision value, not
// the printed text.
import type { ExhibitColumn, ExhibitTable, Inline } from '../present/document.ts'
import { plainInline } from './plain-inline.ts'

export function tableToCsv(table: ExhibitTable): string {
  const rows = table.groups.flat()
  const hasTones = rows.some((row) => row.tone !== undefined)
  const head = [...table.columns.map(columnName), ...(hasTones ? ['row'] : [])]
  const lines = rows.map((row) => [...table.columns.map((_, index) => cellText(row.cells[index] ?? [])), ...(hasTones ? [row.tone ?? ''] : [])])
  return [head, ...lines].map((cells) => `${cells.map(quoted).join(',')}\r\n`).join('')
}

function columnName(column: ExhibitColumn): string {
  return column.unit === undefined ? column.header : `${column.header} [${column.unit}]`
}

function cellText(cell: readonly Inline[]): string {
  const [only] = cell
  if (cell.length === 1 && only?.type === 'number') return String(only.value)
  return plainInline(cell)
}

function quoted(cell: string): string {
  return /[",\r\n]|^\s|\s$/.test(cell) ? `"${cell.replaceAll('"', '""')}"` : cell
}
