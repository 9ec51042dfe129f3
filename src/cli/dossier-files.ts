// A published report → the files of its dossier. The manifest lists every input, record, Markdown, table and chart; never itself, the PDF
// or the history, since each of those holds or follows it.
import { canonicalJson } from '../assess/canonical-json.ts'
import { sha256 } from '../assess/digest.ts'
import type { InputFile } from '../assess/record.ts'

export interface DossierContent {
  readonly recordText: string
  readonly markdown: string
  /** File stem → text. */
  readonly tables: ReadonlyMap<string, string>
  readonly charts: ReadonlyMap<string, string>
  readonly inputs: readonly { readonly path: string; readonly role: InputFile['role']; readonly bytes: Uint8Array }[]
}

const encoder = new TextEncoder()

/** Everything but manifest, PDF and history, by path inside the dossier. */
export function contentFiles(content: DossierContent): ReadonlyMap<string, Uint8Array> {
  const places = inputPaths(content.inputs.map((input) => input.path))
  return new Map([
    ['record.json', encoder.encode(content.recordText)],
    ['report.md', encoder.encode(content.markdown)],
    ...[...content.tables].map(([stem, text]): [string, Uint8Array] => [`tables/${stem}.csv`, encoder.encode(text)]),
    ...[...content.charts].map(([stem, text]): [string, Uint8Array] => [`charts/${stem}.svg`, encoder.encode(text)]),
    ...content.inputs.map((input): [string, Uint8Array] => [places.get(input.path) ?? '', input.bytes]),
  ])
}

/**
 * Where each input stands in the dossier: under its path; a file from outside the study's folder under its path without `..`. Where that is
 * taken already (letter case ignored, as some disks do), it stands in a folder of its own.
 */
export function inputPaths(paths: readonly string[]): ReadonlyMap<string, string> {
  const isOutside = (path: string): boolean => path.startsWith('../')
  const taken = new Set<string>()
  return new Map([...paths.filter((path) => !isOutside(path)), ...paths.filter(isOutside)].map((path): [string, string] => {
    const plain = path.split('/').filter((part) => part !== '..' && part !== '.').join('/')
    let place = `inputs/${plain}`
    for (let count = 1; taken.has(place.toLowerCase()); count += 1) place = `inputs/another-${count}/${plain}`
    taken.add(place.toLowerCase())
    return [path, place]
  }))
}

export function manifestText(files: ReadonlyMap<string, Uint8Array>): string {
  const entries = [...files].map(([path, bytes]) => ({ path, size: bytes.length, sha256: sha256(bytes) })).sort((left, right) => (left.path < right.path ? -1 : 1))
  return canonicalJson({ format: 1, files: entries })
}
