// What keeps a report a draft: points a person still has to settle before anyone can sign. An empty list means it is for signature.
import type { StudyDefinition } from '../definition/study.ts'
import type { DesignLine } from './record.ts'

export function openItems(study: StudyDefinition, design: readonly DesignLine[]): readonly string[] {
  const unmet = [...new Set(design.filter((line) => !line.met).map((line) => line.block))]
  return [
    ...(study.texts['conclusion'] === undefined ? ['The laboratory has not stated its conclusion (texts: conclusion).'] : []),
    ...(unmet.length > 0 && study.deviations.length === 0 ? [`The planned design is not met in ${unmet.join(', ')} and no deviation is recorded.`] : []),
  ]
}
