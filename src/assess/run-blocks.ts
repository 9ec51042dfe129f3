// Runs every block for every measurand in dependency order and judges what comes out, so that a later characteristic can read earlier
// verdicts. It knows no characteristic by name; blocks that can turn responses into results go first.
import type { Dataset } from '../data/dataset.ts'
import type { DefinitionPart } from '../definition/definition-part.ts'
import { unitOfMetric } from '../definition/metric-unit.ts'
import type { Block, DatasetSource, Measurand, StudyDefinition } from '../definition/study.ts'
import { diagnostic, type Diagnostic } from '../diagnostics/diagnostic.ts'
import type { AssessInput, AssessmentPart, PriorAssessment } from './assessment-part.ts'
import type { Finding, NotEvaluable, Verdict } from './finding.ts'
import { findingId } from './finding-id.ts'
import { independentUnits } from './independent-units.ts'
import { judge, limitFor } from './judge.ts'
import type { Measurements } from './measurements.ts'
import { type Calibration, meanResponse, resultsOf } from './results.ts'

export type AssessableCharacteristic = DefinitionPart & AssessmentPart

export interface RanBlock {
  readonly block: Block
  readonly measurand: string
  readonly title: string
  readonly detail: unknown
  readonly findings: readonly Finding[]
  readonly verdicts: readonly Verdict[]
  readonly notEvaluable: readonly NotEvaluable[]
  readonly design: Readonly<Record<string, number>>
  readonly diagnostics: readonly Diagnostic[]
  /** What it read: datasets, and blocks before it whose outcome it could see. */
  readonly read: { readonly datasets: ReadonlySet<string>; readonly blocks: ReadonlySet<string> }
}

export interface RunRequest {
  readonly study: StudyDefinition
  readonly datasets: readonly Dataset[]
  readonly catalogue: readonly AssessableCharacteristic[]
  /** Runs as if nothing had been excluded. */
  readonly putBackExcluded: boolean
  /** The same with the exclusions in force: what no excluded row reaches is taken from here. */
  readonly inForce?: readonly RanBlock[]
  readonly measurands: readonly Measurand[]
}

export function runBlocks(request: RunRequest): readonly RanBlock[] {
  const ordered = inDependencyOrder(request.study.blocks, request.catalogue)
  const ran = request.measurands.flatMap((measurand) => runMeasurand(request, measurand, ordered))
  const place = new Map(request.study.blocks.map((block, index) => [block.id, index]))
  const rank = (each: RanBlock): number => place.get(each.block.id) ?? 0
  return ran.sort((left, right) => rank(left) - rank(right))
}

function inDependencyOrder(blocks: readonly Block[], catalogue: readonly AssessableCharacteristic[]): readonly Block[] {
  const order: Block[] = []
  const visiting = new Set<string>()
  const done = new Set<string>()
  const visit = (id: string): void => {
    if (done.has(id)) return
    if (visiting.has(id)) throw new Error(`characteristics build on each other in a circle: ${id}`)
    visiting.add(id)
    for (const before of catalogue.find((part) => part.id === id)?.after ?? []) visit(before)
    done.add(id)
    order.push(...blocks.filter((block) => block.characteristic === id))
  }
  for (const part of catalogue.filter((each) => each.invert !== undefined)) visit(part.id)
  for (const block of blocks) visit(block.characteristic)
  return order
}

function runMeasurand(request: RunRequest, measurand: Measurand, ordered: readonly Block[]): readonly RanBlock[] {
  const ran: RanBlock[] = []
  for (const block of ordered) {
    const part = request.catalogue.find((each) => each.id === block.characteristic)
    if (part === undefined) throw new Error(`no characteristic ${block.characteristic} in the catalogue`)
    if (!block.measurands.includes(measurand.id)) continue
    const before = request.inForce?.find((each) => each.block.id === block.id && each.measurand === measurand.id)
    ran.push(before !== undefined && isOutOfReach(before, request, ran) ? before : runBlock(request, measurand, block, part, ran))
  }
  return ran
}

/** No excluded row in what it read, and every block before it came out the same. */
function isOutOfReach(before: RanBlock, { datasets, inForce = [] }: RunRequest, ran: readonly RanBlock[]): boolean {
  const touched = (name: string): boolean => datasets.some((dataset) => dataset.name === name && dataset.observations.some((each) => each.excluded !== undefined && each.measurand === before.measurand))
  return ![...before.read.datasets].some(touched) && [...before.read.blocks].every((id) => ran.some((each) => each.block.id === id && inForce.includes(each)))
}

function runBlock(request: RunRequest, measurand: Measurand, block: Block, part: AssessableCharacteristic, earlier: readonly RanBlock[]): RanBlock {
  const noticed: Diagnostic[] = []
  const read = { datasets: new Set<string>(), blocks: new Set<string>() }
  const output = part.assess({ block, measurand, confidence: request.study.rules.confidence, ...dataAccess(request, measurand, block, earlier, noticed, read) })
  const findings = output.findings.map((draft): Finding => {
    const metric = part.metrics[draft.metric]
    if (metric === undefined) throw new Error(`${part.id} reported the metric ${draft.metric}, which it does not declare`)
    if (![draft.value, draft.interval?.low ?? 0, draft.interval?.high ?? 0, draft.df ?? 0].every(Number.isFinite)) throw new Error(`${part.id} reported a ${draft.metric} that is not finite`)
    return {
      ...draft, id: findingId({ block: block.id, measurand: measurand.id, metric: draft.metric, level: draft.level, condition: draft.condition }),
      measurand: measurand.id, characteristic: part.id, block: block.id, unit: unitOfMetric(metric.unit, measurand),
    }
  })
  const verdicts = judgeAll(request.study, block, measurand, part, findings, output.notEvaluable, output.detail === undefined)
  return {
    block, measurand: measurand.id, title: part.title, detail: output.detail, findings, verdicts, notEvaluable: output.notEvaluable,
    design: output.design, diagnostics: [...noticed, ...output.diagnostics], read,
  }
}

function judgeAll(
  study: StudyDefinition, block: Block, measurand: Measurand, part: AssessableCharacteristic, findings: readonly Finding[], notEvaluable: readonly NotEvaluable[], nothing: boolean,
): readonly Verdict[] {
  return block.criteria.flatMap((criterion): readonly Verdict[] => {
    const metric = part.metrics[criterion.metric]
    if (metric === undefined) throw new Error(`a criterion names the metric ${criterion.metric}, which ${part.id} does not declare`)
    const judged = findings.filter((finding) => finding.metric === criterion.metric).map((finding) => judge(finding, { criterion, decideBy: criterion.decideBy ?? block.decideBy, rules: study.rules, metric }))
    const { limit, text } = limitFor(criterion, measurand.id)
    const unjudged = notEvaluable.filter((each) => each.metric === criterion.metric)
    const absent = judged.length + unjudged.length === 0
      ? [{ metric: criterion.metric, because: nothing ? 'nothing could be computed for this measurand' : 'no such finding could be computed' }] : []
    const missing = [...unjudged, ...absent].map((each: NotEvaluable): Verdict => ({
      finding: findingId({ block: block.id, measurand: measurand.id, metric: each.metric, level: each.level, condition: each.condition }),
      measurand: measurand.id, characteristic: part.id, block: block.id, metric: each.metric,
      ...(each.level === undefined ? {} : { level: each.level }), ...(each.condition === undefined ? {} : { condition: each.condition }),
      criterion: text, limit, ...(criterion.source === undefined ? {} : { source: criterion.source }), decideBy: criterion.decideBy ?? block.decideBy,
      verdict: 'not evaluable', because: each.because, required: true,
    }))
    return [...judged, ...missing]
  })
}

type DataAccess = Pick<AssessInput<unknown>, 'responses' | 'results' | 'observations' | 'prior'>

function dataAccess(
  request: RunRequest, measurand: Measurand, block: Block, earlier: readonly RanBlock[], noticed: Diagnostic[], read: { readonly datasets: Set<string>; readonly blocks: Set<string> },
): DataAccess {
  const { study, datasets, catalogue, putBackExcluded } = request
  // That a named dataset exists is settled when the study is read.
  const find = (name: string): { readonly dataset: Dataset; readonly source: DatasetSource } => {
    const dataset = datasets.find((each) => each.name === name)
    const source = study.datasets.find((each) => each.name === name)
    read.datasets.add(name)
    if (dataset === undefined || source === undefined) throw new Error(`${block.id} reads the dataset ${name}, which the study does not declare`)
    return { dataset, source }
  }
  const keep = (result: { readonly value: Measurements | undefined; readonly diagnostics: readonly Diagnostic[] }): Measurements | undefined => {
    noticed.push(...result.diagnostics)
    return result.value
  }
  return {
    responses(name) {
      const found = find(name)
      if (found.dataset.fields.includes('response')) return keep(independentUnits(found.dataset, found.source, measurand.id, 'response', putBackExcluded))
      noticed.push(diagnostic('assess/missing-field', `\`${block.id}\` needs responses, and dataset \`${name}\` maps no column for \`response\``, {
        place: found.source.place, expected: '`response:` under `columns:`', mend: 'Map the column that holds the response',
      }))
      return undefined
    },
    results(name) {
      const found = find(name)
      const calibrations = !found.dataset.fields.includes('response') ? [] : earlier.flatMap((ran): readonly Calibration[] => {
        const part = catalogue.find((each) => each.id === ran.block.characteristic)
        if (part?.invert === undefined || ran.detail === undefined) return []
        const { detail } = ran
        read.blocks.add(ran.block.id)
        return [{ block: ran.block.id, name: ran.block.name, invert: (response) => part.invert?.(detail, response) ?? { outside: 'below' } }]
      })
      const blank = found.source.subtractBlank === undefined ? undefined : find(found.source.subtractBlank.value)
      const blankMean = blank === undefined ? undefined : meanResponse(blank.dataset, blank.source, measurand.id, putBackExcluded)
      return keep(resultsOf({ ...found, measurand, putBackExcluded, calibrations, blankMean }))
    },
    observations(name) {
      return find(name).dataset.observations.filter((each) => each.measurand === measurand.id && (putBackExcluded || each.excluded === undefined))
    },
    prior(characteristic) {
      const before = earlier.filter((ran) => ran.block.characteristic === characteristic)
      for (const ran of before) read.blocks.add(ran.block.id)
      return before.map((ran): PriorAssessment => ({ block: ran.block.id, detail: ran.detail, findings: ran.findings, verdicts: ran.verdicts }))
    },
  }
}
