// The design an MDL needs: at least seven of each, three batches, three dates of preparation and of analysis, two of each per instrument,
// and spikes at 2 to 10 times the limit. A rule whose column is not mapped is neither met nor missed.
import type { MdlDetail } from './detail.ts'
import type { Series } from './series.ts'

type Factors = Readonly<Record<string, string>>
type Check = MdlDetail['checks'][number]

export function mdlChecks(spikes: Series, blanks: Series, levels: readonly number[], limit: number): readonly Check[] {
  const sides = [['spikes', factorsOf(spikes)], ['blanks', factorsOf(blanks)]] as const
  const counts = sides.map(([name, rows]): Check => ({ rule: `number of ${name}`, found: rows.length, needed: 'at least 7', met: rows.length >= 7 }))
  const spread = sides.flatMap(([name, rows]) => [['batch', 'batches'], ['prepared', 'dates of preparation'], ['analysed', 'dates of analysis']].map(([field = '', words = '']): Check => {
    const found = distinct(rows, field)
    return { rule: `${words} of ${name}`, found, needed: 'at least 3', met: found === undefined ? undefined : found >= 3 }
  }))
  const lowest = levels[0]
  const ratios: readonly Check[] = lowest === undefined || limit <= 0
    ? [{ rule: 'spike level over the limit', found: undefined, needed: '2 to 10', met: undefined }]
    : levels.map((level) => ({ rule: `spike level ${level} over the limit`, found: level / limit, needed: '2 to 10', met: level / limit >= 2 && level / limit <= 10 }))
  return [...counts, ...spread, ...instrumentChecks(sides), ...ratios]
}

/** With several instruments, each needs two spikes and two blanks. */
function instrumentChecks(sides: readonly (readonly ['spikes' | 'blanks', readonly Factors[]])[]): readonly Check[] {
  const instruments = [...new Set(sides.flatMap(([, rows]) => rows.flatMap((row) => row['instrument'] ?? [])))].sort()
  if (instruments.length < 2) return []
  return instruments.flatMap((instrument) => sides.map(([name, rows]): Check => {
    const found = rows.filter((row) => row['instrument'] === instrument).length
    return { rule: `${name} on instrument ${instrument}`, found, needed: 'at least 2', met: found >= 2 }
  }))
}

export function mdlSchedule(spikes: Series, blanks: Series): MdlDetail['schedule'] {
  const rows = [...factorsOf(spikes).map((factors) => ({ factors, spike: true })), ...factorsOf(blanks).map((factors) => ({ factors, spike: false }))]
  const dateField = rows.some((row) => row.factors['analysed'] !== undefined) ? 'analysed' : 'prepared'
  const dates = [...new Set(rows.map((row) => row.factors[dateField] ?? ''))].sort()
  const batches = [...new Set(rows.map((row) => row.factors['batch'] ?? ''))].sort()
  const counts = dates.flatMap((date) => batches.map((batch) => {
    const here = rows.filter((row) => (row.factors[dateField] ?? '') === date && (row.factors['batch'] ?? '') === batch)
    return { date, batch, spikes: here.filter((row) => row.spike).length, blanks: here.filter((row) => !row.spike).length }
  }))
  return { dateField, dates, batches, counts }
}

/** Censored blanks are part of the design like any other. */
function factorsOf(series: Series): readonly Factors[] {
  return [...series.measurements.values, ...series.measurements.censored].map((each) => each.factors)
}

function distinct(rows: readonly Factors[], field: string): number | undefined {
  const words = rows.flatMap((row) => row[field] ?? [])
  return words.length === 0 ? undefined : new Set(words).size
}
