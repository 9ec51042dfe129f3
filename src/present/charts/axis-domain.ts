// Values → the span of an axis, chosen here and not by the chart library so that labels can be placed before anything is drawn.
// Every value lies inside the span; a logarithmic axis is taken only when every value is above zero.

export interface AxisDomain {
  readonly low: number
  readonly high: number
  readonly logarithmic: boolean
}

/** More than two decades do not read well on a linear axis. */
const widestLinearRatio = 100

export function spansDecades(values: readonly number[]): boolean {
  if (values.length === 0) return false
  const [low, high] = [Math.min(...values), Math.max(...values)]
  return low > 0 && high / low > widestLinearRatio
}

export function axisDomain(values: readonly number[], options: { readonly ticks: number; readonly logarithmic?: boolean; readonly room?: number; readonly ends?: 'ticks' | 'open' }): AxisDomain {
  const [low, high] = values.length === 0 ? [0, 1] : [Math.min(...values), Math.max(...values)]
  return options.logarithmic === true ? logarithmicDomain(low, high) : linearDomain(low, high, options.ticks, options.room ?? 0.02, options.ends ?? 'ticks')
}

/** Less than this and a logarithmic axis names 1, 2 and 5 as well. */
const fewDecades = 3.2

export function scaleOf(domain: AxisDomain): 'linear' | 'few decades' | 'decades' {
  return !domain.logarithmic ? 'linear' : Math.log10(domain.high / domain.low) < fewDecades ? 'few decades' : 'decades'
}

/** Where a value stands between the ends of an axis, 0 to 1. */
export function positionOn(domain: AxisDomain, value: number): number {
  const scaled = (each: number): number => (domain.logarithmic ? Math.log10(each) : each)
  return (scaled(value) - scaled(domain.low)) / (scaled(domain.high) - scaled(domain.low))
}

export interface AxisTick {
  readonly value: number
  readonly text: string
}

/** Ticks of a linear axis where the chart draws them as data, in the style of the axes of the library. */
export function axisTicks(domain: AxisDomain, count: number): readonly AxisTick[] {
  const step = tickStep(domain.low, domain.high, count)
  const first = Math.ceil(domain.low / step - 1e-6)
  const last = Math.floor(domain.high / step + 1e-6)
  return Array.from({ length: last - first + 1 }, (_, index) => {
    const value = Number(((first + index) * step).toPrecision(12))
    return { value, text: tickText(value, step) }
  })
}

function tickText(value: number, step: number): string {
  const magnitude = Math.abs(value)
  const sign = value < 0 ? '\u2212' : ''
  if (value === 0) return '0'
  if (magnitude >= 1e7 || magnitude < 1e-4) {
    const [mantissa = '', exponent = ''] = magnitude.toExponential(2).split('e')
    return `${sign}${String(Number(mantissa))} × 10${[...exponent].map((letter) => raised[letter] ?? '').join('')}`
  }
  const [whole = '', fraction] = magnitude.toFixed(Math.max(0, -Math.floor(Math.log10(step) + 1e-9))).split('.')
  return sign + whole.replace(/\B(?=(\d{3})+$)/g, '\u2009') + (fraction === undefined ? '' : `.${fraction}`)
}

const raised: Readonly<Record<string, string>> = { '-': '⁻', ...Object.fromEntries([...'⁰¹²³⁴⁵⁶⁷⁸⁹'].map((letter, digit) => [String(digit), letter])) }

/** Room at both ends, then outwards to the next tick unless the ends are open; an axis starts at zero when it starts near it, and does not cross it for nothing. */
function linearDomain(low: number, high: number, ticks: number, room: number, ends: 'ticks' | 'open'): AxisDomain {
  const span = high > low ? high - low : Math.abs(high) > 0 ? Math.abs(high) * 0.2 : 1
  const padded = { low: low - room * span - (high > low ? 0 : span / 2), high: high + room * span + (high > low ? 0 : span / 2) }
  if (low >= 0 && padded.low < 0) padded.low = 0
  else if (high <= 0 && padded.high > 0) padded.high = 0
  if (ends === 'open') {
    if (low > 0 && low < 0.15 * high) padded.low = 0
    return { ...padded, logarithmic: false }
  }
  const step = tickStep(padded.low, padded.high, ticks)
  const rounded = { low: stepsDown(padded.low, step), high: -stepsDown(-padded.high, step) }
  const widened = tickStep(rounded.low, rounded.high, ticks)
  return { low: stepsDown(rounded.low, widened), high: -stepsDown(-rounded.high, widened), logarithmic: false }
}

/** A little beyond the outermost values: whole decades would leave half of a short axis empty. */
function logarithmicDomain(low: number, high: number): AxisDomain {
  return { low: roundedTo(low / 1.5, 2, Math.floor), high: roundedTo(high * 1.5, 2, Math.ceil), logarithmic: true }
}

/** 1, 2 or 5 times a power of ten, so that about `count` ticks fit. */
function tickStep(low: number, high: number, count: number): number {
  const wanted = (high - low) / count
  const power = Math.floor(Math.log10(wanted))
  const remainder = wanted / 10 ** power
  const factor = remainder >= Math.sqrt(50) ? 10 : remainder >= Math.sqrt(10) ? 5 : remainder >= Math.SQRT2 ? 2 : 1
  return factor * 10 ** power
}

function stepsDown(value: number, step: number): number {
  const steps = Math.floor(value / step + 1e-9)
  return Number((steps * step).toPrecision(12))
}

function roundedTo(value: number, digits: number, direction: (value: number) => number): number {
  const unit = 10 ** (Math.floor(Math.log10(value)) - digits + 1)
  return Number((direction(value / unit) * unit).toPrecision(12))
}
