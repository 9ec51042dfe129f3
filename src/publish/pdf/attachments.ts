// Files attached to the report: inputs, record, manifest, each with its type, its relation to the report and a description.
import type { PdfDictionary, PdfDocument, PdfReference } from './pdfkit-augmented.d.ts'

export interface Attachment {
  /** Path inside the dossier. */
  readonly name: string
  readonly bytes: Uint8Array
  readonly relationship: 'Source' | 'Data' | 'Supplement'
  readonly description: string
  /** Media type; by the ending of the name when not given. */
  readonly type?: string
}

const types: Readonly<Record<string, string>> = {
  csv: 'text/csv', json: 'application/json', jsonl: 'application/jsonl', md: 'text/markdown', txt: 'text/plain', tsv: 'text/tab-separated-values', yaml: 'application/yaml', yml: 'application/yaml', png: 'image/png', pdf: 'application/pdf', svg: 'image/svg+xml', xml: 'application/xml',
  xlsx: 'application/vnd.openxmlformats-officedocument.spreadsheetml.sheet',
}

export function attach(pdf: PdfDocument, attachments: readonly Attachment[], date: Date): void {
  if (attachments.length === 0) return
  const named = attachments.map((attachment) => ({ attachment, name: flatName(attachment.name) }))
  const names = new Set(named.map(({ name }) => name))
  // Two paths that differ only in their folders' marks would hide each other in a viewer.
  if (names.size < named.length) throw new Error('two attachments have the same name')
  const specifications = named.map(({ attachment, name }) => ({ name, reference: fileSpecification(pdf, attachment, name, date) }))
  // A name tree is ordered by bytes (ISO 32000-1, 7.9.6), not by any language.
  const ordered = [...specifications].sort((left, right) => (left.name < right.name ? -1 : 1))
  const tree = pdf.ref({ Names: ordered.flatMap(({ name, reference }) => [new String(name), reference]) })
  tree.end()
  const catalogueNames = pdf._root.data['Names'] as PdfReference
  catalogueNames.data['EmbeddedFiles'] = tree
  pdf._root.data['AF'] = specifications.map(({ reference }) => reference)
}

/** Viewers save an attachment under its name, so it holds no folder. The description keeps the path. */
function flatName(path: string): string {
  return path.replaceAll('/', '_')
}

function fileSpecification(pdf: PdfDocument, attachment: Attachment, name: string, date: Date): PdfReference {
  const ending = /\.([A-Za-z0-9]+)$/.exec(attachment.name)?.[1]?.toLowerCase() ?? ''
  const stream = pdf.ref({
    Type: 'EmbeddedFile', Subtype: nameOf(attachment.type ?? types[ending] ?? 'application/octet-stream'),
    Params: { Size: attachment.bytes.length, CreationDate: date, ModDate: date },
  })
  stream.end(attachment.bytes)
  const text = new String(name)
  const data: PdfDictionary = { Type: 'Filespec', F: text, UF: text, Desc: new String(`${attachment.name}: ${attachment.description}`), EF: { F: stream, UF: stream }, AFRelationship: attachment.relationship }
  const specification = pdf.ref(data)
  specification.end()
  return specification
}

/** A media type as a PDF name: `/` begins a name and is written by its number (ISO 32000-1, 7.3.5). */
function nameOf(type: string): string {
  return type.replaceAll(/[^A-Za-z0-9.+-]/g, (letter) => `#${letter.charCodeAt(0).toString(16).toUpperCase().padStart(2, '0')}`)
}
