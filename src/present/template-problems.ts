// What is wrong with a template: directives that do not exist, values that the record does not hold, results typed by hand, and blocks
// that no report prints. Found without building the report, so that a check stays quick.
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { nearest } from '../diagnostics/nearest.ts'
import { directives } from './directives.ts'
import type { TemplatePart } from './template.ts'

/** From here on headings are annexes, lettered instead of numbered. */
export const annexesDirective = 'annexes'

/** What a report cannot be without: who signs what, how it came out, and what was taken out or noticed on the way. */
const needed = ['cover', 'sign-off', 'overall', 'conformity', 'assessments', 'exclusions', 'files', 'diagnostics'] as const

/** Attributes a directive takes; the others take none. */
const attributesOf: Readonly<Record<string, readonly string[]>> = { text: ['name'], contents: ['title'] }

export interface TemplateCheck {
  readonly file: string
  readonly parts: readonly TemplatePart[]
}

/** `study` is what `:value[…]` reads; `texts` are the laboratory's own, each of which must be printed somewhere. */
export function templateProblems({ file, parts }: TemplateCheck, study: { readonly file: string; readonly texts: Readonly<Record<string, string>> }): readonly Diagnostic[] {
  return [
    ...parts.flatMap((part): readonly Diagnostic[] => {
      switch (part.kind) {
        case 'heading': return []
        case 'directive': return directiveProblems(part)
        case 'paragraph': return [...looseDirective(part), ...unknownValues(part, study), ...typedNumbers(part)]
        case 'block': return unprintable(part)
      }
    }),
    ...leftOut(file, parts), ...unprintedTexts(parts, study),
  ]
}

function directiveProblems(part: TemplatePart & { readonly kind: 'directive' }): readonly Diagnostic[] {
  const known = [...Object.keys(directives), annexesDirective]
  if (!known.includes(part.name)) {
    const guess = nearest(part.name, known)
    return [diagnostic('present/unknown-directive', `Unexpected directive \`${part.name}\``, {
      place: part.place, actual: part.name, expected: `one of: ${known.join(', ')}`, mend: guess === undefined ? 'Remove the line, or write a known directive' : `Write \`::${guess}\``,
    })]
  }
  if (part.hasContent) return [diagnostic('present/unknown-directive', `Unexpected third colon: \`${part.name}\` takes nothing inside`, { place: part.place, actual: `:::${part.name}`, expected: `\`::${part.name}\``, mend: `Write \`::${part.name}\` on a line of its own` })]
  const taken = attributesOf[part.name] ?? []
  const strangers = Object.keys(part.attributes).filter((key) => !taken.includes(key))
  const missing = part.name === 'text' && part.attributes['name'] === undefined
  return strangers.length === 0 && !missing ? [] : [diagnostic('present/unknown-directive', strangers.length === 0 ? `\`${part.name}\` does not say which text` : `Unexpected \`${strangers.join(', ')}\` of directive \`${part.name}\``, {
    place: part.place, actual: strangers.join(', '), expected: taken.length === 0 ? 'nothing in braces' : `{${taken.join('=… ')}=…}`, mend: part.name === 'text' ? 'Write `::text{name=conclusion}`' : 'Remove what stands in braces',
  })]
}

/** `:: conformity` is no directive but a paragraph, and would be printed as it stands. */
function looseDirective(part: TemplatePart & { readonly kind: 'paragraph' }): readonly Diagnostic[] {
  const first = part.pieces[0]
  if (first?.kind !== 'text' || !first.text.startsWith('::')) return []
  return [diagnostic('present/unknown-directive', `Unexpected text \`${first.text.slice(0, 40)}\` that begins like a directive`, { place: part.place, actual: first.text.slice(0, 40), expected: '`::name` on a line of its own', mend: 'Write the name right after the two colons, with an empty line before and after' })]
}

function leftOut(file: string, parts: readonly TemplatePart[]): readonly Diagnostic[] {
  const held = new Set(parts.flatMap((part) => (part.kind === 'directive' ? [part.name] : [])))
  return needed.filter((name) => !held.has(name)).map((name) => diagnostic('present/missing-directive', `The template leaves out \`${name}\``, { place: { file, line: 1 }, actual: 'no such directive', expected: needed.join(', '), mend: `Add \`::${name}\` on a line of its own` }))
}

function unprintedTexts(parts: readonly TemplatePart[], study: { readonly file: string; readonly texts: Readonly<Record<string, string>> }): readonly Diagnostic[] {
  const printed = parts.flatMap((part) => (part.kind === 'directive' && part.name === 'text' ? [part.attributes['name'] ?? ''] : []))
  return Object.keys(study.texts).filter((name) => !printed.includes(name)).map((name) => {
    const guess = nearest(name, printed)
    return diagnostic('present/unprinted-text', `The text \`${name}\` of the study stands nowhere in the report`, { place: { file: study.file }, actual: name, expected: `a text that the template prints: ${printed.join(', ')}`, mend: guess === undefined ? `Add \`::text{name=${name}}\` to the template` : `Write \`${guess}:\` under \`texts:\`` })
  })
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
