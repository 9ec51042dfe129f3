// What stands where a dossier is to be written → why it may not be replaced. Only a dossier of the same report that holds nothing but what
// this program wrote may: a signed copy laid beside it, or somebody's own folder, is never thrown away.
import { existsSync, lstatSync, readdirSync, readFileSync } from 'node:fs'
import { join } from 'node:path'

const ownFiles: ReadonlySet<string> = new Set(['manifest.json', 'report.pdf', 'history.jsonl'])
const litter: ReadonlySet<string> = new Set(['.DS_Store', 'Thumbs.db', 'desktop.ini']) // of file managers

export interface NotReplaceable {
  readonly problem: string
  readonly mend: string
}

export function notReplaceable(folder: string, reportNumber: string): NotReplaceable | undefined {
  if (!existsSync(folder)) return undefined
  if (!lstatSync(folder).isDirectory()) return { problem: 'something that is no folder stands in its place', mend: 'Move it elsewhere' }
  const known = manifestPaths(folder)
  const files = (readdirSync(folder, { recursive: true }) as string[]).filter((path) => !lstatSync(join(folder, path)).isDirectory()).map((path) => path.split('\\').join('/'))
  const strangers = files.filter((path) => !known.has(path) && !ownFiles.has(path) && !litter.has(path.split('/').at(-1) ?? '')).sort()
  if (strangers.length > 0) {
    return { problem: `the folder holds ${strangers.slice(0, 3).map((each) => `\`${each}\``).join(', ')}${strangers.length > 3 ? ` and ${strangers.length - 3} more files` : ''}, which the program did not write`, mend: 'Move what is your own elsewhere; a signed revision is superseded by the next one, never written over' }
  }
  const other = files.length === 0 ? undefined : numberIn(folder)
  if (other !== undefined && other !== reportNumber) return { problem: `the folder holds the report \`${other}\``, mend: 'Give each report its own number, or name another folder with --out' }
  return undefined
}

/** Paths that the manifest of the dossier lists; none when it cannot be read, and then every file is a stranger. */
function manifestPaths(folder: string): ReadonlySet<string> {
  const manifest = parsed(join(folder, 'manifest.json'))
  const files = typeof manifest === 'object' && manifest !== null && 'files' in manifest && Array.isArray(manifest.files) ? (manifest.files as readonly unknown[]) : []
  return new Set(files.flatMap((each) => (typeof each === 'object' && each !== null && 'path' in each && typeof each.path === 'string' ? [each.path] : [])))
}

function numberIn(folder: string): string | undefined {
  const record = parsed(join(folder, 'record.json')) as { readonly study?: { readonly report?: { readonly number?: unknown } } } | undefined
  const number = record?.study?.report?.number
  return typeof number === 'string' ? number : undefined
}

function parsed(path: string): unknown {
  try {
    return JSON.parse(readFileSync(path, 'utf8'))
  } catch (error) {
    if (error instanceof SyntaxError || (error instanceof Error && 'code' in error)) return undefined
    throw error
  }
}
