// The catalogue: one line per characteristic, in the order a report usually tells them.
import type { Characteristic } from './characteristic.ts'

export const catalogue: readonly Characteristic[] = []
