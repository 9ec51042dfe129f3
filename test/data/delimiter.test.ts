// What separates the columns of a file. Files and answers are written by hand.
import { describe, expect, test } from 'vitest'
import { sniffDelimiter } from '../../src/data/delimiter.ts'

describe('found out', () => {
  test.each([
    ['comma', 'a,b\n1,2\n'], ['semicolon', 'a;b\n1;2\n'], ['tab', 'a\tb\n1\t2\n'], ['pipe', 'a|b\n1|2\n'],
    ['semicolon', 'a;b;c\n1,5;2,5;3\n'], ['tab', 'a\tb\n1,5\t2,5\n'], ['pipe', 'a|b\n1,5|2,5\n'],
    ['comma', 'a,b\n"1;5","x|y"\n"2;5","z|w"\n'], ['comma', 'a,b\n"1,5","2,5"\n'],
    ['semicolon', 'Run of Monday, by night\nPeak, area\na;b\n1;2\n3;4\n5;6\n'],
    ['comma', '"Peak\narea;x",b\n1,2\n3,4\n'],
    ['semicolon', 'sep=;\na;b\n1,2;3,4\n'], ['tab', 'sep=\t\r\na\tb\r\n1,2\t3,4\r\n'],
    ['semicolon', 'a\n1,5\n2,5\n'], ['semicolon', 'a\n1.5\n'],
  ])('%s: %j', (expected, text) => expect(sniffDelimiter(text, [])).toBe(expected))
})

describe('undecided', () => {
  test.each<readonly [readonly string[], string]>([
    [['comma', 'semicolon'], 'a,b;c\nx,y;z\nu,v;w\n'], [['semicolon', 'tab'], 'a;b\tc\n1;2\t3\n'], [[], 'a,b;c\nNote\nEnd, of file\nThe end\n'],
  ])('%j: %j', (fitting, text) => expect(sniffDelimiter(text, [])).toEqual({ fitting }))
})

test('the line that holds the mapped headings decides', () => {
  expect(sniffDelimiter('Level, mg/L;Area\n1,2;3,4\n', ['Level, mg/L', 'Area'])).toBe('semicolon')
  expect(sniffDelimiter(`${'Setting: on; off\n'.repeat(39)}Level,Area\n1,2\n`, ['Level', 'Area'])).toBe('comma')
  expect(sniffDelimiter('"Level"\t"Area"\n1,5\t2;5\n', ['Level', 'Area'])).toBe('tab')
})

test('a sample of odd quotes takes no longer than its length asks', () => {
  const started = process.cpuUsage().user
  for (const text of ['"'.repeat(1_000_001), `${'",'.repeat(500_000)}"`, `${'x'.repeat(900_000)},\n`]) sniffDelimiter(text, ['a', 'b'])
  expect(process.cpuUsage().user - started).toBeLessThan(1_000_000)
})
