// A typed quantity (`0.2 mg/L`, `5.0 %`, `0.05`) as number and unit; the digits stay as typed, since `5.0 %` is not `5 %`.
// A decimal comma is refused: a study is written with points.
import type { Quantity } from './study.ts'
import { checkUnit } from './units.ts'

export type ParsedQuantity =
  | { readonly kind: 'quantity'; readonly quantity: Quantity }
  | { readonly kind: 'unknown unit'; readonly unit: string; readonly nearest?: string | undefined }
  | { readonly kind: 'decimal comma' }
  | { readonly kind: 'not a quantity' }

export function parseQuantity(typed: string): ParsedQuantity {
  const match = /^\s*([+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?)\s*(.*?)\s*$/.exec(typed)
  if (match?.[1] === undefined) return { kind: 'not a quantity' }
  const unit = match[2] ?? ''
  if (/^,\d/.test(unit)) return { kind: 'decimal comma' }
  const value = Number(match[1])
  if (!Number.isFinite(value)) return { kind: 'not a quantity' }
  const checked = checkUnit(unit)
  if (!checked.known) return { kind: 'unknown unit', unit, nearest: checked.nearest }
  return { kind: 'quantity', quantity: { value, unit, text: match[1] } }
}
