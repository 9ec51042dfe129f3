// A report → a PDF that is an archive file (PDF/A-3a) and readable by a screen reader (PDF/UA-1): first laid out, then drawn.
import type { ReportDocument } from '../../present/document.ts'
import type { Drawing } from '../drawing.ts'
import type { FontFaces } from '../fonts.ts'
import type { Attachment } from './attachments.ts'
import { draw } from './draw.ts'
import { flow } from './flow.ts'

export interface PublishPdfInput {
  readonly document: ReportDocument
  /** By figure id. */
  readonly drawings: ReadonlyMap<string, Drawing>
  readonly fonts: FontFaces
  readonly attachments: readonly Attachment[]
  /** An sRGB profile, which PDF/A asks for. */
  readonly colourProfile: Uint8Array
}

export function publishPdf({ document, drawings, fonts, attachments, colourProfile }: PublishPdfInput): Uint8Array {
  return draw(flow({ document, drawings, fonts }), {
    title: `${document.header.number} ${document.title}`, authors: document.authors, subject: document.subject, language: document.language, date: document.date, digest: document.header.digest,
    fonts, attachments, colourProfile,
  })
}
