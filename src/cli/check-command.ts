// `assaywrit check`: one study, everything that is wrong with it, nothing written.
import { resolve } from 'node:path'
import { decode } from '../data/text.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import { check, type Checked } from '../pipeline.ts'
import { readStudyFile, studyFolder } from './study-folder.ts'

export interface CheckedStudy {
  readonly checked: Checked | undefined
  readonly diagnostics: readonly Diagnostic[]
  /** Text of every file read, by path, for code frames. */
  readonly sources: ReadonlyMap<string, string>
}

export function checkStudy(studyPath: string): CheckedStudy {
  const study = readStudyFile(studyPath)
  if ('problem' in study) {
    return {
      checked: undefined, sources: new Map(),
      diagnostics: [diagnostic('command/unknown-study', `Cannot read the study \`${studyPath}\`: ${study.problem}`, { place: { file: studyPath }, actual: study.problem, expected: 'a study definition (YAML)', mend: study.mend })],
    }
  }
  const checked = check(study, studyFolder(resolve(studyPath)))
  return { checked, diagnostics: checked.diagnostics, sources: frameSources(checked) }
}

const largestFrameSource = 4 * 1024 * 1024 // characters; above this a frame costs more than it helps

/** In the encoding they are read in; what is no text there is shown as UTF-8, with replacement characters. */
function frameSources({ files, study }: Checked): ReadonlyMap<string, string> {
  const declared = new Map(study?.datasets.flatMap((dataset) => dataset.files.map((file) => [file.path, file.encoding] as const)))
  return new Map(files.filter((file) => file.bytes.length <= largestFrameSource).map((file) => {
    const text = file.role === 'raw data' ? decode(file.bytes, file.path, declared.get(file.path)) : undefined
    return [file.path, text === undefined || 'problem' in text ? new TextDecoder('utf-8').decode(file.bytes) : text.text]
  }))
}
