// Bytes of a raw file → text, with the encoding it was read in. Bytes that are no text in the encoding are an error with their place,
// never replaced.
import type { Encoding } from '../definition/study.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'

export interface DecodedText {
  readonly text: string
  readonly encoding: Encoding
}

const longestLine = 1024 * 1024 // characters; no table row is longer, a binary file or a runaway export is

export function decode(bytes: Uint8Array, file: string, declared: Encoding | undefined): DecodedText | { readonly problem: Diagnostic } {
  const problem = (code: 'data/empty-file' | 'data/not-text' | 'data/too-long', message: string, details: { readonly expected: string; readonly mend: string; readonly line?: number }): { readonly problem: Diagnostic } =>
    ({ problem: diagnostic(code, message, { place: { file, line: details.line ?? 1, column: 1 }, expected: details.expected, mend: details.mend }) })
  if (bytes.length === 0) return problem('data/empty-file', `The file \`${file}\` is empty`, { expected: 'a heading row and data', mend: 'Export the file again' })
  const long = lineTooLong(bytes)
  if (long !== undefined) return problem('data/too-long', `Line ${long} of \`${file}\` is longer than ${longestLine} bytes`, { expected: 'a table with one row a line', mend: 'Export the file as CSV', line: long })
  const encoding = declared ?? sniffed(bytes)
  try {
    const text = new TextDecoder(encoding, { fatal: encoding !== 'windows-1252' }).decode(bytes).replace(/^\uFEFF/, '')
    const odd = /[\u0000-\u0008\u000e-\u001f]/.exec(text)
    if (odd === null && text.trim() !== '') return { text, encoding }
    if (odd === null) return problem('data/empty-file', `The file \`${file}\` holds white space only`, { expected: 'a heading row and data', mend: 'Export the file again' })
    return problem('data/not-text', `The file \`${file}\` is binary, not text`, { expected: 'CSV text', mend: 'Export the data as CSV, or declare `encoding:`', line: text.slice(0, odd.index).split('\n').length })
  } catch (error) {
    if (!(error instanceof TypeError)) throw error
    return problem('data/not-text', `The file \`${file}\` is not text in ${encoding}`, { expected: `text in ${encoding}`, mend: 'Declare the right `encoding:`' })
  }
}

function sniffed(bytes: Uint8Array): Encoding {
  const [first, second] = bytes
  if (first === 0xff && second === 0xfe) return 'utf-16le'
  if (first === 0xfe && second === 0xff) return 'utf-16be'
  // Without a mark, every second byte of Latin text in UTF-16 is zero.
  const sample = bytes.subarray(0, 2000)
  const zeros = [0, 0]
  sample.forEach((byte, index) => { if (byte === 0) zeros[index % 2] = (zeros[index % 2] ?? 0) + 1 })
  if ((zeros[1] ?? 0) > sample.length / 4 && (zeros[0] ?? 0) === 0) return 'utf-16le'
  if ((zeros[0] ?? 0) > sample.length / 4 && (zeros[1] ?? 0) === 0) return 'utf-16be'
  try {
    new TextDecoder('utf-8', { fatal: true }).decode(bytes)
    return 'utf-8'
  } catch {
    return 'windows-1252'
  }
}

function lineTooLong(bytes: Uint8Array): number | undefined {
  let line = 1
  let from = 0
  while (from < bytes.length) {
    const end = bytes.indexOf(10, from)
    const to = end < 0 ? bytes.length : end
    if (to - from > longestLine) return line
    if (end < 0) return undefined
    from = end + 1
    line += 1
  }
  return undefined
}
