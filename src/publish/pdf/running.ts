// Header and footer of every page, the cover included: report number, revision, status, title, short digest, page n of m. Decoration
// for a screen reader, which would otherwise hear them on each page.
import type { ReportDocument } from '../../present/document.ts'
import type { Box } from './frames.ts'
import type { Shaping } from './shaping.ts'
import { colours, page, styles } from './style.ts'

const { running } = styles
const right = page.left + page.textWidth

export function runningBoxes(header: ReportDocument['header'], number: number, count: number, shaping: Shaping): { readonly header: readonly Box[]; readonly footer: readonly Box[] } {
  const text = (words: string, y: number, place: { readonly left: number } | { readonly right: number }, look: { readonly bold?: true; readonly colour?: string } = {}): readonly Box[] => {
    const asked = look.bold === true ? running.bold : running.face
    let x = 'left' in place ? place.left : place.right - shaping.width(words, asked, running.size)
    return shaping.fonts.runs(words, asked).map(({ face, text: part }): Box => {
      const width = shaping.width(part, face, running.size)
      const box: Box = { kind: 'text', x, y, text: part, face, size: running.size, width, colour: look.colour ?? running.colour, tag: undefined }
      x += width
      return box
    })
  }
  const head = page.headerBaseline
  const isDraft = /^draft/i.test(header.status)
  const foot = page.footerBaseline
  const label = [header.number, revisionText(header.revision)].join('  ·  ')
  const pages = `page ${number} of ${count}`
  const digest = `record ${header.digest}`
  return {
    header: [
      ...text(label, head, { left: page.left }, { bold: true }),
      ...text(header.status, head, { right }, isDraft ? { bold: true, colour: colours.undecided } : {}),
      { kind: 'rule', x: page.left, y: head + 6, toX: right, toY: head + 6, width: 0.4, colour: colours.rule },
    ],
    footer: [
      { kind: 'rule', x: page.left, y: foot - 11, toX: right, toY: foot - 11, width: 0.4, colour: colours.rule },
      ...text(fitted(header.title, 260, shaping), foot, { left: page.left }),
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
function fitted(title: string, width: number, shaping: Shaping): string {
  const fits = (text: string): boolean => shaping.width(text, running.face, running.size) <= width
  if (fits(title)) return title
  const words = title.split(' ')
  while (words.length > 1 && !fits(`${words.join(' ')} …`)) words.pop()
  return `${words.join(' ')} …`
}
