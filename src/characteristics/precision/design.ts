// The design of precision as found: fields that change together, and cells with fewer values than others.
import type { AssessInput } from '../../assess/assessment-part.ts'
import type { Measurement } from '../../assess/measurements.ts'
import { counted } from '../../diagnostics/counted.ts'
import { diagnostic, type Diagnostic } from '../../diagnostics/diagnostic.ts'
import type { PrecisionOptions } from './options.ts'

/** Pairs of fields of which one follows from the other: `analyst follows from day`. */
export function confoundedFields(values: readonly Measurement[], fields: readonly string[]): readonly string[] {
  return fields.flatMap((one, index) => fields.slice(index + 1).flatMap((other) => {
    const found = [follows(values, one, other) ? `${other} follows from ${one}` : '', follows(values, other, one) ? `${one} follows from ${other}` : ''].filter((text) => text !== '')
    return found.length === 2 ? [`${one} and ${other} always change together`] : []
  }))
}

function follows(values: readonly Measurement[], from: string, what: string): boolean {
  const seen = new Map<string, string>()
  for (const each of values) {
    const [key, value] = [each.factors[from] ?? '', each.factors[what] ?? '']
    if ((seen.get(key) ?? value) !== value) return false
    seen.set(key, value)
  }
  return new Set(seen.values()).size > 1
}

/** Runs absent at a level, and runs with fewer replicates than others. */
export function designGaps(values: readonly Measurement[], runOf: (each: Measurement) => string, input: AssessInput<PrecisionOptions>): readonly Diagnostic[] {
  const runs = [...new Set(values.map(runOf))]
  const levels = [...new Set(values.map((each) => each.level))]
  const counts = levels.flatMap((level) => runs.map((run) => ({ level, run, n: values.filter((each) => each.level === level && runOf(each) === run).length })))
  const most = Math.max(0, ...counts.map((each) => each.n))
  const short = counts.filter((each) => each.n < most)
  if (short.length === 0) return []
  const named = short.slice(0, 8).map((each) => `${each.run === '' ? 'all' : each.run}${each.level === undefined ? '' : ` at ${each.level}`}: ${each.n}`)
  return [diagnostic('assess/design-gap', `${counted(short.length, 'cell')} of the precision design of \`${input.measurand.id}\` with fewer than ${most} values`, {
    place: input.block.place, actual: `${named.join('; ')}${short.length > 8 ? '; …' : ''}`, expected: `${most} values in each run at each level`, mend: 'Nothing is put in their place; degrees of freedom are counted from what is there',
  })]
}
