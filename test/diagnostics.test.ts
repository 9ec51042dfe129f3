// Every folder fixtures/faulty/<stage>/<code>[--variant]/ is the smallest study with one mistake; what the program says of it is approved
// text. A code without a folder is a code nobody has seen.
import { existsSync, readdirSync, readFileSync, statSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { parse } from 'yaml'
import { describe, expect, test } from 'vitest'
import { readDefinition } from '../src/definition/index.ts'
import { codes } from '../src/diagnostics/codes.ts'
import type { Diagnostic } from '../src/diagnostics/diagnostic.ts'
import { printDiagnostics } from '../src/diagnostics/print.ts'
import { expectApproved } from './support/approved.ts'
import { shippedTemplate } from './support/shipped-template.ts'
import { tinyCatalogue } from './support/tiny-catalogue.ts'

const root = fileURLToPath(new URL('../fixtures/faulty', import.meta.url))
const cases = foldersOf(root).flatMap((stage) => foldersOf(join(root, stage)).map((name) => ({ stage, name, code: `${stage}/${name.split('--')[0] ?? name}`, folder: join(root, stage, name) })))

function foldersOf(path: string): readonly string[] {
  return existsSync(path) ? readdirSync(path).filter((name) => statSync(join(path, name)).isDirectory()).sort() : []
}

describe.each(cases)('$stage/$name', ({ stage, code, folder }) => {
  test('says what is approved', async () => {
    const study = { file: 'study.yaml', text: readFileSync(join(folder, 'study.yaml'), 'utf8') }
    const diagnostics = stage === 'definition' ? readDefinition(study, tinyCatalogue).diagnostics : await wholeCheck(folder)
    expect(diagnostics.map((each) => each.code)).toContain(code)
    expectApproved(join(folder, 'diagnostics.txt'), `${printDiagnostics(diagnostics, { sources: sourcesOf(folder) })}\n`)
  })
})

/** The later stages need all before them. Imported only here, so that the definition's own cases run by themselves. */
async function wholeCheck(folder: string): Promise<readonly Diagnostic[]> {
  const { check } = await import('../src/pipeline.ts')
  return check({ path: 'study.yaml', bytes: readFileSync(join(folder, 'study.yaml')) }, {
    program: { name: 'Assaywrit', version: '0.0.0-test' }, templates: ['validation-report'], template: shippedTemplate,
    read: (path) => (existsSync(join(folder, path)) ? { path, bytes: readFileSync(join(folder, path)) } : { problem: 'no such file', mend: 'Put the file there' }),
  }).diagnostics
}

function sourcesOf(folder: string): ReadonlyMap<string, string> {
  return new Map((readdirSync(folder, { recursive: true }) as string[]).filter((name) => statSync(join(folder, name)).isFile()).map((name) => [name.split('\\').join('/'), readFileSync(join(folder, name), 'utf8')]))
}

/** Codes that no small folder can show, and where they are seen instead. */
const shownElsewhere: Readonly<Record<string, string>> = {
  'data/too-long': 'needs a line of a megabyte: test/bad-input.test.ts',
  'present/unprintable-character': 'needs the fonts of the bundle: test/cli.test.ts',
  'definition/too-long': 'needs two megabytes: test/definition/yaml.test.ts',
}

test('every code has a folder, a case that expects it, or a reason', () => {
  const characteristics = fileURLToPath(new URL('../fixtures/characteristics', import.meta.url))
  const expected = foldersOf(characteristics).flatMap((each) => foldersOf(join(characteristics, each)).flatMap((name) => {
    const path = join(characteristics, each, name, 'expected.yaml')
    return existsSync(path) ? ((parse(readFileSync(path, 'utf8')) as { diagnostics?: readonly string[] }).diagnostics ?? []) : []
  }))
  const shown = new Set([...cases.map((each) => each.code), ...expected, ...Object.keys(shownElsewhere)])
  // Codes of the command need a disk that refuses: test/bad-input.test.ts and test/dossier-folder.test.ts.
  expect(Object.keys(codes).filter((code) => !code.startsWith('command/') && !shown.has(code))).toEqual([])
})

test('every folder and every exception names a code of the table', () => {
  const known = Object.keys(codes)
  expect([...cases.map((each) => each.code), ...Object.keys(shownElsewhere)].filter((code) => !known.includes(code))).toEqual([])
})

test('every code has a sentence of help without full stop', () => {
  expect(Object.entries(codes).filter(([, entry]) => entry.help.length < 20 || entry.help.endsWith('.')).map(([code]) => code)).toEqual([])
})
