// Labels of points and lines → offsets at which no label lies on another, and none on a point where that can be avoided. Works
// from estimated widths, since the fonts are known only when the report is published; the estimate errs on the wide side.

export interface LabelRequest {
  readonly text: string
  /** The point that is labelled, in points of the plot: x to the right, y downwards. */
  readonly x: number
  readonly y: number
  /** Positions to try, best first. */
  readonly candidates: readonly LabelOffset[]
}

export interface LabelOffset {
  readonly dx: number
  readonly dy: number
  readonly align: 'left' | 'center' | 'right'
}

export interface Box {
  readonly left: number
  readonly right: number
  readonly top: number
  readonly bottom: number
}

export const labelSize = 7.5

/** Widest letters of the house sans are about 0.85, the mean of running text about 0.48 of the font size. */
export function estimatedWidth(text: string, size = labelSize): number {
  let sum = 0
  for (const letter of text) sum += /[\p{M}]/u.test(letter) ? 0 : /[ilj.,:;|'()[\] tfr]/.test(letter) ? 0.34 : /[mwMW@%—→]/.test(letter) ? 0.86 : /\p{Lu}/u.test(letter) ? 0.62 : 0.54
  return sum * size
}

/** Broken at spaces (a no-break space holds) so that no line is wider, unless one word is. */
export function wrapped(text: string, width: number, size = labelSize): readonly string[] {
  const lines: string[] = []
  for (const word of text.split(/ +/)) {
    const last = lines.at(-1)
    if (last !== undefined && estimatedWidth(`${last} ${word}`, size) <= width) lines[lines.length - 1] = `${last} ${word}`
    else lines.push(word)
  }
  return lines
}

/** Beside, above or below a point, and farther off when the place is taken. */
export function aroundPoint(): readonly LabelOffset[] {
  const rings = [0, 1, 2, 3, 4, 5, 6, 7]
  return rings.flatMap((ring): readonly LabelOffset[] => {
    const far = ring * (labelSize + 1.5)
    return [
      { dx: 6, dy: 2.5 - far, align: 'left' }, { dx: -6, dy: 2.5 - far, align: 'right' }, { dx: 0, dy: -6 - far, align: 'center' },
      { dx: 6, dy: 2.5 + far, align: 'left' }, { dx: -6, dy: 2.5 + far, align: 'right' }, { dx: 0, dy: 11 + far, align: 'center' },
    ]
  })
}

/** Along a level line, from its right end: on the side away from the data first, then the other side, then farther left, then farther off. */
export function alongLine(away: 'above' | 'below', width: number): readonly LabelOffset[] {
  const [first, second] = away === 'above' ? [-3, labelSize + 1.5] : [labelSize + 1.5, -3]
  const near = [0, 0.25, 0.5, 0.75].flatMap((part): readonly LabelOffset[] => [first, second].map((dy) => ({ dx: -2 - part * width, dy, align: 'right' })))
  const far = [1, 2, 3, 4, 5, 6].flatMap((row): readonly LabelOffset[] => [first, second].map((dy) => ({ dx: -2, dy: dy + Math.sign(dy) * row * (labelSize + 1.5), align: 'right' })))
  return [...near, ...far]
}

/** Above the top of a curve, in as many rows as it takes. */
export function aboveTop(): readonly LabelOffset[] {
  return Array.from({ length: 6 }, (_, row) => row * -(labelSize + 2.5) - 4).flatMap((dy): readonly LabelOffset[] => [{ dx: 0, dy, align: 'center' }, { dx: 4, dy, align: 'left' }, { dx: -4, dy, align: 'right' }])
}

/** In the order asked for; `plot` keeps labels inside, `taken` are boxes of points. A label for which nothing is free takes its last candidate that touches no other label. */
export function placeLabels(requests: readonly LabelRequest[], plot: Box, taken: readonly Box[]): readonly LabelOffset[] {
  const placed: Box[] = []
  return requests.map((request) => {
    const boxes = request.candidates.map((candidate) => ({ candidate, box: labelBox(request, candidate) }))
    const inside = boxes.filter(({ box }) => box.left >= plot.left && box.right <= plot.right && box.top >= plot.top && box.bottom <= plot.bottom)
    const clear = (inside.length > 0 ? inside : boxes).filter(({ box }) => !placed.some((other) => overlap(box, other)))
    const best = clear.find(({ box }) => !taken.some((other) => overlap(box, other))) ?? leastCrowded(clear, taken) ?? boxes.at(-1)
    if (best === undefined) throw new Error('a label has no candidates')
    placed.push(best.box)
    return best.candidate
  })
}

function leastCrowded<T extends { readonly box: Box }>(boxes: readonly T[], taken: readonly Box[]): T | undefined {
  let best: { readonly item: T; readonly hits: number } | undefined
  for (const item of boxes) {
    const hits = taken.filter((other) => overlap(item.box, other)).length
    if (best === undefined || hits < best.hits) best = { item, hits }
  }
  return best?.item
}

function labelBox({ text, x, y }: LabelRequest, { dx, dy, align }: LabelOffset): Box {
  const width = estimatedWidth(text)
  const left = x + dx - (align === 'left' ? 0 : align === 'right' ? width : width / 2)
  return { left, right: left + width, top: y + dy - 0.8 * labelSize, bottom: y + dy + 0.25 * labelSize }
}

function overlap(a: Box, b: Box): boolean {
  return a.left < b.right && b.left < a.right && a.top < b.bottom && b.top < a.bottom
}
