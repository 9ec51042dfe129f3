// The types of a study after reading: what a laboratory promises, names and asks. Everything here is plain data;
// defaults have been filled in, and each one taken is listed in `defaults`.
import type { Located, Place } from '../diagnostics/place.ts'

export interface StudyDefinition {
  /** File name of the study, relative to its own folder. */
  readonly file: string
  readonly report: ReportIdentity
  readonly method: Method
  readonly intendedUse: string
  readonly people: Readonly<Record<Role, readonly Person[]>>
  readonly rules: NumericRules
  readonly measurands: readonly Measurand[]
  readonly datasets: readonly DatasetSource[]
  readonly exclusions: readonly Exclusion[]
  /** In report order. */
  readonly blocks: readonly Block[]
  readonly design: readonly DesignPromise[]
  readonly notPerformed: readonly { readonly characteristic: string; readonly justification: string; readonly place: Place }[]
  /** The user's own words, by name (`discussion`, `conclusion`, …). */
  readonly texts: Readonly<Record<string, string>>
  readonly deviations: readonly RegisterEntry[]
  readonly equipment: readonly RegisterEntry[]
  readonly materials: readonly RegisterEntry[]
  readonly defaults: readonly DefaultTaken[]
}

export type Role = 'prepared' | 'reviewed' | 'approved'

export interface ReportIdentity {
  readonly number: string
  readonly revision: number
  readonly title: string
  readonly kind: 'full validation' | 'partial validation' | 'verification' | 'transfer'
  /** ISO date; the only date the document knows. */
  readonly date: string
  readonly language: string
  /** Name of a shipped template, or a path beside the study. */
  readonly template: Located<string>
  readonly supersedes?: Located<string> | undefined
  readonly reason?: string | undefined
  readonly organisation?: string | undefined
  /** How much of each measurand is shown; depends on their number when absent. */
  readonly detail?: 'all' | 'main' | undefined
}

export interface Method {
  readonly number: string
  readonly revision?: string | undefined
  readonly title?: string | undefined
  readonly technique: string
  readonly scope?: string | undefined
  readonly principle?: string | undefined
}

export interface Person {
  readonly id: string
  readonly name: string
  readonly position: string
  readonly place: Place
}

/** One row of a free register (equipment, materials, deviations): column title → text, in the order written. */
export type RegisterEntry = Readonly<Record<string, string>>

export interface NumericRules {
  /** Two-sided confidence as a fraction, such as 0.95. */
  readonly confidence: number
  readonly decideOn: 'unrounded values' | 'rounded values'
  readonly rounding: 'half up' | 'half even'
  readonly to: 'decimals of the limit' | 'significant figures of the limit'
}

export interface Measurand {
  readonly id: string
  /** Printed name; the id when the study gives none. */
  readonly name: string
  /** Unit of results and levels. */
  readonly unit: string
  /** Unit of the instrument's response; absent when only results are used. */
  readonly responseUnit?: string | undefined
  readonly place: Place
}

/** A number with its unit as typed; `decimals` are those typed (`5.0 %` has 1). */
export interface Quantity {
  readonly value: number
  readonly unit: string
  readonly text: string
}

export type Delimiter = 'comma' | 'semicolon' | 'tab' | 'pipe'
export type DecimalMark = 'point' | 'comma'
export type Encoding = 'utf-8' | 'utf-16le' | 'utf-16be' | 'windows-1252'

export interface FileSource {
  readonly path: string
  /** Declared to lie outside the folder of the study. */
  readonly outside?: true | undefined
  readonly place: Place
  readonly delimiter?: Delimiter | undefined
  readonly decimal?: DecimalMark | undefined
  readonly encoding?: Encoding | undefined
  /** Line of the header row, counted from 1. */
  readonly headerRow?: number | undefined
  /** Values that hold for every row of this file, by field: `{ day: 2026-03-02 }`. */
  readonly fixed: Readonly<Record<string, string>>
}

/** A field is either one column, or (wide layout) one column per measurand. */
export type ColumnChoice =
  | { readonly kind: 'one'; readonly column: string; readonly place: Place }
  | { readonly kind: 'per measurand'; readonly columns: Readonly<Record<string, Located<string>>>; readonly place: Place }

export interface DatasetSource {
  readonly name: string
  readonly files: readonly FileSource[]
  /** Keep only rows whose column (as in the header) has one of these texts. */
  readonly rows: readonly { readonly column: string; readonly accepted: readonly string[]; readonly place: Place }[]
  /** Field (`level`, `response`, `result`, `day`, `analyst`, …) → where it stands. */
  readonly columns: Readonly<Record<string, ColumnChoice>>
  /** Field that names the independent unit; rows that share it (and level and factors) are averaged. */
  readonly replicate?: Located<string> | undefined
  /** Fields averaged over before any statistic. */
  readonly average: readonly Located<string>[]
  /** Texts that mean "not detected" / "no value", beside the built-in ones. */
  readonly tokens: { readonly notDetected: readonly string[]; readonly missing: readonly string[] }
  /** Name of the linearity block (or its default name `linearity`) that turns responses into results. */
  readonly through?: Located<string> | undefined
  /** Dataset whose mean response is subtracted from each response first. */
  readonly subtractBlank?: Located<string> | undefined
  /** When both a result and a response are mapped: which one is reported. */
  readonly reportable?: 'result' | 'recomputed' | undefined
  readonly place: Place
}

export interface RowSelector {
  /** Column (as in the header) → text. */
  readonly matches: readonly { readonly column: string; readonly text: string }[]
  readonly file?: string | undefined
  /** How many source rows the selector must match. */
  readonly rows: number
}

export interface Exclusion {
  /** Counted from 1, as printed. */
  readonly number: number
  readonly dataset: Located<string>
  readonly row: RowSelector
  readonly measurands?: readonly string[] | undefined
  readonly class: 'assignable cause' | 'rule of the plan' | 'statistical only'
  readonly reason: string
  readonly reference?: string | undefined
  readonly requestedBy: string
  readonly approvedBy: string
  readonly date: string
  readonly place: Place
}

/** What the study promised of a characteristic's design: word (`levels`, `runs`, `replicates`, …) → count. */
export interface DesignPromise {
  readonly characteristic: string
  readonly counts: Readonly<Record<string, number>>
  /** Relative standard deviation that the design was planned for. */
  readonly assumedRsd?: Quantity | undefined
  readonly place: Place
}

/** One question the study asks: a characteristic, its options, and the criteria its findings are held to. */
export interface Block<Options = unknown> {
  /** `linearity`, or `linearity.low-range` when the block has a name: unique in the study. */
  readonly id: string
  readonly characteristic: string
  readonly name?: string | undefined
  readonly measurands: readonly string[]
  readonly options: Options
  readonly decideBy: 'estimate' | 'interval'
  readonly criteria: readonly Criterion[]
  readonly place: Place
}

/** Limit as typed; the decimals and significant figures of the limit are read from `text`. */
export type Limit =
  | { readonly kind: 'at most' | 'below' | 'at least' | 'above'; readonly bound: Quantity }
  | { readonly kind: 'between'; readonly low: Quantity; readonly high: Quantity }

export interface Criterion {
  readonly metric: string
  readonly limit: Limit
  /** The phrase as typed. */
  readonly text: string
  readonly source?: string | undefined
  /** Measurand → its own limit instead of the general one. */
  readonly overrides: Readonly<Record<string, { readonly limit: Limit; readonly text: string }>>
  /** Where the question itself says what is decided on (equivalence: the interval), whatever the block says. */
  readonly decideBy?: 'estimate' | 'interval' | undefined
  readonly place: Place
}

export interface DefaultTaken {
  /** Where in the study it would stand, such as `characteristics.linearity.weights`. */
  readonly key: string
  readonly value: string
}
