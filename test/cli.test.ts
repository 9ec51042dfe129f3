// Exit codes and what is printed where: results on standard output, everything else on standard error, one JSON document with --json.
import { spawnSync } from 'node:child_process'
import { cpSync, existsSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { describe, expect, test } from 'vitest'
import { sha256 } from '../src/assess/digest.ts'
import { temporaryFolder } from './support/temporary-folder.ts'

const root = fileURLToPath(new URL('..', import.meta.url))
const command = join(root, 'dist/assaywrit.js')

function run(...words: readonly string[]): { readonly status: number | null; readonly stderr: string; readonly stdout: string } {
  return spawnSync(process.execPath, [command, ...words], { encoding: 'utf8' })
}

function smallest(change: (text: string) => string = (text) => text): string {
  const folder = temporaryFolder()
  cpSync(join(root, 'fixtures/studies/smallest'), folder, { recursive: true })
  const path = join(folder, 'study.yaml')
  writeFileSync(path, change(readFileSync(path, 'utf8')))
  return path
}

describe('help and usage', () => {
  test.each([[[]], [['--help']], [['report', '--help']], [['check', '--help']], [['schema', '--help']]])('%j explains with an example', (words) => {
    const done = run(...words)
    expect(done.status).toBe(0)
    expect(done.stdout).toMatch(/Example:/)
    expect(done.stderr).toBe('')
  })

  test.each([
    [['chek'], /did you mean check/], [['report'], /name a study/], [['report', 'a.yaml', '--ot', 'x'], /--ot/], [['check', 'a.yaml', '--out', 'x'], /--out/], [['schema', 'x'], /x/],
  ])('%j is refused with exit 2', (words, said) => {
    const done = run(...words)
    expect(done.status).toBe(2)
    expect(done.stderr).toMatch(said)
    expect(done.stdout).toBe('')
  })
})

test('check says it is ready and writes nothing', () => {
  const path = smallest()
  const done = run('check', path)
  expect([done.status, done.stderr]).toEqual([0, ''])
  expect(done.stdout).toMatch(/ready; overall verdict: meets/)
  expect(existsSync(join(path, '../out'))).toBe(false)
})

test('report writes the dossier, and its manifest and history hold', () => {
  const path = smallest()
  const done = run('report', path)
  expect([done.status, done.stderr]).toEqual([0, ''])
  const dossier = join(path, '../out/SM-001/revision-1')
  const manifest = JSON.parse(readFileSync(join(dossier, 'manifest.json'), 'utf8')) as { files: readonly { path: string; sha256: string; size: number }[] }
  for (const file of manifest.files) {
    const bytes = readFileSync(join(dossier, file.path))
    expect([file.path, bytes.length, sha256(bytes)]).toEqual([file.path, file.size, file.sha256])
  }
  expect(manifest.files.map((file) => file.path)).toEqual(expect.arrayContaining(['record.json', 'report.md', 'inputs/study.yaml', 'inputs/standards.csv']))
  run('report', path)
  const history = readFileSync(join(dossier, 'history.jsonl'), 'utf8').trimEnd().split('\n')
  expect(history.length).toBe(2)
  expect((JSON.parse(history[1] ?? '{}') as { previous?: string }).previous).toBe(sha256(history[0] ?? ''))
})

test('a missed criterion is exit 3 only when asked', () => {
  const path = smallest((text) => text.replace('at most 10 %', 'at most 0.001 %'))
  expect(run('report', path).status).toBe(0)
  expect(run('report', path, '--fail-on-verdict').status).toBe(3)
})

test('--json prints one document and nothing on standard error', () => {
  const path = smallest((text) => text.replace('kind: partial validation', 'kind: partial validaton'))
  const done = run('check', path, '--json')
  expect([done.status, done.stderr]).toEqual([1, ''])
  const printed = JSON.parse(done.stdout) as { format: number; studies: readonly { exit: number; diagnostics: readonly { code: string; place: { line: number; column: number } }[] }[] }
  expect(printed.format).toBe(1)
  expect(printed.studies[0]?.diagnostics[0]).toMatchObject({ code: 'definition/unknown-choice', place: { file: 'study.yaml', line: 6, column: 9 } })
})

test('a character that no font has is refused by name, and nothing is written', () => {
  const path = smallest((text) => text.replace('Dye in rinse water', 'Dye \u{1F9EA} in rinse water'))
  const done = run('report', path)
  expect(done.status, done.stderr).toBe(1)
  expect(done.stderr).toMatch(/U\+1F9EA/)
  expect(existsSync(join(path, '../out'))).toBe(false)
})

test('the schema is JSON Schema with a description for every key', () => {
  const schema = JSON.parse(run('schema').stdout) as Record<string, unknown>
  expect(schema['$schema']).toMatch(/json-schema/)
  const undescribed: string[] = []
  const visit = (node: unknown, path: string): void => {
    if (typeof node !== 'object' || node === null) return
    for (const [key, member] of Object.entries((node as { properties?: Record<string, unknown> }).properties ?? {})) {
      if (typeof (member as { description?: unknown }).description !== 'string') undescribed.push(`${path}.${key}`)
      visit(member, `${path}.${key}`)
    }
    visit((node as { items?: unknown }).items, `${path}[]`)
    visit((node as { additionalProperties?: unknown }).additionalProperties, `${path}.*`)
  }
  visit(schema, '')
  expect(undescribed).toEqual([])
})
