// Writes a dossier whole or not at all: built in a sibling folder and read back, the old one renamed aside, the new one renamed in.
// A run that was killed between any two steps is completed or undone by the next one, under a lock.
import { closeSync, existsSync, fsyncSync, mkdirSync, openSync, readFileSync, renameSync, rmSync, writeFileSync, writeSync } from 'node:fs'
import { dirname, join } from 'node:path'
import { sha256 } from '../assess/digest.ts'

export interface DossierPlace {
  /** `OUT/NUMBER` */
  readonly parent: string
  /** `revision-1` */
  readonly name: string
}

export type RefusalKind = 'locked' | 'disk' | 'not replaceable'

/** The dossier is being written by another run, the disk refuses, or what stands there is not the program's to replace. All is as it was. */
export class DossierRefused extends Error {
  readonly kind: RefusalKind
  readonly mend: string

  constructor(kind: RefusalKind, message: string, mend = 'Name another folder with --out, or mend this one') {
    super(message)
    this.kind = kind
    this.mend = mend
  }
}

export function dossierPath(place: DossierPlace): string {
  return join(place.parent, place.name)
}

/** Runs `write` while no other run can touch the dossier; an interrupted earlier run is settled first. */
export function underLock<T>(place: DossierPlace, work: () => T): T {
  try {
    makeFolders(place.parent)
  } catch (error) {
    if (codeOf(error) === '') throw error
    throw new DossierRefused('disk', `cannot make the folder ${place.parent}: ${codeOf(error)}`)
  }
  const lock = join(place.parent, `.${place.name}.lock`)
  takeLock(lock)
  try {
    settle(place)
    return work()
  } catch (error) {
    if (error instanceof DossierRefused || codeOf(error) === '') throw error
    throw new DossierRefused('disk', `cannot read or write ${dossierPath(place)}: ${codeOf(error)}`)
  } finally {
    dropLock(lock)
  }
}

/** Level by level: where a file system answers "no such file" to a folder that cannot be made, the recursive call never ends. */
function makeFolders(path: string): void {
  if (existsSync(path)) return
  makeFolders(dirname(path))
  try {
    mkdirSync(path)
  } catch (error) {
    if (codeOf(error) !== 'EEXIST') throw error
  }
}

/** Replaces the dossier by these files. Call under the lock. */
export function replaceDossier(place: DossierPlace, files: ReadonlyMap<string, Uint8Array>): void {
  const { fresh, aside, current } = paths(place)
  try {
    rmSync(fresh, { recursive: true, force: true })
    for (const [name, bytes] of files) writeDurably(join(fresh, name), bytes)
    for (const [name, bytes] of files) {
      if (sha256(readFileSync(join(fresh, name))) !== sha256(bytes)) throw new DossierRefused('disk', `${name} was not written as it was given: the disk may be full or failing`)
    }
    if (existsSync(current)) renameSync(current, aside)
    renameSync(fresh, current)
    rmSync(aside, { recursive: true, force: true })
  } catch (error) {
    if (error instanceof DossierRefused) throw error
    if (codeOf(error) === '') throw error
    settle(place)
    rmSync(fresh, { recursive: true, force: true })
    throw new DossierRefused('disk', `cannot write ${current}: ${codeOf(error)}; the earlier dossier is as it was`)
  }
}

/** Completes or undoes what a killed run left: afterwards the dossier is the old one or the new one, whole. */
function settle(place: DossierPlace): void {
  const { fresh, aside, current } = paths(place)
  if (existsSync(aside)) {
    if (existsSync(current)) rmSync(aside, { recursive: true, force: true })
    else renameSync(aside, current)
  }
  rmSync(fresh, { recursive: true, force: true })
}

function paths(place: DossierPlace): { readonly fresh: string; readonly aside: string; readonly current: string } {
  return { fresh: join(place.parent, `.${place.name}.new`), aside: join(place.parent, `.${place.name}.old`), current: dossierPath(place) }
}

function writeDurably(path: string, bytes: Uint8Array): void {
  mkdirSync(dirname(path), { recursive: true })
  const handle = openSync(path, 'wx')
  try {
    let written = 0
    while (written < bytes.length) written += writeSync(handle, bytes, written)
    fsyncSync(handle)
  } finally {
    closeSync(handle)
  }
}

/** The lock names its process; one whose process is gone is taken over. */
function takeLock(lock: string): void {
  for (let attempt = 0; attempt < 2; attempt += 1) {
    try {
      writeFileSync(lock, String(process.pid), { flag: 'wx' })
      return
    } catch (error) {
      if (codeOf(error) !== 'EEXIST') throw new DossierRefused('disk', `cannot write beside the dossier: ${codeOf(error)}`)
      if (isHeld(lock)) break
      dropLock(lock)
    }
  }
  throw new DossierRefused('locked', 'another run is writing to it', `Wait for the other run; when there is none, remove ${lock}`)
}

/** A lock that cannot be removed is left to be told by the next run. */
function dropLock(lock: string): void {
  try {
    rmSync(lock, { force: true })
  } catch (error) {
    if (codeOf(error) === '') throw error
  }
}

function isHeld(lock: string): boolean {
  try {
    const holder = Number(readFileSync(lock, 'utf8'))
    if (!Number.isInteger(holder) || holder <= 0) return false
    process.kill(holder, 0)
    return true
  } catch (error) {
    return codeOf(error) === 'EPERM'
  }
}

/** The name of what the system refused with; empty for an error of another kind. */
function codeOf(error: unknown): string {
  const code = error instanceof Error && 'code' in error ? String(error.code) : ''
  return /^(?:E[A-Z0-9]+|ERR_FS_\w+)$/.test(code) ? code : ''
}
