// Results of spiked or reference samples → recovery or bias of each preparation, with the native content taken off first. An added amount,
// reference or native value that is needed and absent is told, never taken as zero.
import type { AssessInput } from '../../assess/assessment-part.ts'
import { evidenceOf, type Measurement, type Measurements } from '../../assess/measurements.ts'
import type { Evidence } from '../../assess/finding.ts'
import { diagnostic, type Diagnostic } from '../../diagnostics/diagnostic.ts'
import { mean, standardDeviation } from '../../statistics/describe.ts'
import type { AccuracyOptions } from './options.ts'

export interface Preparation {
  readonly measurement: Measurement
  readonly level?: number | undefined
  readonly found: number
  readonly target: number
  readonly native?: number
  readonly value: number
  /** Variance that the mean native content adds to every value of its sample, in the unit of `value`. */
  readonly nativeVariance: number
  /** The unspiked sample it belongs to: values that share one share its error. */
  readonly nativeSample: string
}

export interface PreparationsOutcome {
  readonly measurements?: Measurements
  readonly preparations: readonly Preparation[]
  readonly excluded: readonly Preparation[]
  readonly nativeEvidence: readonly Evidence[]
  readonly because?: string
  readonly diagnostics: readonly Diagnostic[]
}

export function preparationsOf(input: AssessInput<AccuracyOptions>): PreparationsOutcome {
  const { options, place } = input.block
  const nothing = { preparations: [], excluded: [], nativeEvidence: [] }
  const measurements = input.results(options.data)
  if (measurements === undefined) return { ...nothing, because: `dataset ${options.data} gives no results`, diagnostics: [] }
  const natives = options.native === undefined ? undefined : input.results(options.native)
  if (options.native !== undefined && natives === undefined) return { ...nothing, because: `dataset ${options.native} gives no results`, diagnostics: [] }
  const censoredNative = natives?.censored[0]
  if (censoredNative !== undefined) {
    return { ...nothing, because: `the native content is censored (${censoredNative.cell.text.trim()} in ${censoredNative.cell.place.file}:${censoredNative.cell.place.line ?? ''})`, diagnostics: [diagnostic('assess/censored-value', `A native content of \`${input.measurand.id}\` is censored`, { place: censoredNative.cell.place, actual: censoredNative.cell.text.trim(), expected: 'a number', mend: 'Leave out `native:` and state why the native content does not matter, or measure it' })] }
  }
  const preparation = (measurement: Measurement): Preparation | undefined => one(measurement, options, natives)
  const preparations = measurements.values.map(preparation)
  if (preparations.some((each) => each === undefined)) {
    const needed = options.mode === 'recovery' ? 'an added amount above zero (`added`, or `level` where none is mapped)' : 'a reference value (`reference`)'
    return {
      ...nothing, because: `a result has no ${options.mode === 'recovery' ? 'added amount' : 'reference value'}${natives === undefined ? '' : ' or native content'}`,
      diagnostics: [diagnostic('assess/missing-field', `\`${input.block.id}\` needs ${needed} for every result of dataset \`${options.data}\``, { place, expected: needed, mend: 'Map the column that holds it' })],
    }
  }
  return {
    measurements, preparations: preparations.filter((each) => each !== undefined), excluded: measurements.excluded.flatMap((each) => preparation(each) ?? []),
    nativeEvidence: natives === undefined ? [] : evidenceOf(natives), diagnostics: [],
  }
}

function one(measurement: Measurement, options: AccuracyOptions, natives: Measurements | undefined): Preparation | undefined {
  const { value: found, level, numbers, factors } = measurement
  if (options.mode === 'bias') {
    const target = numbers['reference'] ?? options.reference?.value
    return target === undefined ? undefined : { measurement, level: level ?? target, found, target, value: found - target, nativeVariance: 0, nativeSample: '' }
  }
  const target = numbers['added'] ?? level
  if (target === undefined || !(target > 0)) return undefined
  const own = natives?.values.filter((each) => (options['native-by'] ?? []).every((field) => each.factors[field] === factors[field])).map((each) => each.value)
  if (own !== undefined && own.length === 0) return undefined
  const native = own === undefined ? numbers['native'] : mean(own)
  const spread = own === undefined || own.length < 2 ? 0 : standardDeviation(own) ** 2 / own.length
  return {
    measurement, level: level ?? target, found, target, ...(native === undefined ? {} : { native }),
    value: (100 * (found - (native ?? 0))) / target, nativeVariance: spread * (100 / target) ** 2, nativeSample: (options['native-by'] ?? []).map((field) => factors[field] ?? '').join(' · '),
  }
}
