// What a cell of a number column says, text by text. Expected values are written by hand; what a text means is common practice, no source,
// unless said. Whatever is refused here is shown with its diagnostic in fixtures/faulty/data.
import { describe, expect, test } from 'vitest'
import { headingOf, isSpreadsheetError, readNumber, tidied } from '../../src/data/cells.ts'

const none = { notDetected: [], missing: [] }
const number = (value: number): object => ({ kind: 'number', value })
const refused = (why: string): object => ({ kind: 'unreadable', why })

describe('a decimal point', () => {
  test.each<readonly [string, object]>([
    ['5', number(5)], ['5.0', number(5)], ['0.05', number(0.05)], ['.5', number(0.5)], ['5.', number(5)], ['+5', number(5)], ['-5.25', number(-5.25)],
    ['0', number(0)], ['0.000', number(0)], ['007', number(7)],
    ['1e3', number(1000)], ['1E+03', number(1000)], ['1.5e-3', number(0.0015)], ['-2.5E2', number(-250)],
    ['  5.5\t', number(5.5)], ['\u00a05.5\u00a0', number(5.5)], ['\u202f5.5', number(5.5)], ['\u200b5.5', number(5.5)], ['\ufeff5.5', number(5.5)],
    ['\u22125.5', number(-5.5)], ['\u20135.5', number(-5.5)], ['\u20125.5', number(-5.5)], ['\u20115.5', number(-5.5)], ['\u20105.5', number(-5.5)],
    ['', { kind: 'missing' }], ['   ', { kind: 'missing' }], ['\u00a0', { kind: 'missing' }],
    ['<0.05', { kind: 'below', bound: 0.05 }], ['< 0.05', { kind: 'below', bound: 0.05 }], ['<= 0.05', { kind: 'below', bound: 0.05 }], ['≤0.05', { kind: 'below', bound: 0.05 }], ['<\u00a00.05', { kind: 'below', bound: 0.05 }],
    ['>500', { kind: 'above', bound: 500 }], ['> 500', { kind: 'above', bound: 500 }], ['≥ 500', { kind: 'above', bound: 500 }], ['>1e3', { kind: 'above', bound: 1000 }],
    ['ND', { kind: 'not detected' }], ['nd', { kind: 'not detected' }], ['n.d.', { kind: 'not detected' }], ['N. D.', { kind: 'not detected' }], ['not detected', { kind: 'not detected' }],
    ['BLQ', { kind: 'not detected' }], ['<LOD', { kind: 'not detected' }], ['< LOQ', { kind: 'not detected' }],
    // Not analysed, not available, not applicable or not detected: the study has to say.
    ['n.a.', refused('text')], ['NA', refused('text')], ['n.b.', refused('text')], ['-', refused('text')], ['---', refused('text')], ['?', refused('text')],
    ['5,0', refused('other mark')], ['1,234', refused('other mark')], ['<0,05', refused('other mark')],
    ['1,234.5', refused('thousands')], ['1 234', refused('thousands')], ['1\u00a0234.5', refused('thousands')], ['1\u202f234', refused('thousands')], ["1'234.5", refused('thousands')], ['1’234', refused('thousands')], ['1.234.567', refused('thousands')], ['1,234,567', refused('thousands')],
    ['5.0 mg/L', refused('unit')], ['5.0mg/L', refused('unit')], ['98 %', refused('unit')], ['98%', refused('unit')], ['5.0*', refused('unit')], ['5 (a)', refused('unit')],
    ['NaN', refused('text')], ['nan', refused('text')], ['Infinity', refused('text')], ['-Infinity', refused('text')], ['inf', refused('text')], ['∞', refused('text')], ['-1.#IND', refused('unit')], ['0x1F', refused('unit')],
    ['1e400', refused('too large')], ['-1e400', refused('too large')], [`1${'0'.repeat(309)}`, refused('too large')], ['<1e400', refused('too large')],
    ['1e61', refused('too large')], ['-1e308', refused('too large')], ['1e60', number(1e60)], ['-1e-60', number(-1e-60)], ['1e-61', refused('too small')], ['5e-324', refused('too small')], ['0e999', number(0)], ['1e-400', refused('too small')], ['-0.01e-400', refused('too small')],
    ['#DIV/0!', refused('spreadsheet error')], ['#N/A', refused('spreadsheet error')], ['#NV', refused('spreadsheet error')], ['#ÜBERLAUF!', refused('spreadsheet error')], ['Err:502', refused('spreadsheet error')], ['#####', refused('spreadsheet error')],
    ['=A1*2', refused('formula')], ['=1', refused('formula')], ['=cmd|\' /C calc\'!A0', refused('formula')],
    ['5..0', refused('text')], ['5.0.', refused('text')], ['--5', refused('text')], ['5-', refused('text')], ['(5)', refused('text')], ['e3', refused('text')], ['1e', refused('unit')], ['1e+', refused('unit')], ['.', refused('text')], ['+', refused('text')], ['5 6', refused('text')], ['٥', refused('text')], ['５', refused('text')], ['2026-05-04', refused('text')], ['5\n6', refused('text')], ['<', refused('text')], ['<<5', refused('text')], ['true', refused('text')], ['Saturated', refused('text')],
  ])('%j', (text, expected) => expect(readNumber(text, 'point', none)).toMatchObject(expected))
})

describe('a decimal comma', () => {
  test.each<readonly [string, object]>([
    ['5', number(5)], ['5,0', number(5)], ['0,05', number(0.05)], [',5', number(0.5)], ['1,234', number(1.234)], ['1,2E+03', number(1200)], ['-2,5e-1', number(-0.25)], ['\u22122,5', number(-2.5)],
    ['<0,05', { kind: 'below', bound: 0.05 }], ['> 500', { kind: 'above', bound: 500 }],
    ['5.0', refused('other mark')], ['1.234', refused('other mark')], ['1.234,5', refused('thousands')], ['1 234,5', refused('thousands')], ['5,0 mg/L', refused('unit')], ['5,0,0', refused('text')],
  ])('%j', (text, expected) => expect(readNumber(text, 'comma', none)).toMatchObject(expected))
})

test('minus zero is zero', () => {
  for (const text of ['-0', '-0.0', '\u22120', '-0e5']) expect(Object.is((readNumber(text, 'point', none) as { value: number }).value, 0), text).toBe(true)
})

test('texts that the study declares come before every meaning of their own but a number', () => {
  const tokens = { notDetected: ['n.a.', '---'], missing: ['x', 'ND'] }
  expect(readNumber('n.a.', 'point', tokens)).toEqual({ kind: 'not detected' })
  expect(readNumber(' --- ', 'point', tokens)).toEqual({ kind: 'not detected' })
  expect(readNumber('x', 'point', tokens)).toEqual({ kind: 'missing' })
  expect(readNumber('ND', 'point', tokens)).toEqual({ kind: 'missing' })
})

test('a reading takes time in step with the length of its text', () => {
  const started = process.cpuUsage().user
  for (const text of ['1'.repeat(200_000), `${'1,'.repeat(100_000)}x`, `<${' '.repeat(200_000)}x`, `${'1 '.repeat(100_000)}`, `${'='.repeat(100_000)}`, `#${'A'.repeat(200_000)}`]) readNumber(text, 'point', none)
  expect(process.cpuUsage().user - started).toBeLessThan(1_000_000)
})

test.each([['#REF!', true], ['#N/A', true], ['#VALUE!', true], ['#NAME?', true], ['#12', false], ['#A', false], ['N/A', false], ['No. #1!', false]])('a label %j is an error of a spreadsheet: %j', (text, expected) => {
  expect(isSpreadsheetError(text)).toBe(expected)
})

test.each([
  [' Peak\r\nArea ', 'Peak Area'], ['Peak  Area', 'Peak Area'], ['Fla\u0308che', 'Fläche'], ['Conc (\u03bcg/L)', 'Conc (\u00b5g/L)'], ['\ufeffLevel', 'Level'], ['Le\u00advel\u200b', 'Level'], ['A\u00a0B', 'A B'],
])('heading %j is compared as %j', (text, expected) => expect(headingOf(text)).toBe(expected))

test('a label keeps its letters, its case and its inner spaces', () => {
  expect(tidied('  Fläche  1µ Ω ')).toBe('Fläche  1µ Ω')
})
