// The study record, the narrow waist: everything the report may say, as plain data. After it exists nothing looks at raw data again.
import type { DatasetSource, DefaultTaken, DesignPromise, Exclusion, Measurand, Method, NumericRules, Person, RegisterEntry, ReportIdentity, Role } from '../definition/study.ts'
import type { FileReading, Fate } from '../data/dataset.ts'
import type { Diagnostic } from '../diagnostics/diagnostic.ts'
import type { Finding, NotEvaluable, Verdict, VerdictWord } from './finding.ts'

export interface InputFile {
  /** Relative to the study's folder, with `/`. */
  readonly path: string
  readonly role: 'study' | 'raw data' | 'template' | 'earlier record' | 'text'
  readonly size: number
  readonly sha256: string
}

/** One mapped cell: where (column number), what stood there, and what was read from it. */
export interface RecordedCell {
  readonly column: number
  readonly text: string
  readonly kind: 'number' | 'label' | 'below' | 'above' | 'not detected' | 'missing'
  readonly value?: number | string
}

export interface RecordedRow {
  readonly file: string
  readonly line: number
  readonly sheet?: string
  readonly fate: Fate
  readonly cells: Readonly<Record<string, RecordedCell>>
}

export interface RecordedDataset {
  readonly name: string
  readonly files: readonly FileReading[]
  /** Field (or `field/measurand`) → header of its column. */
  readonly columns: Readonly<Record<string, string>>
  readonly rows: readonly RecordedRow[]
}

export interface RecordedAssessment {
  readonly characteristic: string
  readonly block: string
  readonly measurand: string
  readonly title: string
  /** Plain data of the characteristic, for its exhibits; null when nothing could be computed. */
  readonly detail: unknown
  readonly notEvaluable: readonly NotEvaluable[]
  readonly designFound: Readonly<Record<string, number>>
}

/** A finding (and its verdicts) as it would be with every excluded row put back. */
export interface WithExcluded {
  readonly finding: string
  readonly exclusions: readonly number[]
  /** null: not evaluable with the rows back in (or out). */
  readonly without: number | null
  readonly with: number | null
  readonly unit: string
  readonly verdicts: readonly { readonly criterion: string; readonly without: VerdictWord; readonly with: VerdictWord }[]
}

export interface DesignLine {
  readonly characteristic: string
  readonly block: string
  readonly measurand: string
  readonly word: string
  readonly planned?: number
  readonly found?: number
  readonly met: boolean
}

export interface StudyRecord {
  readonly format: 1
  readonly program: { readonly name: string; readonly version: string }
  readonly study: {
    readonly report: ReportIdentity
    readonly method: Method
    readonly intendedUse: string
    readonly people: Readonly<Record<Role, readonly Person[]>>
    readonly rules: NumericRules
    readonly measurands: readonly Measurand[]
    readonly sources: readonly DatasetSource[]
    readonly exclusions: readonly Exclusion[]
    readonly design: readonly DesignPromise[]
    readonly blocks: readonly { readonly id: string; readonly characteristic: string; readonly measurands: readonly string[]; readonly options: unknown; readonly decideBy: string }[]
    readonly notPerformed: readonly { readonly characteristic: string; readonly justification: string }[]
    readonly texts: Readonly<Record<string, string>>
    readonly deviations: readonly RegisterEntry[]
    readonly equipment: readonly RegisterEntry[]
    readonly materials: readonly RegisterEntry[]
  }
  readonly inputs: readonly InputFile[]
  readonly datasets: readonly RecordedDataset[]
  readonly assessments: readonly RecordedAssessment[]
  readonly findings: readonly Finding[]
  readonly verdicts: readonly Verdict[]
  readonly design: readonly DesignLine[]
  readonly withExcluded: readonly WithExcluded[]
  readonly overall: { readonly verdict: VerdictWord; readonly because: readonly string[] }
  /** What keeps the report a draft; empty means it is for signature. */
  readonly openItems: readonly string[]
  readonly defaults: readonly DefaultTaken[]
  readonly diagnostics: readonly Diagnostic[]
}
