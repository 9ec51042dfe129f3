// The same study built in different folders, time zones and locales gives the same bytes in every file of the dossier but the history.
import { spawnSync } from 'node:child_process'
import { cpSync, readdirSync, readFileSync, statSync } from 'node:fs'
import { join, relative } from 'node:path'
import { fileURLToPath } from 'node:url'
import { expect, test } from 'vitest'
import { sha256 } from '../src/assess/digest.ts'
import { temporaryFolder } from './support/temporary-folder.ts'

const root = fileURLToPath(new URL('..', import.meta.url))
const command = join(root, 'dist/assaywrit.js')

function digests(folder: string, base = folder): readonly string[] {
  return readdirSync(folder).sort().flatMap((name): readonly string[] => {
    const path = join(folder, name)
    if (statSync(path).isDirectory()) return digests(path, base)
    return name === 'history.jsonl' ? [] : [`${sha256(readFileSync(path))} ${relative(base, path)}`]
  })
}

function build(environment: Readonly<Record<string, string>>): readonly string[] {
  const folder = temporaryFolder()
  cpSync(join(root, 'fixtures/studies/process-water'), join(folder, 'study'), { recursive: true })
  const done = spawnSync(process.execPath, [command, 'report', join(folder, 'study/study.yaml'), '--out', join(folder, 'out')], { encoding: 'utf8', cwd: folder, env: { ...process.env, ...environment } })
  expect(done.stderr.split('\n').filter((line) => line.includes(' error '))).toEqual([])
  expect(done.status).toBe(0)
  const number = readdirSync(join(folder, 'out'))[0] ?? ''
  return digests(join(folder, 'out', number, 'revision-1'))
}

test('the demo dossier is the same bytes elsewhere and elsewhen', () => {
  const here = build({ TZ: 'UTC', LANG: 'C.UTF-8', LC_ALL: 'C.UTF-8' })
  expect(here.length).toBeGreaterThan(10)
  expect(build({ TZ: 'Pacific/Kiritimati', LANG: 'de_DE.UTF-8', LC_ALL: 'de_DE.UTF-8' })).toEqual(here)
})
