// The catalogue: one line per characteristic, in the order a report usually tells them.
import { accuracy } from './accuracy/index.ts'
import type { Characteristic } from './characteristic.ts'
import { comparison } from './comparison/index.ts'
import { detection } from './detection/index.ts'
import { linearity } from './linearity/index.ts'
import { precision } from './precision/index.ts'
import { range } from './range/index.ts'

export const catalogue: readonly Characteristic[] = [
  linearity,
  range,
  detection,
  accuracy,
  precision,
  comparison,
]
