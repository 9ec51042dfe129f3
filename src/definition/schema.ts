// The published JSON Schema of a study (draft-07), made from the readers themselves, so that editors and the program agree.
import { blocksSchema } from './blocks.ts'
import type { DefinitionPart } from './definition-part.ts'
import type { JsonSchema } from './fields.ts'
import { studyReader } from './index.ts'
import { rulesReader } from './report.ts'

export function studySchema(catalogue: readonly DefinitionPart[]): JsonSchema {
  const study = studyReader.schema as { readonly properties: Record<string, unknown>; readonly required: readonly string[] }
  return {
    $schema: 'http://json-schema.org/draft-07/schema#', title: 'Assaywrit study definition, format 1', ...study,
    properties: { ...study.properties, rules: rulesReader.schema, characteristics: blocksSchema(catalogue) },
    required: [...study.required, 'characteristics'],
  }
}
