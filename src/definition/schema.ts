// The published JSON Schema of a study (draft-07), made from the readers themselves, so that editors and the program agree.
// It cannot say everything: references between parts and units of limits are checked by the program alone.
import { blocksSchema } from './blocks.ts'
import type { DefinitionPart } from './definition-part.ts'
import { type JsonSchema, object } from './fields.ts'
import { studyFields } from './study-fields.ts'

export function studySchema(catalogue: readonly DefinitionPart[]): JsonSchema {
  const { schema } = object(studyFields, { describe: 'A study definition' })
  return {
    $schema: 'http://json-schema.org/draft-07/schema#', title: 'Assaywrit study definition, format 1', ...schema,
    properties: { ...(schema['properties'] as JsonSchema), characteristics: blocksSchema(catalogue) },
  }
}
