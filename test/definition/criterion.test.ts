// Criterion phrases and units: what is read, and what is proposed for a phrase that is not. Limits are invented.
import { describe, expect, test } from 'vitest'
import { parseCriterion } from '../../src/definition/criterion.ts'
import { readUnit } from '../../src/definition/units.ts'

describe('a phrase', () => {
  test.each([
    ['at most 5 %', { kind: 'at most', bound: { value: 5, unit: '%', text: '5' } }],
    ['at most 5.0 %', { kind: 'at most', bound: { value: 5, unit: '%', text: '5.0' } }],
    ['at least 0.995', { kind: 'at least', bound: { value: 0.995, unit: '', text: '0.995' } }],
    ['above -0.5 mg/L', { kind: 'above', bound: { value: -0.5, unit: 'mg/L', text: '-0.5' } }],
    ['  below   10 % ', { kind: 'below', bound: { value: 10, unit: '%', text: '10' } }],
    ['between 98.0 % and 102.0 %', { kind: 'between', low: { value: 98, unit: '%', text: '98.0' }, high: { value: 102, unit: '%', text: '102.0' } }],
    ['between -1 and 1', { kind: 'between', low: { value: -1, unit: '', text: '-1' }, high: { value: 1, unit: '', text: '1' } }],
    ['between 5 % and 5 %', { kind: 'between', low: { value: 5, unit: '%', text: '5' }, high: { value: 5, unit: '%', text: '5' } }],
  ])('%s', (typed, limit) => {
    expect(parseCriterion(typed)).toEqual({ kind: 'limit', limit })
  })

  test.each([
    ['<= 5 %', 'at most 5 %'], ['≤5 %', 'at most 5 %'], ['>= 0.99', 'at least 0.99'], ['< 5 %', 'below 5 %'], ['> 1', 'above 1'], ['max. 5 %', 'at most 5 %'], ['not more than 5 %', 'at most 5 %'], ['NLT 90 %', 'at least 90 %'],
    ['At most 5 %', 'at most 5 %'], ['atmost 5 %', 'at most 5 %'], ['bellow 5 %', 'below 5 %'], ['98 % to 102 %', 'between 98 % and 102 %'], ['98 % - 102 %', 'between 98 % and 102 %'],
    ['at most 2,5 %', 'at most 2.5 %'], ['at most 5 ug/L', 'at most 5 µg/L'], ['at least −5 %', 'at least -5 %'], ['between 98 and 102 %', 'between 98 % and 102 %'], ['between 102 % and 98 %', 'between 98 % and 102 %'],
    ['between 1 mg/L and 2 µg/L', 'same unit'], ['at most', 'at most 5 %'], ['5 %', 'at most 5 %'], ['at most five', 'at most 5 %'], ['at most NaN', 'at most 5 %'], ['at most Infinity', 'at most 5 %'], ['at most 1e999', 'at most 5 %'], ['', 'at most 5 %'],
  ])('%s is not read; proposed: %s', (typed, proposed) => {
    const parsed = parseCriterion(typed)
    expect(parsed.kind).toBe('unreadable')
    expect(parsed.kind === 'unreadable' ? parsed.mend : '').toContain(proposed)
  })
})

// Symbols and the rules of writing products and quotients: SI Brochure, 9th edition (BIPM 2019), section 5.4 and tables 4, 7 and 8.
describe('a unit', () => {
  test.each(['mg/L', 'µg/kg', 'ng/mL', 'mmol/L', '%', '1', 'mAU·s', 'µS·min', 'counts', 'µS·min/(mg/L)', 'mg·L⁻¹', 'L/(mol·cm)', 'CFU/100 mL', 'm³', 'µg/m³', '°C', ''])('%s', (unit) => {
    expect(readUnit(unit)).toEqual({ known: true, unit })
  })
  test('the Greek mu is the micro sign', () => {
    expect(readUnit('\u03bcg/L')).toEqual({ known: true, unit: '\u00b5g/L' })
  })
  test.each([['ug/L', 'µg/L'], ['mg/l', 'mg/L'], ['mcg/ml', 'µg/mL'], ['uS*min', 'µS·min'], ['mAU s', 'mAU·s'], ['percent', '%'], ['mM', 'mmol/L'], ['mg/LL', 'mg/L'], ['mgL', 'mg/L'], ['ug / l', 'µg/L']])('%s → %s', (typed, proposed) => {
    expect(readUnit(typed)).toEqual({ known: false, nearest: proposed })
  })
  test.each(['mg/L/h', 'mg//L', '/L', 'mg/', 'mg·', '(mg', 'mg)', '()', 'mg/(L', 'furlong', '('.repeat(100_000)])('%s is no unit', (typed) => {
    expect(readUnit(typed).known).toBe(false)
  })
})
