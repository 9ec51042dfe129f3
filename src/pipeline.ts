// The stages in order; read this first. Nothing here touches disk, clock or process: files come through `World`, which the command line
// gives, and everything that leaves is a value.
//
//   study.yaml ─ definition ─┐
//   raw files ──── data ─────┴─ assess ── StudyRecord ── present ── ReportDocument ── publish ── PDF, Markdown, tables, charts
import { assess } from './assess/index.ts'
import { canonicalJson } from './assess/canonical-json.ts'
import { sha256 } from './assess/digest.ts'
import type { InputFile, StudyRecord } from './assess/record.ts'
import { catalogue } from './characteristics/index.ts'
import { readData } from './data/index.ts'
import { readDefinition } from './definition/index.ts'
import type { StudyDefinition } from './definition/study.ts'
import { diagnostic, type Diagnostic } from './diagnostics/diagnostic.ts'
import { hasErrors } from './diagnostics/stage-result.ts'
import { present } from './present/index.ts'
import { templateProblems } from './present/template-problems.ts'
import { parseTemplate } from './present/template.ts'
import type { ReportDocument } from './present/document.ts'

export interface ReadFile {
  /** Relative to the study's folder, with `/`. */
  readonly path: string
  readonly bytes: Uint8Array
}

/** All that the stages ask of the outside. A problem is told with the place where the study names the file. */
export interface World {
  readonly program: { readonly name: string; readonly version: string }
  /** A file of the study, by its path relative to the study's folder. */
  read(path: string, mayBeOutside?: boolean): ReadFile | { readonly problem: string; readonly mend: string }
  /** A shipped template by name, or undefined. */
  template(name: string): Uint8Array | undefined
  /** Names of the shipped templates. */
  readonly templates: readonly string[]
}

export interface Checked {
  readonly study: StudyDefinition | undefined
  readonly record: StudyRecord | undefined
  readonly diagnostics: readonly Diagnostic[]
  /** Every byte read, study first. */
  readonly files: readonly (ReadFile & { readonly role: InputFile['role'] })[]
  /** Told by the report command only: a check needs no document. There exactly when nothing is wrong. */
  readonly tell?: () => Told
}

export interface Told {
  /** Canonical JSON of the record and its SHA-256. */
  readonly recordText: string
  readonly digest: string
  readonly document: ReportDocument
}

/** Reads everything and says everything; writes nothing. `record` is there exactly when there is no error before the report. */
export function check(studyFile: ReadFile, world: World): Checked {
  const files: (ReadFile & { readonly role: InputFile['role'] })[] = [{ ...studyFile, role: 'study' }]
  const definition = readDefinition({ file: studyFile.path, text: decoded(studyFile.bytes) }, catalogue)
  const noticed: Diagnostic[] = [...definition.diagnostics]
  const nothing = { study: definition.value, record: undefined, files }
  const study = definition.value
  if (study === undefined) return { ...nothing, diagnostics: noticed }

  const raw = readNamedFiles(study, world, noticed)
  files.push(...raw.map((each) => ({ ...each, role: 'raw data' as const })))
  const template = readTemplate(study, world, noticed)
  if (template !== undefined) files.push({ ...template, role: 'template' })
  if (study.report.supersedes !== undefined) {
    const earlier = readOne(study.report.supersedes.value, study.report.supersedes.place, world, noticed, true)
    if (earlier !== undefined) files.push({ ...earlier, role: 'earlier record' })
  }
  const parts = template === undefined ? [] : parseTemplate({ file: template.path, text: decoded(template.bytes) })
  if (template !== undefined) noticed.push(...templateProblems({ file: template.path, parts }, study))
  const data = readData(study, new Map(raw.map((each) => [each.path, each.bytes])))
  noticed.push(...data.diagnostics)
  if (data.value === undefined || hasErrors(noticed)) return { ...nothing, diagnostics: noticed }

  const inputs = files.map((each): InputFile => ({ path: each.path, role: each.role, size: each.bytes.length, sha256: sha256(each.bytes) }))
  const assessed = assess({ study, datasets: data.value, inputs, program: world.program, noticed }, catalogue)
  noticed.push(...assessed.diagnostics)
  const record = assessed.value
  if (record === undefined || template === undefined) return { ...nothing, diagnostics: noticed }

  return {
    study, record, diagnostics: noticed, files,
    tell() {
      const recordText = canonicalJson(record)
      const digest = sha256(recordText)
      return { recordText, digest, document: present({ record, digest, parts }, catalogue) }
    },
  }
}

/** UTF-8 with or without byte order mark; a study in another encoding shows as characters that YAML refuses. */
function decoded(bytes: Uint8Array): string {
  return new TextDecoder('utf-8').decode(bytes)
}

function readNamedFiles(study: StudyDefinition, world: World, noticed: Diagnostic[]): readonly ReadFile[] {
  const read = new Map<string, ReadFile>()
  const tried = new Set<string>()
  for (const source of study.datasets.flatMap((dataset) => dataset.files)) {
    if (tried.has(source.path)) continue
    tried.add(source.path)
    const file = readOne(source.path, source.place, world, noticed, source.outside === true)
    if (file !== undefined) read.set(source.path, { path: source.path, bytes: file.bytes })
  }
  return [...read.values()]
}

function readOne(path: string, place: Diagnostic['place'], world: World, noticed: Diagnostic[], mayBeOutside = false): ReadFile | undefined {
  const file = world.read(path, mayBeOutside)
  if ('bytes' in file) return file
  noticed.push(diagnostic('command/unreadable-file', `Cannot read \`${path}\`: ${file.problem}`, { place, actual: file.problem, expected: 'a readable file in the folder of the study', mend: file.mend }))
  return undefined
}

function readTemplate(study: StudyDefinition, world: World, noticed: Diagnostic[]): ReadFile | undefined {
  const { value, place } = study.report.template
  if (value.includes('/') || value.endsWith('.md')) return readOne(value.replace(/^(\.\/)+/, ''), place, world, noticed)
  const shipped = world.template(value)
  if (shipped !== undefined) return { path: `templates/${value}.md`, bytes: shipped }
  noticed.push(diagnostic('present/unknown-template', `No template is named \`${value}\``, {
    place, actual: value, expected: world.templates.join(', '), mend: 'Write the name of a shipped template, or the path of your own beside the study, such as `./our-report.md`',
  }))
  return undefined
}
