// What is typed in YAML and what the study reads of it: the pitfalls that cost a laboratory a result. Rules of YAML 1.2.2 (yaml.org/spec/1.2.2,
// sections 6.1 tabs, 3.2.1.3 unique keys, 10.3 core schema) and of YAML 1.1 (yaml.org/type/bool.html) where the two disagree.
import { describe, expect, test } from 'vitest'
import { flag, number, quantity, type Reader, text } from '../../src/definition/fields.ts'
import { readYaml } from '../../src/definition/yaml.ts'
import type { Diagnostic } from '../../src/diagnostics/diagnostic.ts'

function codesOf(yaml: string): readonly string[] {
  return readYaml({ file: 'study.yaml', text: yaml }).diagnostics.map((each) => `${each.code} ${each.place?.line}:${each.place?.column}`)
}

describe('text', () => {
  test.each([
    ['a tab before a key', 'a:\n\tb: 1\n', ['definition/tab 2:1']],
    ['two keys of one name', 'a: 1\nb: 2\na: 3\n', ['definition/duplicate-key 3:1']],
    ['two keys of one name, one in quotes', 'a: 1\n"a": 3\n', ['definition/duplicate-key 2:1']],
    ['two mistakes', 'a: @x\nb: `y\n', ['definition/not-yaml 1:4', 'definition/not-yaml 2:4']],
    ['a second document', 'a: 1\n---\nb: 2\n', ['definition/several-documents 2:1']],
    ['an end marker', 'a: 1\n...\n', []],
    ['a start marker', '---\na: 1\n', []],
    ['a directive', '%YAML 1.1\n---\na: yes\n', ['definition/yaml-feature 1:1']],
    ['an alias that would grow', 'a: &a [x, x]\nb: &b [*a, *a]\nc: [*b, *b]\n', ['definition/yaml-feature 1:7', 'definition/yaml-feature 2:7', 'definition/yaml-feature 2:8', 'definition/yaml-feature 2:12', 'definition/yaml-feature 3:5', 'definition/yaml-feature 3:9']],
    ['a merge key', 'a: { <<: 1 }\n', []],
    ['a key that is a list', '? [a]\n: 1\n', ['definition/yaml-feature 1:3']],
    ['a key that is missing', ': 1\n', ['definition/yaml-feature 1:1']],
    ['a tag', 'a: !!str 1\n', ['definition/yaml-feature 1:10']],
    ['control characters', 'a: \u0007\nb: \u202e\n', ['definition/control-character 1:4', 'definition/control-character 2:4']],
    ['bytes that were not UTF-8', 'a: Gr\ufffd\ufffde\n', ['definition/control-character 1:6', 'definition/control-character 1:7']],
    ['nothing', '', ['definition/empty-study 1:1']],
    ['comments only', '# a\n\n', ['definition/empty-study 1:1']],
    ['carriage returns', 'a: 1\r\nb: @\r\n', ['definition/not-yaml 2:4']],
    ['a byte order mark', '\ufeffa: @\n', ['definition/not-yaml 1:4']],
    ['brackets without end', '['.repeat(100_000), ['definition/too-deep 1:40']],
    ['dashes without end', `${'- '.repeat(100_000)}x`, ['definition/too-deep 1:79']],
    ['more than any study', 'a: 1\n'.repeat(420_000), ['definition/too-long 1:1']],
  ])('%s', (_, yaml, expected) => {
    expect(codesOf(yaml)).toEqual(expected)
  })

  test('a scalar keeps its text and its place', () => {
    const { value } = readYaml({ file: 'study.yaml', text: 'a: 5.0   # five\nb: "5.0"\nc: >\n  one\n  two\nd:\n' })
    if (value?.kind !== 'map') throw new Error('no map')
    expect(value.entries.map(({ value: each }) => each)).toMatchObject([
      { kind: 'scalar', text: '5.0', quoted: false, value: 5, place: { line: 1, column: 4, length: 3 } },
      { text: '5.0', quoted: true, value: '5.0', place: { line: 2, column: 4, length: 5 } },
      { text: 'one two\n', quoted: true, place: { line: 3, column: 4 } },
      { text: '', value: null, place: { line: 6, column: 1 } },
    ])
  })
})

function read<T>(reader: Reader<T>, typed: string): { readonly value: T | undefined; readonly told: readonly Diagnostic[] } {
  const tree = readYaml({ file: 'study.yaml', text: `key: ${typed}\n` })
  if (tree.value?.kind !== 'map') throw new Error(`not YAML: ${typed}`)
  const told: Diagnostic[] = []
  const node = tree.value.entries[0]?.value
  if (node === undefined) throw new Error('no value')
  const value = reader.read(node, { path: 'key', report: (found) => told.push(found), took: () => undefined })
  return { value, told }
}

describe('a number', () => {
  const reader = number({ describe: 'a number' })
  test.each([['5', 5], ['5.0', 5], ['-0.25', -0.25], ['+3', 3], ['.5', 0.5], ['1.', 1], ['1.0e-3', 0.001], ['2.5E+2', 250]])('%s is read', (typed, expected) => {
    expect(read(reader, typed)).toEqual({ value: expected, told: [] })
  })
  test.each([
    ['1,5', 'ambiguous-number', '1.5'], ['1e3', 'ambiguous-number', '1000'], ['1.0e3', 'ambiguous-number', '1000'], ['0x1F', 'ambiguous-number', '31'], ['0o17', 'ambiguous-number', '15'], ['010', 'ambiguous-number', '10'], ['1_000', 'ambiguous-number', '1000'], ['1e30', 'ambiguous-number', '1.0e+30'],
    ['.inf', 'wrong-type', 'a number'], ['.nan', 'wrong-type', 'a number'], ['NaN', 'wrong-type', 'a number'], ['"5"', 'wrong-type', '5'], ['1 000', 'wrong-type', 'a number'], ['1.2.3', 'wrong-type', 'a number'], ['five', 'wrong-type', 'a number'], ['', 'wrong-type', 'a number'], ['[5]', 'wrong-type', 'a number'], ['2026-01-02', 'wrong-type', 'a number'],
  ])('%s is refused as %s', (typed, code, mend) => {
    const { value, told } = read(reader, typed)
    expect(value).toBeUndefined()
    expect(told.map((each) => each.code)).toEqual([`definition/${code}`])
    expect(told[0]?.mend).toContain(mend)
  })
  test.each([['0', false], ['1', true], ['10', true], ['11', false], ['2.5', false]])('%s within 1 to 10, whole: %s', (typed, isGood) => {
    expect(read(number({ describe: 'a count', minimum: 1, maximum: 10, integer: true }), typed).value !== undefined).toBe(isGood)
  })
})

describe('a word', () => {
  test.each(['yes', 'no', 'on', 'off', 'No', 'OFF', 'true', 'False', 'null', '~'])('%s without quotes is no text', (typed) => {
    expect(read(text({ describe: 'a text' }), typed).told.map((each) => each.code)).toEqual(['definition/ambiguous-word'])
    expect(read(text({ describe: 'a text' }), `"${typed}"`).value).toBe(typed)
  })
  test.each(['41', '5.0', '2026-03-02', '1e3', '007', 'nothing', 'north'])('%s is a text as typed', (typed) => {
    expect(read(text({ describe: 'a text' }), typed)).toEqual({ value: typed, told: [] })
  })
  test.each([['true', true], ['false', false]])('%s is a truth value', (typed, expected) => {
    expect(read(flag({ describe: 'a flag' }), typed)).toEqual({ value: expected, told: [] })
  })
  test.each([['yes', 'true'], ['no', 'false'], ['on', 'true'], ['Off', 'false'], ['TRUE', 'true']])('%s where true or false is needed', (typed, meant) => {
    const { value, told } = read(flag({ describe: 'a flag' }), typed)
    expect(value).toBeUndefined()
    expect(told).toMatchObject([{ code: 'definition/ambiguous-word', mend: expect.stringContaining(`Write \`${meant}\``) as unknown }])
  })
})

describe('a quantity', () => {
  test.each([['5.0 %', 5, '%', '5.0'], ['0.20 mg/L', 0.2, 'mg/L', '0.20'], ['-1e-3 mol/L', -0.001, 'mol/L', '-1e-3'], ['0.995', 0.995, '', '0.995'], ['5%', 5, '%', '5']])('%s', (typed, value, unit, digits) => {
    expect(read(quantity({ describe: 'a quantity' }), typed).value).toEqual({ value, unit, text: digits })
  })
  test.each([['0,2 mg/L', 'ambiguous-number'], ['0.2 ug/L', 'unknown-unit'], ['mg/L', 'wrong-type'], ['1 000 mg/L', 'wrong-type'], ['1e999 mg/L', 'wrong-type'], ['.inf', 'wrong-type']])('%s is refused as %s', (typed, code) => {
    expect(read(quantity({ describe: 'a quantity' }), typed).told.map((each) => each.code)).toEqual([`definition/${code}`])
  })
})
