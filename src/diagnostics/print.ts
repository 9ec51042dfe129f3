// Diagnostics → lines for a person (place, message, code frame, expected, how to mend) or plain data for a program.
// What comes from the user's files is never printed raw: control and escape characters are shown by their number.
import { codes } from './codes.ts'
import type { Diagnostic } from './diagnostic.ts'
import type { Place } from './place.ts'

export interface Printing {
  /** Text of files by path, for code frames. */
  readonly sources: ReadonlyMap<string, string>
  readonly colour?: boolean
}

const foldAbove = 5 // equal problems; more than a screen of the same says no more
const frameWidth = 100 // characters of a line shown around the place
const order = { error: 0, warning: 1, note: 2 } as const

export function printDiagnostics(diagnostics: readonly Diagnostic[], printing: Printing): string {
  const groups = folded([...diagnostics].sort((left, right) => order[left.severity] - order[right.severity]))
  return groups.map((group) => printGroup(group, printing)).join('\n\n')
}

export function diagnosticsAsJson(diagnostics: readonly Diagnostic[]): readonly Readonly<Record<string, unknown>>[] {
  return diagnostics.map((each) => ({
    code: each.code, severity: each.severity, message: each.message, place: each.place ?? null, actual: each.actual ?? null,
    expected: each.expected ?? null, mend: each.mend ?? null, related: each.related ?? [], help: codes[each.code].help,
  }))
}

/** Printable form of text from outside: control characters by number, so that no file can move the cursor or colour the screen. */
export function harmless(text: string): string {
  return text.replace(/[\u0000-\u0008\u000b-\u001f\u007f-\u009f\u061c\u200e\u200f\u202a-\u202e\u2066-\u2069]/g, (sign) => `\\u${sign.charCodeAt(0).toString(16).padStart(4, '0')}`).replace(/\t/g, ' ')
}

/** Diagnostics that say the same of many places stand together: same code, and same message but for what is quoted or counted. */
function folded(diagnostics: readonly Diagnostic[]): readonly (readonly Diagnostic[])[] {
  const groups = new Map<string, Diagnostic[]>()
  for (const each of diagnostics) {
    const key = `${each.code}\u0000${each.place?.file ?? ''}\u0000${each.message.replace(/`[^`]*`|\d+/g, '…')}`
    const group = groups.get(key)
    if (group === undefined) groups.set(key, [each])
    else group.push(each)
  }
  return [...groups.values()].flatMap((group) => (group.length > foldAbove ? [group] : group.map((each) => [each])))
}

function printGroup(group: readonly Diagnostic[], { sources, colour }: Printing): string {
  const first = group[0]
  if (first === undefined) return ''
  const paint = (code: number, text: string): string => (colour ? `\u001b[${code}m${text}\u001b[0m` : text)
  const tone = { error: 31, warning: 33, note: 36 }[first.severity]
  const lines = [`${placeText(first.place)}${paint(tone, first.severity)} ${harmless(first.message)} [${first.code}]`]
  if (first.place !== undefined) lines.push(...frame(first.place, sources))
  if (first.expected !== undefined && first.expected !== '') lines.push(`  expected: ${harmless(first.expected)}`)
  if (first.mend !== undefined && first.mend !== '') lines.push(`  mend: ${harmless(first.mend)}`)
  for (const related of first.related ?? []) lines.push(`  ${harmless(related.message)}: ${placeText(related.place).trimEnd().replace(/:$/, '')}`)
  if (group.length > 1) {
    lines.push(`  the same at ${group.length - 1} more places: ${group.slice(1, 4).map((each) => placeText(each.place).trimEnd().replace(/:$/, '')).join(', ')}${group.length > 4 ? ', …' : ''}`)
  }
  return lines.join('\n')
}

function placeText(place: Place | undefined): string {
  if (place === undefined) return ''
  const file = harmless(place.file)
  if (place.sheet !== undefined) return `${file}[${harmless(place.sheet)}]${place.cell === undefined ? '' : `!${place.cell}`}: `
  return `${[file, place.line, place.line === undefined ? undefined : place.column].filter((part) => part !== undefined).join(':')}: `
}

function frame(place: Place, sources: ReadonlyMap<string, string>): readonly string[] {
  const text = sources.get(place.file)
  if (text === undefined || place.line === undefined) return []
  const lines = text.split(/\r\n|\r|\n/)
  const line = lines[place.line - 1]
  if (line === undefined) return []
  const column = place.column ?? 1
  const from = Math.max(0, column - 1 - frameWidth / 2)
  const window = (given: string): string => harmless(given.slice(from, from + frameWidth))
  const gutter = String(place.line).length
  const before = harmless(line.slice(from, column - 1)).length
  const marked = Math.max(1, harmless(line.slice(column - 1, Math.min(column - 1 + (place.length ?? 1), from + frameWidth))).length)
  const previous = lines[place.line - 2]
  return [
    ...(previous === undefined || previous.trim() === '' ? [] : [`  ${String(place.line - 1).padStart(gutter)} | ${window(previous)}`]),
    `> ${place.line} | ${window(line)}`,
    ...(place.column === undefined ? [] : [`  ${' '.repeat(gutter)} | ${' '.repeat(before)}${'^'.repeat(marked)}`]),
  ]
}
