// Diagnostics → lines for a person (place, message, code frame, expected, how to mend) or plain data for a program.
// Errors come first, then warnings and notes; within each, the order of the files and of their lines.
import { codeFrame } from './code-frame.ts'
import { codes } from './codes.ts'
import type { Diagnostic, Severity } from './diagnostic.ts'
import { foldDiagnostics, type FoldedDiagnostic } from './fold.ts'
import { harmless } from './harmless.ts'
import type { Place } from './place.ts'

export interface Printing {
  /** Text of files by path, for code frames; a file that is absent gets none. */
  readonly sources: ReadonlyMap<string, string>
  readonly colour?: boolean
}

/** Empty when there is nothing to say. */
export function printDiagnostics(diagnostics: readonly Diagnostic[], { sources, colour = false }: Printing): string {
  if (diagnostics.length === 0) return ''
  const split = new Map<string, readonly string[]>()
  const linesOf = (file: string): readonly string[] | undefined => {
    const text = sources.get(file)
    if (text === undefined) return undefined
    const lines = split.get(file) ?? text.replace(/^\uFEFF/, '').split(/\r\n|\r|\n/)
    split.set(file, lines)
    return lines
  }
  const paint: Paint = (style, text) => (colour ? `\u001b[${styles[style]}m${text}\u001b[0m` : text)
  return [...foldDiagnostics(inOrder(diagnostics)).map((each) => printOne(each, linesOf, paint)), countLine(diagnostics)].join('\n\n')
}

export function diagnosticsAsJson(diagnostics: readonly Diagnostic[]): readonly Readonly<Record<string, unknown>>[] {
  return diagnostics.map((each) => ({
    code: each.code, severity: each.severity, message: each.message, place: each.place ?? null, actual: each.actual ?? null,
    expected: each.expected ?? null, mend: each.mend ?? null, related: each.related ?? [], help: codes[each.code].help,
  }))
}

/** `study.yaml:6:11`, or `week-1.xlsx[Sheet1]!B7`. */
export function placeText(place: Place): string {
  const file = harmless(place.file)
  if (place.sheet !== undefined) return `${file}[${harmless(place.sheet)}]${place.cell === undefined ? '' : `!${harmless(place.cell)}`}`
  return [file, ...(place.line === undefined ? [] : [place.line, ...(place.column === undefined ? [] : [place.column])])].join(':')
}

const severities = ['error', 'warning', 'note'] as const

function inOrder(diagnostics: readonly Diagnostic[]): readonly Diagnostic[] {
  const files = [...new Set(diagnostics.map((each) => each.place?.file))]
  const ranked = diagnostics.map((each) => ({
    each, rank: [severities.indexOf(each.severity), each.place === undefined ? files.length : files.indexOf(each.place.file), each.place?.line ?? 0, each.place?.column ?? 0],
  }))
  ranked.sort((left, right) => {
    const at = left.rank.findIndex((value, index) => value !== right.rank[index])
    return at < 0 ? 0 : (left.rank[at] ?? 0) - (right.rank[at] ?? 0)
  })
  return ranked.map(({ each }) => each)
}

type Paint = (style: keyof typeof styles, text: string) => string

const styles = { error: '31', warning: '33', note: '36', faint: '2', strong: '1' } as const satisfies Record<Severity | 'faint' | 'strong', string>

function printOne({ diagnostic, others }: FoldedDiagnostic, linesOf: (file: string) => readonly string[] | undefined, paint: Paint): string {
  const { place } = diagnostic
  const lines = place === undefined ? undefined : linesOf(place.file)
  const frame = place === undefined || lines === undefined ? [] : codeFrame(lines, place)
  const said = (label: string, text: string | undefined): readonly string[] => (text === undefined || text === '' ? [] : [`  ${label}: ${harmless(text)}`])
  // What was found is read off the frame or the message; it is told apart only where neither shows it.
  const shownLine = frame.length === 0 ? '' : (lines?.[(place?.line ?? 0) - 1] ?? '')
  const isShown = diagnostic.actual === undefined || diagnostic.message.includes(diagnostic.actual) || shownLine.includes(diagnostic.actual.replace(/^`|`$/g, ''))
  return [
    [...(place === undefined ? [] : [paint('strong', placeText(place))]), paint(diagnostic.severity, diagnostic.severity), harmless(diagnostic.message), paint('faint', `[${diagnostic.code}]`)].join(' '),
    ...frame.map((line) => `  ${paint('faint', line)}`),
    ...(isShown ? [] : said('found', diagnostic.actual)), ...said('expected', diagnostic.expected), ...said('to mend', diagnostic.mend),
    ...(diagnostic.related ?? []).map((each) => `  see ${placeText(each.place)}: ${harmless(each.message)}`),
    ...(others.length === 0 ? [] : [`  and ${others.length} more like it: ${firstPlaces(others)}`]),
  ].join('\n')
}

function firstPlaces(others: readonly Diagnostic[]): string {
  const shown = 4 // enough to see a pattern
  return [...others.slice(0, shown).map((each) => (each.place === undefined ? harmless(each.message) : placeText(each.place))), ...(others.length > shown ? ['…'] : [])].join(', ')
}

function countLine(diagnostics: readonly Diagnostic[]): string {
  return severities.flatMap((severity) => {
    const count = diagnostics.filter((each) => each.severity === severity).length
    return count === 0 ? [] : [`${count} ${severity}${count === 1 ? '' : 's'}`]
  }).join(', ')
}
