// Bytes of a raw file → text, with the encoding it was read in. Bytes that are no text in the encoding are an error with their place,
// never replaced.
import type { Encoding } from '../definition/study.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { Place } from '../diagnostics/place.ts'

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
  const problem = (code: 'data/empty-file' | 'data/not-text' | 'data/too-long', message: string, details: { readonly actual: string; readonly expected: string; readonly mend: string; readonly line?: number }): { readonly problem: Diagnostic } =>
    ({ problem: diagnostic(code, message, { place: { file, line: details.line ?? 1, column: 1 }, actual: details.actual, expected: details.expected, mend: details.mend }) })
  if (bytes.length === 0) return problem('data/empty-file', `The file \`${file}\` is empty`, { actual: '0 bytes', expected: 'a heading row and data', mend: 'Export the file again' })
  const long = lineTooLong(bytes)
  if (long !== undefined) return problem('data/too-long', `Line ${long} of \`${file}\` is longer than ${longestLine} bytes`, { actual: 'a longer line', expected: 'a table with one row a line', mend: 'Export the file as CSV', line: long })
  if (bytes.length > largestFile) return problem('data/too-long', `The file \`${file}\` is larger than ${largestFile} bytes`, { actual: `${bytes.length} bytes`, expected: 'the rows of one study', mend: 'Export only the rows of this study, or several smaller files' })
  const mark = markOf(bytes)
  if (declared !== undefined && mark !== undefined && mark !== declared) {
    return problem('data/not-text', `The file \`${file}\` is declared as ${declared}, and its byte order mark says ${mark}`, { actual: mark, expected: `a file in ${declared}`, mend: `Declare \`encoding: ${mark}\`, or none` })
  }
  const { encoding, guessed } = declared === undefined ? sniffed(bytes, mark) : { encoding: declared, guessed: false }
  const text = textOf(bytes, encoding)
  if (text === undefined) return { problem: undecodable(bytes, encoding, file) }
  if (text.trim() === '') return problem('data/empty-file', `The file \`${file}\` holds white space only`, { actual: 'white space', expected: 'a heading row and data', mend: 'Export the file again' })
  const odd = control.exec(text)
  return odd === null ? { text, encoding, guessed } : { problem: controlCharacter(text, odd.index, file) }
}

/** Undefined when the bytes are no text in the encoding. */
function textOf(bytes: Uint8Array, encoding: Encoding): string | undefined {
  if (encoding === 'windows-1252') return new TextDecoder('utf-16le').decode(widened(bytes))
  try {
    return new TextDecoder(encoding, { fatal: true }).decode(bytes) // takes the byte order mark off
  } catch (error) {
    if (error instanceof TypeError) return undefined
    throw error
  }
}

/**
 * Characters of the bytes 80 to 9F (WHATWG Encoding Standard, index windows-1252); the five that have none become control characters,
 * which are refused. Decoded here since versions of Node.js differ in it.
 */
const upper = '€\u0081‚ƒ„…†‡ˆ‰Š‹Œ\u008dŽ\u008f\u0090‘’“”•–—˜™š›œ\u009džŸ'

function widened(bytes: Uint8Array): Uint8Array {
  const units = new Uint8Array(2 * bytes.length)
  bytes.forEach((byte, at) => {
    const unit = byte >= 0x80 && byte <= 0x9f ? upper.charCodeAt(byte - 0x80) : byte
    units[2 * at] = unit & 0xff
    units[2 * at + 1] = unit >> 8
  })
  return units
}

/** The place is that of the first replacement character, which decoding without refusal puts in. */
function undecodable(bytes: Uint8Array, encoding: Encoding, file: string): Diagnostic {
  const text = new TextDecoder(encoding).decode(bytes)
  return diagnostic('data/not-text', `The file \`${file}\` is not text in ${encoding}`, {
    place: placeOf(text, Math.max(0, text.indexOf('\ufffd')), file), actual: `bytes that are no character of ${encoding}`, expected: `text in ${encoding}`, mend: 'Declare the right `encoding:`',
  })
}

function placeOf(text: string, at: number, file: string): Place {
  const lines = text.slice(0, at).split(/\r\n|\n|\r/)
  return { file, line: lines.length, column: (lines.at(-1)?.length ?? 0) + 1 }
}

/** A file without text holds NUL; a single other one is a damaged cell, or an attempt on the terminal that shows it. */
function controlCharacter(text: string, at: number, file: string): Diagnostic {
  const place = placeOf(text, at, file)
  const code = `U+${text.charCodeAt(at).toString(16).toUpperCase().padStart(4, '0')}`
  return text.includes('\u0000')
    ? diagnostic('data/not-text', `The file \`${file}\` is binary, not text`, { place, actual: `the control character ${code}`, expected: 'CSV text', mend: 'Export the data as CSV, or declare `encoding:`' })
    : diagnostic('data/not-text', `The file \`${file}\` holds a control character, which is not text`, { place, actual: code, expected: 'CSV text', mend: 'Export the file again, or remove the character' })
}

function markOf(bytes: Uint8Array): Encoding | undefined {
  if (bytes[0] === 0xef && bytes[1] === 0xbb && bytes[2] === 0xbf) return 'utf-8'
  if (bytes[0] === 0xff && bytes[1] === 0xfe) return 'utf-16le'
  return bytes[0] === 0xfe && bytes[1] === 0xff ? 'utf-16be' : undefined
}

function sniffed(bytes: Uint8Array, mark: Encoding | undefined): { readonly encoding: Encoding; readonly guessed: boolean } {
  if (mark !== undefined) return { encoding: mark, guessed: false }
  // Without a mark, every second byte of Latin text in UTF-16 is zero.
  const sample = bytes.subarray(0, 2000)
  const zeros = [0, 0]
  sample.forEach((byte, index) => { if (byte === 0) zeros[index % 2] = (zeros[index % 2] ?? 0) + 1 })
  if ((zeros[1] ?? 0) > sample.length / 4 && (zeros[0] ?? 0) === 0) return { encoding: 'utf-16le', guessed: true }
  if ((zeros[0] ?? 0) > sample.length / 4 && (zeros[1] ?? 0) === 0) return { encoding: 'utf-16be', guessed: true }
  return textOf(bytes, 'utf-8') === undefined ? { encoding: 'windows-1252', guessed: true } : { encoding: 'utf-8', guessed: false }
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
