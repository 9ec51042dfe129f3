// Two runs (exclusions in force, every row put back) → each finding and verdict that an exclusion touches, with and without.
// A finding is touched when either run rests it on an excluded row.
import type { Dataset } from '../data/dataset.ts'
import type { Finding } from './finding.ts'
import type { WithExcluded } from './record.ts'
import type { RanBlock } from './run-blocks.ts'

export function exclusionEffect(inForce: readonly RanBlock[], putBack: readonly RanBlock[], datasets: readonly Dataset[]): readonly WithExcluded[] {
  const excludedRows = new Map(datasets.map((dataset) => [dataset.name, new Map(
    dataset.observations.filter((each) => each.excluded !== undefined).map((each) => [`${each.row}/${each.measurand}`, each.excluded ?? 0]),
  )]))
  const without = new Map(inForce.flatMap((ran) => ran.findings).map((finding) => [finding.id, finding]))
  const verdictsWithout = inForce.flatMap((ran) => ran.verdicts)
  const verdictsWith = putBack.flatMap((ran) => ran.verdicts)
  const ids = [...new Set([...putBack.flatMap((ran) => ran.findings), ...inForce.flatMap((ran) => ran.findings)].map((finding) => finding.id))]
  const withRows = new Map(putBack.flatMap((ran) => ran.findings).map((finding) => [finding.id, finding]))
  return ids.flatMap((id): readonly WithExcluded[] => {
    const before = without.get(id)
    const after = withRows.get(id)
    const finding = after ?? before
    if (finding === undefined) return []
    const exclusions = [...new Set([...numbersIn(after, excludedRows), ...numbersIn(before, excludedRows)])].sort((left, right) => left - right)
    const changed = before?.value !== after?.value
    if (exclusions.length === 0 && !changed) return []
    return [{
      finding: id, exclusions, without: before?.value ?? null, with: after?.value ?? null, unit: finding.unit,
      verdicts: verdictsWithout.filter((verdict) => verdict.finding === id).flatMap((verdict) => {
        const other = verdictsWith.find((each) => each.finding === id && each.criterion === verdict.criterion)
        return other === undefined ? [] : [{ criterion: verdict.criterion, without: verdict.verdict, with: other.verdict }]
      }),
    }]
  })
}

function numbersIn(finding: Finding | undefined, excludedRows: ReadonlyMap<string, ReadonlyMap<string, number>>): readonly number[] {
  if (finding === undefined) return []
  return finding.evidence.flatMap((evidence) => evidence.rows.flatMap((row) => excludedRows.get(evidence.dataset)?.get(`${row}/${finding.measurand}`) ?? []))
}
