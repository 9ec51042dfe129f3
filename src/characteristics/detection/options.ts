// How a study asks for lower limits. Beyond reading each key, it checks that every definition asked for has its data and that one
// governs, because a limit without a named definition means nothing.
import { diagnostic } from '../../diagnostics/diagnostic.ts'
import type { Place } from '../../diagnostics/place.ts'
import { datasetName, defaulted, listOf, number, object, type ObjectReader, oneOf, optional, quantity, type ReadBy, type Reading, required, text } from '../../definition/fields.ts'
import { calibrationDefinitions, confirmedLevel, type DefinitionName, definitionNames, detectionOnly, quantitationNames } from './definitions.ts'

const window = object({
  from: required(number({ describe: 'Start of the window, in the unit of the time column' })),
  to: required(number({ describe: 'End of the window, in the unit of the time column' })),
}, { describe: 'A stretch of the trace' })

const trace = object({
  data: required(datasetName({ describe: 'Dataset that holds the trace: fields `time` and `signal`' })),
  level: required(quantity({ describe: 'Level of the standard whose trace it is', example: '0.5 mg/L', of: 'measurand' })),
  baseline: required(listOf(window, { describe: 'One or more windows without a peak, where the noise is read', single: true, minimum: 1 })),
  peak: required(window),
}, { describe: 'One recorded signal trace of a standard' })

const fields = object({
  by: required(listOf(oneOf(definitionNames, { describe: 'A definition of a lower limit' }), { describe: 'The definitions to compute, side by side', single: true, minimum: 1 })),
  govern: optional(oneOf(definitionNames, { describe: 'The definition whose value is the reported one; needed when several are computed' })),
  'govern-quantitation': optional(oneOf(quantitationNames, { describe: 'The definition of the reported quantitation limit, when it is not the one under `govern`' })),
  calibration: optional(datasetName({ describe: 'Dataset of calibration responses: the slope comes from the straight line of a linearity block on it, else from a straight line fitted here' })),
  'levels-up-to': optional(quantity({ describe: 'Use only calibration levels up to this one: a line over a wide range has too large a scatter for its low end', example: '0.5 mg/L', of: 'measurand' })),
  runs: optional(listOf(text({ describe: 'A field' }), { describe: 'Fields that tell independent calibration curves apart, for the intercept scatter', single: true, minimum: 1 })),
  blanks: optional(datasetName({ describe: 'Dataset of blank measurements' })),
  spikes: optional(datasetName({ describe: 'Dataset of measurements near the limit, with their `level`' })),
  confirmation: optional(datasetName({ describe: 'Dataset of results at the quantitation limit, with their `level`' })),
  trace: optional(trace),
  convention: defaulted(oneOf(['3 s', '3.3 s'], { describe: 'Factor of the scatter definitions for the detection limit; the quantitation limit takes 10 s' }), '3.3 s'),
  noise: optional(oneOf(['peak-to-peak', 'rms'], { describe: 'Noise as the full width of the baseline (ratio 2H/h) or as its standard deviation (ratio H/s)' })),
  alpha: defaulted(number({ describe: 'Probability of claiming detection in a blank', minimum: 0.0001, maximum: 0.5 }), 0.05),
  beta: defaulted(number({ describe: 'Probability of missing a sample at the detection limit', minimum: 0.0001, maximum: 0.5 }), 0.05),
  'sample-replicates': defaulted(number({ describe: 'Measurements averaged to one reported result (m)', minimum: 1, integer: true }), 1),
  'blank-replicates': optional(number({ describe: 'Blank measurements whose mean is subtracted from a result; left out when no blank is subtracted', minimum: 1, integer: true })),
  replicates: defaulted(number({ describe: 'Measurements of one sample preparation under ISO 11843-2 (K)', minimum: 1, integer: true }), 1),
}, { describe: 'Detection and quantitation limits' })

export type DetectionOptions = ReadBy<typeof fields>

export const detectionOptions: ObjectReader<DetectionOptions> = {
  ...fields,
  readPart(node, reading) {
    const options = fields.readPart(node, reading)
    return options !== undefined && isConsistent(options, node.place, reading) ? options : undefined
  },
  read(node, reading) {
    const options = fields.read(node, reading)
    return options !== undefined && isConsistent(options, node.place, reading) ? options : undefined
  },
}

/** The definition that governs detection: the one named, or the only one. */
export function governing(options: DetectionOptions): DefinitionName | undefined {
  return options.govern ?? (options.by.length === 1 ? options.by[0] : undefined)
}

function isConsistent(options: DetectionOptions, place: Place, reading: Reading): boolean {
  const problems: { readonly message: string; readonly expected: string; readonly mend: string }[] = []
  const need = (key: string, present: boolean, because: string): void => {
    if (!present) problems.push({ message: `Expected key \`${key}\` in \`${reading.path}\`: ${because}`, expected: `\`${key}\``, mend: `Add \`${key}:\` here` })
  }
  const asked = (name: DefinitionName): boolean => options.by.includes(name)
  if (options.by.length > 1) need('govern', options.govern !== undefined, 'several definitions are asked for and one of them must be the reported one')
  for (const [key, name] of [['govern', options.govern], ['govern-quantitation', options['govern-quantitation']]] as const) {
    if (name === undefined || name === confirmedLevel || asked(name)) continue
    problems.push({ message: `\`${key}\` names \`${name}\`, which is not among \`by\``, expected: options.by.join(' | '), mend: `Add \`${name}\` to \`by\`, or name one that is there` })
  }
  const quantitation = options['govern-quantitation']
  if (quantitation !== undefined && quantitation !== confirmedLevel && detectionOnly.includes(quantitation)) {
    problems.push({ message: `\`${quantitation}\` gives no quantitation limit`, expected: 'a definition that does', mend: `Write another definition, or \`${confirmedLevel}\`` })
  }
  if (quantitation === confirmedLevel) need('confirmation', options.confirmation !== undefined, 'the quantitation limit is the lowest confirmed level')
  for (const name of calibrationDefinitions) if (asked(name)) need('calibration', options.calibration !== undefined, `\`${name}\` rests on calibration responses`)
  for (const name of ['blank scatter', 'critical value', 'MDL'] as const) if (asked(name)) need('blanks', options.blanks !== undefined, `\`${name}\` rests on blanks`)
  if (asked('MDL')) need('spikes', options.spikes !== undefined, '`MDL` rests on spikes as well as blanks')
  if (asked('intercept scatter')) need('runs', options.runs !== undefined, 'the intercept scatter needs to know which curves are independent')
  if (asked('signal to noise')) {
    need('noise', options.noise !== undefined, 'the two ways to express noise differ several-fold')
    if (options.trace === undefined) need('trace', options.blanks !== undefined && options.spikes !== undefined, '`signal to noise` rests on a trace, or on both `blanks` and `spikes`')
  }
  const windows = options.trace === undefined ? [] : [options.trace.peak, ...options.trace.baseline]
  for (const each of windows.filter(({ from, to }) => from >= to)) {
    problems.push({ message: `A window of \`${reading.path}.trace\` ends where it starts or before: ${each.from} to ${each.to}`, expected: '`from` before `to`', mend: 'Swap the two, or correct one' })
  }
  const [peak, ...baselines] = windows
  for (const each of baselines.filter(({ from, to }) => peak !== undefined && from < peak.to && to > peak.from)) {
    problems.push({ message: `A baseline window of \`${reading.path}.trace\` overlaps the peak: ${each.from} to ${each.to}`, expected: 'windows apart', mend: 'Move the baseline window off the peak' })
  }
  const told = problems.filter((each, index) => problems.findIndex((other) => other.message === each.message) === index)
  for (const each of told) reading.report(diagnostic('definition/missing-key', each.message, { place, expected: each.expected, mend: each.mend }))
  return told.length === 0
}
