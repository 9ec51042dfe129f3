// Whatever stands where a file should be, the command says so in a sentence with exit 1, shows no stack trace, and leaves the earlier dossier whole.
import { spawnSync } from 'node:child_process'
import { chmodSync, cpSync, existsSync, mkdirSync, mkdtempSync, readFileSync, rmSync, symlinkSync, writeFileSync } from 'node:fs'
import { tmpdir } from 'node:os'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { temporaryFolder } from './support/temporary-folder.ts'

const root = fileURLToPath(new URL('..', import.meta.url))
const command = join(root, 'dist/assaywrit.js')
const example = join(root, 'fixtures/studies/smallest')

function run(words: readonly string[]): { readonly status: number | null; readonly stderr: string; readonly stdout: string } {
  return spawnSync(process.execPath, [command, ...words], { encoding: 'utf8', maxBuffer: 1 << 28, timeout: 30_000 })
}

const study = (folder: string): string => join(folder, 'study.yaml')
const data = (folder: string): string => join(folder, 'standards.csv')

const spoil: readonly (readonly [string, (folder: string) => void, RegExp])[] = [
  ['a missing data file', (folder) => rmSync(data(folder)), /no such file/],
  ['a folder instead of a data file', (folder) => { rmSync(data(folder)); mkdirSync(data(folder)) }, /folder, not a file/],
  ['an empty data file', (folder) => writeFileSync(data(folder), ''), /empty/i],
  ['a header only', (folder) => writeFileSync(data(folder), readFileSync(data(folder), 'utf8').split('\n')[0] + '\n'), /no row|header only|no data/i],
  ['a binary data file', (folder) => writeFileSync(data(folder), Buffer.from([0x7f, 0x45, 0x4c, 0x46, 2, 1, 1, 0, 0, 0, 0xff, 0xfe, 0, 0])), /binary|not text/i],
  ['a line of 200 MB', (folder) => writeFileSync(data(folder), Buffer.alloc(200 * 1024 * 1024, 'x')), /line|long|large/i],
  ['a path that leaves the folder', (folder) => writeFileSync(study(folder), readFileSync(study(folder), 'utf8').replace('standards.csv', '../../standards.csv')), /outside|leaves/i],
  ['a link out of the folder', (folder) => { rmSync(data(folder)); symlinkSync(join(root, 'package.json'), data(folder)) }, /outside/],
  ['links in a circle', (folder) => { rmSync(data(folder)); symlinkSync(data(folder), join(folder, 'b.csv')); symlinkSync(join(folder, 'b.csv'), data(folder)) }, /circle|no such file/],
  ['a study that is a folder', (folder) => { rmSync(study(folder)); mkdirSync(study(folder)) }, /folder, not a file/],
  ['an empty study', (folder) => writeFileSync(study(folder), ''), /./],
  ['a study that is no YAML', (folder) => writeFileSync(study(folder), '{ [ : '), /./],
  ['a study with escape sequences', (folder) => writeFileSync(study(folder), `${readFileSync(study(folder), 'utf8')}"\\u001b[31mred": 1\n`), /Unexpected key/],
  ['a template with an unknown directive', (folder) => { writeFileSync(join(folder, 'ours.md'), '# One\n\n::conformty\n'); writeFileSync(study(folder), readFileSync(study(folder), 'utf8').replace(/template: .*/, 'template: ./ours.md')) }, /conformty[\s\S]*conformity/],
]

/** The example with its dossier, built once. */
let built = ''

beforeAll(() => {
  built = mkdtempSync(join(tmpdir(), 'assaywrit-built-'))
  cpSync(example, built, { recursive: true })
  const done = run(['report', study(built), '--out', join(built, 'dossiers')])
  if (done.status !== 0) throw new Error(done.stderr)
})

afterAll(() => rmSync(built, { recursive: true, force: true }))

describe('bad input', () => {
  test.each(spoil)('%s', (_, damage, said) => {
    const folder = temporaryFolder()
    cpSync(built, folder, { recursive: true })
    const out = join(folder, 'dossiers')
    const dossier = join(out, 'SM-001', 'revision-1', 'record.json')
    const before = readFileSync(dossier, 'utf8')
    damage(folder)
    const done = run(['report', study(folder), '--out', out])
    expect(done.stderr).toMatch(said)
    expect(done.stderr).not.toMatch(/^\s+at .*\.[jt]s:\d+/m)
    expect(done.stderr).not.toContain('\u001b[31m')
    expect(done.status, done.stderr).toBe(1)
    expect(readFileSync(dossier, 'utf8')).toBe(before)
  })

  test('a file outside the folder is read when the study declares it', () => {
    const folder = temporaryFolder()
    cpSync(example, join(folder, 'study'), { recursive: true })
    cpSync(join(example, 'standards.csv'), join(folder, 'shared.csv'))
    writeFileSync(join(folder, 'study/study.yaml'), readFileSync(join(folder, 'study/study.yaml'), 'utf8').replace('files: [standards.csv]', 'files: { file: ../shared.csv, outside: true }'))
    const done = run(['report', join(folder, 'study/study.yaml'), '--out', join(folder, 'out')])
    expect(done.status, done.stderr).toBe(0)
    expect(existsSync(join(folder, 'out/SM-001/revision-1/inputs/shared.csv'))).toBe(true)
  })

  test.runIf(process.getuid?.() !== 0)('a data file that may not be read', () => {
    const folder = temporaryFolder()
    cpSync(example, folder, { recursive: true })
    chmodSync(data(folder), 0)
    expect(run(['check', study(folder)]).stderr).toMatch(/may not be read/)
  })

  test('an output place that is a file is refused with exit 6', () => {
    const folder = temporaryFolder()
    cpSync(example, folder, { recursive: true })
    writeFileSync(join(folder, 'taken'), '')
    const done = run(['report', study(folder), '--out', join(folder, 'taken')])
    expect(done.status, done.stderr).toBe(6)
    expect(existsSync(join(folder, 'taken', 'SM-001'))).toBe(false)
  })
})
