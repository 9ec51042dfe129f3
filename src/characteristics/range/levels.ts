// Verdicts of accuracy, precision and linearity → what holds at each level. A verdict without a level speaks of every level; between two
// standards the fit is accepted when both are; beyond the outermost standards, or beyond where the line is required to be straight, never.
import type { PriorAssessment } from '../../assess/assessment-part.ts'
import type { Verdict, VerdictWord } from '../../assess/finding.ts'

export type LevelWord = VerdictWord | 'not tested' | 'outside the fit'

export interface RangeLevel {
  readonly level: number
  readonly accuracy: LevelWord
  readonly precision: LevelWord
  readonly linearity: LevelWord
  /** Tested for both accuracy and precision, inside the fit, and all that is required is met. */
  readonly holds: boolean
  /** No interval may pass this level. */
  readonly splits: boolean
  /** The part of the level that all matched data cover; one number unless levels were matched within a tolerance. */
  readonly low: number
  readonly high: number
}

export interface Priors {
  readonly accuracy: readonly PriorAssessment[]
  readonly precision: readonly PriorAssessment[]
  readonly linearity: readonly PriorAssessment[]
}

type Same = (left: number, right: number) => boolean

/** Every level tested for accuracy or precision, and every standard between them at which the fit does not hold. */
export function rangeLevels(priors: Priors, same: Same): readonly RangeLevel[] {
  const fits = priors.linearity.map(fitOf)
  const [accuracy, precision] = [levelsOf(priors.accuracy), levelsOf(priors.precision)]
  const tested = withoutDoubles([...accuracy, ...precision], same)
  const [lowest = 0, highest = 0] = [Math.min(...tested), Math.max(...tested)]
  const failing = fits.flatMap((fit) => fit.standards).filter((level) => level > lowest && level < highest && isFailure(linearityAt(fits, level, same)))
  return withoutDoubles([...tested, ...failing], same).sort((left, right) => left - right).map((level): RangeLevel => {
    const at = (levels: readonly number[]): readonly number[] => levels.filter((each) => same(each, level))
    const isTested = at(accuracy).length > 0 && at(precision).length > 0
    const words = {
      accuracy: at(accuracy).length === 0 ? 'not tested' as const : wordAt(priors.accuracy, level, same),
      precision: at(precision).length === 0 ? 'not tested' as const : wordAt(priors.precision, level, same),
      linearity: linearityAt(fits, level, same),
    }
    const holds = isTested && words.accuracy === 'meets' && words.precision === 'meets' && (words.linearity === 'meets' || words.linearity === 'information only')
    const matched = [...at(accuracy), ...at(precision), ...at(fits.flatMap((fit) => fit.standards))]
    return { level, ...words, holds, splits: isTested ? !holds : Object.values(words).some(isFailure), low: Math.max(...matched), high: Math.min(...matched) }
  })
}

/** The longest interval from a level that holds to another (or the same) that no level splits; the lower one of two equals. */
export function longestInterval(levels: readonly RangeLevel[]): { readonly low: number; readonly high: number; readonly levels: number } | undefined {
  const runs: RangeLevel[][] = [[]]
  for (const level of levels) {
    if (level.splits) runs.push([])
    else if (level.holds) runs.at(-1)?.push(level)
  }
  return runs.flatMap((run) => {
    const [first, last] = [run[0], run.at(-1)]
    if (first === undefined || last === undefined) return []
    // One level alone is as wide as nothing, whatever was matched to it.
    return [first === last ? { low: first.level, high: first.level, levels: 1 } : { low: first.low, high: last.high, levels: run.length }]
  }).reduce<{ low: number; high: number; levels: number } | undefined>((best, each) => (best === undefined || each.high - each.low > best.high - best.low ? each : best), undefined)
}

/** From the lowest to the highest standard at which the fit is accepted. */
export function acceptedFit(linearity: readonly PriorAssessment[], same: Same): { readonly fitLow?: number; readonly fitHigh?: number } {
  const fits = linearity.map(fitOf)
  const accepted = fits.flatMap((fit) => fit.standards).filter((level) => !isFailure(linearityAt(fits, level, same)))
  return accepted.length === 0 ? {} : { fitLow: Math.min(...accepted), fitHigh: Math.max(...accepted) }
}

interface AcceptedFit {
  /** Levels above zero of the standards, ascending. */
  readonly standards: readonly number[]
  /** Level above which the line is not straight, where the study requires it to be. */
  readonly straightTo?: number
  readonly verdicts: readonly Verdict[]
}

function fitOf(prior: PriorAssessment): AcceptedFit {
  const required = prior.verdicts.filter((verdict) => verdict.required)
  const straightTo = required.some((verdict) => verdict.metric === 'straight-to') ? prior.findings.find((finding) => finding.metric === 'straight-to')?.value : undefined
  return {
    standards: levelsOf([prior]).filter((level) => level > 0),
    ...(straightTo === undefined ? {} : { straightTo }), verdicts: straightTo === undefined ? required : required.filter((verdict) => verdict.metric !== 'straight-to'),
  }
}

function linearityAt(fits: readonly AcceptedFit[], level: number, same: Same): LevelWord {
  const words = fits.map((fit) => fitAt(fit, level, same)).filter((word) => word !== 'outside the fit')
  return words.length === 0 ? 'outside the fit' : gravest(words)
}

function fitAt({ standards, straightTo, verdicts }: AcceptedFit, level: number, same: Same): VerdictWord | 'outside the fit' {
  const [lowest, highest] = [standards[0], standards.at(-1)]
  if (lowest === undefined || highest === undefined) return 'not evaluable'
  const end = straightTo === undefined ? highest : Math.min(highest, straightTo)
  if ((level < lowest && !same(level, lowest)) || (level > end && !same(level, end))) return 'outside the fit'
  const own = standards.filter((each) => same(each, level))
  const around = own.length > 0 ? own : [standards.filter((each) => each < level).at(-1), standards.find((each) => each > level)]
  return gravest(verdicts.filter((verdict) => verdict.level === undefined || around.includes(verdict.level)).map((verdict) => verdict.verdict))
}

function levelsOf(prior: readonly PriorAssessment[]): readonly number[] {
  const levels = prior.flatMap((each) => [...each.findings, ...each.verdicts]).flatMap((each) => each.level ?? [])
  return [...new Set(levels)].sort((left, right) => left - right)
}

function withoutDoubles(levels: readonly number[], same: Same): number[] {
  return levels.filter((level, index) => levels.findIndex((other) => same(level, other)) === index)
}

function wordAt(prior: readonly PriorAssessment[], level: number, same: Same): VerdictWord {
  const verdicts = prior.flatMap((each) => each.verdicts).filter((verdict) => verdict.required && (verdict.level === undefined || same(verdict.level, level)))
  return gravest(verdicts.map((verdict) => verdict.verdict))
}

function gravest(words: readonly VerdictWord[]): VerdictWord {
  return (['misses', 'not evaluable', 'meets'] as const).find((word) => words.includes(word)) ?? 'information only'
}

function isFailure(word: LevelWord): boolean {
  return word === 'misses' || word === 'not evaluable' || word === 'outside the fit'
}
