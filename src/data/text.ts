// Bytes of a raw file → text, with the encoding it was read in. Bytes that are no text in the encoding are an error with their place,
// never replaced.
import type { Encoding } from '../definition/study.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'

export interface DecodedText {
  readonly text: string
  readonly encoding: Encoding
  /** Found out from the bytes alone: no declaration, no byte order mark, no valid UTF-8. */
  readonly guessed: boolean
}

const control = /[\u0000-\u0008\u000e-\u001f\u007f-\u009f]/ // vertical tab and form feed are white space
const longestLine = 1024 * 1024 // bytes; no table row is longer, a binary file or a runaway export is
const largestFile = 256 * 1024 * 1024 // bytes; half of what one text may hold in the program, and far more than a study has

export function decode(bytes: Uint8Array, file: string, declared: Encoding | undefined): DecodedText | { readonly problem: Diagnostic } {
  const problem = (code: 'data/empty-file' | 'data/not-text' | 'data/too-long', message: string, details: { readonly expected: string; readonly mend: string; readonly line?: number }): { readonly problem: Diagnostic } =>
    ({ problem: diagnostic(code, message, { place: { file, line: details.line ?? 1, column: 1 }, expected: details.expected, mend: details.mend }) })
  if (bytes.length === 0) return problem('data/empty-file', `The file \`${file}\` is empty`, { expected: 'a heading row and data', mend: 'Export the file again' })
  const long = lineTooLong(bytes)
  if (long !== undefined) return problem('data/too-long', `Line ${long} of \`${file}\` is longer than ${longestLine} bytes`, { expected: 'a table with one row a line', mend: 'Export the file as CSV', line: long })
  if (bytes.length > largestFile) return problem('data/too-long', `The file \`${file}\` is larger than ${largestFile} bytes`, { expected: 'the rows of one study', mend: 'Export only the rows of this study, or several smaller files' })
  const { encoding, guessed } = declared === undefined ? sniffed(bytes) : { encoding: declared, guessed: false }
  try {
    const text = new TextDecoder(encoding, { fatal: encoding !== 'windows-1252' }).decode(bytes).replace(/^\uFEFF/, '')
    if (text.trim() === '') return problem('data/empty-file', `The file \`${file}\` holds white space only`, { expected: 'a heading row and data', mend: 'Export the file again' })
    const odd = control.exec(text)
    return odd === null ? { text, encoding, guessed } : { problem: controlCharacter(text, odd.index, file) }
  } catch (error) {
    if (!(error instanceof TypeError)) throw error
    return problem('data/not-text', `The file \`${file}\` is not text in ${encoding}`, { expected: `text in ${encoding}`, mend: 'Declare the right `encoding:`' })
  }
}

/** A file without text holds NUL; a single other one is a damaged cell, or an attempt on the terminal that shows it. */
function controlCharacter(text: string, at: number, file: string): Diagnostic {
  const line = text.slice(0, at).split(/\r\n|\n|\r/)
  const place = { file, line: line.length, column: (line.at(-1)?.length ?? 0) + 1 }
  const code = `U+${text.charCodeAt(at).toString(16).toUpperCase().padStart(4, '0')}`
  return text.includes('\u0000')
    ? diagnostic('data/not-text', `The file \`${file}\` is binary, not text`, { place, actual: `the control character ${code}`, expected: 'CSV text', mend: 'Export the data as CSV, or declare `encoding:`' })
    : diagnostic('data/not-text', `The file \`${file}\` holds a control character, which is not text`, { place, actual: code, expected: 'CSV text', mend: 'Export the file again, or remove the character' })
}

function sniffed(bytes: Uint8Array): { readonly encoding: Encoding; readonly guessed: boolean } {
  const [first, second] = bytes
  if (first === 0xff && second === 0xfe) return { encoding: 'utf-16le', guessed: false }
  if (first === 0xfe && second === 0xff) return { encoding: 'utf-16be', guessed: false }
  // Without a mark, every second byte of Latin text in UTF-16 is zero.
  const sample = bytes.subarray(0, 2000)
  const zeros = [0, 0]
  sample.forEach((byte, index) => { if (byte === 0) zeros[index % 2] = (zeros[index % 2] ?? 0) + 1 })
  if ((zeros[1] ?? 0) > sample.length / 4 && (zeros[0] ?? 0) === 0) return { encoding: 'utf-16le', guessed: true }
  if ((zeros[0] ?? 0) > sample.length / 4 && (zeros[1] ?? 0) === 0) return { encoding: 'utf-16be', guessed: true }
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(bytes)
    return { encoding: 'utf-8', guessed: false }
  } catch {
    return { encoding: 'windows-1252', guessed: true }
  }
}

/** Lines end with a line feed, or with a carriage return alone. */
function lineTooLong(bytes: Uint8Array): number | undefined {
  let line = 1
  let from = 0
  while (from < bytes.length) {
    const end = lineEnd(bytes, from)
    if (end - from > longestLine) return line
    from = end + (bytes[end] === 13 && bytes[end + 1] === 10 ? 2 : 1)
    line += 1
  }
  return undefined
}

function lineEnd(bytes: Uint8Array, from: number): number {
  let at = from
  while (at < bytes.length && at - from <= longestLine && bytes[at] !== 10 && bytes[at] !== 13) at += 1
  return at
}
