// Headings → bookmarks, nested by their depth; sections are open to their first level.
import type { OutlineEntry } from './frames.ts'
import type { PdfDocument, PdfReference } from './pdfkit-augmented.d.ts'

interface Item {
  readonly entry: OutlineEntry
  readonly reference: PdfReference
  readonly children: Item[]
}

/** Where on which page something stands. */
export interface Destination {
  readonly page: PdfReference
  /** From the foot of the page. */
  readonly y: number
}

export function writeOutline(pdf: PdfDocument, entries: readonly OutlineEntry[], destinations: ReadonlyMap<string, Destination>): void {
  if (entries.length === 0) return
  const root = pdf.ref({ Type: 'Outlines' })
  const top: Item[] = []
  const path: Item[] = []
  for (const entry of entries) {
    const destination = destinations.get(entry.id)
    if (destination === undefined) throw new Error(`bookmark ${entry.title} points nowhere`)
    while ((path.at(-1)?.entry.depth ?? 0) >= entry.depth) path.pop()
    const item: Item = { entry, children: [], reference: pdf.ref({ Title: new String(entry.title), Dest: [destination.page, 'XYZ', null, destination.y, null] }) }
    ;(path.at(-1)?.children ?? top).push(item)
    path.push(item)
  }
  link(top, root)
  root.data['Count'] = top.length
  root.end()
  pdf._root.data['Outlines'] = root
  pdf._root.data['PageMode'] = 'UseOutlines'
}

function link(items: readonly Item[], parent: PdfReference): void {
  const first = items[0]
  const last = items.at(-1)
  if (first === undefined || last === undefined) return
  parent.data['First'] = first.reference
  parent.data['Last'] = last.reference
  items.forEach((item, index) => {
    const { data } = item.reference
    data['Parent'] = parent
    const before = items[index - 1]
    const after = items[index + 1]
    if (before !== undefined) data['Prev'] = before.reference
    if (after !== undefined) data['Next'] = after.reference
    // Closed: the count of what it hides, negative (ISO 32000-1, table 153).
    if (item.children.length > 0) data['Count'] = -item.children.length
    link(item.children, item.reference)
    item.reference.end()
  })
}
