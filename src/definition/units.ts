// The table of units a study may use. A unit is a known part, or known parts joined by `·` and one `/`; units are compared as written,
// so that `ug/L` and `µg/L` never mix: the table proposes the one spelling. Nothing is converted.
import { nearest } from '../diagnostics/nearest.ts'

/** SI units and those accepted with them (SI Brochure, 9th edition), with the usual words of instruments and laboratories. */
const parts: ReadonlySet<string> = new Set([
  't', 'kg', 'g', 'mg', 'µg', 'ng', 'pg', 'fg', // mass
  'mol', 'mmol', 'µmol', 'nmol', 'pmol', 'fmol', 'eq', 'meq', // amount of substance
  'm³', 'dm³', 'cm³', 'mm³', 'L', 'dL', 'cL', 'mL', 'µL', 'nL', '100 mL', // volume
  'm', 'dm', 'cm', 'mm', 'µm', 'nm', 'm²', 'dm²', 'cm²', 'mm²', // length and area
  's', 'ms', 'µs', 'min', 'h', 'd', 'Hz', 'kHz', 'MHz', // time
  '1', '%', '‰', 'ppm', 'ppb', // fractions; `1` is a number without unit
  'IU', 'U', 'mU', 'kat', 'µkat', 'nkat', 'CFU', 'PFU', 'MPN', 'copies', 'cells', 'Bq', 'mBq', 'kBq', // activity and counts of living things
  'AU', 'mAU', 'OD', 'counts', 'kcounts', 'cps', 'kcps', 'Mcps', 'a.u.', 'area', 'height', 'RFU', 'RLU', 'ratio', // response
  'S', 'mS', 'µS', 'nS', 'V', 'mV', 'µV', 'A', 'mA', 'µA', 'nA', 'pA', 'C', 'mC', 'µC', 'nC', 'W', 'mW', 'Ω', 'kΩ', 'MΩ', 'pH',
  'Pa', 'hPa', 'kPa', 'bar', 'mbar', 'N', 'mN', 'J', 'kJ', 'K', '°C', 'FNU', 'NTU', 'cP', // others a result may have
  'dose', 'tablet', 'capsule', 'vial', 'sample', 'spot', 'wipe',
])

/** Spellings that are common and not used here → the one that is. */
const respelled: Readonly<Record<string, string>> = {
  ug: 'µg', mcg: 'µg', umol: 'µmol', uL: 'µL', ul: 'µL', 'µl': 'µL', l: 'L', dl: 'dL', ml: 'mL', nl: 'nL', ltr: 'L', liter: 'L', litre: 'L', cc: 'cm³', m3: 'm³', cm3: 'cm³', m2: 'm²', cm2: 'cm²', um: 'µm',
  uS: 'µS', uV: 'µV', uA: 'µA', us: 'µs', percent: '%', pct: '%', sec: 's', hr: 'h', hour: 'h', day: 'd', count: 'counts', cfu: 'CFU', au: 'AU', mau: 'mAU', M: 'mol/L', mM: 'mmol/L', µM: 'µmol/L', uM: 'µmol/L', nM: 'nmol/L',
  KG: 'kg', Kg: 'kg', gr: 'g', ohm: 'Ω', degC: '°C', iu: 'IU', '*': '·', '.': '·', ' ': '·',
}

const usual = ['mg/L', 'µg/L', 'ng/mL', 'mg/kg', 'µg/kg', 'mmol/L', 'mAU·s', 'µS·min', 'counts', ...parts]

export type ReadUnit = { readonly known: true; readonly unit: string } | { readonly known: false; readonly nearest?: string | undefined }

/** `''` is "no unit" and known. The Greek mu and the dot operator are taken as the micro sign and the middle dot: the same signs in Unicode's own tables. */
export function readUnit(typed: string): ReadUnit {
  if (typed.length > 60) return { known: false } // no unit is that long, and the reading below is recursive
  const unit = typed.replaceAll('\u03bc', '\u00b5').replaceAll('\u22c5', '\u00b7').replaceAll('\u2126', '\u03a9')
  if (unit === '' || isUnit(unit)) return { known: true, unit }
  const proposal = unit.split(/([/·()*]|\s+)/).filter((piece) => piece !== '').map(properPiece).join('').replace(/·?([/()·])·?/g, '$1')
  if (proposal !== unit && isUnit(proposal)) return { known: false, nearest: proposal }
  // `mgL` is as near to `mg` as to `mg/L`; a forgotten sign is the likelier slip.
  return { known: false, nearest: usual.find((each) => each.replace(/[/·]/g, '') === unit) ?? nearest(unit, usual) }
}

function properPiece(piece: string): string {
  if (parts.has(piece)) return piece
  return Object.hasOwn(respelled, piece) ? (respelled[piece] ?? piece) : /^\s+$/.test(piece) ? '·' : piece
}

/** product, or product/product; a second `/` would leave open what it divides. */
function isUnit(unit: string): boolean {
  const fraction = splitOutside(unit, '/')
  return fraction.length <= 2 && fraction.every((product) => splitOutside(product, '·').every((factor) => {
    const inner = /^\((.+)\)$/.exec(factor)?.[1]
    return inner === undefined ? isPart(factor) : isUnit(inner)
  }))
}

/** Parts may carry an exponent: `mg·L⁻¹`. */
function isPart(factor: string): boolean {
  return parts.has(factor) || parts.has(/^(.+?)⁻?[¹²³]$/.exec(factor)?.[1] ?? '')
}

function splitOutside(unit: string, sign: '/' | '·'): readonly string[] {
  const pieces: string[] = []
  let depth = 0
  let from = 0
  for (let index = 0; index < unit.length; index += 1) {
    if (unit[index] === '(') depth += 1
    else if (unit[index] === ')') depth -= 1
    else if (unit[index] === sign && depth === 0) {
      pieces.push(unit.slice(from, index))
      from = index + 1
    }
  }
  return [...pieces, unit.slice(from)]
}
