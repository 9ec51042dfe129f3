// The line a diagnostic points at, the line before it, and a caret line: what a reader needs to find the place without opening the file.
import type { Place } from './place.ts'
import { harmless } from './harmless.ts'

const widest = 100 // characters of source shown; a longer line is cut to a window around the caret
const lead = 40 // characters kept before the caret in a cut line

export function codeFrame(lines: readonly string[], place: Place): readonly string[] {
  const { line, column = 1 } = place
  const pointed = line === undefined ? undefined : lines[line - 1]
  if (line === undefined || pointed === undefined) return []
  const gutter = String(line).length
  const start = pointed.length > widest ? Math.max(0, column - 1 - lead) : 0
  const window = (text: string): string => shown(`${start > 0 && text.length > start ? '…' : ''}${text.slice(start, start + widest)}${text.length > start + widest ? '…' : ''}`)
  const ahead = shown(`${start > 0 ? '…' : ''}${pointed.slice(start, column - 1)}`)
  const marked = shown(pointed.slice(column - 1, column - 1 + Math.max(1, place.length ?? 1)).slice(0, Math.max(1, start + widest - column + 1)))
  const before = line > 1 ? [`  ${String(line - 1).padStart(gutter)} | ${window(lines[line - 2] ?? '')}`] : []
  return [
    ...before.map((text) => text.trimEnd()),
    `> ${line} | ${window(pointed)}`.trimEnd(),
    `  ${' '.repeat(gutter)} | ${' '.repeat(width(ahead))}${'^'.repeat(Math.max(1, width(marked)))}`,
  ]
}

/** A tab counts as one space here, so that the caret stands where it should. */
function shown(text: string): string {
  return harmless(text.replaceAll('\t', ' '))
}

/** Columns on a terminal, near enough: combining marks take none, and wide East Asian signs two. */
function width(text: string): number {
  let columns = 0
  for (const character of text) {
    if (/\p{Mark}/u.test(character)) continue
    columns += /[\u1100-\u115f\u2e80-\ua4cf\uac00-\ud7a3\uf900-\ufaff\ufe30-\ufe6f\uff00-\uff60\uffe0-\uffe6]/.test(character) ? 2 : 1
  }
  return columns
}
