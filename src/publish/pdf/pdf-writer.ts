// Opens a pdfkit document that will be PDF/A-3a and PDF/UA-1 at once and the same bytes on every machine: metadata escaped and complete,
// file identifier and dates from the report, streams deflated by a pure program, the colour profile given as bytes.
import { zlibSync } from 'fflate'
import PdfKit from 'pdfkit'
import type { PdfDocument, PdfDocumentConstructor, PdfReference } from './pdfkit-augmented.d.ts'

export interface PdfWriterInput {
  readonly title: string
  readonly authors: readonly string[]
  readonly subject: string
  readonly language: string
  /** `2026-04-17` */
  readonly date: string
  /** Hexadecimal; makes the file identifier. */
  readonly digest: string
  readonly colourProfile: Uint8Array
}

const program = 'Assaywrit'

export interface PdfWriter {
  readonly pdf: PdfDocument
  /** Ends the document and gives its bytes. */
  finish(): Uint8Array
}

export function openPdf(input: PdfWriterInput): PdfWriter {
  const date = new Date(`${input.date}T00:00:00Z`)
  const pdf = new (PdfKit as unknown as PdfDocumentConstructor)({
    size: 'A4', bufferPages: true, autoFirstPage: false, tagged: true, lang: input.language, displayTitle: true, pdfVersion: '1.7', subset: 'PDF/A-3a', font: null,
    info: { Title: input.title, Author: input.authors.join('; '), Subject: input.subject, Creator: program, Producer: program, CreationDate: date, ModDate: date },
  })
  deflatePurely(pdf)
  pdf._id = identifier(input)
  const parts = collectBytes(pdf)
  pdf._addInfo = () => {
    pdf.appendXML(metadata(input))
  }
  pdf._addColorOutputIntent = () => {
    addOutputIntent(pdf, input.colourProfile)
  }
  return {
    pdf,
    finish() {
      pdf.end()
      return concatenated(parts)
    },
  }
}

/** Takes the bytes as they are written; the document's own stream would hold each small piece apart. */
function collectBytes(pdf: PdfDocument): readonly Uint8Array[] {
  const parts: Uint8Array[] = []
  let pending: string[] = []
  const settle = (): void => {
    if (pending.length > 0) parts.push(latin1(pending.join('')))
    pending = []
  }
  // What the constructor has written so far.
  parts.push(new Uint8Array(pdf.read()))
  pdf._write = (data) => {
    if (typeof data === 'string') {
      pending.push(data, '\n')
      pdf._offset += data.length + 1
    } else {
      settle()
      parts.push(data)
      pdf._offset += data.length
    }
  }
  pdf.push = (end) => {
    if (end === null) settle()
    return true
  }
  return parts
}

/** One byte a letter: what PDF writes outside its text strings, whose bytes are letters already. */
export function latin1(text: string): Uint8Array {
  return Buffer.from(text, 'latin1')
}

/** An object of our own words, past the general conversion: structure elements come by ten thousands. */
export function writeObject(pdf: PdfDocument, reference: PdfReference, body: string): void {
  reference.offset = pdf._offset
  pdf._write(`${reference.id} 0 obj\n${body}\nendobj`)
  pdf._refEnd(reference)
}

let isDeflatingPurely = false

/** Node's own zlib gives different bytes from version to version (nodejs/node issue 50138). */
function deflatePurely(pdf: PdfDocument): void {
  if (isDeflatingPurely) return
  isDeflatingPurely = true
  const prototype = Object.getPrototypeOf(pdf._root) as { finalize: (this: PdfReference) => void }
  const { finalize } = prototype
  prototype.finalize = function (this: PdfReference) {
    if (this.compress && Array.isArray(this.buffer) && this.buffer.length > 0) {
      this.buffer = [zlibSync(concatenated(this.buffer), { level: 4 })] // level 6 makes the file 1 % smaller and takes half as long again
      this.compress = false
    }
    finalize.call(this)
  }
}

function concatenated(parts: readonly Uint8Array[]): Uint8Array {
  const [only] = parts
  if (parts.length === 1 && only !== undefined) return only
  const joined = new Uint8Array(parts.reduce((sum, part) => sum + part.length, 0))
  let offset = 0
  for (const part of parts) {
    joined.set(part, offset)
    offset += part.length
  }
  return joined
}

/** Sixteen bytes of the digest, or of the texts when the digest is too short (FNV-1a, four times with different starts). */
function identifier(input: PdfWriterInput): Uint8Array {
  const text = [input.digest, input.title, input.date, input.subject].join('\n')
  const bytes = new Uint8Array(16)
  for (let part = 0; part < 4; part += 1) {
    let hash = (2166136261 ^ (part * 0x9e3779b9)) >>> 0
    for (let index = 0; index < text.length; index += 1) hash = Math.imul(hash ^ text.charCodeAt(index), 16777619) >>> 0
    new DataView(bytes.buffer).setUint32(part * 4, hash)
  }
  return bytes
}

function escaped(text: string): string {
  return text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;')
}

/** XMP: Dublin Core, dates, PDF/UA part, and the extension schema that PDF/A asks for it (ISO 19005-3, 6.6.2.3.3). */
function metadata(input: PdfWriterInput): string {
  const date = `${input.date}T00:00:00Z`
  const creators = input.authors.length === 0 ? '' : `<dc:creator><rdf:Seq><rdf:li>${escaped(input.authors.join('; '))}</rdf:li></rdf:Seq></dc:creator>`
  return `
<rdf:Description rdf:about="" xmlns:xmp="http://ns.adobe.com/xap/1.0/"><xmp:CreateDate>${date}</xmp:CreateDate><xmp:ModifyDate>${date}</xmp:ModifyDate><xmp:CreatorTool>${program}</xmp:CreatorTool></rdf:Description>
<rdf:Description rdf:about="" xmlns:dc="http://purl.org/dc/elements/1.1/"><dc:format>application/pdf</dc:format>
<dc:title><rdf:Alt><rdf:li xml:lang="x-default">${escaped(input.title)}</rdf:li></rdf:Alt></dc:title>${creators}
<dc:description><rdf:Alt><rdf:li xml:lang="x-default">${escaped(input.subject)}</rdf:li></rdf:Alt></dc:description></rdf:Description>
<rdf:Description rdf:about="" xmlns:pdf="http://ns.adobe.com/pdf/1.3/"><pdf:Producer>${program}</pdf:Producer></rdf:Description>
<rdf:Description rdf:about="" xmlns:pdfuaid="http://www.aiim.org/pdfua/ns/id/"><pdfuaid:part>1</pdfuaid:part></rdf:Description>
<rdf:Description rdf:about="" xmlns:pdfaExtension="http://www.aiim.org/pdfa/ns/extension/" xmlns:pdfaSchema="http://www.aiim.org/pdfa/ns/schema#" xmlns:pdfaProperty="http://www.aiim.org/pdfa/ns/property#">
<pdfaExtension:schemas><rdf:Bag><rdf:li rdf:parseType="Resource"><pdfaSchema:schema>PDF/UA identification</pdfaSchema:schema><pdfaSchema:namespaceURI>http://www.aiim.org/pdfua/ns/id/</pdfaSchema:namespaceURI><pdfaSchema:prefix>pdfuaid</pdfaSchema:prefix>
<pdfaSchema:property><rdf:Seq><rdf:li rdf:parseType="Resource"><pdfaProperty:name>part</pdfaProperty:name><pdfaProperty:valueType>Integer</pdfaProperty:valueType><pdfaProperty:category>internal</pdfaProperty:category><pdfaProperty:description>Part of PDF/UA that the document follows</pdfaProperty:description></rdf:li></rdf:Seq></pdfaSchema:property></rdf:li></rdf:Bag></pdfaExtension:schemas></rdf:Description>
`
}

function addOutputIntent(pdf: PdfDocument, profile: Uint8Array): void {
  const stream = pdf.ref({ N: 3 })
  stream.end(profile)
  const name = 'sRGB IEC61966-2.1'
  const intent = pdf.ref({ Type: 'OutputIntent', S: 'GTS_PDFA1', Info: new String(name), OutputConditionIdentifier: new String(name), DestOutputProfile: stream })
  intent.end()
  pdf._root.data['OutputIntents'] = [intent]
}
