// A Chart → a Drawing: the only doorway to Vega. Its canvas renderer draws on a recording context, with text measured by the
// fonts that will be printed; a fresh view for each chart, because the layout of a used one depends on what it showed before.
import * as vega from 'vega'
import { compile, type TopLevelSpec } from 'vega-lite'
import type { Chart } from '../present/document.ts'
import type { Drawing, Operation, Segment } from './drawing.ts'
import { faceFor, RecordingContext } from './recording-context.ts'
import type { MeasureText } from './fonts.ts'

/** Parsed specifications by their text: charts of one kind differ in their data only. */
const runtimes = new Map<string, vega.Runtime>()

/** Far enough inside the recorded plane that the renderer leaves nothing out. */
const margin = 2000

/** White kept round what is drawn. */
const padding = 1

export async function drawChart(chart: Chart, measure: MeasureText): Promise<Drawing> {
  const complaints: string[] = []
  const logger = complainingLogger(complaints)
  measureTextWith(measure)
  const view = new vega.View(runtimeOf(chart.specification, logger), { renderer: 'none', logger, expr: expressions, locale: numberLocale as unknown as vega.LocaleFormatters })
  for (const [name, rows] of Object.entries(chart.data)) view.data(name, rows.map((row) => checkedCopy(name, row)))
  await view.runAsync()
  const context = new RecordingContext(measure)
  const renderer = new untyped.CanvasRenderer()
  renderer.initialize(null, 2 * margin, 2 * margin, [margin, margin], 1, { externalContext: context })
  renderer.render((view.scenegraph() as unknown as { readonly root: unknown }).root)
  view.finalize()
  if (complaints.length > 0) throw new Error(`the chart library complains: ${complaints.join('; ')}`)
  return framed(context.operations, frameOf(chart.specification))
}

/** A copy, because Vega marks the rows that it takes in. It also takes a number that is none for zero, so that is refused here. */
function checkedCopy(name: string, row: Readonly<Record<string, unknown>>): Record<string, unknown> {
  for (const [field, value] of Object.entries(row)) if (typeof value === 'number' && !Number.isFinite(value)) throw new Error(`the chart has a point without a place: ${field} of ${name} is ${value}`)
  return { ...row }
}

/** Members of Vega that its types do not know. */
const untyped = vega as unknown as {
  readonly textMetrics: { width: (item: TextItem, text: unknown) => number }
  readonly Dataflow: new () => object
  readonly runtimeContext: (dataflow: object, transforms: object, functions: object, expressions: undefined) => { readonly expr: Readonly<Record<'operator' | 'parameter' | 'encode', (context: object, expression: object) => ExpressionFunction>> }
  readonly CanvasRenderer: new () => {
    initialize(element: null, width: number, height: number, origin: readonly [number, number], scale: number, options: { readonly externalContext: RecordingContext }): void
    render(root: unknown): void
  }
}

/** What Vega makes of an expression of a specification; the views of one runtime share it, as compiling is dear. */
const compiled = new WeakMap<object, ExpressionFunction>()

function shared(compile: (context: object, expression: object) => ExpressionFunction): (context: { readonly functions?: unknown }, expression: object) => ExpressionFunction {
  return (context, expression) => {
    const known = compiled.get(expression) ?? compile({}, expression)
    compiled.set(expression, known)
    return known.bind(context.functions) as ExpressionFunction
  }
}

type ExpressionFunction = (...given: readonly unknown[]) => unknown

const plain = untyped.runtimeContext(new untyped.Dataflow(), {}, {}, undefined).expr
const expressions = { ...plain, operator: shared(plain.operator), parameter: shared(plain.parameter), encode: shared(plain.encode) }

/** Decimal point and thin spaces, as in the tables: no comma that could be read as a decimal one. */
const numberLocale = { number: { decimal: '.', thousands: '\u2009', grouping: [3], currency: ['', ''], minus: '\u2212' } }

function runtimeOf(specification: Chart['specification'], logger: vega.LoggerInterface): vega.Runtime {
  const text = JSON.stringify(specification)
  const known = runtimes.get(text)
  if (known !== undefined) return known
  const compiled = compile(JSON.parse(text) as TopLevelSpec, { logger: logger as never })
  const runtime = vega.parse(compiled.spec)
  runtimes.set(text, runtime)
  return runtime
}

function complainingLogger(complaints: string[]): vega.LoggerInterface {
  const complain = (...words: readonly unknown[]): typeof logger => {
    complaints.push(words.map((word) => (word instanceof Error ? word.message : String(word))).join(' '))
    return logger
  }
  const quiet = (): typeof logger => logger
  const logger = { level: () => logger, error: complain, warn: complain, info: quiet, debug: quiet } as unknown as vega.LoggerInterface
  return logger
}

/** Vega asks this hook for every width; without it, it guesses from the number of characters. */
function measureTextWith(measure: MeasureText): void {
  untyped.textMetrics.width = (item, text) => (text === null || text === undefined ? 0 : measure(String(text).trim(), faceFor(item.font ?? '', item.fontWeight === 'bold' || Number(item.fontWeight) >= 600, item.fontStyle === 'italic'), item.fontSize ?? 11))
}

interface TextItem {
  readonly font?: string
  readonly fontSize?: number
  readonly fontWeight?: string | number
  readonly fontStyle?: string
}

interface Frame {
  /** Distance of the plot's left side from the left side of the drawing. */
  readonly left: number
  readonly width: number
}

/** The house style says where the plot stands, so that the axes of charts below one another align. */
function frameOf(specification: Chart['specification']): Frame | undefined {
  const meta = specification['usermeta'] as { readonly frame?: Frame } | undefined
  return meta?.frame
}

interface Bounds {
  left: number
  top: number
  right: number
  bottom: number
}

/** Moves everything so that it lies inside the drawing, whose size takes in all that is drawn. */
function framed(operations: readonly Operation[], frame: Frame | undefined): Drawing {
  const bounds: Bounds = frame === undefined
    ? { left: Infinity, top: Infinity, right: -Infinity, bottom: -Infinity }
    : { left: margin - frame.left, top: Infinity, right: margin - frame.left + frame.width, bottom: -Infinity }
  for (const operation of operations) extend(bounds, operation)
  if (bounds.bottom < bounds.top) throw new Error('the chart draws nothing')
  const held = frame === undefined ? padding : 0
  const [x, y] = [held - bounds.left, padding - bounds.top]
  return { width: rounded(bounds.right - bounds.left + 2 * held), height: rounded(bounds.bottom - bounds.top + 2 * padding), operations: operations.flatMap((operation) => moved(operation, x, y)) }
}

function extend(bounds: Bounds, operation: Operation): void {
  const include = (x: number, y: number, reach: number): void => {
    bounds.left = Math.min(bounds.left, x - reach)
    bounds.right = Math.max(bounds.right, x + reach)
    bounds.top = Math.min(bounds.top, y - reach)
    bounds.bottom = Math.max(bounds.bottom, y + reach)
  }
  if (operation.kind === 'text') {
    for (const [x, y] of textCorners(operation)) include(x, y, 0)
    return
  }
  // What a clip path hides needs no room, and what it shows lies inside it.
  const reach = operation.kind === 'path' && operation.stroke !== undefined ? operation.stroke.width / 2 : 0
  for (const segment of operation.segments) for (let index = 1; index < segment.length; index += 2) include(segment[index] as number, segment[index + 1] as number, reach)
}

/** Corners of the box that a text fills, from the top of its tallest letter to the foot of its deepest. */
export function textCorners({ x, y, size, width, rotation }: { readonly x: number; readonly y: number; readonly size: number; readonly width: number; readonly rotation: number }): readonly (readonly [number, number])[] {
  const [cos, sin] = [Math.cos((rotation * Math.PI) / 180), Math.sin((rotation * Math.PI) / 180)]
  return ([[0, -0.76 * size], [width, -0.76 * size], [width, 0.22 * size], [0, 0.22 * size]] as const).map(([along, down]) => [x + along * cos - down * sin, y + along * sin + down * cos] as const)
}

function moved(operation: Operation, x: number, y: number): readonly Operation[] {
  if (operation.kind === 'text') return [{ ...operation, x: rounded(operation.x + x), y: rounded(operation.y + y), rotation: rounded(operation.rotation), width: rounded(operation.width), paint: { ...operation.paint, opacity: rounded(operation.paint.opacity) } }]
  const segments = operation.segments.map((segment) => segment.map((each, index) => (typeof each === 'string' ? each : rounded(each + (index % 2 === 1 ? x : y)))) as unknown as Segment)
  if (operation.kind === 'path') return [{ ...operation, segments }]
  const operations = operation.operations.flatMap((each) => moved(each, x, y))
  return operations.length === 0 ? [] : [{ ...operation, segments, operations }]
}

/** To a hundredth of a point: finer than any printer, coarse enough to be the same on every processor. */
function rounded(value: number): number {
  return Math.round(value * 100) / 100 + 0
}
