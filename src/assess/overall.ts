// All verdicts → the one overall verdict: any required miss misses; else any required criterion that is not evaluable leaves it not
// evaluable; else it meets, naming what was justified as not performed. Without criteria there is information only.
import type { StudyDefinition } from '../definition/study.ts'
import type { Verdict } from './finding.ts'
import type { StudyRecord } from './record.ts'

export function overallVerdict(verdicts: readonly Verdict[], study: StudyDefinition): StudyRecord['overall'] {
  const required = verdicts.filter((verdict) => verdict.required)
  const missed = required.filter((verdict) => verdict.verdict === 'misses')
  const open = required.filter((verdict) => verdict.verdict === 'not evaluable')
  const omitted = study.notPerformed.map((each) => `${each.characteristic} was not performed: ${each.justification}`)
  if (missed.length > 0) return { verdict: 'misses', because: missed.map((verdict) => verdict.finding) }
  if (open.length > 0) return { verdict: 'not evaluable', because: open.map((verdict) => verdict.finding) }
  if (required.length === 0) return { verdict: 'information only', because: omitted }
  return { verdict: 'meets', because: omitted }
}
