// Titles of the axes, drawn as data and not as part of the axes: a specification then serves charts of every measurand, and
// preparing a specification costs several times what drawing one chart costs.
import { inks, titleSize, type PlotFrame } from './house-style.ts'
import { wrapped } from './label-placement.ts'
import type { Fragment, Rows } from './layers.ts'

const lineGap = titleSize + 1.5

/** Baseline of a title below labels of one line. */
export const belowLabels = 26

export function titleLayer(): Fragment {
  return {
    data: { name: 'titles' },
    mark: { type: 'text', align: 'center', baseline: 'alphabetic', fontSize: titleSize, color: inks.text, angle: { expr: 'datum.angle' }, x: { expr: 'datum.at' }, y: { expr: 'datum.down' } },
    encoding: { text: { field: 'title', type: 'nominal' } },
  }
}

/** A title longer than its axis goes on in further lines. `below` is the baseline of the first one under the plot. */
export function titleRows(frame: PlotFrame, titles: { readonly x?: string; readonly y?: string; readonly below?: number; readonly top?: number }): Rows {
  const across = titles.x === undefined ? [] : linesAcross(titles.x, frame)
  const upwards = titles.y === undefined ? [] : wrapped(titles.y, frame.plotHeight + 16, titleSize)
  return [
    ...across.map((title, index) => ({ title, angle: 0, at: frame.plotWidth / 2, down: (titles.top ?? 0) + frame.plotHeight + (titles.below ?? belowLabels) + index * lineGap })),
    ...upwards.map((title, index) => ({ title, angle: 270, at: 10 - frame.left - (upwards.length - 1 - index) * lineGap, down: (titles.top ?? 0) + frame.plotHeight / 2 })),
  ]
}

/** Where a key may stand below the title of the horizontal axis. */
export function belowTitle(title: string, frame: PlotFrame): number {
  return belowLabels + 10 + (linesAcross(title, frame).length - 1) * lineGap
}

function linesAcross(title: string, frame: PlotFrame): readonly string[] {
  return wrapped(title, frame.plotWidth + 20, titleSize)
}
