// A made-up report with every kind of block, for tests of layout: numbers in it mean nothing.
import type { Text } from 'mdast'
import type { ExhibitRow, ExhibitTable, NumberNode, ReportBlock, ReportDocument } from '../../src/present/document.ts'
import type { Drawing } from '../../src/publish/drawing.ts'

export const text = (value: string): Text => ({ type: 'text', value })
export const number = (value: number, printed = String(value).replace('-', '\u2212')): NumberNode => ({ type: 'number', value, text: printed })

/** Values of a plain congruential sequence: the same on every machine. */
export function sequence(seed: number): () => number {
  let state = seed
  return () => {
    state = (state * 1103515245 + 12345) % 2147483648
    return state / 2147483648
  }
}

const filler = 'The response was measured for every prepared level, each preparation being worked up on its own, and the values were taken over as the instrument wrote them.'

export function levelTable(id: string, groups: number, rowsPerGroup: number): ExhibitTable {
  const next = sequence(groups * 31 + rowsPerGroup)
  return {
    type: 'exhibitTable', id, number: '1', caption: [text('Back-calculated levels of '), { type: 'emphasis', children: [text('measurand one')] }, text(' by run; every value stands in the attached record')],
    columns: [
      { header: 'Run', align: 'text', rowHeader: true }, { header: 'Nominal level', unit: 'mg/L', align: 'number' }, { header: 'Response', unit: 'µS·min', align: 'number' },
      { header: 'Found', unit: 'mg/L', align: 'number' }, { header: 'Error', unit: '%', align: 'number' }, { header: 'Remark', align: 'text' },
    ],
    groups: Array.from({ length: groups }, (_, group) => Array.from({ length: rowsPerGroup }, (__, index): ExhibitRow => {
      const level = [0.1, 0.5, 2, 10, 50][group % 5] ?? 1
      const error = Math.round((next() - 0.5) * 1000) / 100
      const row: ExhibitRow = { cells: [[text(`run ${group + 1}-${index + 1}`)], [number(level)], [number(Math.round(level * 12345 * (1 + error / 100)) / 1000)], [number(Math.round(level * (100 + error)) / 100)], [number(error)], index === 1 ? [text('air bubble in the loop, vial repeated')] : []] }
      return index === 1 && group === 1 ? { ...row, tone: 'excluded' } : row
    })),
    notes: [[text('Found = inverse prediction by the line of the same run.')], [text('The excluded value is shown and was left out of the fit.')]],
  }
}

const conformity: ExhibitTable = {
  type: 'exhibitTable', id: 'conformity', number: '2', caption: [text('Conformity with the acceptance criteria')],
  columns: ['Measurand', 'Criterion', 'Limit', 'Source', 'Result', 'Verdict', 'Page'].map((header, index) => ({ header, align: 'text' as const, ...(index === 0 ? { rowHeader: true as const } : {}) })),
  groups: [
    [
      { cells: [[text('measurand one')], [text('linearity: largest back-calculated error')], [text('at most 15 %')], [text('QP-7, section 3')], [number(4.21), text(' %')], [{ type: 'verdict', word: 'meets' }], [{ type: 'pageReference', target: 'linearity' }]] },
      { cells: [[text('measurand one')], [text('precision: relative standard deviation of repeatability')], [text('at most 5 %')], [text('not stated')], [number(6.02), text(' %')], [{ type: 'verdict', word: 'misses' }], [{ type: 'pageReference', target: 'precision' }]] },
    ],
    [{ cells: [[text('measurand two')], [text('detection: detection limit')], [text('at most 0.05 mg/L')], [text('QP-7, section 5')], [text('no blanks')], [{ type: 'verdict', word: 'not evaluable' }], [{ type: 'pageReference', target: 'precision' }]] }],
    [{ cells: [[text('all')], [text('robustness: covered by an earlier development study')], [], [], [], [{ type: 'verdict', word: 'not performed' }], []] }],
  ],
  notes: [],
}

const wide: ExhibitTable = {
  type: 'exhibitTable', id: 'wide', number: '3', caption: [text('A table with more columns than a page is wide')],
  columns: [{ header: 'Preparation', align: 'text', rowHeader: true }, ...Array.from({ length: 24 }, (_, index) => ({ header: `Day ${index + 1}`, unit: 'mg/L', align: 'number' as const }))],
  groups: [Array.from({ length: 6 }, (_, row) => ({ cells: [[text(`preparation ${row + 1}`)], ...Array.from({ length: 24 }, (__, column) => [number(1000 + row * 24 + column + 0.125)])] }))],
  notes: [[text('Each part repeats the first column.')]],
}

const longCell: ExhibitTable = {
  type: 'exhibitTable', id: 'long-cell', number: '4', caption: [text('A row taller than a page')],
  columns: [{ header: 'Item', align: 'text', rowHeader: true }, { header: 'Text', align: 'text' }, { header: 'Digest', align: 'text' }],
  groups: [[
    { cells: [[text('short')], [text('one line')], [{ type: 'inlineCode', value: 'a3'.repeat(32) }]] },
    { cells: [[text('long')], [text(`${filler} `.repeat(60).trim())], []] },
    { cells: [[text('total')], [text('two rows')], []], tone: 'total' },
  ]],
  notes: [],
}

const paragraph = (value: string, origin: 'program' | 'user' = 'program'): ReportBlock => ({ type: 'textBlock', origin, children: [text(value)] })

const blocks: readonly ReportBlock[] = [
  {
    type: 'cover', organisation: 'Example laboratory', title: 'Two measurands in process water & <other> matrices by a separation technique', subtitle: 'Report of a full validation of an analytical method',
    facts: [
      { label: 'Report', text: 'EX-VR-001' }, { label: 'Revision', text: '1' }, { label: 'Date', text: '2026-04-17' }, { label: 'Method', text: 'EX-M-031, revision 4' },
      { label: 'Status', text: 'draft: 2 open items' }, { label: 'Record digest', text: `SHA-256 ${'0123456789abcdef'.repeat(4)}` },
    ],
    overall: { type: 'verdict', word: 'misses' }, overallSentence: [text('At least one criterion is missed. Of '), number(4), text(' decisions '), number(1), text(' meets.')],
  },
  {
    type: 'signOff',
    people: [
      { role: 'prepared', meaning: 'Prepared: the data and their evaluation are complete and correct', name: 'A. Author', position: 'Analyst' },
      { role: 'reviewed', meaning: 'Reviewed: the report was checked against the data and the plan', name: 'B. Reviewer', position: 'Statistician' },
      { role: 'approved', meaning: 'Approved: the statement of fitness for the intended use is adopted', name: 'C. Approver', position: 'Head of quality' },
    ],
    note: [text('Signatures refer to the record with the digest printed on the cover.')],
  },
  { type: 'pageBreak' },
  { type: 'contents', title: 'Contents' },
  { type: 'sectionHeading', id: 'summary', depth: 1, number: '1', children: [text('Summary')] },
  { type: 'textBlock', origin: 'program', children: [{ type: 'verdict', word: 'misses' }, text('. See '), { type: 'reference', target: 'conformity', text: 'Table 2' }, text(' and '), { type: 'reference', target: 'figure-line', text: 'Figure 1' }, text(`. ${filler}`)] },
  conformity,
  { type: 'sectionHeading', id: 'linearity', depth: 1, number: '2', children: [text('Linearity and working range')] },
  { type: 'sectionHeading', id: 'linearity-one', depth: 2, number: '2.1', children: [text('Measurand one')] },
  {
    type: 'textBlock', origin: 'program',
    children: [
      text('The slope is '), number(12.345), text(' µS·min·L/mg with a standard uncertainty '), { type: 'emphasis', children: [text('s')] }, { type: 'subscript', children: [text('b')] }, text(' of '), number(0.0123),
      text(' µS·min·L/mg; the intercept is '), number(-1.2e-5, '\u22121.2 × 10⁻⁵'), text(` µS·min. ${filler} ${filler}`),
    ],
  },
  { type: 'formula', children: [{ type: 'emphasis', children: [text('s')] }, { type: 'subscript', children: [text('y/x')] }, text(' = √( ∑ ('), { type: 'emphasis', children: [text('y')] }, { type: 'subscript', children: [text('i')] }, text(' − ŷ'), { type: 'subscript', children: [text('i')] }, text(')² / ('), { type: 'emphasis', children: [text('n')] }, text(' − 2) )')], words: 'residual standard deviation: square root of the sum of squared residuals divided by n minus 2' },
  { type: 'exhibitFigure', id: 'figure-line', number: '1', caption: [text('Response against level, with the fitted line')], alternative: 'Sixteen points close to a rising straight line', chart: { specification: {}, data: {} } },
  { type: 'exhibitFigure', id: 'figure-half-1', number: '2', caption: [text('Residuals against level')], alternative: 'Residuals without pattern', chart: { specification: {}, data: {} } },
  { type: 'exhibitFigure', id: 'figure-half-2', number: '3', caption: [text('Relative errors against level, within the limits of the criterion at every level')], alternative: 'Relative errors within limits', chart: { specification: {}, data: {} } },
  levelTable('levels', 5, 14),
  paragraph('The laboratory accepts the lowest level because blanks were clean on each day of the study.', 'user'),
  paragraph('A second statement follows the first without its label.', 'user'),
  { type: 'sectionHeading', id: 'precision', depth: 1, number: '3', children: [text('Precision')] },
  { type: 'sectionHeading', id: 'precision-detail', depth: 3, number: '3.0.1', children: [text('Detail of the design')] },
  {
    type: 'list', ordered: false, spread: false,
    children: ['first item', `second item: ${filler}`].map((value) => ({ type: 'listItem', spread: false, children: [{ type: 'paragraph', children: [{ type: 'text', value }] }] })),
  },
  { type: 'code', value: 'weights: 1/x^2\nfit: straight line' },
  { type: 'blockquote', children: [{ type: 'paragraph', children: [{ type: 'text', value: filler }] }] },
  { type: 'thematicBreak' },
  ...Array.from({ length: 9 }, (_, index) => paragraph(`Paragraph ${index + 1}. ${`${filler} `.repeat(3)}`.trim())),
  wide,
  longCell,
  { type: 'sectionHeading', id: 'annex-rows', depth: 1, number: 'A', annex: true, children: [text('Raw data')] },
  { ...levelTable('raw', 4, 30), number: '5', caption: [text('Rows as read')] },
]

export const sampleDocument: ReportDocument = {
  type: 'report', language: 'en', title: 'Two measurands in process water & <other> matrices by a separation technique', date: '2026-04-17', authors: ['A. Author', 'B. Reviewer'], subject: 'Method validation report',
  header: { number: 'EX-VR-001', revision: 'revision 1', status: 'draft', title: 'Two measurands in process water & <other> matrices by a separation technique', digest: '0123456789ab' },
  blocks,
}

/** A frame, a line, a translucent area and a turned text of the given size. */
export function plainDrawing(width: number, height: number): Drawing {
  const ink = { colour: '#1b2430', opacity: 1 }
  return {
    width, height,
    operations: [
      { kind: 'path', segments: [['M', 30, 5], ['L', width - 5, 5], ['L', width - 5, height - 25], ['L', 30, height - 25], ['Z']], stroke: { ...ink, width: 0.5, cap: 'butt', join: 'miter', dash: [] } },
      { kind: 'clip', segments: [['M', 30, 5], ['L', width - 5, 5], ['L', width - 5, height - 25], ['L', 30, height - 25], ['Z']], operations: [{ kind: 'path', segments: [['M', 0, height], ['C', width / 3, height / 2, width / 2, height / 3, width, 0]], stroke: { colour: '#1d4f63', opacity: 1, width: 1.2, cap: 'round', join: 'round', dash: [4, 2] } }] },
      { kind: 'path', segments: [['M', 60, 40], ['L', 110, 40], ['L', 110, 60], ['L', 60, 60], ['Z']], fill: { colour: '#a4262c', opacity: 0.3 } },
      { kind: 'text', text: 'Response', face: 'sans', size: 8, paint: ink, x: 20, y: height / 2 + 15, rotation: -90, width: 34 },
      { kind: 'text', text: 'Level in mg/L', face: 'sans', size: 8, paint: ink, x: width / 2 - 20, y: height - 8, rotation: 0, width: 48 },
    ],
  }
}

export const sampleDrawings: ReadonlyMap<string, Drawing> = new Map([['figure-line', plainDrawing(440, 240)], ['figure-half-1', plainDrawing(226, 160)], ['figure-half-2', plainDrawing(226, 160)]])
