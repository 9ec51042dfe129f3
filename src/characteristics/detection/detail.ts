// What the detection assessment hands to its exhibits: every definition side by side, and the raw points each rests on. Plain data only.
import type { FindingInterval } from '../../assess/finding.ts'
import type { MethodDetectionLimit } from '../../statistics/detection.ts'
import type { DefinitionName, QuantitationName } from './definitions.ts'

export interface DetectionDetail {
  readonly definitions: readonly DefinitionDetail[]
  readonly governing: { readonly detection?: DefinitionName | undefined; readonly quantitation?: QuantitationName | undefined; readonly named: boolean }
  readonly reported: { readonly detection?: number | undefined; readonly quantitation?: number | undefined }
  /** Smallest and largest detection limit when several definitions gave one, and their ratio. */
  readonly spread?: { readonly lowest: number; readonly highest: number; readonly ratio: number } | undefined
  readonly line?: LineDetail | undefined
  readonly blanks?: SeriesDetail | undefined
  readonly spikes?: SeriesDetail | undefined
  readonly mdl?: MdlDetail | undefined
  readonly trace?: TraceDetail | undefined
  /** Net distributions of blanks and of samples at the detection limit, for each definition with stated error rates. */
  readonly distributions: readonly DistributionDetail[]
  readonly confirmation?: ConfirmationDetail | undefined
  /** Lowest and highest level above zero that any dataset of this block tested. */
  readonly tested?: { readonly lowest: number; readonly highest: number } | undefined
  readonly settings: { readonly convention: '3 s' | '3.3 s'; readonly alpha: number; readonly beta: number; readonly sampleReplicates: number; readonly blankReplicates?: number | undefined; readonly replicates: number }
}

/** One definition of a lower limit with everything it was computed from; `because` when it gave nothing. */
export interface DefinitionDetail {
  readonly definition: DefinitionName
  /** The scatter it multiplies, in words, and in which unit it stands. */
  readonly scatter?: { readonly kind: string; readonly value: number; readonly unit: 'response' | 'measurand' } | undefined
  /** What the limit rests on when that is no scatter. */
  readonly basis?: string | undefined
  readonly detectionFactor?: number | undefined
  readonly quantitationFactor?: number | undefined
  /** Square root of 1/m + 1/n_b, when results are means or blanks are subtracted. */
  readonly netFactor?: number | undefined
  readonly slope?: number | undefined
  readonly criticalValue?: number | undefined
  readonly detectionLimit?: number | undefined
  readonly quantitationLimit?: number | undefined
  /** Interval of the detection limit. */
  readonly interval?: FindingInterval | undefined
  readonly n?: number | undefined
  readonly df?: number | undefined
  /** Of the detection limit. */
  readonly method: string
  readonly quantitationMethod?: string | undefined
  readonly source: string
  readonly because?: string | undefined
}

export interface LineDetail {
  readonly dataset: string
  /** Line that turns a response into a concentration: id of the linearity block, or undefined when it was fitted here. */
  readonly block?: string | undefined
  readonly slope: number
  readonly intercept: number
  /** The unweighted straight line fitted here, whose scatter the calibration definitions use. */
  readonly own: { readonly slope: number; readonly intercept: number; readonly residualStandardDeviation: number; readonly interceptStandardError: number; readonly n: number; readonly df: number; readonly lowest: number; readonly highest: number }
  /** Intercepts of independent curves, when asked for. */
  readonly curves?: readonly { readonly run: string; readonly slope: number; readonly intercept: number; readonly n: number }[] | undefined
}

export interface SeriesDetail {
  readonly dataset: string
  /** What the instrument file holds: a response, or a result in the unit of the measurand. */
  readonly quantity: 'response' | 'result'
  readonly points: readonly SeriesPoint[]
  readonly excluded: readonly SeriesPoint[]
  readonly censored: readonly { readonly text: string; readonly bound?: number | undefined; readonly direction?: 'below' | 'above' | undefined; readonly factors: Readonly<Record<string, string>> }[]
  readonly summary?: { readonly n: number; readonly mean: number; readonly standardDeviation: number; readonly lowest: number; readonly highest: number } | undefined
  /** The same in the unit of the measurand. */
  readonly concentrations?: { readonly mean: number; readonly standardDeviation: number; readonly lowest: number; readonly highest: number } | undefined
}

export interface SeriesPoint {
  readonly value: number
  readonly concentration?: number | undefined
  readonly level?: number | undefined
  readonly factors: Readonly<Record<string, string>>
  readonly exclusion?: number | undefined
}

export interface MdlDetail {
  readonly spikes: MethodDetectionLimit['spikes'] & { readonly levels: readonly number[] }
  /** Mean and standard deviation are those of the numeric blanks, also under the rules that do not use them. */
  readonly blanks: MethodDetectionLimit['blanks']
  readonly mdl?: number | undefined
  /** Lowest spike level divided by the limit, and the highest. */
  readonly spikeRatio?: { readonly lowest: number; readonly highest: number } | undefined
  /** One entry for each rule of the design, met or not. */
  readonly checks: readonly { readonly rule: string; readonly found: number | undefined; readonly needed: string; readonly met: boolean | undefined }[]
  /** Counts by date of analysis (or preparation) and batch. */
  readonly schedule: { readonly dateField: string; readonly dates: readonly string[]; readonly batches: readonly string[]; readonly counts: readonly { readonly date: string; readonly batch: string; readonly spikes: number; readonly blanks: number }[] }
}

export interface TraceDetail {
  readonly dataset: string
  readonly level: number
  readonly points: readonly { readonly x: number; readonly y: number }[]
  readonly baseline: readonly { readonly from: number; readonly to: number }[]
  readonly peak: { readonly from: number; readonly to: number }
  readonly baselineAtPeak: number
  readonly apex: { readonly time: number; readonly signal: number }
  readonly height: number
  readonly noise: number
  readonly convention: 'peak-to-peak' | 'rms'
  readonly ratio: number
  readonly baselinePoints: number
  /** Width of the peak at half height, when both flanks lie in the window. */
  readonly halfWidth?: number | undefined
}

export interface DistributionDetail {
  readonly definition: DefinitionName
  readonly criticalValue: number
  readonly detectionLimit: number
  readonly standardDeviation: number
  readonly curves: readonly { readonly name: string; readonly points: readonly { readonly x: number; readonly density: number }[] }[]
}

export interface ConfirmationDetail {
  readonly dataset: string
  readonly levels: readonly ConfirmedLevel[]
  readonly excluded: readonly SeriesPoint[]
}

export interface ConfirmedLevel {
  readonly level: number
  readonly values: readonly number[]
  readonly n: number
  readonly mean?: number | undefined
  readonly standardDeviation?: number | undefined
  readonly relativeStandardDeviation?: number | undefined
  readonly recovery?: number | undefined
  readonly recoveryInterval?: FindingInterval | undefined
  readonly because?: string | undefined
}
