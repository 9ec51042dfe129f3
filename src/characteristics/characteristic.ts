// The contract: what each stage asks of a characteristic, together. A characteristic is one folder of three files.
import type { AssessmentPart } from '../assess/assessment-part.ts'
import type { DefinitionPart } from '../definition/definition-part.ts'
import type { PresentationPart } from '../present/presentation-part.ts'

export interface Characteristic<Options = unknown, Detail = unknown>
  extends DefinitionPart<Options>, AssessmentPart<Options, Detail>, PresentationPart<Detail> {
  readonly id: string
  readonly title: string
}
