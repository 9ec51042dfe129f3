// What the writer uses of pdfkit 0.20.2 and its published types do not tell: plain objects, fonts and the catalogue.
import type { Font } from 'fontkit'

/** A string is a name, a `String` object a text string, a `PdfReference` an indirect object. */
export type PdfValue = string | String | number | boolean | null | Date | Uint8Array | PdfReference | readonly PdfValue[] | PdfDictionary

export interface PdfDictionary {
  [key: string]: PdfValue | undefined
}

export interface PdfReference {
  readonly id: number
  readonly data: PdfDictionary
  offset: number
  compress: boolean
  buffer: Uint8Array | Uint8Array[]
  write(chunk: Uint8Array | string): void
  end(chunk?: Uint8Array | string): void
}

export interface PdfGlyphPosition {
  readonly xAdvance: number
  readonly xOffset: number
  readonly yOffset: number
  readonly advanceWidth: number
}

export interface PdfFont {
  readonly id: string
  /** Hexadecimal glyph numbers of the subset and their positions in thousandths of the size. */
  encode(text: string): readonly [readonly string[], readonly PdfGlyphPosition[]]
  ref(): PdfReference
}

export interface PdfPage {
  readonly content: PdfReference
  readonly dictionary: PdfReference
  readonly fonts: PdfDictionary
  readonly ext_gstates: PdfDictionary
}

export interface PdfInformation {
  Title: string
  Author: string
  Subject: string
  Creator: string
  Producer: string
  CreationDate: Date
  ModDate: Date
}

export interface PdfDocument {
  readonly info: PdfInformation
  readonly page: PdfPage
  readonly _root: PdfReference
  _font: PdfFont
  _id: Uint8Array
  subset: number
  subset_conformance: string
  ref(data?: PdfDictionary): PdfReference
  addPage(): PdfDocument
  font(font: Font): PdfDocument
  appendXML(xml: string): void
  _addInfo(): void
  _addColorOutputIntent(): void
  getStructTreeRoot(): PdfReference
  _offset: number
  _write(data: Uint8Array | string): void
  _refEnd(reference: PdfReference): void
  push(data: Uint8Array | null): boolean
  end(): void
  read(): Uint8Array
}

export interface PdfDocumentOptions {
  readonly size: 'A4'
  readonly bufferPages: boolean
  readonly autoFirstPage: boolean
  readonly tagged: boolean
  readonly lang: string
  readonly displayTitle: boolean
  readonly pdfVersion: '1.7'
  readonly subset: 'PDF/A-3a'
  readonly font: null
  readonly info: PdfInformation
}

export type PdfDocumentConstructor = new (options: PdfDocumentOptions) => PdfDocument
