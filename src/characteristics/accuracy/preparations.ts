// Results of spiked or reference samples → recovery or bias of each preparation, with the native content taken off first. An added amount,
// reference or native value that is needed and absent is told, never taken as zero.
import type { AssessInput } from '../../assess/assessment-part.ts'
import { type CensoredMeasurement, evidenceOf, fieldGap, type Measurement, type Measurements } from '../../assess/measurements.ts'
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
  readonly nativeDf: number
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
  const nativeFields = natives === undefined ? [] : options['native-by'] ?? []
  const gap = fieldGap(input, measurements, options.runs ?? []) ?? fieldGap(input, measurements, nativeFields, 'native') ?? (natives === undefined ? undefined : fieldGap(input, natives, nativeFields, 'native'))
  if (gap !== undefined) return { ...nothing, because: 'a result lacks a field that it is grouped by', diagnostics: [gap] }
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
    nativeEvidence: natives === undefined ? [] : evidenceOf(natives), diagnostics: natives === undefined ? [] : pooledNatives(natives, measurements, input),
  }
}

/** The level that a preparation belongs to: the one mapped, else its added amount or reference value. */
export function levelOf({ level, numbers }: Pick<CensoredMeasurement, 'level' | 'numbers'>, options: AccuracyOptions): number | undefined {
  return level ?? (options.mode === 'bias' ? numbers['reference'] ?? options.reference?.value : numbers['added'])
}

/** Without `native-by` all unspiked results count as one sample; said where a field that both datasets map would tell several apart. */
function pooledNatives(natives: Measurements, spiked: Measurements, { block, measurand }: AssessInput<AccuracyOptions>): readonly Diagnostic[] {
  if (block.options['native-by'] !== undefined) return []
  const several = (each: Measurements, field: string): number => new Set(each.values.map((value) => value.factors[field]).filter((text) => text !== undefined)).size
  const telling = Object.keys(natives.values[0]?.factors ?? {}).filter((field) => several(natives, field) > 1 && several(spiked, field) > 0)
  if (telling.length === 0) return []
  return [diagnostic('assess/method-note', `The native content of \`${measurand.id}\` is the mean of all ${natives.values.length} results of dataset \`${natives.dataset}\`, over every ${telling.join(', ')}`, {
    place: block.place, mend: `Write \`native-by: ${telling[0]}\` if each ${telling[0]} has a content of its own`,
  })]
}

function one(measurement: Measurement, options: AccuracyOptions, natives: Measurements | undefined): Preparation | undefined {
  const { value: found, level, numbers, factors } = measurement
  const at = levelOf(measurement, options)
  if (options.mode === 'bias') {
    const target = numbers['reference'] ?? options.reference?.value
    return target === undefined ? undefined : { measurement, level: at, found, target, value: found - target, nativeVariance: 0, nativeDf: 0, nativeSample: '' }
  }
  const target = numbers['added'] ?? level
  if (target === undefined || !(target > 0)) return undefined
  const own = natives?.values.filter((each) => (options['native-by'] ?? []).every((field) => each.factors[field] === factors[field])).map((each) => each.value)
  if (own !== undefined && own.length === 0) return undefined
  const native = own === undefined ? numbers['native'] : mean(own)
  const spread = own === undefined || own.length < 2 ? 0 : standardDeviation(own) ** 2 / own.length
  return {
    measurement, level: at, found, target, ...(native === undefined ? {} : { native }),
    value: (100 * (found - (native ?? 0))) / target, nativeVariance: spread * (100 / target) ** 2, nativeDf: own === undefined ? 0 : own.length - 1, nativeSample: (options['native-by'] ?? []).map((field) => factors[field] ?? '').join(' · '),
  }
}
