// Diagnostics as a person sees them on a terminal and as a program reads them.
import { expect, test } from 'vitest'
import { diagnostic, type Diagnostic } from '../src/diagnostics/diagnostic.ts'
import { nearest } from '../src/diagnostics/nearest.ts'
import { diagnosticsAsJson, printDiagnostics } from '../src/diagnostics/print.ts'

const at = (line: number, column: number, length?: number): Diagnostic['place'] => ({ file: 'study.yaml', line, column, ...(length === undefined ? {} : { length }) })
const print = (diagnostics: readonly Diagnostic[], text: string, colour = false): string => printDiagnostics(diagnostics, { sources: new Map([['study.yaml', text]]), colour })

test('nothing to say is an empty text', () => {
  expect(print([], 'a: 1\n')).toBe('')
})

test('place, message, frame, expected, how to mend', () => {
  const found = diagnostic('definition/unknown-choice', 'Unexpected `strait line` for `fit`', { place: at(2, 6, 11), actual: '`strait line`', expected: 'straight line | quadratic', mend: 'Write `straight line`', related: [{ message: 'read here', place: { file: 'study.yaml', line: 1 } }] })
  expect(print([found], 'a:\n\tfit: strait line\n')).toBe([
    'study.yaml:2:6 error Unexpected `strait line` for `fit` [definition/unknown-choice]',
    '    1 | a:',
    '  > 2 |  fit: strait line',
    '      |      ^^^^^^^^^^^',
    '  expected: straight line | quadratic',
    '  to mend: Write `straight line`',
    '  see study.yaml:1: read here',
    '',
    '1 error',
  ].join('\n'))
})

test('no place, a sheet, a file without text: what was found is told in words', () => {
  const printed = printDiagnostics([
    diagnostic('data/not-a-number', 'Unexpected text', { place: { file: 'a.xlsx', sheet: 'Day 1', cell: 'B7' }, actual: 'see note' }),
    diagnostic('command/unwritable-output', 'The dossier was not written'),
  ], { sources: new Map() })
  expect(printed).toBe('a.xlsx[Day 1]!B7 error Unexpected text [data/not-a-number]\n  found: see note\n\nerror The dossier was not written [command/unwritable-output]\n\n2 errors')
})

test('errors before warnings and notes, then by line', () => {
  const printed = print([
    diagnostic('assess/outlier-flag', 'note', { place: at(1, 1) }), diagnostic('assess/design-gap', 'warning', { place: at(1, 1) }),
    diagnostic('definition/wrong-type', 'third', { place: at(3, 1) }), diagnostic('definition/wrong-type', 'second', { place: at(2, 9) }), diagnostic('definition/wrong-type', 'first', { place: at(2, 1) }),
  ], '')
  expect([...printed.matchAll(/(?:error|warning|note) (\w+) \[/g)].map((match) => match[1])).toEqual(['first', 'second', 'third', 'warning', 'note'])
  expect(printed).toMatch(/3 errors, 1 warning, 1 note$/)
})

test('six of a kind are folded, five are not', () => {
  const many = (count: number): readonly Diagnostic[] => Array.from({ length: count }, (_, index) => diagnostic('definition/unknown-name', `Unexpected \`x${index}\` in row ${index}`, { place: at(index + 1, 1) }))
  expect(print(many(5), '').match(/unknown-name/g)).toHaveLength(5)
  expect(print(many(7), '')).toBe('study.yaml:1:1 error Unexpected `x0` in row 0 [definition/unknown-name]\n  > 1 |\n      | ^\n  and 6 more like it: study.yaml:2:1, study.yaml:3:1, study.yaml:4:1, study.yaml:5:1, …\n\n7 errors')
  expect(diagnosticsAsJson(many(7))).toHaveLength(7)
})

test('nothing from a file reaches the terminal raw', () => {
  const evil = 'a\u001b[31mred\u0007\u202e\u2028\u009b'
  const printed = printDiagnostics([diagnostic('definition/unknown-key', `Unexpected key \`${evil}\``, { place: { file: evil, sheet: evil, line: 1, column: 3, length: 4, cell: evil }, actual: evil, expected: evil, mend: evil, related: [{ message: evil, place: { file: evil } }] })], { sources: new Map([[evil, `x ${evil}`]]) })
  expect(printed.replaceAll('\n', '')).not.toMatch(/[\p{Cc}\u2028\u202e]/u)
  expect(printed).toContain('\\u001b[31mred')
})

test('the caret stands under the place when escapes and wide signs come before it', () => {
  const lines = print([diagnostic('definition/wrong-type', 'x', { place: at(1, 6, 2) })], '\u0007漢字: no').split('\n')
  expect(lines[1]).toBe('  > 1 | \\u0007漢字: no')
  expect(lines[2]).toBe(`      | ${' '.repeat(6 + 4 + 2)}^^`)
})

test('of a long line a window is shown', () => {
  const lines = print([diagnostic('definition/wrong-type', 'x', { place: at(1, 5001, 3) })], `${'a'.repeat(5000)}bad${'c'.repeat(5000)}`).split('\n')
  expect(lines[1]?.length).toBeLessThan(120)
  expect(lines[1]).toContain(`${'a'.repeat(40)}bad${'c'.repeat(57)}`)
  expect(lines[2]?.indexOf('^^^')).toBe(lines[1]?.indexOf('bad'))
})

test('colour only when asked', () => {
  const found = [diagnostic('definition/wrong-type', 'x', { place: at(1, 1) })]
  expect(print(found, 'a')).not.toContain('\u001b')
  expect(print(found, 'a', true)).toContain('\u001b[31merror\u001b[0m')
})

test('as data: the same, with the help of the code', () => {
  expect(diagnosticsAsJson([diagnostic('definition/tab', 'Unexpected tab', { place: at(1, 2, 1) })])).toEqual([
    { code: 'definition/tab', severity: 'error', message: 'Unexpected tab', place: { file: 'study.yaml', line: 1, column: 2, length: 1 }, actual: null, expected: null, mend: null, related: [], help: 'A tab stands where YAML takes spaces only' },
  ])
})

test.each([['strait line', 'straight line'], ['linearty', 'linearity'], ['lniearity', 'linearity'], ['LINEARITY', 'linearity'], ['zebra', undefined], ['', undefined]])('nearest to %s is %s', (typed, expected) => {
  expect(nearest(typed, ['linearity', 'straight line', 'quadratic'])).toBe(expected)
})
