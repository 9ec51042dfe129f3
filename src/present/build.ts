// Builders for the blocks a characteristic presents: sentences, tables, figures. Text given here holds no digit of a result; numbers
// come in as NumberNodes.
import type { FindingInterval } from '../assess/finding.ts'
import type { Chart, ExhibitColumn, ExhibitFigure, ExhibitRow, ExhibitTable, FormulaBlock, Inline, ReportBlock, TextBlock } from './document.ts'
import { type NumberFormat, printed } from './numbers.ts'

export type Words = string | Inline | readonly Inline[]

/** sentence`The slope is ${printed(slope)} ${unit}.` — strings stay text, nodes stay nodes. */
export function sentence(strings: TemplateStringsArray, ...parts: readonly Words[]): readonly Inline[] {
  return strings.flatMap((literal, index) => [...textOf(literal), ...textOf(parts[index] ?? '')])
}

export function textOf(words: Words): readonly Inline[] {
  if (typeof words === 'string') return words === '' ? [] : [{ type: 'text', value: words }]
  return 'type' in words ? [words] : words
}

/** Sentences made by the program, as one paragraph. */
export function paragraph(...sentences: readonly (readonly Inline[])[]): TextBlock {
  return { type: 'textBlock', origin: 'program', children: joined(sentences, ' ') }
}

export function joined(parts: readonly (readonly Inline[])[], separator: string): readonly Inline[] {
  return parts.filter((part) => part.length > 0).flatMap((part, index) => (index === 0 ? part : [...textOf(separator), ...part]))
}

export function table(exhibit: {
  readonly id: string
  readonly caption: Words
  readonly columns: readonly ExhibitColumn[]
  readonly rows?: readonly ExhibitRow[]
  readonly groups?: readonly (readonly ExhibitRow[])[]
  readonly notes?: readonly Words[]
}): ExhibitTable {
  return {
    type: 'exhibitTable', id: exhibit.id, caption: textOf(exhibit.caption), columns: exhibit.columns,
    groups: exhibit.groups ?? [exhibit.rows ?? []], notes: (exhibit.notes ?? []).map(textOf),
  }
}

export function column(header: string, options: { readonly unit?: string | undefined; readonly align?: 'text' | 'number'; readonly rowHeader?: true } = {}): ExhibitColumn {
  return { header, align: options.align ?? 'number', ...(options.unit === undefined || options.unit === '' ? {} : { unit: options.unit }), ...(options.rowHeader ? { rowHeader: true } : {}) }
}

/** Title of an axis: `result / mg/L`, or the name alone where there is no unit. */
export function axisTitle(name: string, unit: string | undefined): string {
  return unit === undefined || unit === '' ? name : `${name} / ${unit}`
}

export function row(...cells: readonly Words[]): ExhibitRow {
  return { cells: cells.map(textOf) }
}

export function excludedRow(...cells: readonly Words[]): ExhibitRow {
  return { ...row(...cells), tone: 'excluded' }
}

export function figure(exhibit: { readonly id: string; readonly caption: Words; readonly alternative: string; readonly chart: Chart }): ExhibitFigure {
  return { type: 'exhibitFigure', id: exhibit.id, caption: textOf(exhibit.caption), alternative: exhibit.alternative, chart: exhibit.chart }
}

/** A formula and its reading in words (the alternative text). */
export function formula(children: Words, words: string): FormulaBlock {
  return { type: 'formula', children: textOf(children), words }
}

/** Exhibits that a report leaves out, and never builds, when it has many measurands and the study does not ask for everything. */
export function secondary(shown: { readonly everything: boolean }, build: () => readonly ReportBlock[]): readonly ReportBlock[] {
  return shown.everything ? build() : []
}

export function subscript(base: string, lowered: string): readonly Inline[] {
  return [{ type: 'emphasis', children: [{ type: 'text', value: base }] }, { type: 'subscript', children: [{ type: 'text', value: lowered }] }]
}

/** `1.23 to 1.45`, or nothing. */
export function intervalWords(interval: Pick<FindingInterval, 'low' | 'high'> | undefined, format: NumberFormat = {}): readonly Inline[] {
  return interval === undefined ? [] : sentence`${printed(interval.low, format)} to ${printed(interval.high, format)}`
}
