// A dossier is the old one or the new one, whole, wherever the writing process is killed; and two writers never meet.
import { spawnSync } from 'node:child_process'
import { existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { build } from 'esbuild'
import { beforeAll, expect, test } from 'vitest'
import { DossierRefused, replaceDossier, underLock } from '../src/cli/dossier-folder.ts'
import { temporaryFolder } from './support/temporary-folder.ts'

const root = fileURLToPath(new URL('..', import.meta.url))
const writer = join(root, 'out/test/dossier-folder.mjs')
const driver = join(root, 'test/support/kill-during-write.mjs')

beforeAll(async () => {
  await build({ entryPoints: [join(root, 'src/cli/dossier-folder.ts')], outfile: writer, bundle: true, format: 'esm', platform: 'node', logLevel: 'error' })
})

function write(parent: string, content: string, killBefore: number): string {
  return spawnSync(process.execPath, [driver, writer, parent, String(killBefore), content], { encoding: 'utf8' }).stdout
}

function contents(parent: string): readonly string[] {
  const folder = join(parent, 'revision-1')
  return ['record.json', 'tables/one.csv', 'report.pdf'].map((name) => readFileSync(join(folder, name), 'utf8'))
}

test('killed between any two steps, the dossier is whole and the next run settles it', () => {
  const parent = join(temporaryFolder(), 'report')
  const steps = Number(/after (\d+) steps/.exec(write(parent, 'old', 0))?.[1])
  expect(steps).toBeGreaterThan(15)
  const seen = new Set<string>()
  for (let step = 1; step <= steps + 4; step += 1) {
    write(parent, `new ${step}`, step)
    // What a reader finds now: the dossier, or (between the two renames) the old one aside, which the next run puts back.
    underLock({ parent, name: 'revision-1' }, () => undefined)
    const found = new Set(contents(parent))
    expect(found.size, `killed before step ${step}`).toBe(1)
    seen.add([...found][0] ?? '')
    expect(readdirSync(parent)).toEqual(['revision-1'])
  }
  expect(seen.has('old')).toBe(true)
  expect(seen.size).toBeGreaterThan(1)
})

test('a second writer is refused while the first one lives, and a dead one is taken over', () => {
  const parent = temporaryFolder()
  const place = { parent, name: 'revision-1' }
  underLock(place, () => {
    expect(() => underLock(place, () => undefined)).toThrow(DossierRefused)
  })
  writeFileSync(join(parent, '.revision-1.lock'), '999999999')
  underLock(place, () => replaceDossier(place, new Map([['record.json', new Uint8Array([1])]])))
  expect(existsSync(join(parent, '.revision-1.lock'))).toBe(false)
})

test('a place that cannot be written leaves the earlier dossier as it was', () => {
  const parent = temporaryFolder()
  const place = { parent, name: 'revision-1' }
  underLock(place, () => replaceDossier(place, new Map([['record.json', new TextEncoder().encode('old')]])))
  mkdirSync(join(parent, 'revision-1', 'tables'), { recursive: true })
  // A file name that no file system takes stands for a disk that refuses in the middle.
  expect(() => underLock(place, () => replaceDossier(place, new Map([['record.json', new Uint8Array([2])], [`${'x'.repeat(300)}.csv`, new Uint8Array([3])]])))).toThrow(DossierRefused)
  expect(readFileSync(join(parent, 'revision-1', 'record.json'), 'utf8')).toBe('old')
  expect(readdirSync(parent)).toEqual(['revision-1'])
})
