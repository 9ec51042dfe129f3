// Definition and data → the study record: every finding, verdict and diagnostic as plain data. Nothing after this looks at raw data.
import type { Dataset } from '../data/dataset.ts'
import type { StudyDefinition } from '../definition/study.ts'
import type { Diagnostic } from '../diagnostics/diagnostic.ts'
import { hasErrors, type StageResult } from '../diagnostics/stage-result.ts'
import { designLines } from './design-lines.ts'
import { exclusionEffect } from './exclusion-effect.ts'
import { openItems } from './open-items.ts'
import { overallVerdict } from './overall.ts'
import type { InputFile, StudyRecord } from './record.ts'
import { recordedDatasets } from './recorded-datasets.ts'
import { type AssessableCharacteristic, runBlocks } from './run-blocks.ts'

export interface AssessRequest {
  readonly study: StudyDefinition
  readonly datasets: readonly Dataset[]
  readonly inputs: readonly InputFile[]
  readonly program: { readonly name: string; readonly version: string }
  /** What earlier stages noticed; it belongs to the record. */
  readonly noticed: readonly Diagnostic[]
}

export function assess(request: AssessRequest, catalogue: readonly AssessableCharacteristic[]): StageResult<StudyRecord> {
  const { study, datasets } = request
  const run = { study, datasets, catalogue }
  const ran = runBlocks({ ...run, putBackExcluded: false, measurands: study.measurands })
  const touched = new Set(datasets.flatMap((dataset) => dataset.observations.filter((each) => each.excluded !== undefined).map((each) => each.measurand)))
  const affected = study.measurands.filter((measurand) => touched.has(measurand.id))
  const putBack = affected.length === 0 ? [] : runBlocks({ ...run, putBackExcluded: true, measurands: affected, inForce: ran })
  const diagnostics = withoutRepeats(ran.flatMap((each) => each.diagnostics))
  if (hasErrors(diagnostics)) return { value: undefined, diagnostics }
  const verdicts = ran.flatMap((each) => each.verdicts)
  const design = designLines(ran, study.design)
  const record: StudyRecord = {
    format: 1,
    program: request.program,
    study: {
      report: study.report, method: study.method, intendedUse: study.intendedUse, people: study.people, rules: study.rules, measurands: study.measurands,
      sources: study.datasets, exclusions: study.exclusions, design: study.design,
      blocks: study.blocks.map((block) => ({ id: block.id, characteristic: block.characteristic, measurands: block.measurands, options: block.options, decideBy: block.decideBy })),
      notPerformed: study.notPerformed, texts: study.texts, deviations: study.deviations, equipment: study.equipment, materials: study.materials,
    },
    inputs: request.inputs,
    datasets: recordedDatasets(datasets),
    assessments: ran.map((each) => ({
      characteristic: each.block.characteristic, block: each.block.id, measurand: each.measurand, title: each.title,
      detail: each.detail ?? null, notEvaluable: each.notEvaluable, designFound: each.design,
    })),
    findings: ran.flatMap((each) => each.findings),
    verdicts,
    design,
    withExcluded: exclusionEffect(ran.filter((each) => touched.has(each.measurand)), putBack, datasets),
    overall: overallVerdict(verdicts, study),
    openItems: openItems(study, design),
    defaults: study.defaults,
    diagnostics: [...request.noticed, ...diagnostics],
  }
  return { value: record, diagnostics }
}

/** The same remark about the same cell is made by every block that reads the dataset; it is told once. */
function withoutRepeats(diagnostics: readonly Diagnostic[]): readonly Diagnostic[] {
  const seen = new Set<string>()
  return diagnostics.filter((each) => {
    const key = JSON.stringify([each.code, each.message, each.place])
    if (seen.has(key)) return false
    seen.add(key)
    return true
  })
}
