// A typed quantity (`0.2 mg/L`, `5.0 %`, `0.05`) as number and unit. A decimal comma is refused here: a study is written with points.
import type { Quantity } from './study.ts'

export type ParsedQuantity =
  | { readonly kind: 'quantity'; readonly quantity: Quantity }
  | { readonly kind: 'unknown unit'; readonly unit: string; readonly nearest?: string | undefined }
  | { readonly kind: 'not a quantity' }

export function parseQuantity(typed: string): ParsedQuantity {
  const match = /^\s*([+-]?(?:\d+(?:\.\d*)?|\.\d+)(?:[eE][+-]?\d+)?)\s*(.*?)\s*$/.exec(typed)
  if (match?.[1] === undefined) return { kind: 'not a quantity' }
  const value = Number(match[1])
  if (!Number.isFinite(value)) return { kind: 'not a quantity' }
  return { kind: 'quantity', quantity: { value, unit: match[2] ?? '', text: match[1] } }
}
