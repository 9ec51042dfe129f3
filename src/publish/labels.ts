// Words that the publisher itself puts beside the text of a report, the same in every output.
import type { SectionHeading } from '../present/document.ts'

/** Above the user's own words. */
export const userLabel = 'Stated by the laboratory'

/** `3.1`, `Annex A`; empty for a heading without a number. */
export function headingLabel(heading: SectionHeading): string {
  if (heading.number === undefined) return ''
  return heading.annex === true && heading.depth === 1 ? `Annex ${heading.number}` : heading.number
}
