// The packed command, installed in an empty folder without node_modules and network, builds a study outside the repository.
import { spawnSync } from 'node:child_process'
import { cpSync, existsSync, mkdirSync, readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { expect, test } from 'vitest'
import { temporaryFolder } from './support/temporary-folder.ts'

const root = fileURLToPath(new URL('..', import.meta.url))

test('npm pack, npm install into an empty folder, report', () => {
  const folder = temporaryFolder()
  const packed = spawnSync('npm', ['pack', '--ignore-scripts', '--pack-destination', folder], { cwd: root, encoding: 'utf8' })
  expect(packed.status, packed.stderr).toBe(0)
  const archive = readdirSync(folder).find((name) => name.endsWith('.tgz')) ?? ''
  const home = join(folder, 'home')
  mkdirSync(home)
  // --offline: whatever the package needed from a registry would fail here.
  const installed = spawnSync('npm', ['install', '--global', '--prefix', home, '--offline', '--ignore-scripts', '--no-audit', '--no-fund', join(folder, archive)], { cwd: folder, encoding: 'utf8' })
  expect(installed.status, installed.stderr).toBe(0)
  const own = join(home, 'lib/node_modules/assaywrit')
  expect(existsSync(join(own, 'node_modules'))).toBe(false)
  expect(readdirSync(join(own, 'dist/fonts')).filter((name) => name.endsWith('.ttf')).length).toBeGreaterThanOrEqual(8)
  expect(readdirSync(join(own, 'dist/fonts')).filter((name) => !name.endsWith('.ttf')).length).toBeGreaterThanOrEqual(3)
  cpSync(join(root, 'fixtures/studies/smallest'), join(folder, 'study'), { recursive: true })
  const done = spawnSync(join(home, 'bin/assaywrit'), ['report', 'study.yaml'], { cwd: join(folder, 'study'), encoding: 'utf8' })
  expect(done.status, done.stderr).toBe(0)
  const dossier = join(folder, 'study/out/SM-001/revision-1')
  expect(readFileSync(join(dossier, 'report.pdf')).subarray(0, 5).toString('latin1')).toBe('%PDF-')
  expect(readdirSync(dossier).sort()).toEqual(['charts', 'history.jsonl', 'inputs', 'manifest.json', 'record.json', 'report.md', 'report.pdf', 'tables'])
})
