// The logical tree of the document (headings, paragraphs, tables …) that a screen reader follows. A node joins its parent when its
// first content is drawn, so the reading order is the drawing order; what carries no node is decoration.

export type StructureRole =
  | 'Document' | 'H1' | 'H2' | 'H3' | 'P' | 'Div' | 'BlockQuote' | 'Code' | 'TOC' | 'TOCI' | 'L' | 'LI' | 'Lbl' | 'LBody'
  | 'Table' | 'Caption' | 'THead' | 'TBody' | 'TR' | 'TH' | 'TD' | 'Figure' | 'Formula' | 'Link' | 'Note'

export interface StructureNode {
  readonly role: StructureRole
  readonly parent: StructureNode | undefined
  /** What a reader that cannot see hears instead. */
  readonly alternative?: string
  readonly scope?: 'Row' | 'Column'
  /** Figures and formulas say where they stand. */
  readonly isPlaced?: true
}

export function node(role: StructureRole, parent: StructureNode | undefined, properties: Pick<StructureNode, 'alternative' | 'scope' | 'isPlaced'> = {}): StructureNode {
  return { role, parent, ...properties }
}

export function rolePath(tag: StructureNode): string {
  return tag.parent === undefined ? tag.role : `${rolePath(tag.parent)}/${tag.role}`
}
