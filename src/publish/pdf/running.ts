// Header and footer of every page, the cover included: report number, revision, status, title, short digest, page n of m. Decoration
// for a screen reader, which would otherwise hear them on each page.
import type { ReportDocument } from '../../present/document.ts'
import type { FontFaces } from '../fonts.ts'
import type { Box } from './frames.ts'
import { colours, page, styles } from './style.ts'

const { running } = styles
const right = page.left + page.textWidth

export function runningBoxes(header: ReportDocument['header'], number: number, count: number, fonts: FontFaces): { readonly header: readonly Box[]; readonly footer: readonly Box[] } {
  const text = (words: string, y: number, place: { readonly left: number } | { readonly right: number }, bold = false): readonly Box[] => {
    const asked = bold ? running.bold : running.face
    let x = 'left' in place ? place.left : place.right - fonts.measure(words, asked, running.size)
    return fonts.runs(words, asked).map(({ face, text: part }): Box => {
      const width = fonts.measure(part, face, running.size)
      const box: Box = { kind: 'text', x, y, text: part, face, size: running.size, width, colour: running.colour, tag: undefined }
      x += width
      return box
    })
  }
  const head = page.headerBaseline
  const foot = page.footerBaseline
  const label = [header.number, revisionText(header.revision)].join('  ·  ')
  const pages = `page ${number} of ${count}`
  const digest = `record ${header.digest}`
  return {
    header: [
      ...text(label, head, { left: page.left }, true),
      ...text(header.status, head, { right }),
      { kind: 'rule', x: page.left, y: head + 6, toX: right, toY: head + 6, width: 0.4, colour: colours.rule },
    ],
    footer: [
      { kind: 'rule', x: page.left, y: foot - 11, toX: right, toY: foot - 11, width: 0.4, colour: colours.rule },
      ...text(fitted(header.title, 260, fonts), foot, { left: page.left }),
      ...text(digest, foot, { right: right - 78 }),
      ...text(pages, foot, { right }),
    ],
  }
}

/** `1` and `revision 1` alike. */
function revisionText(revision: string): string {
  return /^\d/.test(revision) ? `revision ${revision}` : revision
}

/** The whole title stands on the cover; here it may end in an ellipsis. */
function fitted(title: string, width: number, fonts: FontFaces): string {
  const fits = (text: string): boolean => fonts.measure(text, running.face, running.size) <= width
  if (fits(title)) return title
  const words = title.split(' ')
  while (words.length > 1 && !fits(`${words.join(' ')} …`)) words.pop()
  return `${words.join(' ')} …`
}
