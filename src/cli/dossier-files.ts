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
  return new Map([
    ['record.json', encoder.encode(content.recordText)],
    ['report.md', encoder.encode(content.markdown)],
    ...[...content.tables].map(([stem, text]): [string, Uint8Array] => [`tables/${stem}.csv`, encoder.encode(text)]),
    ...[...content.charts].map(([stem, text]): [string, Uint8Array] => [`charts/${stem}.svg`, encoder.encode(text)]),
    ...content.inputs.map((input): [string, Uint8Array] => [inputPath(input.path), input.bytes]),
  ])
}

/** Where an input stands in the dossier; an earlier record from outside the study's folder is kept by its name. */
export function inputPath(path: string): string {
  return `inputs/${path.split('/').filter((part) => part !== '..' && part !== '.').join('/')}`
}

export function manifestText(files: ReadonlyMap<string, Uint8Array>): string {
  const entries = [...files].map(([path, bytes]) => ({ path, size: bytes.length, sha256: sha256(bytes) })).sort((left, right) => (left.path < right.path ? -1 : 1))
  return canonicalJson({ format: 1, files: entries })
}
