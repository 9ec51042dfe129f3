// `assaywrit report`: one study → its dossier on disk. Drawing and PDF code is loaded only here, so that `check` starts fast.
import { existsSync, readFileSync } from 'node:fs'
import { basename, dirname, join, resolve } from 'node:path'
import { sha256 } from '../assess/digest.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { Checked } from '../pipeline.ts'
import { contentFiles, inputPath, manifestText } from './dossier-files.ts'
import { DossierRefused, type DossierPlace, dossierPath, replaceDossier, underLock } from './dossier-folder.ts'
import { appended } from './history.ts'

export interface Reported {
  readonly diagnostics: readonly Diagnostic[]
  /** Where the dossier stands; undefined when it was not written. */
  readonly dossier: string | undefined
  readonly diskRefused: boolean
}

export async function writeReport(studyPath: string, checked: Checked, out: string | undefined, progress: (step: string) => void): Promise<Reported> {
  const { record, tell } = checked
  if (record === undefined || tell === undefined) return { diagnostics: [], dossier: undefined, diskRefused: false }
  const { recordText, digest, document } = tell()
  progress('drawing charts and pages')
  const [{ publish }, { MissingGlyph }, { readAssets }] = await Promise.all([import('../publish/index.ts'), import('../publish/fonts.ts'), import('./assets.ts')])
  const encoder = new TextEncoder()
  const inputs = checked.files.map((file) => ({ path: file.path, role: file.role, bytes: file.bytes }))
  const published = await attempt(() => publish(document, {
    ...readAssets(),
    attachments: ({ markdown, tables, charts }) => {
      const files = contentFiles({ recordText, markdown, tables, charts, inputs })
      return [
        ...inputs.map((input) => ({ name: inputPath(input.path), bytes: input.bytes, relationship: 'Source' as const, description: `${input.role}: ${input.path}` })),
        { name: 'record.json', bytes: encoder.encode(recordText), relationship: 'Data' as const, description: 'every finding, verdict and diagnostic' },
        { name: 'manifest.json', bytes: encoder.encode(manifestText(files)), relationship: 'Data' as const, description: 'size and SHA-256 of every file of the dossier' },
      ]
    },
  }), (error) => (error instanceof MissingGlyph ? error : undefined))
  if (published instanceof MissingGlyph) {
    return { dossier: undefined, diskRefused: false, diagnostics: [diagnostic('present/unprintable-character', `No font of the report has the character \`${published.character}\``, {
      place: { file: basename(studyPath) }, actual: `${published.character} (U+${(published.character.codePointAt(0) ?? 0).toString(16).toUpperCase().padStart(4, '0')})`, expected: 'Latin, Greek, Cyrillic and the signs of science', mend: 'Write the text of the study, template or raw file with other characters',
    })] }
  }
  progress('writing the dossier')
  const { report } = record.study
  const place: DossierPlace = { parent: join(resolve(out ?? join(dirname(studyPath), 'out')), safeName(report.number)), name: `revision-${report.revision}` }
  const files = new Map(contentFiles({ recordText, markdown: published.markdown, tables: published.tables, charts: published.charts, inputs }))
  files.set('manifest.json', encoder.encode(manifestText(files)))
  files.set('report.pdf', published.pdf)
  try {
    underLock(place, () => {
      const earlier = join(dossierPath(place), 'history.jsonl')
      const history = existsSync(earlier) ? readFileSync(earlier, 'utf8') : ''
      files.set('history.jsonl', encoder.encode(appended(history, {
        event: 'built', at: new Date().toISOString(), record: digest, report: sha256(published.pdf),
        program: `${record.program.name} ${record.program.version}`, environment: `Node.js ${process.version}, ${process.platform} ${process.arch}`,
      })))
      replaceDossier(place, files)
    })
  } catch (error) {
    if (!(error instanceof DossierRefused)) throw error
    return {
      dossier: undefined, diskRefused: true,
      diagnostics: [diagnostic('command/unwritable-output', `The dossier was not written: ${error.message}`, { place: { file: dossierPath(place) }, expected: 'a folder that can be written', mend: 'Name another folder with --out, or mend this one' })],
    }
  }
  return { diagnostics: [], dossier: dossierPath(place), diskRefused: false }
}

/** A report number as a folder name on every platform: what no file system takes becomes a hyphen. */
function safeName(number: string): string {
  const safe = number.replace(/[\u0000-\u001f<>:"/\\|?*]+/g, '-').replace(/^\.+|[. ]+$/g, '-')
  return safe === '' ? 'report' : safe
}

/** The value, or the expected error; any other error passes. */
async function attempt<T, E>(work: () => Promise<T>, expected: (error: unknown) => E | undefined): Promise<T | E> {
  try {
    return await work()
  } catch (error) {
    const known = expected(error)
    if (known === undefined) throw error
    return known
  }
}
