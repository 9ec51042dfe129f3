// Diagnostics → text for a person, or plain data for a program. What stands in the user's files is never sent to a terminal raw:
// control and direction-changing characters are shown as escapes, so that a file cannot repaint the screen it is complained about on.
import { codeFrame } from './code-frame.ts'
import type { Diagnostic, Severity } from './diagnostic.ts'
import { foldDiagnostics, type FoldedDiagnostic } from './fold.ts'
import type { Place } from './place.ts'
import { visible } from './visible.ts'

export interface PrintChoice {
  /** File as named in places → its text; a file that is absent gets no code frame. */
  readonly sources: ReadonlyMap<string, string>
  readonly colour: boolean
}

/** In the order of the files, then of their lines; what has no place comes last. Empty text when there is nothing to say. */
export function printDiagnostics(diagnostics: readonly Diagnostic[], choice: PrintChoice): string {
  if (diagnostics.length === 0) return ''
  const lines = new Map<string, readonly string[]>()
  const linesOf = (file: string): readonly string[] | undefined => {
    const text = choice.sources.get(file)
    if (text === undefined) return undefined
    const known = lines.get(file) ?? text.replace(/^\uFEFF/, '').split(/\r\n|\r|\n/)
    lines.set(file, known)
    return known
  }
  const told = foldDiagnostics(inOrder(diagnostics)).map((each) => oneDiagnostic(each, linesOf, paint(choice.colour)))
  return [...told, countLine(diagnostics)].join('\n\n')
}

/** For programs: the same data, keys without a value left out, order as given. The whole answer carries its own `format`. */
export function diagnosticsAsJson(diagnostics: readonly Diagnostic[]): readonly Diagnostic[] {
  return diagnostics.map((each) => JSON.parse(JSON.stringify(each)) as Diagnostic)
}

export function placeText(place: Place): string {
  const file = visible(place.file)
  if (place.sheet !== undefined) return `${file}[${visible(place.sheet)}]${place.cell === undefined ? '' : `!${visible(place.cell)}`}`
  return [file, ...(place.line === undefined ? [] : [place.line, ...(place.column === undefined ? [] : [place.column])])].join(':')
}

function inOrder(diagnostics: readonly Diagnostic[]): readonly Diagnostic[] {
  const files = [...new Set(diagnostics.map((each) => each.place?.file))]
  const rank = (each: Diagnostic): readonly number[] => [each.place === undefined ? Infinity : files.indexOf(each.place.file), each.place?.line ?? 0, each.place?.column ?? 0]
  return diagnostics.map((each) => ({ each, rank: rank(each) })).sort((left, right) => {
    const at = left.rank.findIndex((value, index) => value !== right.rank[index])
    return at < 0 ? 0 : (left.rank[at] ?? 0) < (right.rank[at] ?? 0) ? -1 : 1
  }).map(({ each }) => each)
}

type Paint = (style: Severity | 'faint' | 'strong', text: string) => string

function paint(colour: boolean): Paint {
  const styles = { error: '31', warning: '33', note: '36', faint: '2', strong: '1' } as const
  return (style, text) => (colour ? `\u001b[${styles[style]}m${text}\u001b[0m` : text)
}

function oneDiagnostic({ diagnostic, others }: FoldedDiagnostic, linesOf: (file: string) => readonly string[] | undefined, painted: Paint): string {
  const { place } = diagnostic
  const head = [
    ...(place === undefined ? [] : [painted('strong', placeText(place))]), painted(diagnostic.severity, diagnostic.severity), visible(diagnostic.message), painted('faint', `[${diagnostic.code}]`),
  ].join(' ')
  const lines = place === undefined ? undefined : linesOf(place.file)
  const frame = place === undefined || lines === undefined ? [] : codeFrame(lines, place).map((line) => `  ${painted('faint', line)}`)
  const said = (label: string, text: string | undefined): readonly string[] => (text === undefined || text === '' ? [] : [`  ${label}: ${visible(text)}`])
  // What was found is read off the frame or the message; it is told apart only where neither shows it.
  const isShown = frame.length > 0 || diagnostic.actual === undefined || diagnostic.message.includes(diagnostic.actual)
  return [
    head, ...frame, ...(isShown ? [] : said('found', diagnostic.actual)), ...said('expected', diagnostic.expected), ...said('to mend', diagnostic.mend),
    ...(diagnostic.related ?? []).map((each) => `  see ${placeText(each.place)} ${visible(each.message)}`),
    ...(others.length === 0 ? [] : [`  and ${others.length} more like it: ${others.slice(0, 4).map((each) => (each.place === undefined ? visible(each.message) : placeText(each.place))).join(', ')}${others.length > 4 ? ', …' : ''}`]),
  ].join('\n')
}

function countLine(diagnostics: readonly Diagnostic[]): string {
  const parts = (['error', 'warning', 'note'] as const).flatMap((severity) => {
    const count = diagnostics.filter((each) => each.severity === severity).length
    return count === 0 ? [] : [`${count} ${severity}${count === 1 ? '' : 's'}`]
  })
  return parts.join(', ')
}
