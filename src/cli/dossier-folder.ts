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

/** The dossier is being written by another run, or the disk refuses. The earlier dossier is as it was. */
export class DossierRefused extends Error {}

export function dossierPath(place: DossierPlace): string {
  return join(place.parent, place.name)
}

/** Runs `write` while no other run can touch the dossier; an interrupted earlier run is settled first. */
export function underLock<T>(place: DossierPlace, work: () => T): T {
  try {
    mkdirSync(place.parent, { recursive: true })
  } catch (error) {
    throw new DossierRefused(`cannot make the folder ${place.parent}: ${codeOf(error)}`)
  }
  const lock = join(place.parent, `.${place.name}.lock`)
  takeLock(lock)
  try {
    settle(place)
    return work()
  } finally {
    rmSync(lock, { force: true })
  }
}

/** Replaces the dossier by these files. Call under the lock. */
export function replaceDossier(place: DossierPlace, files: ReadonlyMap<string, Uint8Array>): void {
  const { fresh, aside, current } = paths(place)
  try {
    rmSync(fresh, { recursive: true, force: true })
    for (const [name, bytes] of files) writeDurably(join(fresh, name), bytes)
    for (const [name, bytes] of files) {
      if (sha256(readFileSync(join(fresh, name))) !== sha256(bytes)) throw new DossierRefused(`${name} was not written as it was given: the disk may be full or failing`)
    }
    if (existsSync(current)) renameSync(current, aside)
    renameSync(fresh, current)
    rmSync(aside, { recursive: true, force: true })
  } catch (error) {
    if (error instanceof DossierRefused) throw error
    if (codeOf(error) === '') throw error
    settle(place)
    rmSync(fresh, { recursive: true, force: true })
    throw new DossierRefused(`cannot write ${current}: ${codeOf(error)}; the earlier dossier is as it was`)
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
      if (codeOf(error) !== 'EEXIST') throw new DossierRefused(`cannot write beside the dossier: ${codeOf(error)}`)
      if (isHeld(lock)) throw new DossierRefused(`another run is writing to it (remove ${lock} if none is)`)
      rmSync(lock, { force: true })
    }
  }
  throw new DossierRefused('another run is writing to it')
}

function isHeld(lock: string): boolean {
  const holder = Number(existsSync(lock) ? readFileSync(lock, 'utf8') : '')
  if (!Number.isInteger(holder) || holder <= 0) return false
  try {
    process.kill(holder, 0)
    return true
  } catch (error) {
    return codeOf(error) === 'EPERM'
  }
}

function codeOf(error: unknown): string {
  return error instanceof Error && 'code' in error ? String(error.code) : ''
}
