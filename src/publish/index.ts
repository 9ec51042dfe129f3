// A report → everything that is read of it: PDF, Markdown, tables as CSV, charts as SVG. Each chart is drawn once and serves both the
// PDF and its own file. Touches no disk: fonts and colour profile come as bytes.
import type { ExhibitFigure, ExhibitTable, ReportDocument } from '../present/document.ts'
import { drawChart } from './chart.ts'
import type { Drawing } from './drawing.ts'
import { type FaceName, loadFonts } from './fonts.ts'
import { publishMarkdown } from './markdown.ts'
import type { Attachment } from './pdf/attachments.ts'
import { publishPdf } from './pdf/publish-pdf.ts'
import { shaping } from './pdf/shaping.ts'
import { plainInline } from './plain-inline.ts'
import { drawingToSvg } from './svg.ts'
import { tableToCsv } from './tables-csv.ts'

export type { Attachment } from './pdf/attachments.ts'

export interface PublishOptions {
  readonly fontBytes: Readonly<Record<FaceName, Uint8Array>>
  readonly colourProfile: Uint8Array
  /** Files for the PDF to carry, made from the other outputs so that a manifest can list them. */
  attachments(published: Omit<Published, 'pdf'>): readonly Attachment[]
}

export interface Published {
  readonly pdf: Uint8Array
  readonly markdown: string
  /** Id of the table → CSV. */
  readonly tables: ReadonlyMap<string, string>
  /** Id of the figure → SVG. */
  readonly charts: ReadonlyMap<string, string>
}

export async function publish(document: ReportDocument, options: PublishOptions): Promise<Published> {
  const fonts = loadFonts(options.fontBytes)
  const figures = document.blocks.filter((block): block is ExhibitFigure => block.type === 'exhibitFigure')
  const drawings = new Map<string, Drawing>()
  // Text of charts is measured as the pages set it: word by word, with what was learnt of each pair of letters.
  const { width } = shaping(fonts)
  for (const figure of figures) drawings.set(figure.id, await drawChart(figure.chart, width))
  const charts = new Map(figures.map((figure) => [figure.id, drawingToSvg(drawingOf(figure.id), { title: plainInline(figure.caption), description: figure.alternative })]))
  const tables = new Map(document.blocks.filter((block): block is ExhibitTable => block.type === 'exhibitTable').map((table) => [table.id, tableToCsv(table)]))
  const markdown = publishMarkdown(document, { chartPath: (id) => `charts/${id}.svg`, tablePath: (id) => `tables/${id}.csv` })
  const pdf = publishPdf({ document, drawings, fonts, attachments: options.attachments({ markdown, tables, charts }), colourProfile: options.colourProfile })
  return { pdf, markdown, tables, charts }

  function drawingOf(id: string): Drawing {
    const drawing = drawings.get(id)
    if (drawing === undefined) throw new Error(`figure ${id} was not drawn`)
    return drawing
  }
}
