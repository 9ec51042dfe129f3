// What is wrong with a template: directives that do not exist, values that the record does not hold, results typed by hand, and blocks
// that no report prints. Found without building the report, so that a check stays quick.
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import { directives } from './directives.ts'
import type { TemplatePart } from './template.ts'

/** From here on headings are annexes, lettered instead of numbered. */
export const annexesDirective = 'annexes'

export function templateProblems(parts: readonly TemplatePart[], study: object): readonly Diagnostic[] {
  return parts.flatMap((part): readonly Diagnostic[] => {
    switch (part.kind) {
      case 'heading': return []
      case 'directive': return unknownDirective(part)
      case 'paragraph': return [...unknownValues(part, study), ...typedNumbers(part)]
      case 'block': return unprintable(part)
    }
  })
}

function unknownDirective(part: TemplatePart & { readonly kind: 'directive' }): readonly Diagnostic[] {
  const known = [...Object.keys(directives), annexesDirective]
  if (known.includes(part.name)) return []
  const guess = nearest(part.name, known)
  return [diagnostic('present/unknown-directive', `Unexpected directive \`${part.name}\``, {
    place: part.place, actual: part.name, expected: `one of: ${known.join(', ')}`, mend: guess === undefined ? 'Remove the line, or write a known directive' : `Write \`::${guess}\``,
  })]
}

function unknownValues(part: TemplatePart & { readonly kind: 'paragraph' }, study: object): readonly Diagnostic[] {
  return part.pieces.flatMap((piece) => (piece.kind !== 'value' || valueAt(study, piece.path) !== undefined ? [] : [diagnostic('present/unknown-value', `The record holds no value \`${piece.path}\``, {
    place: piece.place, actual: piece.path, expected: 'a path into the study, such as report.number or method.technique', mend: 'Correct the path',
  })]))
}

/** A result typed into a template would stay when the data change. */
function typedNumbers(part: TemplatePart & { readonly kind: 'paragraph' }): readonly Diagnostic[] {
  const text = part.pieces.map((piece) => ('text' in piece ? piece.text : '')).join('')
  return [...text.matchAll(/\d[\d.,]*[ \u00a0\u202f]?(?:%|‰|[kmµn]?g\/|[kmµn]?g\b|[mµn]?mol\b|[mµ]?L\b)/g)].map((match) => diagnostic('present/typed-number', `\`${match[0]}\` is typed into the template`, {
    place: part.place, actual: match[0], expected: 'a directive that takes the number from the record', mend: 'Replace it by a directive, or by words without the number',
  }))
}

function unprintable(part: TemplatePart & { readonly kind: 'block' }): readonly Diagnostic[] {
  if (['list', 'table', 'blockquote', 'code', 'thematicBreak'].includes(part.node.type)) return []
  return [diagnostic('present/unprintable-block', `A report does not print \`${part.node.type}\``, { place: part.place, actual: part.node.type, expected: 'paragraphs, headings, lists, tables, quotations, code and directives', mend: 'Write it in another way, or remove it' })]
}

/** A text or number of the study by its path; lists and maps are no value. */
export function valueAt(root: object, path: string): string | undefined {
  let at: unknown = root
  for (const key of path.split('.')) {
    if (typeof at !== 'object' || at === null || !Object.hasOwn(at, key)) return undefined
    at = (at as Record<string, unknown>)[key]
  }
  return typeof at === 'string' || typeof at === 'number' ? String(at) : undefined
}
