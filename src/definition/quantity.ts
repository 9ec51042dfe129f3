// A typed quantity (`0.2 mg/L`, `5.0 %`, `0.05`) as number and unit; the digits stay as typed, since `5.0 %` is not `5 %`.
// A decimal comma is refused: a study is written with points.
import type { Quantity } from './study.ts'
import { readUnit } from './units.ts'

export type ParsedQuantity =
  | { readonly kind: 'quantity'; readonly quantity: Quantity }
  | { readonly kind: 'unknown unit'; readonly unit: string; readonly nearest?: string | undefined }
  /** `meant` is the same with a point. */
  | { readonly kind: 'decimal comma'; readonly meant: string }
  | { readonly kind: 'not a quantity' }

export function parseQuantity(typed: string): ParsedQuantity {
  const match = /^\s*([+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?)\s*(.*?)\s*$/.exec(typed)
  if (match?.[1] === undefined) return { kind: 'not a quantity' }
  const unit = match[2] ?? ''
  if (/^,\d/.test(unit)) return { kind: 'decimal comma', meant: typed.trim().replace(/(\d),(\d)/, '$1.$2') }
  const value = Number(match[1])
  // A digit or point after the number (`1 000`, `1.2.3`) is a mistyped number, not the beginning of a unit.
  if (!Number.isFinite(value) || /^[\d.,]/.test(unit)) return { kind: 'not a quantity' }
  const read = readUnit(unit)
  return read.known ? { kind: 'quantity', quantity: { value, unit: read.unit, text: match[1] } } : { kind: 'unknown unit', unit, nearest: read.nearest }
}
