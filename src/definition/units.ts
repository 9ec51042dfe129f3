// The table of units a study may use. A unit is a known part, or known parts joined by `·` and `/`; it is compared as typed, so that
// `ug/L` and `µg/L` never mix: the table proposes the one spelling.
import { nearest } from '../diagnostics/nearest.ts'

const amounts = ['kg', 'g', 'mg', 'µg', 'ng', 'pg', 'mol', 'mmol', 'µmol', 'nmol', 'pmol', 'IU', 'CFU', 'copies']
const volumes = ['L', 'dL', 'mL', 'µL', 'm³', 'cm³']
const responses = ['AU', 'mAU', 'counts', 'count', 'cps', 'kcps', 'area', 'height', 'S', 'mS', 'µS', 'nS', 'V', 'mV', 'µV', 'A', 'mA', 'µA', 'nA', 'pA', 'RFU', 'RLU', 'a.u.', 'OD']
const moments = ['s', 'min', 'h', 'd', 'Hz']
const others = ['%', '‰', 'ppm', 'ppb', '1', '°C', 'K', 'mm', 'cm', 'm', 'nm', 'pH', 'dose', 'tablet', 'sample', 'spot', 'NTU']

const parts: readonly string[] = [...amounts, ...volumes, ...responses, ...moments, ...others]

/** Spellings that are common and not used here → the one that is. */
const respelled: Readonly<Record<string, string>> = { ug: 'µg', 'μg': 'µg', umol: 'µmol', uL: 'µL', uS: 'µS', 'μS': 'µS', ul: 'µL', ml: 'mL', l: 'L', '*': '·', percent: '%', sec: 's', liter: 'L', litre: 'L' }

export type CheckedUnit = { readonly known: true } | { readonly known: false; readonly nearest?: string | undefined }

/** `''` is "no unit" and known. Parts may carry an exponent: `mg·L⁻¹`. */
export function checkUnit(unit: string): CheckedUnit {
  if (unit === '') return { known: true }
  const pieces = unit.split(/([/·()])/).filter((piece) => piece !== '')
  const proper = pieces.map((piece) => properPart(piece))
  if (proper.every((piece, index) => piece === pieces[index]) && balanced(unit)) return { known: true }
  const proposal = proper.every((piece) => piece !== undefined) ? proper.join('') : nearest(unit, ['mg/L', 'µg/L', 'ng/mL', 'mg/kg', 'µg/kg', '%', 'mAU·s', 'µS·min', 'counts', ...parts])
  return { known: false, nearest: proposal === unit ? undefined : proposal }
}

function properPart(piece: string): string | undefined {
  if (/^[/·()]$/.test(piece)) return piece
  const [, base = '', exponent = ''] = /^(.*?)([⁻⁰¹²³]*)$/.exec(piece) ?? []
  const known = parts.includes(piece) ? piece : parts.includes(base) ? base : undefined
  if (known === piece) return piece
  if (known !== undefined) return known + exponent
  const other = respelled[base]
  return other === undefined ? undefined : other + exponent
}

function balanced(unit: string): boolean {
  return unit.split('(').length === unit.split(')').length && !/[/·]$|^[/·]/.test(unit)
}
