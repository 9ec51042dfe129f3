// The catalogue: one line per characteristic, in the order a report usually tells them.
import type { Characteristic } from './characteristic.ts'
import { detection } from './detection/index.ts'

export const catalogue: readonly Characteristic[] = [
  detection,
]
