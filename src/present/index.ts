// Record + template → the report as a tree. It computes nothing: wording and order come from the template, numbers from the record.
import type { StudyRecord } from '../assess/record.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import { hasErrors, type StageResult } from '../diagnostics/stage-result.ts'
import { directives } from './directives.ts'
import type { Inline, MarkdownBlock, ReportBlock, ReportDocument } from './document.ts'
import { numbered } from './numbering.ts'
import { type PresentableCharacteristic, sectionOf, type Section, slug, status } from './sections/section.ts'
import { parseTemplate, type TemplatePart, type TemplatePiece } from './template.ts'

export interface PresentRequest {
  readonly record: StudyRecord
  readonly digest: string
  readonly template: { readonly file: string; readonly text: string }
}

export function present(request: PresentRequest, catalogue: readonly PresentableCharacteristic[]): StageResult<ReportDocument> {
  const section = sectionOf(request.record, request.digest, catalogue)
  const found: Diagnostic[] = []
  let annexes = false
  const blocks = parseTemplate(request.template).flatMap((part): readonly ReportBlock[] => {
    if (part.kind === 'directive' && part.name === 'annexes') {
      annexes = true
      return []
    }
    return blocksOf(part, section, annexes, found)
  })
  if (hasErrors(found)) return { value: undefined, diagnostics: found }
  const { report, people } = request.record.study
  return {
    value: {
      type: 'report', language: report.language, title: `${report.number} ${report.title}`,
      header: { number: report.number, revision: `revision ${report.revision}`, status: status(request.record), title: report.title, digest: request.digest.slice(0, 12) },
      date: report.date, authors: people.prepared.map((person) => person.name), subject: `Report of a ${report.kind} of method ${request.record.study.method.number}`,
      blocks: numbered(blocks),
    },
    diagnostics: found,
  }
}

function blocksOf(part: TemplatePart, section: Section, annex: boolean, found: Diagnostic[]): readonly ReportBlock[] {
  switch (part.kind) {
    case 'heading': return [{ type: 'sectionHeading', id: `heading-${slug(part.text)}`, depth: part.depth, children: [{ type: 'text', value: part.text }], ...(annex && part.depth === 1 ? { annex: true as const } : {}) }]
    case 'directive': {
      const directive = Object.hasOwn(directives, part.name) ? directives[part.name] : undefined
      if (directive !== undefined) return directive(section, part.attributes)
      const guess = nearest(part.name, [...Object.keys(directives), 'annexes'])
      found.push(diagnostic('present/unknown-directive', `Unexpected directive \`${part.name}\``, {
        place: part.place, actual: part.name, expected: `one of: ${Object.keys(directives).join(', ')}, annexes`, mend: guess === undefined ? 'Remove the line, or write a known directive' : `Write \`::${guess}\``,
      }))
      return []
    }
    case 'paragraph': {
      found.push(...typedNumbers(part))
      return [{ type: 'textBlock', origin: 'template', children: part.pieces.map((piece) => inlineOf(piece, section, found)) }]
    }
    case 'block': return printable(part.node)
  }
}

/** A result typed into a template would stay when the data change. */
function typedNumbers(part: TemplatePart & { readonly kind: 'paragraph' }): readonly Diagnostic[] {
  const text = part.pieces.map((piece) => ('text' in piece ? piece.text : '')).join('')
  return [...text.matchAll(/\d[\d.,]*[ \u00a0\u202f]?(?:%|‰|[kmµn]?g\/|[kmµn]?g\b|[mµn]?mol\b|[mµ]?L\b)/g)].map((match) => diagnostic('present/typed-number', `\`${match[0]}\` is typed into the template`, {
    place: part.place, actual: match[0], expected: 'a directive that takes the number from the record', mend: 'Replace it by a directive, or by words without the number',
  }))
}

function printable(node: (TemplatePart & { readonly kind: 'block' })['node']): readonly MarkdownBlock[] {
  return node.type === 'list' || node.type === 'table' || node.type === 'blockquote' || node.type === 'code' || node.type === 'thematicBreak' ? [node] : []
}

function inlineOf(piece: TemplatePiece, section: Section, found: Diagnostic[]): Inline {
  switch (piece.kind) {
    case 'text': return { type: 'text', value: piece.text }
    case 'code': return { type: 'inlineCode', value: piece.text }
    case 'emphasis': case 'strong': return { type: piece.kind, children: [{ type: 'text', value: piece.text }] }
    case 'value': {
      const value = valueAt(section.record.study, piece.path)
      if (value !== undefined) return { type: 'text', value }
      found.push(diagnostic('present/unknown-value', `The record holds no value \`${piece.path}\``, {
        place: piece.place, actual: piece.path, expected: 'a path into the study, such as report.number or method.technique', mend: 'Correct the path',
      }))
      return { type: 'text', value: '' }
    }
  }
}

/** A text or number of the study by its path; lists and maps are no value. */
function valueAt(root: unknown, path: string): string | undefined {
  let at: unknown = root
  for (const key of path.split('.')) {
    if (typeof at !== 'object' || at === null || !Object.hasOwn(at, key)) return undefined
    at = (at as Record<string, unknown>)[key]
  }
  return typeof at === 'string' || typeof at === 'number' ? String(at) : undefined
}
