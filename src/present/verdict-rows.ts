// Verdicts of the record as printed rows: which finding decides a criterion that holds at several levels, and its value with as many
// digits as it takes to stand visibly on its side of the limit. Nothing is computed; a number is chosen and printed.
import type { Finding, Verdict } from '../assess/finding.ts'
import type { Limit } from '../definition/study.ts'
import type { Inline } from './document.ts'
import { joined, sentence, textOf } from './build.ts'
import { asFound, asTyped, numberText } from './numbers.ts'

const severity: Readonly<Record<Verdict['verdict'], number>> = { misses: 4, 'not evaluable': 3, meets: 2, 'information only': 1, 'not performed': 0 }

/** Verdicts of one criterion of one measurand together, in the order of the record. */
export function byCriterion(verdicts: readonly Verdict[]): readonly (readonly Verdict[])[] {
  const groups = new Map<string, Verdict[]>()
  for (const verdict of verdicts) {
    const key = `${verdict.block}/${verdict.measurand}/${verdict.metric}/${verdict.criterion}`
    const group = groups.get(key)
    if (group === undefined) groups.set(key, [verdict])
    else group.push(verdict)
  }
  return [...groups.values()]
}

/** The verdict that decides: the gravest, and among equals the one nearest to (or furthest beyond) its limit. */
export function deciding(verdicts: readonly Verdict[]): Verdict {
  const ranked = [...verdicts].sort((left, right) => severity[right.verdict] - severity[left.verdict] || strain(right) - strain(left))
  const first = ranked[0]
  if (first === undefined) throw new Error('a criterion without a verdict')
  return first
}

/** How far towards or beyond the limit, for choosing only; never printed. */
function strain(verdict: Verdict): number {
  const values = verdict.unrounded ?? []
  const { limit } = verdict
  switch (limit.kind) {
    case 'at most': case 'below': return Math.max(...values, -Infinity)
    case 'at least': case 'above': return -Math.min(...values, Infinity)
    case 'between': return Math.max(...values.map((value) => Math.abs(value - (limit.low.value + limit.high.value) / 2)), -Infinity)
  }
}

/** The decided value with its unit, and the level or condition it belongs to: `12.34 % at 0.05 mg/L`. */
export function resultWords(verdict: Verdict, finding: Finding | undefined, levelUnit: string): readonly Inline[] {
  if (verdict.unrounded === undefined || finding === undefined) return textOf('none')
  const values = verdict.unrounded.map((value): readonly Inline[] => [{ type: 'number', value, text: decisionText(value, verdict.limit) }])
  return [...joined(values, ' to '), ...unitWords(finding.unit), ...whereWords(verdict, levelUnit)]
}

/** `1` is the unit of a plain number and is not printed. */
export function unitWords(unit: string): readonly Inline[] {
  return unit === '' || unit === '1' ? [] : textOf(`${unit === '%' ? '\u202f' : '\u00a0'}${unit}`)
}

/** ` at 0.05 mg/L`, ` (north)`, or nothing. */
export function whereWords(where: { readonly level?: number | undefined; readonly condition?: string | undefined }, levelUnit: string): readonly Inline[] {
  return [
    ...(where.level === undefined ? [] : sentence` at ${asTyped(where.level)}${unitWords(levelUnit)}`),
    ...(where.condition === undefined ? [] : textOf(` (${where.condition})`)),
  ]
}

/** Four significant digits, or as many more as show on which side of the limit the value lies. */
function decisionText(value: number, limit: Limit): string {
  if (asFound(value).text === asTyped(value).text) return asFound(value).text
  const bounds = limit.kind === 'between' ? [limit.low.value, limit.high.value] : [limit.bound.value]
  for (let significant = 4; significant < 12; significant += 1) {
    const text = numberText(value, { significant })
    const shown = Number(text.replace('\u2212', '-').replace(/ × 10.*/, ''))
    if (text.includes('×') || bounds.every((bound) => Math.sign(shown - bound) === Math.sign(value - bound))) return text
  }
  return numberText(value, { significant: 12 })
}
