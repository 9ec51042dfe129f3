// Observations of one measurand → independent measurements: repeated injections are averaged only as the study says, and what is
// one measurement here is one degree of freedom everywhere. A mapped injection column without such a word is an error, not a guess.
import type { Cell, Dataset, Observation } from '../data/dataset.ts'
import type { DatasetSource } from '../definition/study.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { StageResult } from '../diagnostics/stage-result.ts'
import { mean } from '../statistics/describe.ts'
import type { CensoredMeasurement, Measurement, Measurements } from './measurements.ts'

/** Fields that carry a value or a moment, and so never tell two independent units apart. */
const valueFields: ReadonlySet<string> = new Set(['response', 'result', 'measurand', 'order', 'time', 'signal'])

export function independentUnits(
  dataset: Dataset, source: DatasetSource, measurand: string, field: 'response' | 'result', putBackExcluded: boolean,
): StageResult<Measurements> {
  const diagnostics: Diagnostic[] = []
  const averages = source.average.map((each) => each.value)
  const averaging = source.replicate !== undefined || averages.length > 0
  if (dataset.fields.includes('injection') && !averaging) {
    diagnostics.push(diagnostic('assess/pseudo-replication', `Dataset \`${dataset.name}\` tells injections apart but not the independent unit`, {
      place: source.columns['injection']?.place ?? source.place, actual: 'a column for `injection`', expected: '`replicate` or `average`',
      mend: 'Write `average: [injection]`, or `replicate:` with the field that names the preparation',
    }))
    return { value: undefined, diagnostics }
  }
  const ignored = new Set([...valueFields, ...averages, ...(source.replicate === undefined ? [] : ['injection'])])
  const groups = new Map<string, Observation[]>()
  for (const observation of dataset.observations) {
    if (observation.measurand !== measurand) continue
    const key = averaging ? unitKey(observation, ignored) : String(groups.size)
    const group = groups.get(key)
    if (group === undefined) groups.set(key, [observation])
    else group.push(observation)
  }
  const values: Measurement[] = []
  const censored: CensoredMeasurement[] = []
  const excluded: Measurement[] = []
  const empty: Cell[] = []
  for (const group of groups.values()) {
    const repeated = repeatedWithin(group, averages)
    if (repeated !== undefined) {
      diagnostics.push(diagnostic('assess/pseudo-replication', `\`${repeated.text}\` stands twice in \`${repeated.column}\` within what would be averaged as one unit`, {
        place: repeated.place, actual: `${group.length} rows that differ in nothing but what is averaged`, expected: 'a column that tells preparations apart',
        mend: 'Map the column that names the preparation (for example as `vial:` or `replicate:`)',
      }))
      continue
    }
    const kept = putBackExcluded ? group : group.filter((each) => each.excluded === undefined)
    const filled = kept.filter((each) => {
      const cell = each.fields[field]
      if (cell !== undefined && cell.kind === 'missing') empty.push(cell)
      return cell !== undefined && cell.kind !== 'missing'
    })
    const first = filled[0]
    const stranger = filled.map((each) => each.fields[field]).find((cell) => cell !== undefined && cell.kind !== 'number')
    if (first !== undefined && stranger !== undefined) censored.push({ ...identity(first, ignored), numbers: numbersOf(filled, field), cell: stranger, rows: filled.map((each) => each.row) })
    else if (first !== undefined) values.push(measurement(filled, field, ignored))
    const out = group.filter((each) => each.excluded !== undefined && each.fields[field]?.kind === 'number')
    if (kept.length === 0 && out[0] !== undefined) excluded.push({ ...measurement(out, field, ignored), exclusion: out[0].excluded })
  }
  const firstEmpty = empty[0]
  if (firstEmpty !== undefined) {
    diagnostics.push(diagnostic('assess/design-gap', `${empty.length === 1 ? 'One value' : `${empty.length} values`} of \`${measurand}\` in dataset \`${dataset.name}\` ${empty.length === 1 ? 'is' : 'are'} empty`, {
      place: firstEmpty.place, actual: 'an empty cell', expected: 'a value', mend: 'Nothing is put in its place; the number of values is counted without it',
      related: empty.slice(1, 4).map((cell) => ({ message: 'also empty', place: cell.place })),
    }))
  }
  return { value: { dataset: dataset.name, field, values, censored, excluded, chain: averaging && values.some((each) => each.averaged.length > 1) ? [averageStep(source)] : [] }, diagnostics }
}

function averageStep(source: DatasetSource): string {
  if (source.replicate === undefined) return `arithmetic mean over ${source.average.map((each) => each.value).join(', ')}`
  return `arithmetic mean of all rows of one ${source.replicate.value}`
}

function unitKey(observation: Observation, ignored: ReadonlySet<string>): string {
  return Object.keys(observation.fields).filter((name) => !ignored.has(name)).sort()
    .map((name) => `${name}\u0000${observation.fields[name]?.text.trim() ?? ''}`).join('\u0001')
}

function repeatedWithin(group: readonly Observation[], averages: readonly string[]): Cell | undefined {
  if (averages.length === 0) return undefined
  const seen = new Set<string>()
  for (const observation of group) {
    const key = averages.map((name) => observation.fields[name]?.text.trim() ?? '').join('\u0001')
    if (seen.has(key)) return observation.fields[averages[0] ?? '']
    seen.add(key)
  }
  return undefined
}

function identity(observation: Observation, ignored: ReadonlySet<string>): Pick<Measurement, 'level' | 'factors'> {
  const factors: Record<string, string> = {}
  for (const [name, cell] of Object.entries(observation.fields)) {
    if (name !== 'level' && (!ignored.has(name)) && cell.kind === 'label') factors[name] = cell.value
  }
  const level = observation.fields['level']
  return { ...(level?.kind === 'number' ? { level: level.value } : {}), factors }
}

function measurement(group: readonly Observation[], field: string, ignored: ReadonlySet<string>): Measurement {
  const first = group[0]
  if (first === undefined) throw new Error('a measurement needs at least one observation')
  const averaged = group.map((each) => numberIn(each.fields[field]))
  return { value: averaged.length === 1 ? (averaged[0] ?? 0) : mean(averaged), ...identity(first, ignored), numbers: numbersOf(group, field), rows: group.map((each) => each.row), averaged }
}

function numbersOf(group: readonly Observation[], field: string): Readonly<Record<string, number>> {
  const numbers: Record<string, number> = {}
  for (const [name, cell] of Object.entries(group[0]?.fields ?? {})) {
    if (name === field || name === 'level' || cell.kind !== 'number') continue
    // Only the moments differ within a unit (they are no part of its key); their mean is the unit's own.
    const members = group.map((each) => each.fields[name]).filter((each) => each?.kind === 'number').map(numberIn)
    numbers[name] = members.length === 1 ? numberIn(cell) : mean(members)
  }
  return numbers
}

function numberIn(cell: Cell | undefined): number {
  if (cell?.kind !== 'number') throw new Error('a cell that holds no number was read as one')
  return cell.value
}
