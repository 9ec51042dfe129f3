// The known word nearest to what was typed, or none when nothing is near: a far guess misleads more than it helps.

/** Optimal string alignment distance (insertion, deletion, substitution, swap of neighbours), case ignored. */
function distance(left: string, right: string): number {
  const rows = left.length + 1
  const columns = right.length + 1
  const table = Array.from({ length: rows }, (_, row) => Array.from({ length: columns }, (__, column) => (row === 0 ? column : column === 0 ? row : 0)))
  const at = (row: number, column: number): number => table[row]?.[column] ?? 0
  for (let row = 1; row < rows; row += 1) {
    for (let column = 1; column < columns; column += 1) {
      const cost = left[row - 1] === right[column - 1] ? 0 : 1
      let best = Math.min(at(row - 1, column) + 1, at(row, column - 1) + 1, at(row - 1, column - 1) + cost)
      if (row > 1 && column > 1 && left[row - 1] === right[column - 2] && left[row - 2] === right[column - 1]) best = Math.min(best, at(row - 2, column - 2) + 1)
      const line = table[row]
      if (line !== undefined) line[column] = best
    }
  }
  return at(rows - 1, columns - 1)
}

export function nearest(typed: string, known: readonly string[]): string | undefined {
  const word = typed.toLowerCase().slice(0, 80)
  let best: { readonly candidate: string; readonly distance: number; readonly isTied: boolean } | undefined
  for (const candidate of known) {
    const found = distance(word, candidate.toLowerCase())
    if (best === undefined || found < best.distance) best = { candidate, distance: found, isTied: false }
    else if (found === best.distance && candidate !== best.candidate) best = { ...best, isTied: true }
  }
  // Two words equally near: either could be meant, and a wrong proposal is taken more readily than none.
  if (best === undefined || best.isTied) return undefined
  return best.distance <= Math.max(1, Math.floor(Math.max(word.length, best.candidate.length) * 0.4)) ? best.candidate : undefined
}
