// YAML text → a tree in which every node keeps its place and every scalar the text as typed. All problems of the text are told at once.
// Tabs, duplicate keys, aliases, several documents and what looks like a number but is none are errors, since each has cost a laboratory a result.
import { type Document, isAlias, isMap, isScalar, isSeq, LineCounter, type Node, parseAllDocuments } from 'yaml'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { Place } from '../diagnostics/place.ts'
import type { StageResult } from '../diagnostics/stage-result.ts'
import type { MapEntry, StudyNode } from './study-node.ts'

const deepest = 24 // levels; a study has about eight
const largest = 8 * 1024 * 1024 // characters; hundreds of measurands need a few hundred thousand

export function readYaml(source: { readonly file: string; readonly text: string }): StageResult<StudyNode> {
  const text = source.text.replace(/^\uFEFF/, '')
  const lines = new LineCounter()
  const place = (from: number, to: number): Place => {
    const { line, col } = lines.linePos(Math.min(from, text.length))
    const lineEnd = text.indexOf('\n', from)
    return { file: source.file, line: Math.max(1, line), column: Math.max(1, col), length: Math.max(1, Math.min(to, lineEnd < 0 ? text.length : lineEnd) - from) }
  }
  const problem = (message: string, at: Place, details: { readonly expected: string; readonly mend: string; readonly actual?: string }): Diagnostic => diagnostic('definition/not-yaml', message, { place: at, ...details })
  const start: Place = { file: source.file, line: 1, column: 1 }
  if (text.length > largest) return { value: undefined, diagnostics: [problem('The study is too long', start, { expected: `at most ${largest} characters`, mend: 'Move data into raw files' })] }
  const odd = /[\u0000-\u0008\u000b\u000c\u000e-\u001f\u007f\uFFFD]/.exec(text)
  if (odd !== null) {
    let line = 1
    let from = 0
    for (let index = text.indexOf('\n'); index >= 0 && index < odd.index; index = text.indexOf('\n', index + 1)) { line += 1; from = index + 1 }
    return { value: undefined, diagnostics: [problem('Unexpected control character, or text that is not UTF-8', { file: source.file, line, column: odd.index - from + 1, length: 1 }, { actual: `U+${odd[0].charCodeAt(0).toString(16).toUpperCase().padStart(4, '0')}`, expected: 'plain text in UTF-8', mend: 'Remove the character, or save the study as UTF-8' })] }
  }
  const documents: readonly Document.Parsed[] = [...parseAllDocuments(text, { lineCounter: lines, prettyErrors: false, uniqueKeys: true, version: '1.2', strict: true, merge: false, logLevel: 'silent' }) as Iterable<Document.Parsed>]
  const diagnostics: Diagnostic[] = []
  for (const document of documents) for (const error of [...document.errors, ...document.warnings]) {
    const told = explained(error.code, error.message)
    diagnostics.push(diagnostic(error.code === 'DUPLICATE_KEY' ? 'definition/duplicate-key' : 'definition/not-yaml', told.message, { place: place(error.pos[0], error.pos[1]), expected: told.expected, mend: told.mend }))
  }
  const first = documents[0]
  if (documents.length > 1 && diagnostics.length === 0) diagnostics.push(problem('Unexpected second document', place(documents[1]?.range[0] ?? 0, documents[1]?.range[0] ?? 0), { expected: 'one study per file', mend: 'Remove the line `---`, or split the file' }))
  if (first?.contents == null) {
    if (diagnostics.length === 0) diagnostics.push(problem('The study is empty', start, { expected: 'a study definition', mend: 'Begin with `format: 1`' }))
    return { value: undefined, diagnostics }
  }
  if (diagnostics.length > 0) return { value: undefined, diagnostics }
  const walk = (node: Node | null, at: Place, depth: number): StudyNode => {
    if (depth > deepest) {
      diagnostics.push(problem('The study is nested too deeply', at, { expected: `at most ${deepest} levels`, mend: 'Remove levels' }))
      return { kind: 'scalar', text: '', quoted: false, value: null, place: at }
    }
    if (node === null) return { kind: 'scalar', text: '', quoted: false, value: null, place: at }
    const [from, to] = node.range ?? [0, 0]
    const own = place(from, to)
    if (isAlias(node) || ('anchor' in node && node.anchor !== undefined)) {
      diagnostics.push(problem('Unexpected anchor or alias', own, { expected: 'everything written out', mend: 'Write the value where it is needed' }))
      return { kind: 'scalar', text: '', quoted: false, value: null, place: own }
    }
    if (isMap(node)) {
      return { kind: 'map', place: own, entries: node.items.map((item): MapEntry => {
        const key = item.key as Node
        const [keyFrom, keyTo] = key.range ?? [from, from]
        const keyPlace = place(keyFrom, keyTo)
        if (!isScalar(key)) diagnostics.push(problem('Unexpected key that is no plain text', keyPlace, { expected: 'a word', mend: 'Write a word before the colon' }))
        return { key: isScalar(key) ? (key.source ?? String(key.value)) : '', keyPlace, value: walk(item.value as Node | null, keyPlace, depth + 1) }
      }) }
    }
    if (isSeq(node)) return { kind: 'list', place: own, items: node.items.map((item) => walk(item as Node | null, own, depth + 1)) }
    if (isScalar(node)) {
      const quoted = node.type === 'QUOTE_DOUBLE' || node.type === 'QUOTE_SINGLE'
      const block = node.type === 'BLOCK_FOLDED' || node.type === 'BLOCK_LITERAL'
      const value = node.value
      return {
        kind: 'scalar', quoted: quoted || block, place: own, text: quoted || block || node.source === undefined ? String(value ?? '') : node.source.trim().replace(/\s*\n\s*/g, ' '),
        value: typeof value === 'string' || typeof value === 'number' || typeof value === 'boolean' || value === null ? value : String(value),
      }
    }
    throw new Error('a kind of YAML node that YAML does not have')
  }
  const value = walk(first.contents, start, 0)
  return { value: diagnostics.length > 0 ? undefined : value, diagnostics }
}

function explained(code: string, message: string): { readonly message: string; readonly expected: string; readonly mend: string } {
  const first = message.split('\n')[0]?.replace(/\.$/, '') ?? message
  switch (code) {
    case 'TAB_AS_INDENT': return { message: 'Unexpected tab', expected: 'spaces before a key', mend: 'Replace the tab by spaces' }
    case 'DUPLICATE_KEY': return { message: 'Unexpected second key of the same name', expected: 'each key once', mend: 'Remove one of the two, or rename it' }
    case 'BAD_INDENT': case 'MISSING_CHAR': case 'BLOCK_AS_IMPLICIT_KEY': case 'MULTILINE_IMPLICIT_KEY': return { message: `Cannot read this as YAML: ${first}`, expected: '`key: value`, indented with spaces like its neighbours', mend: 'Correct the indentation, the colon or the bracket here or in the line before' }
    default: return { message: `Cannot read this as YAML: ${first}`, expected: 'YAML', mend: 'Correct the line; a text with a colon, a number sign or brackets needs quotes' }
  }
}
