// The closed table of diagnostic codes, one part per stage: `stage/what-is-wrong`, its severity and one sentence of help.
import { assessCodes } from './codes/assess.ts'
import { commandCodes } from './codes/command.ts'
import { dataCodes } from './codes/data.ts'
import { definitionCodes } from './codes/definition.ts'
import { presentCodes } from './codes/present.ts'
import type { CodeEntry } from './codes/entry.ts'

const table = { ...commandCodes, ...definitionCodes, ...dataCodes, ...assessCodes, ...presentCodes } as const

export type Code = keyof typeof table

export const codes: Readonly<Record<Code, CodeEntry>> = table
