// Readings under conditions → effects by the design: replicates (Welch), pairs, or alternating blocks with a straight drift.
import { type Block, alternatingBlocks } from '../../statistics/alternating-blocks.ts'
import { brownForsythe, type DifferenceTest, equivalence, pairedT, pooledT, varianceRatio, welch } from '../../statistics/compare.ts'
import { mean } from '../../statistics/describe.ts'
import { oneWay } from '../../statistics/variance-components.ts'
import type { ComparisonDetail, EffectLine, EquivalenceLine, SpreadLine } from './detail.ts'
import type { ConditionReading } from './readings.ts'

const fewestBlocks = 6 // below, drift and condition leave too few degrees of freedom to tell them apart

export interface Analysis {
  readonly effects: readonly EffectLine[]
  readonly besides: readonly EffectLine[]
  readonly blocks: ComparisonDetail['blocks']
  readonly drift?: ComparisonDetail['drift']
}

export interface AnalysisRequest {
  readonly readings: readonly ConditionReading[]
  readonly reference: string
  readonly others: readonly string[]
  /** Field that names blocks or pairs. */
  readonly field: string
  /** Confidence of the intervals. */
  readonly level: number
}

type Outcome = Analysis | { readonly because: string }

export function replicates(request: AnalysisRequest): Outcome {
  const { reference, others, level } = request
  const base = valuesUnder(request, reference)
  const lines = (method: string, test: typeof welch): readonly EffectLine[] => others.map((other) => line(other, method, test(valuesUnder(request, other), base, level), level, mean(base)))
  return { effects: lines('Welch t', welch), besides: lines('pooled t', pooledT), blocks: [] }
}

export function pairs(request: AnalysisRequest): Outcome {
  const { reference, others, field, level } = request
  const named = (condition: string): ReadonlyMap<string, number> => new Map(request.readings.filter((each) => each.condition === condition).map((each) => [each.measurement.factors[field] ?? String(each.measurement.numbers[field] ?? ''), each.value]))
  const base = named(reference)
  if (base.has('')) return { because: `the field \`${field}\` that names the pairs is empty or not mapped` }
  for (const condition of [reference, ...others]) {
    const under = request.readings.filter((each) => each.condition === condition).length
    if (under > named(condition).size) return { because: `of ${under} readings under ${condition}, some share a pair; a pair needs one reading of each condition` }
  }
  const effects: EffectLine[] = []
  for (const other of others) {
    const values = named(other)
    const common = [...base.keys()].filter((pair) => values.has(pair))
    if (common.length < 2 || common.length < base.size || common.length < values.size) return { because: `${base.size} readings under ${reference} and ${values.size} under ${other} make ${common.length} complete pairs; a pair needs one reading of each condition` }
    const b = common.map((pair) => base.get(pair) ?? 0)
    effects.push(line(other, 'paired t', pairedT(common.map((pair) => values.get(pair) ?? 0), b, level), level, mean(b)))
  }
  return { effects, besides: [], blocks: [] }
}

export function blocks(request: AnalysisRequest): Outcome {
  const { reference, others, level } = request
  const found = blockMeans(request)
  if (found.length < fewestBlocks) return { because: `${found.length} blocks are fewer than the ${fewestBlocks} that are needed to tell a condition from a drift` }
  const conditions = [reference, ...others]
  const fit = alternatingBlocks(found.map((block): Block => ({ condition: conditions.indexOf(block.condition), mean: block.mean, order: block.order })), level)
  const base = mean(found.filter((block) => block.condition === reference).map((block) => block.mean))
  return {
    effects: fit.effects.map((effect) => line(conditions[effect.condition] ?? '', 'block means with a straight drift', effect, level, base)),
    besides: [], blocks: found, drift: { value: fit.drift, standardError: fit.driftStandardError },
  }
}

/** Readings that share the block field; without it, readings of one condition that follow each other. */
function blockMeans({ readings, field }: AnalysisRequest): ComparisonDetail['blocks'] {
  const groups: { readonly block: string; readonly condition: string; readonly values: number[] }[] = []
  for (const each of readings) {
    const name = each.measurement.factors[field]
    const last = groups.at(-1)
    const same = name === undefined ? (last?.condition === each.condition ? last : undefined) : groups.find((group) => group.block === name && group.condition === each.condition)
    if (same === undefined) groups.push({ block: name ?? String(groups.length + 1), condition: each.condition, values: [each.value] })
    else same.values.push(each.value)
  }
  return groups.map((group, index) => ({ block: group.block, condition: group.condition, order: index + 1, n: group.values.length, mean: mean(group.values) }))
}

function valuesUnder({ readings }: AnalysisRequest, condition: string): readonly number[] {
  return readings.filter((each) => each.condition === condition).map((each) => each.value)
}

function line(condition: string, method: string, test: DifferenceTest, confidence: number, base: number): EffectLine {
  return {
    condition, method, difference: test.difference, standardError: test.standardError, df: test.df, t: test.t, probability: test.probability,
    low: test.interval.low, high: test.interval.high, confidence, ...(base === 0 ? {} : { relative: (100 * test.difference) / Math.abs(base) }),
  }
}

export function equivalenceLines(effects: readonly EffectLine[], margin: number, alpha: number): readonly EquivalenceLine[] {
  return effects.map((effect): EquivalenceLine => {
    const { lower, upper, probability } = equivalence(effect, { low: -margin, high: margin }, alpha)
    return { condition: effect.condition, lowerT: lower.t, lowerProbability: lower.probability, upperT: upper.t, upperProbability: upper.probability, probability }
  })
}

/** Spreads under the conditions, and with more than two conditions the means as a whole. */
export function spreadLines({ readings, reference, others }: AnalysisRequest): readonly SpreadLine[] {
  const groups = [reference, ...others].map((condition) => readings.filter((each) => each.condition === condition).map((each) => each.value))
  const [base = [], ...rest] = groups
  return [
    ...rest.flatMap((values, index) => tried(() => ({ test: 'F test of the variances', condition: others[index] ?? '', ...varianceRatio(values, base) }))),
    ...tried(() => ({ test: 'Brown-Forsythe test of the spreads', ...brownForsythe(groups) })),
    ...(others.length < 2 ? [] : tried(() => {
      const { F, dfBetween, dfWithin, probability } = oneWay(groups)
      return { test: 'one-way analysis of variance of the means', F, df1: dfBetween, df2: dfWithin, probability }
    })),
  ]
}

function tried(make: () => SpreadLine): readonly SpreadLine[] {
  try {
    return [make()]
  } catch (error) {
    if (error instanceof RangeError) return []
    throw error
  }
}
