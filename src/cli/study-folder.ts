// The folder of a study as the stages see it: files by relative path, read once, never followed out of the folder.
// Every refusal is a sentence, since the user's disk is the user's input too.
import { existsSync, readdirSync, readFileSync, realpathSync, statSync } from 'node:fs'
import { dirname, isAbsolute, join, relative, resolve, sep } from 'node:path'
import { fileURLToPath } from 'node:url'
import type { ReadFile, World } from '../pipeline.ts'

declare const programVersion: string

const largestFile = 256 * 1024 * 1024 // bytes; a raw file above this is a mistake or an attack, and would not fit a dossier

type Refusal = { readonly problem: string; readonly mend: string }

/** The study file itself, named as the user typed it. */
export function readStudyFile(path: string): ReadFile | Refusal {
  const absolute = resolve(path)
  const read = readBytes(absolute)
  if ('problem' in read) return existsSync(join(absolute, 'study.yaml')) ? { ...read, mend: `Write ${join(path, 'study.yaml')}` } : read
  // YAML may be in UTF-16 too; a study is not, so that what people compare and search is one kind of text.
  if (read.bytes.subarray(0, 2).some((byte) => byte === 0 || byte === 0xfe || byte === 0xff)) return { problem: 'it is not in UTF-8', mend: 'Save it as UTF-8' }
  return { path: path.split(/[\\/]/).at(-1) ?? path, bytes: read.bytes }
}

/** `templatesFolder` is beside the bundle unless said (tests run the sources). */
export function studyFolder(studyPath: string, templatesFolder = new URL('../templates/', import.meta.url)): World {
  const folder = dirname(resolve(studyPath))
  const shipped = fileURLToPath(templatesFolder)
  const templates = existsSync(shipped) ? readdirSync(shipped).filter((name) => name.endsWith('.md')).map((name) => name.slice(0, -3)).sort() : []
  return {
    program: { name: 'Assaywrit', version: programVersion },
    templates,
    template(name) {
      return templates.includes(name) ? readFileSync(resolve(shipped, `${name}.md`)) : undefined
    },
    read(path, mayBeOutside = false) {
      const absolute = resolve(folder, path)
      if (isAbsolute(path)) return { problem: 'the path is absolute', mend: 'Write a path relative to the folder of the study' }
      const read = readBytes(absolute)
      if ('problem' in read) return read
      const real = relative(realpathSync(folder), realpathSync(absolute))
      const leaves = real.startsWith(`..${sep}`) || isAbsolute(real)
      if (leaves && !mayBeOutside) return { problem: 'it lies outside the folder of the study', mend: 'Copy the file into the folder of the study, or declare `outside: true` beside `file:`' }
      return { path, bytes: read.bytes }
    },
  }
}

function readBytes(absolute: string): { readonly bytes: Uint8Array } | Refusal {
  try {
    const about = statSync(absolute)
    if (about.isDirectory()) return { problem: 'it is a folder, not a file', mend: 'Name a file in that folder' }
    if (!about.isFile()) return { problem: 'it is no ordinary file', mend: 'Copy its content into an ordinary file' }
    if (about.size > largestFile) return { problem: `it is larger than ${largestFile / 1024 / 1024} MiB`, mend: 'Split the file, or leave out what the study does not need' }
    return { bytes: readFileSync(absolute) }
  } catch (error) {
    return refusal(error)
  }
}

function refusal(error: unknown): Refusal {
  const code = error instanceof Error && 'code' in error ? String(error.code) : ''
  switch (code) {
    case 'ENOENT': case 'ENOTDIR': return { problem: 'no such file', mend: 'Correct the path, or put the file there' }
    case 'EACCES': case 'EPERM': return { problem: 'it may not be read', mend: 'Give yourself the right to read it' }
    case 'ELOOP': return { problem: 'its links go in a circle', mend: 'Replace the link by the file' }
    case 'EBUSY': return { problem: 'another program holds it', mend: 'Close it there and try again' }
    case 'ENAMETOOLONG': return { problem: 'its name is too long', mend: 'Shorten the name' }
    default:
      if (error instanceof Error && code !== '') return { problem: `the system says ${code}`, mend: 'Mend the file and try again' }
      throw error
  }
}
