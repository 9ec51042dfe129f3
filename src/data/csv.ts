// Bytes of a raw file → its table: text in one encoding, split by one delimiter. A file that several datasets read is split once, and what is
// wrong with the file itself is told once.
import type { Delimiter, Encoding, FileSource } from '../definition/study.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { delimiterSigns, sniffDelimiter } from './delimiter.ts'
import { type CsvRow, mostRows, splitRows } from './split-rows.ts'
import { decode, type DecodedText } from './text.ts'

export interface CsvTable {
  readonly encoding: Encoding
  readonly delimiter: Delimiter
  readonly rows: readonly CsvRow[]
}

export interface TableReader {
  /** `headings` are those that the study maps. Undefined when the file is no table; `diagnostics` are told by the first call only. */
  read(file: FileSource, bytes: Uint8Array, headings: readonly string[]): { readonly table: CsvTable | undefined; readonly diagnostics: readonly Diagnostic[] }
}

export function tableReader(): TableReader {
  const texts = new Map<string, DecodedText | { readonly problem: Diagnostic }>()
  const tables = new Map<string, readonly CsvRow[] | { readonly problem: Diagnostic }>()
  const told = new Set<string>()
  const once = (told_: Diagnostic): readonly Diagnostic[] => {
    const key = `${told_.code}\u0000${told_.place?.file ?? ''}\u0000${told_.message}`
    if (told.has(key)) return []
    told.add(key)
    return [told_]
  }
  return {
    read(file, bytes, headings) {
      const decoded = remembered(texts, `${file.path}\u0000${file.encoding ?? ''}`, () => decode(bytes, file.path, file.encoding))
      if ('problem' in decoded) return { table: undefined, diagnostics: once(decoded.problem) }
      const guessed = decoded.guessed ? once(guessedEncoding(file.path, decoded.encoding)) : []
      const delimiter = file.delimiter ?? sniffDelimiter(decoded.text, headings)
      if (typeof delimiter !== 'string') return { table: undefined, diagnostics: [...guessed, ...once(undecided(file.path, delimiter.fitting))] }
      const rows = remembered(tables, `${file.path}\u0000${file.encoding ?? ''}\u0000${delimiter}`, () => split(decoded.text, file.path, delimiter))
      if ('problem' in rows) return { table: undefined, diagnostics: [...guessed, ...once(rows.problem)] }
      return { table: { encoding: decoded.encoding, delimiter, rows }, diagnostics: guessed }
    },
  }
}

function remembered<T>(known: Map<string, T>, key: string, make: () => T): T {
  const earlier = known.get(key)
  if (earlier !== undefined) return earlier
  const made = make()
  known.set(key, made)
  return made
}

function split(text: string, file: string, delimiter: Delimiter): readonly CsvRow[] | { readonly problem: Diagnostic } {
  const rows = splitRows(text, delimiterSigns[delimiter])
  if (!('kind' in rows)) return rows
  if (rows.kind === 'too many rows') {
    return { problem: diagnostic('data/too-long', `The file \`${file}\` has more than ${mostRows} lines`, { place: { file, line: rows.line, column: 1 }, actual: `a line ${rows.line}`, expected: 'the rows of one study', mend: 'Export only the rows of this study' }) }
  }
  const isOpen = rows.kind === 'not closed'
  return { problem: diagnostic('data/broken-row', isOpen ? `A quote in line ${rows.line} of \`${file}\` is not closed` : `Cannot split line ${rows.line} of \`${file}\` into cells`, {
    place: { file, line: rows.line, column: rows.column },
    actual: isOpen ? 'a quote that is open to the end of the file' : rows.kind === 'inside a cell' ? 'a quote inside a cell' : 'text behind the closing quote of a cell',
    expected: 'quotes around whole cells, doubled inside', mend: 'Export the file again, or mend the quote',
  }) }
}

function undecided(file: string, fitting: readonly Delimiter[]): Diagnostic {
  return diagnostic('data/ambiguous-delimiter', `Cannot tell what separates the columns of \`${file}\``, {
    place: { file, line: 1, column: 1 }, actual: fitting.length === 0 ? 'no delimiter found' : fitting.join(' and '), expected: 'one of comma, semicolon, tab, pipe', mend: 'Declare `delimiter:` for the file',
  })
}

function guessedEncoding(file: string, encoding: Encoding): Diagnostic {
  return diagnostic('data/encoding', encoding === 'windows-1252' ? `\`${file}\` is no UTF-8 and was read as windows-1252` : `\`${file}\` has no byte order mark and was read as ${encoding}`, {
    place: { file, line: 1, column: 1 }, actual: `bytes that read as ${encoding}`, expected: 'a declared `encoding:` when this is wrong', mend: 'Nothing, if the letters of the file are right; else declare `encoding:`',
  })
}
