// Record + template → the report as a tree. It computes nothing: wording and order come from the template, numbers from the record.
import type { StudyRecord } from '../assess/record.ts'
import { directives } from './directives.ts'
import type { Inline, MarkdownBlock, ReportBlock, ReportDocument } from './document.ts'
import { numbered } from './numbering.ts'
import { type PresentableCharacteristic, sectionOf, type Section, slug, status } from './sections/section.ts'
import { annexesDirective, valueAt } from './template-problems.ts'
import type { TemplatePart, TemplatePiece } from './template.ts'

export interface PresentRequest {
  readonly record: StudyRecord
  readonly digest: string
  /** Of a template without problems. */
  readonly parts: readonly TemplatePart[]
}

export function present(request: PresentRequest, catalogue: readonly PresentableCharacteristic[]): ReportDocument {
  const section = sectionOf(request.record, request.digest, catalogue)
  let annexes = false
  const blocks = request.parts.flatMap((part): readonly ReportBlock[] => {
    annexes ||= part.kind === 'directive' && part.name === annexesDirective
    return blocksOf(part, section, annexes)
  })
  const { report, people } = request.record.study
  return {
    type: 'report', language: report.language, title: report.title,
    header: { number: report.number, revision: `revision ${report.revision}`, status: status(request.record), title: report.title, digest: request.digest.slice(0, 12) },
    date: report.date, authors: people.prepared.map((person) => person.name), subject: `Report of a ${report.kind} of method ${request.record.study.method.number}`,
    blocks: numbered(blocks),
  }
}

function blocksOf(part: TemplatePart, section: Section, annex: boolean): readonly ReportBlock[] {
  switch (part.kind) {
    case 'heading': return [{ type: 'sectionHeading', id: `heading-${slug(part.text)}`, depth: part.depth, children: [{ type: 'text', value: part.text }], ...(annex && part.depth === 1 ? { annex: true as const } : {}) }]
    case 'directive': return directives[part.name]?.(section, part.attributes) ?? []
    case 'paragraph': return [{ type: 'textBlock', origin: 'template', children: part.pieces.map((piece) => inlineOf(piece, section)) }]
    case 'block': return printable(part.node)
  }
}

function printable(node: (TemplatePart & { readonly kind: 'block' })['node']): readonly MarkdownBlock[] {
  return node.type === 'list' || node.type === 'table' || node.type === 'blockquote' || node.type === 'code' || node.type === 'thematicBreak' ? [node] : []
}

function inlineOf(piece: TemplatePiece, section: Section): Inline {
  switch (piece.kind) {
    case 'text': return { type: 'text', value: piece.text }
    case 'code': return { type: 'inlineCode', value: piece.text }
    case 'emphasis': case 'strong': return { type: piece.kind, children: [{ type: 'text', value: piece.text }] }
    case 'value': return { type: 'text', value: valueAt(section.record.study, piece.path) ?? '' }
  }
}
