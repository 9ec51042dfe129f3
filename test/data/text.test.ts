// Bytes → text. The bytes of a character in each encoding are written by hand (µ is B5 in windows-1252, C2 B5 in UTF-8, 00B5 in UTF-16;
// the Unicode Standard and the WHATWG Encoding Standard's index of windows-1252).
import { describe, expect, test } from 'vitest'
import { decode } from '../../src/data/text.ts'
import type { Encoding } from '../../src/definition/study.ts'

const ascii = (text: string): number[] => [...text].map((character) => character.charCodeAt(0))
const little = (text: string): number[] => [...text].flatMap((character) => [character.charCodeAt(0) & 0xff, character.charCodeAt(0) >> 8])
const big = (text: string): number[] => [...text].flatMap((character) => [character.charCodeAt(0) >> 8, character.charCodeAt(0) & 0xff])
const table = 'Level;µS\n1;2\n'

describe('found out from the bytes', () => {
  test.each<readonly [string, readonly number[], string, Encoding, boolean]>([
    ['plain ASCII', ascii('a,b\n1,2\n'), 'a,b\n1,2\n', 'utf-8', false],
    ['UTF-8', [...ascii('a,'), 0xc2, 0xb5, ...ascii('S\n')], 'a,µS\n', 'utf-8', false],
    ['UTF-8 with a byte order mark', [0xef, 0xbb, 0xbf, ...ascii('a,b\n')], 'a,b\n', 'utf-8', false],
    ['windows-1252', [...ascii('a,'), 0xb5, ...ascii('S\n')], 'a,µS\n', 'windows-1252', true],
    ['windows-1252 with a euro sign and a dash', [...ascii('a,'), 0x80, 0x96, 0x0a], 'a,€–\n', 'windows-1252', true],
    ['UTF-16LE with a byte order mark', [0xff, 0xfe, ...little(table)], table, 'utf-16le', false],
    ['UTF-16BE with a byte order mark', [0xfe, 0xff, ...big(table)], table, 'utf-16be', false],
    ['UTF-16LE without a mark', little(table), table, 'utf-16le', true],
    ['UTF-16BE without a mark', big(table), table, 'utf-16be', true],
  ])('%s', (_, bytes, text, encoding, guessed) => expect(decode(Uint8Array.from(bytes), 'a.csv', undefined)).toEqual({ text, encoding, guessed }))
})

describe('declared', () => {
  test.each<readonly [Encoding, readonly number[], string]>([
    ['windows-1252', [...ascii('a,'), 0xb5, 0x0a], 'a,µ\n'], ['utf-16le', little(table), table], ['utf-16be', big(table), table], ['utf-16le', [0xff, 0xfe, ...little(table)], table], ['utf-8', [0xef, 0xbb, 0xbf, ...ascii('a\n')], 'a\n'],
  ])('%s', (encoding, bytes, text) => expect(decode(Uint8Array.from(bytes), 'a.csv', encoding)).toEqual({ text, encoding, guessed: false }))
})

describe('refused with the place', () => {
  test.each<readonly [string, readonly number[], Encoding | undefined, string, number, number]>([
    ['nothing', [], undefined, 'data/empty-file', 1, 1],
    ['white space only', ascii(' \r\n\t\n'), undefined, 'data/empty-file', 1, 1],
    ['a byte order mark only', [0xef, 0xbb, 0xbf], undefined, 'data/empty-file', 1, 1],
    ['a NUL byte', [...ascii('a,b\n1,'), 0, ...ascii('2\n')], undefined, 'data/not-text', 2, 3],
    ['an escape character', [...ascii('a,b\r1,2\r3,'), 0x1b, ...ascii('[31m4\r')], undefined, 'data/not-text', 3, 3],
    ['a C1 control character in UTF-8', [...ascii('a,b\n'), 0xc2, 0x9b, ...ascii('31m\n')], undefined, 'data/not-text', 2, 1],
    ['a byte that windows-1252 does not have', [...ascii('a,b\n1'), 0x9d, 0x0a], undefined, 'data/not-text', 2, 2],
    ['bytes that are no UTF-8, declared as such', [...ascii('a,b\n1,'), 0xb5, 0x0a], 'utf-8', 'data/not-text', 2, 3],
    ['half a character of UTF-16', [...little('a,b\n'), 0x31], 'utf-16le', 'data/not-text', 2, 1],
    ['half a pair of UTF-16', [...little('a,b\n'), 0x3d, 0xd8, ...little('1\n')], 'utf-16le', 'data/not-text', 2, 1],
    ['a byte order mark that contradicts', [0xef, 0xbb, 0xbf, ...ascii('a,b\n')], 'windows-1252', 'data/not-text', 1, 1],
    ['another byte order mark that contradicts', [0xff, 0xfe, ...little('a,b\n')], 'utf-16be', 'data/not-text', 1, 1],
  ])('%s', (_, bytes, declared, code, line, column) => {
    const read = decode(Uint8Array.from(bytes), 'a.csv', declared)
    if (!('problem' in read)) throw new Error('read')
    expect(read.problem).toMatchObject({ code, place: { file: 'a.csv', line, column } })
    expect(read.problem.expected).toBeTruthy()
    expect(read.problem.mend).toBeTruthy()
  })
})

describe('long lines', () => {
  const row = 'x'.repeat(1024 * 1024)
  test.each<readonly [string, string, number | undefined]>([
    ['a longest line', `a\n${row}\n`, undefined], ['one more', `a\n${row}x\n`, 2], ['one more without a line end', `a\r\nb\r\n${row}x`, 3], ['many lines that end with a carriage return', `${'1,2\r'.repeat(400_000)}`, undefined],
  ])('%s', (_, text, line) => {
    const read = decode(new TextEncoder().encode(text), 'a.csv', undefined)
    expect('problem' in read ? read.problem.place?.line : undefined).toBe(line)
  })

  test('a line of 200 MB is refused at once', () => {
    const bytes = new Uint8Array(200 * 1024 * 1024).fill(0x78)
    const started = process.cpuUsage().user
    expect(decode(bytes, 'a.csv', undefined)).toMatchObject({ problem: { code: 'data/too-long', place: { line: 1 } } })
    expect(process.cpuUsage().user - started).toBeLessThan(500_000)
  })
})
