// Frames → the bytes of a PDF. Nothing is laid out here; what is drawn for a node of the logical tree is marked as its content, all
// else as artifact.
import type { FontFaces } from '../fonts.ts'
import { attach, type Attachment } from './attachments.ts'
import { Content, type ContentResources } from './content.ts'
import { fontResources } from './font-resources.ts'
import type { Box, Frames, LinkBox } from './frames.ts'
import { type Destination, writeOutline } from './outline.ts'
import { openPdf, type PdfWriterInput } from './pdf-writer.ts'
import type { PdfDictionary, PdfDocument, PdfReference } from './pdfkit-augmented.d.ts'
import { type StructureTree, structureTree } from './structure-tree.ts'
import type { StructureNode } from './structure.ts'
import { page } from './style.ts'

export interface DrawInput extends PdfWriterInput {
  readonly fonts: FontFaces
  readonly attachments: readonly Attachment[]
}

export function draw(frames: Frames, input: DrawInput): Uint8Array {
  const { pdf, finish } = openPdf(input)
  const pages = frames.pages.map(() => pdf.addPage().page)
  const destinations = new Map<string, Destination>()
  frames.pages.forEach(({ boxes }, index) => {
    const dictionary = pages[index]?.dictionary
    if (dictionary === undefined) return
    for (const box of boxes) if (box.kind === 'anchor' && box.id !== '') destinations.set(box.id, { page: dictionary, y: page.height - box.y + 6 })
  })
  const tree = structureTree(pdf)
  const opacities = opacityStates(pdf)
  const fonts = fontResources(pdf, input.fonts)
  frames.pages.forEach((frame, index) => {
    const target = pages[index]
    if (target === undefined) return
    tree.startPage(target.dictionary)
    const content = new Content(page.height, { fonts, opacity: opacities.name })
    // The writer starts each page upside down; the same matrix again sets it upright.
    content.write(`1 0 0 -1 0 ${page.height} cm`)
    drawArtifacts(frame.header, 'Header', content)
    const annotations = drawBody(frame.boxes, content, tree, pdf, destinations)
    drawArtifacts(frame.footer, 'Footer', content)
    target.content.write(content.bytes())
    if (annotations.length > 0) target.dictionary.data['Annots'] = annotations
    for (const [name, font] of fonts.taken()) target.fonts[name] = font
    for (const [name, state] of opacities.taken()) target.ext_gstates[name] = state
  })
  writeOutline(pdf, frames.outline, destinations)
  attach(pdf, input.attachments, pdf.info.CreationDate)
  pdf._root.data['PageLabels'] = { Nums: [0, { S: 'D' }] }
  tree.finish()
  return finish()
}

function drawArtifacts(boxes: readonly Box[], subtype: 'Header' | 'Footer', content: Content): void {
  content.write(`/Artifact <</Type /Pagination /Subtype /${subtype}>> BDC`)
  for (const box of boxes) drawBox(box, content)
  content.write('EMC')
}

function drawBody(boxes: readonly Box[], content: Content, tree: StructureTree, pdf: PdfDocument, destinations: ReadonlyMap<string, Destination>): readonly PdfReference[] {
  const annotations: PdfReference[] = []
  let open: StructureNode | 'artifact' | undefined
  const change = (next: StructureNode | 'artifact' | undefined): void => {
    if (next === open) return
    if (open !== undefined) content.write('EMC')
    open = next
    if (next === 'artifact') content.write('/Artifact BMC')
    else if (next !== undefined) content.write(`/${next.role} <</MCID ${tree.mark(next)}>> BDC`)
  }
  for (const box of boxes) {
    switch (box.kind) {
      case 'anchor': break
      case 'structure':
        tree.place(box.tag)
        break
      case 'link': {
        const annotation = linkAnnotation(box, pdf, destinations)
        tree.annotate(box.tag, annotation)
        annotation.end()
        annotations.push(annotation)
        break
      }
      case 'rule': case 'panel':
        change('artifact')
        drawBox(box, content)
        break
      default:
        change(box.tag ?? 'artifact')
        drawBox(box, content)
        if (box.tag !== undefined) encloseBox(box, tree)
    }
  }
  change(undefined)
  return annotations
}

function drawBox(box: Box, content: Content): void {
  switch (box.kind) {
    case 'text': return content.text(box)
    case 'rule': return content.rule(box)
    case 'panel': return content.panel(box)
    case 'drawing': return content.drawing(box)
    default:
  }
}

function encloseBox(box: Extract<Box, { kind: 'text' | 'drawing' }>, tree: StructureTree): void {
  if (box.tag?.isPlaced !== true) return
  const corners = box.kind === 'drawing'
    ? [box.x, page.height - box.y - box.drawing.height * box.scale, box.x + box.drawing.width * box.scale, page.height - box.y] as const
    : [box.x, page.height - box.y - box.size * 0.3, box.x + box.width, page.height - box.y + box.size] as const
  tree.enclose(box.tag, corners)
}

function linkAnnotation(box: LinkBox, pdf: PdfDocument, destinations: ReadonlyMap<string, Destination>): PdfReference {
  const y = page.height - box.y
  const common: PdfDictionary = { Type: 'Annot', Subtype: 'Link', Rect: [box.x, y - box.height, box.x + box.width, y], Border: [0, 0, 0], F: 4, Contents: new String(box.words) }
  if (box.target.kind === 'address') return pdf.ref({ ...common, A: { S: 'URI', URI: new String(box.target.url) } })
  const destination = destinations.get(box.target.id)
  if (destination === undefined) throw new Error(`a link points to ${box.target.id}, which the report does not hold`)
  return pdf.ref({ ...common, Dest: [destination.page, 'XYZ', null, destination.y, null] })
}

function opacityStates(pdf: PdfDocument): { readonly name: ContentResources['opacity']; taken(): ReadonlyMap<string, PdfReference> } {
  const states = new Map<string, { readonly name: string; readonly reference: PdfReference }>()
  let used = new Map<string, PdfReference>()
  return {
    name(fill, stroke) {
      if (fill >= 1 && stroke >= 1) return undefined
      const key = `${fill} ${stroke}`
      let state = states.get(key)
      if (state === undefined) {
        state = { name: `G${states.size + 1}`, reference: pdf.ref({ Type: 'ExtGState', ca: fill, CA: stroke }) }
        state.reference.end()
        states.set(key, state)
      }
      used.set(state.name, state.reference)
      return state.name
    },
    taken() {
      const taken = used
      used = new Map()
      return taken
    },
  }
}
