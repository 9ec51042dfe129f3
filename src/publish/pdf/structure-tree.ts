// Structure nodes → the structure tree of the PDF: every marked content and every link belongs to exactly one element, and the parent
// tree leads back from it.
import type { PdfDictionary, PdfDocument, PdfReference, PdfValue } from './pdfkit-augmented.d.ts'
import type { StructureNode } from './structure.ts'

interface Element {
  readonly node: StructureNode
  readonly reference: PdfReference
  readonly children: PdfValue[]
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
    const reference = pdf.ref({ Type: 'StructElem', S: node.role, P: parent?.reference ?? root })
    const made: Element = { node, reference, children: [], page: undefined, box: undefined }
    elements.set(node, made)
    if (parent === undefined) top.push(reference)
    else parent.children.push(reference)
    return made
  }

  function page(): PdfReference {
    if (current === undefined) throw new Error('marked content before the first page')
    return current
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
      const number = marked.length
      marked.push(element.reference)
      element.page ??= page()
      element.children.push(element.page === page() ? number : { Type: 'MCR', Pg: page(), MCID: number })
      return number
    },
    place(node) {
      elementOf(node)
    },
    annotate(node, annotation) {
      const element = elementOf(node)
      const key = nextKey()
      annotation.data['StructParent'] = key
      parents.push([key, element.reference])
      element.children.push({ Type: 'OBJR', Obj: annotation, Pg: page() })
    },
    enclose(node, box) {
      const element = elementOf(node)
      const known = element.box
      element.box = known === undefined ? box : [Math.min(known[0], box[0]), Math.min(known[1], box[1]), Math.max(known[2], box[2]), Math.max(known[3], box[3])]
    },
    finish() {
      for (const { node, reference, children, page: first, box } of elements.values()) {
        const { data } = reference
        if (first !== undefined) data['Pg'] = first
        const [only] = children
        if (children.length > 0) data['K'] = children.length === 1 && only !== undefined ? only : children
        if (node.alternative !== undefined) data['Alt'] = new String(node.alternative)
        if (node.role === 'Note') data['ID'] = new String(`note-${(noteCount += 1)}`)
        const attributes = attributesOf(node, box)
        if (attributes !== undefined) data['A'] = attributes
        reference.end()
      }
      const tree = pdf.ref({ Nums: parents.flatMap(([key, value]) => [key, value]) })
      tree.end()
      root.data['ParentTree'] = tree
      root.data['ParentTreeNextKey'] = parents.length
      root.data['K'] = top
    },
  }
}

function attributesOf(node: StructureNode, box: Element['box']): PdfDictionary | undefined {
  if (node.scope !== undefined) return { O: 'Table', Scope: node.scope }
  if (node.isPlaced === true && box !== undefined) return { O: 'Layout', Placement: 'Block', BBox: [...box] }
  return undefined
}
