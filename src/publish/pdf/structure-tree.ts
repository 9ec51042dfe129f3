// Structure nodes → the structure tree of the PDF: every marked content and every link belongs to exactly one element, and the parent
// tree leads back from it.
import { number } from './content.ts'
import { writeObject } from './pdf-writer.ts'
import type { PdfDocument, PdfReference, PdfValue } from './pdfkit-augmented.d.ts'
import type { StructureNode } from './structure.ts'

interface Element {
  readonly node: StructureNode
  readonly reference: PdfReference
  readonly parent: PdfReference
  /** As written in the array of kids. */
  readonly children: string[]
  /** Page of its first content. */
  page: PdfReference | undefined
  /** On that page. */
  box: readonly [number, number, number, number] | undefined
}

export interface StructureTree {
  /** The key of a page in the parent tree. */
  startPage(page: PdfReference): void
  /** The number of a marked content on the current page that belongs to the node. */
  mark(node: StructureNode): number
  /** A place in the tree for a node without content of its own. */
  place(node: StructureNode): void
  /** The annotation gets its key in the parent tree. */
  annotate(node: StructureNode, annotation: PdfReference): void
  /** Bounding box in the coordinates of the page, for figures and formulas. */
  enclose(node: StructureNode, box: readonly [number, number, number, number]): void
  finish(): void
}

export function structureTree(pdf: PdfDocument): StructureTree {
  const elements = new Map<StructureNode, Element>()
  const parents: [number, PdfValue][] = []
  let marked: PdfReference[] = []
  let current: PdfReference | undefined
  let noteCount = 0
  const root = pdf.getStructTreeRoot()
  const top: PdfReference[] = []

  function nextKey(): number {
    return parents.length
  }

  function elementOf(node: StructureNode): Element {
    const known = elements.get(node)
    if (known !== undefined) return known
    const parent = node.parent === undefined ? undefined : elementOf(node.parent)
    const reference = pdf.ref()
    const made: Element = { node, reference, parent: parent?.reference ?? root, children: [], page: undefined, box: undefined }
    elements.set(node, made)
    if (parent === undefined) top.push(reference)
    else parent.children.push(`${reference.id} 0 R`)
    return made
  }

  function page(): PdfReference {
    if (current === undefined) throw new Error('marked content before the first page')
    return current
  }

  function writeElement({ node, reference, parent, children, page: first, box }: Element): void {
    const entries = [`/Type /StructElem /S /${node.role} /P ${parent.id} 0 R`]
    if (first !== undefined) entries.push(`/Pg ${first.id} 0 R`)
    if (children.length > 0) entries.push(children.length === 1 ? `/K ${children[0] ?? ''}` : `/K [${children.join(' ')}]`)
    if (node.alternative !== undefined) entries.push(`/Alt ${textString(node.alternative)}`)
    if (node.role === 'Note') entries.push(`/ID (note-${(noteCount += 1)})`)
    if (node.scope !== undefined) entries.push(`/A <</O /Table /Scope /${node.scope}>>`)
    else if (node.isPlaced === true && box !== undefined) entries.push(`/A <</O /Layout /Placement /Block /BBox [${box.map(number).join(' ')}]>>`)
    writeObject(pdf, reference, `<<${entries.join(' ')}>>`)
  }

  return {
    startPage(reference) {
      marked = []
      current = reference
      reference.data['StructParents'] = nextKey()
      reference.data['Tabs'] = 'S'
      parents.push([nextKey(), marked])
    },
    mark(node) {
      const element = elementOf(node)
      const identifier = marked.length
      marked.push(element.reference)
      element.page ??= page()
      element.children.push(element.page === page() ? String(identifier) : `<</Type /MCR /Pg ${page().id} 0 R /MCID ${identifier}>>`)
      return identifier
    },
    place(node) {
      elementOf(node)
    },
    annotate(node, annotation) {
      const element = elementOf(node)
      const key = nextKey()
      annotation.data['StructParent'] = key
      parents.push([key, element.reference])
      element.children.push(`<</Type /OBJR /Obj ${annotation.id} 0 R /Pg ${page().id} 0 R>>`)
    },
    enclose(node, box) {
      const element = elementOf(node)
      const known = element.box
      element.box = known === undefined ? box : [Math.min(known[0], box[0]), Math.min(known[1], box[1]), Math.max(known[2], box[2]), Math.max(known[3], box[3])]
    },
    finish() {
      for (const element of elements.values()) writeElement(element)
      const tree = pdf.ref({ Nums: parents.flatMap(([key, value]) => [key, value]) })
      tree.end()
      root.data['ParentTree'] = tree
      root.data['ParentTreeNextKey'] = parents.length
      root.data['K'] = top
    },
  }
}

/** UTF-16 with its mark, in hexadecimal (ISO 32000-1, 7.9.2.2). */
function textString(text: string): string {
  let hexadecimal = 'FEFF'
  for (let index = 0; index < text.length; index += 1) hexadecimal += text.charCodeAt(index).toString(16).toUpperCase().padStart(4, '0')
  return `<${hexadecimal}>`
}
