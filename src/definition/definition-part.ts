// What the definition stage asks of a characteristic: its name, what it may find, and how its options are read.
import type { ObjectReader } from './fields.ts'
import type { Metric } from './metric.ts'
import type { Criterion } from './study.ts'

export interface DefinitionPart<Options = unknown> {
  /** The key under `characteristics:`. */
  readonly id: string
  /** Printed title, such as `Detection and quantitation limits`. */
  readonly title: string
  readonly metrics: Readonly<Record<string, Metric>>
  readonly options: ObjectReader<Options>
  /** Criteria that follow from the options themselves (a stated equivalence margin is one). */
  impliedCriteria?(options: Options): readonly Criterion[]
}
