// Names and places on disk: what folder a report number gives, what may stand where a dossier is to be written, and what is said when the
// disk refuses. Run through the sources, so that no bundle is needed.
import { existsSync, mkdirSync, readdirSync, readFileSync, symlinkSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { describe, expect, test } from 'vitest'
import { inputPaths } from '../src/cli/dossier-files.ts'
import { DossierRefused, underLock } from '../src/cli/dossier-folder.ts'
import { notReplaceable } from '../src/cli/earlier-dossier.ts'
import { folderName } from '../src/cli/folder-name.ts'
import { readStudyFile, studyFolder } from '../src/cli/study-folder.ts'
import { temporaryFolder } from './support/temporary-folder.ts'

describe('the folder of a report number', () => {
  test.each(['SM-001', 'GHW-VR-014', 'x y', 'é', '2026.1', '-rf', '~', '$(id)', '%', '報告', 'CONSOLE', 'com10'])('%j is its own', (number) => expect(folderName(number)).toBe(number))

  const changed = ['../x', '..', '.', '...', 'a/b', 'a\\b', 'a:b', 'C:\\x', '/etc/passwd', 'SM-001.', 'SM-001 ', ' SM-001', '.hidden', 'CON', 'con', 'nul.txt', 'LPT1', 'com¹', 'a\u001b[31m', 'a\u009b31m', 'a\u202eb', 'a\u200bb', '<a>', 'a|b', 'a?', '*', '', 'X'.repeat(300), '😀'.repeat(300), '\ud800', 'e\u0301']
  test.each(changed)('%j is changed, and bears a digest', (number) => {
    const name = folderName(number)
    expect(name).toMatch(/^[^\p{Cc}\p{Cf}\p{Cs}<>:"/\\|?*. ][^\p{Cc}\p{Cf}\p{Cs}<>:"/\\|?*]*-[0-9a-f]{8}$/u)
    expect(Buffer.byteLength(name)).toBeLessThan(255)
  })

  test('no two numbers share one', () => {
    const numbers = [...changed, 'a-b', '-', '--x', 'SM-001-', 'SM-001', 'X'.repeat(301), 'é']
    expect(new Set(numbers.map(folderName)).size).toBe(numbers.length)
  })
})

test('no two inputs share a place in the dossier, also where letter case is ignored', () => {
  expect([...inputPaths(['../raw/a.csv', 'study.yaml', 'raw/a.csv', '../../raw/a.csv', 'Raw/A.csv', '../b.csv'])]).toEqual([
    ['study.yaml', 'inputs/study.yaml'], ['raw/a.csv', 'inputs/raw/a.csv'], ['Raw/A.csv', 'inputs/another-1/Raw/A.csv'],
    ['../raw/a.csv', 'inputs/another-2/raw/a.csv'], ['../../raw/a.csv', 'inputs/another-3/raw/a.csv'], ['../b.csv', 'inputs/b.csv'],
  ])
})

describe('what stands where a dossier is to be written', () => {
  function dossier(number = 'A-1'): string {
    const folder = join(temporaryFolder(), 'revision-1')
    mkdirSync(join(folder, 'tables'), { recursive: true })
    for (const name of ['report.pdf', 'history.jsonl', 'tables/one.csv']) writeFileSync(join(folder, name), '')
    writeFileSync(join(folder, 'record.json'), JSON.stringify({ study: { report: { number } } }))
    writeFileSync(join(folder, 'manifest.json'), JSON.stringify({ format: 1, files: [{ path: 'record.json' }, { path: 'tables/one.csv' }] }))
    return folder
  }

  test('nothing, an empty folder, or a dossier of the same report is replaced', () => {
    const folder = dossier()
    writeFileSync(join(folder, 'Thumbs.db'), '')
    expect(notReplaceable(folder, 'A-1')).toBeUndefined()
    expect(notReplaceable(join(folder, 'none'), 'A-1')).toBeUndefined()
    expect(notReplaceable(join(temporaryFolder()), 'A-1')).toBeUndefined()
  })

  test.each<readonly [string, (folder: string) => void, RegExp]>([
    ['a signed copy beside the report', (folder) => writeFileSync(join(folder, 'signed.pdf'), ''), /`signed\.pdf`/],
    ['a note among the tables', (folder) => writeFileSync(join(folder, 'tables/note.txt'), ''), /`tables\/note\.txt`/],
    ['a folder without a manifest', (folder) => writeFileSync(join(folder, 'manifest.json'), '{'), /`record\.json`, `tables\/one\.csv`/],
    ['a manifest of another shape', (folder) => writeFileSync(join(folder, 'manifest.json'), '{"files":[null,{"path":3}]}'), /`record\.json`/],
    ['many files', (folder) => { for (let index = 0; index < 9; index += 1) writeFileSync(join(folder, `${index}.txt`), '') }, /and 6 more files/],
    ['another report', (folder) => writeFileSync(join(folder, 'record.json'), '{"study":{"report":{"number":"a-1"}}}'), /the report `a-1`/],
  ])('%s is left alone', (_, change, said) => {
    const folder = dossier()
    change(folder)
    const found = notReplaceable(folder, 'A-1')
    expect(found?.problem).toMatch(said)
    expect(found?.mend).toBeTruthy()
  })

  test('a file or a link is left alone', () => {
    const folder = temporaryFolder()
    writeFileSync(join(folder, 'file'), '')
    symlinkSync(dossier(), join(folder, 'link'))
    for (const name of ['file', 'link']) expect(notReplaceable(join(folder, name), 'A-1')?.problem).toMatch(/no folder/)
  })
})

describe('a disk that refuses', () => {
  const refusal = (parent: string, work: () => unknown = () => undefined): DossierRefused | undefined => {
    try {
      underLock({ parent, name: 'revision-1' }, work)
      return undefined
    } catch (error) {
      if (error instanceof DossierRefused) return error
      throw error
    }
  }

  test.each<readonly [string, (folder: string) => string, RegExp]>([
    ['a file where a folder should be', (folder) => { writeFileSync(join(folder, 'taken'), ''); return join(folder, 'taken/x/y') }, /ENOTDIR/],
    ['links in a circle', (folder) => { symlinkSync(join(folder, 'a'), join(folder, 'b')); symlinkSync(join(folder, 'b'), join(folder, 'a')); return join(folder, 'a/x') }, /ELOOP/],
    ['a name that is too long', (folder) => join(folder, 'x'.repeat(300)), /ENAMETOOLONG/],
  ])('%s', (_, make, said) => {
    const refused = refusal(make(temporaryFolder()))
    expect([refused?.kind, refused?.message]).toEqual(['disk', expect.stringMatching(said)])
  })

  test.runIf(existsSync('/proc/self'))('a file system that makes no folders is left after one try', () => expect(refusal('/proc/none/x')?.kind).toBe('disk'))

  test('an error of the system inside is told as a refusal, any other passes, and the lock is gone', () => {
    const parent = temporaryFolder()
    mkdirSync(join(parent, 'revision-1/history.jsonl'), { recursive: true })
    expect(refusal(parent, () => readFileSync(join(parent, 'revision-1/history.jsonl')))?.message).toMatch(/EISDIR/)
    expect(() => refusal(parent, () => { throw new TypeError('ours') })).toThrow('ours')
    expect(readdirSync(parent)).toEqual(['revision-1'])
  })

  test.each<readonly [string, (lock: string) => void, boolean]>([
    ['of a running process', (lock) => writeFileSync(lock, String(process.pid)), true], ['of the first process', (lock) => writeFileSync(lock, '1'), true], ['that is a folder', (lock) => mkdirSync(lock), true],
    ['of a process that is gone', (lock) => writeFileSync(lock, '999999999'), false], ['that is empty', (lock) => writeFileSync(lock, ''), false], ['of nonsense', (lock) => writeFileSync(lock, '-1; x'), false],
  ])('a lock %s', (_, make, held) => {
    const parent = temporaryFolder()
    make(join(parent, '.revision-1.lock'))
    const refused = refusal(parent)
    expect(refused?.kind).toBe(held ? 'locked' : undefined)
    if (held) expect(refused?.mend).toContain('.revision-1.lock')
  })
})

describe('the study and its files', () => {
  test.each<readonly [string, (folder: string) => string, RegExp, RegExp]>([
    ['a folder that holds a study', (folder) => { writeFileSync(join(folder, 'study.yaml'), ''); return folder }, /folder, not a file/, /study\.yaml$/],
    ['UTF-16', (folder) => { writeFileSync(join(folder, 'a.yaml'), Buffer.from('format: 1\n', 'utf16le')); return join(folder, 'a.yaml') }, /not in UTF-8/, /UTF-8/],
    ['a device', () => '/dev/zero', /no ordinary file/, /./],
    ['a backslash on a system without', (folder) => `${folder}\\study.yaml`, /no such file/, /./],
  ])('%s', (_, make, problem, mend) => {
    const read = readStudyFile(make(temporaryFolder()))
    expect(read).toMatchObject({ problem: expect.stringMatching(problem) as string, mend: expect.stringMatching(mend) as string })
  })

  test('links are followed inside the folder of the study only', () => {
    const folder = temporaryFolder()
    mkdirSync(join(folder, 'study'))
    writeFileSync(join(folder, 'outside.csv'), 'a')
    writeFileSync(join(folder, 'study/inside.csv'), 'b')
    symlinkSync('inside.csv', join(folder, 'study/link.csv'))
    symlinkSync('../outside.csv', join(folder, 'study/escape.csv'))
    symlinkSync('..', join(folder, 'study/up'))
    symlinkSync('loop.csv', join(folder, 'study/loop.csv'))
    const world = studyFolder(join(folder, 'study/study.yaml'), new URL('../templates/', import.meta.url))
    expect(world.read('link.csv')).toMatchObject({ path: 'link.csv', bytes: Buffer.from('b') })
    for (const path of ['escape.csv', 'up/outside.csv', '../outside.csv']) expect(world.read(path), path).toMatchObject({ problem: expect.stringMatching(/outside/) as string })
    expect(world.read('../outside.csv', true)).toMatchObject({ bytes: Buffer.from('a') })
    expect(world.read('loop.csv')).toMatchObject({ problem: expect.stringMatching(/circle/) as string })
    expect(world.read('up')).toMatchObject({ problem: expect.stringMatching(/folder/) as string })
    expect(world.read('/etc/hostname')).toMatchObject({ problem: expect.stringMatching(/absolute/) as string })
    expect(world.read('none.csv')).toMatchObject({ problem: 'no such file' })
  })
})
