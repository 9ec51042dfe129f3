// `assaywrit report`: one study → its dossier on disk. Drawing and PDF code is loaded only here, so that `check` starts fast.
import { existsSync, readFileSync } from 'node:fs'
import { basename, dirname, join, resolve } from 'node:path'
import { sha256 } from '../assess/digest.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { Checked } from '../pipeline.ts'
import { contentFiles, inputPaths, manifestText } from './dossier-files.ts'
import { DossierRefused, type DossierPlace, dossierPath, replaceDossier, underLock } from './dossier-folder.ts'
import { notReplaceable } from './earlier-dossier.ts'
import { folderName } from './folder-name.ts'
import { appended } from './history.ts'

export interface Reported {
  readonly diagnostics: readonly Diagnostic[]
  /** Where the dossier stands; undefined when it was not written. */
  readonly dossier: string | undefined
  readonly diskRefused: boolean
}

export interface ReportRequest {
  readonly studyPath: string
  readonly checked: Checked
  readonly out: string | undefined
  /** Dossiers that this run has written, with the study of each: two studies with one number and revision would replace each other. */
  readonly written: ReadonlyMap<string, string>
  readonly progress: (step: string) => void
}

export async function writeReport({ studyPath, checked, out, written, progress }: ReportRequest): Promise<Reported> {
  const { record, tell } = checked
  if (record === undefined || tell === undefined) return { diagnostics: [], dossier: undefined, diskRefused: false }
  const { report } = record.study
  const place: DossierPlace = { parent: join(resolve(out ?? join(dirname(studyPath), 'out')), folderName(report.number)), name: `revision-${report.revision}` }
  const sameRun = written.get(dossierPath(place))
  if (sameRun !== undefined) {
    return { dossier: undefined, diskRefused: false, diagnostics: [diagnostic('command/unwritable-output', `The dossier was not written: \`${sameRun}\` of this run has the same report number and revision`, {
      place: { file: basename(studyPath) }, actual: `${report.number}, revision ${report.revision}`, expected: 'one study for each dossier', mend: 'Give each report its own number, or name each study once',
    })] }
  }
  const { recordText, digest, document } = tell()
  progress('drawing charts and pages')
  const [{ publish }, { MissingGlyph }, { readAssets }] = await Promise.all([import('../publish/index.ts'), import('../publish/fonts.ts'), import('./assets.ts')])
  const encoder = new TextEncoder()
  const places = inputPaths(checked.files.map((file) => file.path))
  const inputs = checked.files.map((file) => ({ path: file.path, role: file.role, bytes: file.bytes }))
  const published = await attempt(() => publish(document, {
    ...readAssets(),
    attachments: ({ markdown, tables, charts }) => {
      const files = contentFiles({ recordText, markdown, tables, charts, inputs })
      return [
        ...inputs.map((input) => ({ name: places.get(input.path) ?? '', bytes: input.bytes, relationship: 'Source' as const, description: `${input.role}: ${input.path}` })),
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
  const files = new Map(contentFiles({ recordText, markdown: published.markdown, tables: published.tables, charts: published.charts, inputs }))
  files.set('manifest.json', encoder.encode(manifestText(files)))
  files.set('report.pdf', published.pdf)
  try {
    underLock(place, () => {
      const refused = notReplaceable(dossierPath(place), report.number)
      if (refused !== undefined) throw new DossierRefused('not replaceable', refused.problem, refused.mend)
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
      dossier: undefined, diskRefused: error.kind !== 'not replaceable',
      diagnostics: [diagnostic(error.kind === 'locked' ? 'command/locked-dossier' : 'command/unwritable-output', `The dossier was not written: ${error.message}`, {
        place: { file: dossierPath(place) }, actual: error.message, expected: 'a folder that can be written, or the dossier of an earlier run', mend: error.mend,
      })],
    }
  }
  return { diagnostics: [], dossier: dossierPath(place), diskRefused: false }
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
