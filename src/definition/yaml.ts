// YAML text → a tree in which every node keeps its place and every scalar the text as typed. All problems of the text are told at once.
// Only the part of YAML that every program reads alike is taken: no anchors, tags or directives, and each key once.
import { Composer, type Document, isAlias, isMap, isScalar, isSeq, Lexer, LineCounter, Parser } from 'yaml'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { Place } from '../diagnostics/place.ts'
import type { StageResult } from '../diagnostics/stage-result.ts'
import type { MapEntry, ScalarNode, StudyNode } from './study-node.ts'
import { explainYamlError } from './yaml-errors.ts'

const deepest = 40 // open collections; a study has about eight, and deeper text could exhaust the stack
const longest = 2 * 1024 * 1024 // characters; a study with hundreds of measurands has some hundred thousand

const marks: readonly string[] = ['\u0002', '\u0018', '\u001f'] // what the lexer adds for document, flow end and scalar: no text of the study

/** `place(from, to)` of offsets in the text; the underlined part ends with the line. */
type PlaceOf = (from: number, to: number) => Place

/** No value when the text cannot be trusted; a value beside errors (a key that stands twice) when the rest can still be read. */
export function readYaml(source: { readonly file: string; readonly text: string }): StageResult<StudyNode> {
  const text = source.text.replace(/^\uFEFF/, '')
  const lines = new LineCounter()
  const placeOf: PlaceOf = (from, to) => {
    const { line, col } = lines.linePos(Math.min(from, text.length))
    const next = lines.lineStarts[line] ?? text.length + 1
    const end = text[next - 2] === '\r' ? next - 2 : next - 1
    return { file: source.file, line: Math.max(1, line), column: Math.max(1, col), length: Math.max(1, Math.min(to, end) - from) }
  }
  const start: Place = { file: source.file, line: 1, column: 1 }
  if (text.length > longest) {
    return refused([diagnostic('definition/too-long', 'The study is too long', { place: start, actual: `${text.length} characters`, expected: `at most ${longest} characters`, mend: 'Move data into raw files and name them under `data`' })])
  }
  for (let index = text.indexOf('\n'), from = 0; ; from = index + 1, index = text.indexOf('\n', from)) {
    lines.addNewLine(from)
    if (index < 0) break
  }
  const control = controlCharacters(text, placeOf)
  if (control.length > 0) return refused(control)
  const read = documentOf(text, placeOf)
  if (read.diagnostics.length > 0) return refused(read.diagnostics)
  if (read.document?.contents == null) return refused([diagnostic('definition/empty-study', 'The study is empty', { place: start, actual: 'nothing but comments or blank lines', expected: 'a study definition', mend: 'Begin with `format: 1`' })])
  const diagnostics: Diagnostic[] = []
  const value = walk(read.document.contents, start, (found) => diagnostics.push(found), placeOf)
  return { value: diagnostics.some((each) => each.code === 'definition/yaml-feature') ? undefined : value, diagnostics }
}

function refused(diagnostics: readonly Diagnostic[]): StageResult<StudyNode> {
  return { value: undefined, diagnostics }
}

/** Controls and direction marks deceive the eye of whoever reviews the study; U+FFFD is what a wrong encoding leaves. */
function controlCharacters(text: string, placeOf: PlaceOf): readonly Diagnostic[] {
  return [...text.matchAll(/(?![\t\n\r\u0085])[\p{Cc}\u200e\u200f\u202a-\u202e\u2066-\u2069\ufeff\ufffd]/gu)].map((match) => {
    const number = `U+${match[0].charCodeAt(0).toString(16).toUpperCase().padStart(4, '0')}`
    const [message, mend] = match[0] === '\ufffd'
      ? ['Unexpected bytes that are not UTF-8', 'Save the study as UTF-8']
      : [`Unexpected invisible character ${number}`, 'Remove the character']
    return diagnostic('definition/control-character', message, { place: placeOf(match.index, match.index + 1), actual: number, expected: 'visible text in UTF-8', mend })
  })
}

/** A document with diagnostics is not to be trusted. */
function documentOf(text: string, placeOf: PlaceOf): { readonly document?: Document.Parsed | undefined; readonly diagnostics: readonly Diagnostic[] } {
  // The tree is built only after its depth is known, since building it is recursive.
  const parser = new Parser()
  const tokens = []
  let offset = 0
  for (const lexeme of new Lexer().lex(text)) {
    tokens.push(...parser.next(lexeme))
    if (parser.stack.length > deepest) {
      return { diagnostics: [diagnostic('definition/too-deep', 'The study is nested too deeply', { place: placeOf(offset, offset + 1), expected: `at most ${deepest} levels`, mend: 'Remove levels, or close brackets that are open' })] }
    }
    offset += marks.includes(lexeme) ? 0 : lexeme.length
  }
  tokens.push(...parser.end())
  const documents = [...new Composer({ version: '1.2', uniqueKeys: false, strict: true, merge: false, prettyErrors: false, logLevel: 'silent' }).compose(tokens)]
  const told = new Set<number | undefined>() // one line, one diagnostic: what follows from an error is no news
  const errors = documents.flatMap((document) => [...document.errors, ...document.warnings])
  // A tab shifts all that follows it, so the lines after it are complained of without being wrong.
  const tabs = errors.filter((error) => error.code === 'TAB_AS_INDENT')
  const diagnostics = (tabs.length > 0 ? tabs : errors).flatMap((error) => {
    const place = placeOf(...error.pos)
    if (told.has(place.line)) return []
    told.add(place.line)
    return [explainYamlError(error.code, place, text.slice(error.pos[0], error.pos[0] + 1))]
  })
  const second = documents[1]
  if (second !== undefined) {
    diagnostics.push(diagnostic('definition/several-documents', 'Unexpected second document', { place: placeOf(second.range[0], second.range[0] + 1), actual: `${documents.length} documents`, expected: 'one study in one file', mend: 'Remove the line `---`, or split the file' }))
  }
  const first = documents[0]
  if (first !== undefined && (first.directives.yaml.explicit === true || text.startsWith('%'))) diagnostics.push(feature('directive', placeOf(0, 1), 'Remove the lines that begin with `%`'))
  return { document: first, diagnostics }
}

function feature(what: string, place: Place, mend: string): Diagnostic {
  return diagnostic('definition/yaml-feature', `Unexpected ${what}`, { place, expected: 'plain YAML: keys, lists and texts, each written out', mend })
}

/** `at` is the place of the key, where an empty value or a missing key is told. */
function walk(node: unknown, at: Place, report: (found: Diagnostic) => void, placeOf: PlaceOf): StudyNode {
  const nothing: ScalarNode = { kind: 'scalar', text: '', quoted: false, value: null, place: at }
  if (isAlias(node)) {
    report(feature(`alias \`*${node.source}\``, placeOf(node.range?.[0] ?? 0, node.range?.[1] ?? 0), 'Write the value itself'))
    return nothing
  }
  if (!isMap(node) && !isSeq(node) && !isScalar(node)) return nothing
  const [from, to] = node.range ?? [0, 0]
  const place = placeOf(from, to)
  if (node.anchor !== undefined) report(feature(`anchor \`&${node.anchor}\``, place, 'Remove the anchor and write the value wherever it is needed'))
  if (node.tag !== undefined) report(feature(`tag \`${node.tag.replace('tag:yaml.org,2002:', '!!')}\``, place, 'Remove the tag; put a text into quotes instead'))
  if (isMap(node)) {
    const seen = new Map<string, Place>()
    const entries = node.items.flatMap((item): readonly MapEntry[] => {
      const key = item.key
      const range = isMap(key) || isSeq(key) || isScalar(key) || isAlias(key) ? key.range : undefined
      const keyPlace = range == null ? place : placeOf(range[0], range[1])
      if (!isScalar(key) || key.value === null) report(feature('key that is no word', keyPlace, 'Write a word before the colon'))
      const word = isScalar(key) ? textOf(key) : ''
      const earlier = seen.get(word)
      if (earlier !== undefined && word !== '') {
        report(diagnostic('definition/duplicate-key', `Unexpected second key \`${word}\``, { place: keyPlace, actual: word, expected: 'each key once in its map', mend: 'Remove one of the two, or rename it', related: [{ message: `the first \`${word}\``, place: earlier }] }))
        return []
      }
      seen.set(word, keyPlace)
      return [{ key: word, keyPlace, value: walk(item.value, keyPlace, report, placeOf) }]
    })
    return { kind: 'map', place: node.flow === true ? place : at, entries }
  }
  if (isSeq(node)) return { kind: 'list', place: node.flow === true ? place : at, items: node.items.map((item) => walk(item, isMap(item) || isSeq(item) || isScalar(item) ? placeOf(item.range?.[0] ?? from, item.range?.[1] ?? from) : place, report, placeOf)) }
  const { value } = node
  if (node.source === '' && value === null) return nothing
  const text = textOf(node)
  return { kind: 'scalar', text, quoted: node.type !== 'PLAIN', place, value: typeof value === 'string' || typeof value === 'number' || typeof value === 'boolean' || value === null ? value : text }
}

/** As typed for a plain scalar (`5.0` is not `5`); between the quotes for a quoted one. */
function textOf(scalar: { readonly value: unknown; readonly source?: string; readonly type?: string }): string {
  return scalar.type === 'PLAIN' ? (scalar.source ?? String(scalar.value)) : String(scalar.value)
}
