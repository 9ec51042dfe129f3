// Linearity: what a study may ask of a calibration and what it may find.
import type { Characteristic } from '../characteristic.ts'
import { assessLinearity, invertLinearity } from './assess.ts'
import type { LinearityDetail } from './detail.ts'
import { type LinearityOptions, linearityOptions } from './options.ts'
import { presentLinearity } from './present.ts'

export const linearity: Characteristic<LinearityOptions, LinearityDetail> = {
  id: 'linearity',
  title: 'Linearity of the response',
  options: linearityOptions,
  metrics: {
    slope: { label: 'slope', unit: 'response per measurand', help: 'Sensitivity: the linear coefficient of the fit' },
    intercept: { label: 'intercept', unit: 'response', help: 'Response at level zero by the fit' },
    'residual-standard-deviation': { label: 'residual standard deviation', unit: 'response', help: 'Scatter about an unweighted fit' },
    correlation: { label: 'correlation coefficient r', unit: 'none', help: 'A description of the scatter about a line, no proof of linearity' },
    'r-squared': { label: 'coefficient of determination R²', unit: 'none', help: 'A description of the scatter about the fit, no proof of linearity' },
    'lack-of-fit-probability': { label: 'probability of lack of fit', unit: 'none', help: 'Probability of the F test of lack of fit against true replicates' },
    'curvature-probability': { label: 'probability of curvature', unit: 'none', help: 'Probability of Mandel’s test of a parabola against the straight line' },
    'back-calculation-error': { label: 'back-calculated error', unit: 'percent', magnitude: true, help: 'Per level: error of the standard furthest off, in percent of its level' },
    'back-calculation-mean-error': { label: 'mean back-calculated error', unit: 'percent', magnitude: true, help: 'Per level: mean error of its standards, in percent of the level' },
    'relative-standard-error': { label: 'relative standard error', unit: 'percent', help: 'Relative standard error of the calibration over all standards' },
    'intercept-relative': { label: 'relative intercept', unit: 'percent', magnitude: true, help: 'Intercept in percent of the response at the full-response level' },
    'straight-to': { label: 'straight up to', unit: 'measurand', help: 'Highest level up to which no curvature is seen' },
    'top-sensitivity': { label: 'sensitivity at the top', unit: 'percent', help: 'Slope between the two highest levels in percent of the fitted one' },
    'slope-rsd-between-runs': { label: 'relative standard deviation of the slope between runs', unit: 'percent', help: 'Scatter of the slopes of independent calibrations' },
  },
  assess: assessLinearity,
  invert: invertLinearity,
  present: presentLinearity,
}
