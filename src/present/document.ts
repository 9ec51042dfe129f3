// The report as a tree: mdast plus a few nodes of our own. A number in running text or a table is always a NumberNode, made from
// a number of the record, so that no digit of a report is typed and a test can compare every one of them with the record.
import type { Blockquote, Code, Emphasis, Heading as MdastHeading, InlineCode, Link, List, Paragraph as MdastParagraph, Strong, Table, Text, ThematicBreak } from 'mdast'

/** A number of the record as printed. `value` is the full-precision number of the record, `text` what is printed (true minus, no unit). */
export interface NumberNode {
  readonly type: 'number'
  readonly value: number
  readonly text: string
}

/** Raised or lowered text: `s` + subscript `r`. */
export interface ScriptNode {
  readonly type: 'superscript' | 'subscript'
  readonly children: readonly Inline[]
}

/** Number of a table, figure or section by its id: printed as `Table 4`, with a link. */
export interface ReferenceNode {
  readonly type: 'reference'
  readonly target: string
  /** Filled in when the document is numbered. */
  readonly text?: string
}

/** Page number of a target; the Markdown prints the reference instead. */
export interface PageReferenceNode {
  readonly type: 'pageReference'
  readonly target: string
}

/** A verdict word with its mark, so that it never depends on colour. */
export interface VerdictNode {
  readonly type: 'verdict'
  readonly word: 'meets' | 'misses' | 'not evaluable' | 'not performed' | 'information only'
}

export type Inline = Text | Emphasis | Strong | InlineCode | Link | NumberNode | ScriptNode | ReferenceNode | PageReferenceNode | VerdictNode

export interface SectionHeading {
  readonly type: 'sectionHeading'
  readonly id: string
  readonly depth: 1 | 2 | 3
  readonly children: readonly Inline[]
  /** `3`, `3.1`, `A`; filled in when the document is numbered. */
  readonly number?: string
  /** Annexes are lettered. */
  readonly annex?: true
}

/** Running text made by the program (`origin: program`) or the user's own words (`origin: user`), visibly distinguished. */
export interface TextBlock {
  readonly type: 'textBlock'
  readonly origin: 'program' | 'user' | 'template'
  readonly children: readonly Inline[]
}

export interface ExhibitColumn {
  readonly header: string
  /** Printed below the header, such as `mg/L`. */
  readonly unit?: string | undefined
  /** Numbers align on their decimal mark. */
  readonly align: 'text' | 'number'
  /** The cells of this column head their rows. */
  readonly rowHeader?: true
}

export interface ExhibitRow {
  /** One list of inline nodes per column; empty for no value. */
  readonly cells: readonly (readonly Inline[])[]
  /** Excluded rows are set apart and never left out. */
  readonly tone?: 'excluded' | 'total'
}

export interface ExhibitTable {
  readonly type: 'exhibitTable'
  /** Unique in the document; also the stem of the CSV file. */
  readonly id: string
  readonly caption: readonly Inline[]
  readonly columns: readonly ExhibitColumn[]
  /** Rows of one group stay on one page when they can. */
  readonly groups: readonly (readonly ExhibitRow[])[]
  readonly notes: readonly (readonly Inline[])[]
  readonly number?: string
}

/** A Vega-Lite specification without data, and its named data: one specification serves many measurands. */
export interface Chart {
  readonly specification: Readonly<Record<string, unknown>>
  readonly data: Readonly<Record<string, readonly Readonly<Record<string, unknown>>[]>>
}

export interface ExhibitFigure {
  readonly type: 'exhibitFigure'
  readonly id: string
  readonly caption: readonly Inline[]
  /** Alternative text made from the data. */
  readonly alternative: string
  readonly chart: Chart
  readonly number?: string
}

/** A formula in running mathematical notation (Unicode and scripts), with its reading in words. */
export interface FormulaBlock {
  readonly type: 'formula'
  readonly children: readonly Inline[]
  readonly words: string
}

export interface CoverBlock {
  readonly type: 'cover'
  readonly organisation?: string | undefined
  readonly title: string
  readonly subtitle: string
  /** Label → text, in order. */
  readonly facts: readonly { readonly label: string; readonly text: string }[]
  readonly overall: VerdictNode
  readonly overallSentence: readonly Inline[]
}

export interface SignOffBlock {
  readonly type: 'signOff'
  readonly people: readonly { readonly role: string; readonly meaning: string; readonly name: string; readonly position: string }[]
  readonly note: readonly Inline[]
}

/** Where the list of contents goes; filled by the publisher, which knows the pages. */
export interface ContentsBlock {
  readonly type: 'contents'
  readonly title: string
}

export interface PageBreakBlock {
  readonly type: 'pageBreak'
}

/** Ordinary Markdown blocks (from templates and texts), whose inline content may hold our inline nodes. */
export type MarkdownBlock = List | Table | Blockquote | Code | ThematicBreak

export type ReportBlock =
  | SectionHeading | TextBlock | ExhibitTable | ExhibitFigure | FormulaBlock | CoverBlock | SignOffBlock | ContentsBlock | PageBreakBlock | MarkdownBlock

export interface ReportDocument {
  readonly type: 'report'
  readonly language: string
  readonly title: string
  /** `GHW-VR-014 · revision 1`, the status word, and the short digest of the record: printed on every page. */
  readonly header: { readonly number: string; readonly revision: string; readonly status: string; readonly title: string; readonly digest: string }
  /** `2026-04-17` */
  readonly date: string
  readonly authors: readonly string[]
  readonly subject: string
  readonly blocks: readonly ReportBlock[]
}

/** Kept for readers of templates. */
export type { MdastHeading, MdastParagraph }
