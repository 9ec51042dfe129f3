// The exhibits and sentences of linearity, from its detail alone.
import { axisTitle, column, excludedRow, figure, formula, joined, paragraph, row, secondary, sentence, subscript, table, textOf } from '../../present/build.ts'
import { deviationChart } from '../../present/charts/deviation-chart.ts'
import { responseChart } from '../../present/charts/response-chart.ts'
import type { Inline, ReportBlock } from '../../present/document.ts'
import { asMeasured, asPercent, asTyped, count, printed, probability } from '../../present/numbers.ts'
import type { Presented } from '../../present/presentation-part.ts'
import type { LinearityDetail } from './detail.ts'

type Shown = Presented<LinearityDetail>

const modelNames = { 'straight line': 'a straight line', 'through zero': 'a straight line through zero', quadratic: 'a parabola' } as const

export function presentLinearity(shown: Shown): readonly ReportBlock[] {
  return [summary(shown), ...secondary(shown, () => model(shown)), responseFigure(shown), coefficients(shown), ...secondary(shown, () => [residualFigure(shown), ...errorFigure(shown), standards(shown), candidates(shown), ...tests(shown), ...runs(shown)])]
}

function weighted({ weights }: LinearityDetail): string {
  return weights === 'none' ? ' without weights' : `, weights ${weights}`
}

function unit(text: string | undefined): string {
  return text === undefined || text === '' ? '' : `\u00a0${text}`
}

function summary({ detail, measurand }: Shown): ReportBlock {
  const errors = detail.levels.filter((level) => level.worstError !== undefined)
  const worst = [...errors].sort((left, right) => Math.abs(right.worstError ?? 0) - Math.abs(left.worstError ?? 0))[0]
  const sentences: (readonly Inline[])[] = [
    sentence`${count(detail.n)} responses at ${count(detail.levels.length)} levels from ${asTyped(detail.range.low)} to ${asTyped(detail.range.high)}${unit(measurand.unit)} are described by ${modelNames[detail.fit]}${weighted(detail)}.`,
  ]
  if (worst?.worstError !== undefined) sentences.push(sentence`The largest back-calculated error of a standard is ${printed(worst.worstError)}\u202f%, at ${asTyped(worst.level)}${unit(measurand.unit)}.`)
  if (detail.straightTo !== undefined && detail.straightTo.level < detail.straightTo.highest) sentences.push(sentence`Curvature is seen above ${asTyped(detail.straightTo.level)}${unit(measurand.unit)}; up to there Mandel’s test sees none.`)
  if (detail.topSensitivity !== undefined) sentences.push(sentence`Between the two highest levels the response changes by ${printed(detail.topSensitivity)}\u202f% of what the fit expects.`)
  sentences.push(textOf('The coefficients r and R² describe the scatter and do not prove that the response is linear.'))
  return paragraph(...sentences)
}

function model({ detail }: Shown): readonly ReportBlock[] {
  const x: Inline = { type: 'emphasis', children: [{ type: 'text', value: 'x' }] }
  const y: Inline = { type: 'emphasis', children: [{ type: 'text', value: 'y' }] }
  const terms = { 'straight line': [...subscript('b', '0'), ...textOf(' + '), ...subscript('b', '1'), x], 'through zero': [...subscript('b', '1'), x], quadratic: [...subscript('b', '0'), ...textOf(' + '), ...subscript('b', '1'), x, ...textOf(' + '), ...subscript('b', '2'), x, { type: 'superscript' as const, children: textOf('2') }] }[detail.fit]
  return [formula([y, ...textOf(' = '), ...terms], { 'straight line': 'response equals intercept plus slope times level', 'through zero': 'response equals slope times level', quadratic: 'response equals intercept plus slope times level plus curvature times level squared' }[detail.fit])]
}

function responseFigure({ detail, measurand, prefix, confidence }: Shown): ReportBlock {
  return figure({
    id: `${prefix}-response`,
    caption: sentence`Response of ${measurand.name} against level, n = ${count(detail.n)}, with the fit and its confidence band at ${asPercent(confidence)}\u202f%`,
    alternative: `Calibration of ${measurand.name}: ${detail.n} responses at ${detail.levels.length} levels from ${detail.range.low} to ${detail.range.high}${unit(measurand.unit)}, fitted by ${modelNames[detail.fit]}${weighted(detail)}.`,
    chart: responseChart({
      xTitle: axisTitle('level', measurand.unit), yTitle: axisTitle('response', measurand.responseUnit),
      points: detail.points.map((point) => ({ x: point.level, y: point.response, ...(point.run === undefined ? {} : { series: point.run }) })),
      excluded: detail.excluded.map((each) => ({ x: each.level, y: each.response, label: `excluded (${each.exclusion})` })), line: detail.line, band: detail.band,
    }),
  })
}

function perUnit({ unit: own }: Shown['measurand']): string {
  return own === '' ? '1' : own.includes('/') ? `(${own})` : own
}

function slopeUnit(measurand: Shown['measurand']): string {
  return `${measurand.responseUnit ?? '1'}/${perUnit(measurand)}`
}

function coefficients({ detail, measurand, prefix, confidence }: Shown): ReportBlock {
  const per = perUnit(measurand)
  const units = { intercept: measurand.responseUnit ?? '', slope: slopeUnit(measurand), curvature: `${measurand.responseUnit ?? '1'}/${per}${per === '1' ? '' : '²'}` }
  const symbols = { intercept: subscript('b', '0'), slope: subscript('b', '1'), curvature: subscript('b', '2') }
  return table({
    id: `${prefix}-coefficients`, caption: 'Coefficients of the fit',
    columns: [column('Coefficient', { align: 'text', rowHeader: true }), column('Value', { align: 'text' }), column('Standard error', { align: 'text' }), column('Interval', { align: 'text' }), column('Unit', { align: 'text' })],
    rows: detail.coefficients.map((each) => row([...textOf(`${each.name} `), ...symbols[each.name]], printed(each.value, { significant: 6 }), printed(each.standardError, { significant: 4 }), sentence`${printed(each.low, { significant: 6 })} to ${printed(each.high, { significant: 6 })}`, units[each.name])),
    notes: [
      sentence`Residual standard deviation ${printed(detail.residualStandardDeviation)}${detail.weights === 'none' ? unit(measurand.responseUnit) : ' (weighted)'}, ${count(detail.df)} degrees of freedom.`,
      joined([
        detail.correlation === undefined ? [] : sentence`r = ${printed(detail.correlation, { decimals: 6 })}`,
        detail.rSquared === undefined ? [] : sentence`R² = ${printed(detail.rSquared, { decimals: 6 })}${detail.fit === 'through zero' ? ' (about zero)' : detail.weights === 'none' ? '' : ' (with the weights of the fit)'}`,
      ], ', '),
      sentence`Intervals by Student t at ${asPercent(confidence)}\u202f%.`,
      detail.interceptRelative === undefined ? [] : sentence`The intercept is ${printed(detail.interceptRelative.value)}\u202f% of the fitted response at ${asTyped(detail.interceptRelative.level)}${unit(measurand.unit)}.`,
    ].filter((note) => note.length > 0),
  })
}

function residualFigure({ detail, measurand, prefix }: Shown): ReportBlock {
  return figure({
    id: `${prefix}-residuals`, caption: sentence`Residuals of ${measurand.name} against level, n = ${count(detail.n)}`,
    alternative: `Residuals of the calibration of ${measurand.name} at ${detail.levels.length} levels about the zero line.`,
    chart: deviationChart({ xTitle: axisTitle('level', measurand.unit), yTitle: axisTitle('residual', measurand.responseUnit), points: detail.points.map((point) => ({ x: point.level, y: point.residual, ...(point.run === undefined ? {} : { series: point.run }) })), excluded: [], limits: [] }),
  })
}

function errorFigure({ detail, measurand, prefix, verdicts }: Shown): readonly ReportBlock[] {
  const points = detail.points.flatMap((point) => (point.error === undefined ? [] : [{ x: point.level, y: point.error, ...(point.run === undefined ? {} : { series: point.run }) }]))
  if (points.length === 0) return []
  const judged = verdicts.find((verdict) => verdict.metric === 'back-calculation-error')
  const limit = judged?.limit
  const limits = limit === undefined ? [] : limit.kind === 'between' ? [{ value: limit.low.value, label: 'lower limit' }, { value: limit.high.value, label: 'upper limit' }] : [{ value: limit.bound.value, label: judged?.criterion ?? '' }, { value: -limit.bound.value, label: '' }]
  return [figure({
    id: `${prefix}-back-calculated`, caption: sentence`Back-calculated error of every standard of ${measurand.name}, n = ${count(points.length)}`,
    alternative: `Back-calculated errors of ${points.length} standards of ${measurand.name} against level${limits.length === 0 ? '' : ', with the limit drawn'}.`,
    chart: deviationChart({ xTitle: axisTitle('level', measurand.unit), yTitle: 'error / %', points, excluded: [], limits }),
  })]
}

function standards({ detail, measurand, prefix }: Shown): ReportBlock {
  const groups = detail.levels.map((level) => [
    ...detail.points.filter((point) => point.level === level.level).map((point) => row(
      asTyped(point.level), asMeasured(point.response), printed(point.residual, { significant: 3 }), point.found === undefined ? '' : printed(point.found, { significant: 4 }), point.error === undefined ? '' : printed(point.error, { decimals: 2 }),
    )),
    ...detail.excluded.filter((each) => each.level === level.level).map((each) => excludedRow(asTyped(each.level), asMeasured(each.response), '', '', textOf('excluded'))),
  ])
  return table({
    id: `${prefix}-standards`, caption: 'Every standard: response, residual, level read back and its error',
    columns: [column('Level', { unit: measurand.unit, rowHeader: true }), column('Response', { unit: measurand.responseUnit }), column('Residual', { unit: measurand.responseUnit }), column('Found', { unit: measurand.unit }), column('Error', { unit: '%' })],
    groups,
  })
}

function candidates({ detail, prefix }: Shown): ReportBlock {
  return table({
    id: `${prefix}-weights`, caption: 'The same model under other weights',
    columns: [column('Weights', { align: 'text', rowHeader: true }), column('Sum of errors', { unit: '%' }), column('Largest error', { unit: '%' }), column('Relative standard error', { unit: '%' }), column('Mean error at the lowest level', { unit: '%' }), column('', { align: 'text' })],
    rows: detail.candidates.map((each) => row(
      each.weights, ...[each.sumOfErrors, each.largestError, each.relativeStandardError, each.lowestLevelError].map((value) => (value === undefined ? '' : printed(value, { decimals: 2 }))),
      each.chosen ? 'used' : each.impossible ?? '',
    )),
    notes: ['Errors without sign, except that at the lowest level. The weights that are used were chosen by the laboratory; this table shows what they change.'],
  })
}

function tests({ detail, prefix }: Shown): readonly ReportBlock[] {
  const lines = [
    ...(detail.lackOfFit === undefined ? [] : [row('lack of fit', printed(detail.lackOfFit.F), count(detail.lackOfFit.df1), count(detail.lackOfFit.df2), probability(detail.lackOfFit.probability), detail.lackOfFit.largestDeviation === undefined ? '' : sentence`largest deviation of a level mean ${printed(detail.lackOfFit.largestDeviation, { significant: 3 })}\u202f%`)]),
    ...(detail.mandel === undefined ? [] : [row('curvature (Mandel)', printed(detail.mandel.F), count(detail.mandel.df1), count(detail.mandel.df2), probability(detail.mandel.probability), sentence`quadratic coefficient ${printed(detail.mandel.curvature)}`)]),
  ]
  if (lines.length === 0) return []
  return [table({
    id: `${prefix}-tests`, caption: 'Tests of the model, with the size of the effect',
    columns: [column('Test', { align: 'text', rowHeader: true }), column('F'), column('df 1'), column('df 2'), column('Probability'), column('Size of the effect', { align: 'text' })], rows: lines,
    notes: ['A small probability says that the data leave the model by more than chance, not by how much; a large one does not prove the model.'],
  })]
}

function runs({ detail, prefix, measurand }: Shown): readonly ReportBlock[] {
  const leftOut = detail.runsLeftOut.map((each) => sentence`Run ${each.run}, n = ${count(each.n)}, is not fitted alone: ${each.because}. Its standards are in the common fit.`)
  if (detail.runs.length === 0) return leftOut.length === 0 ? [] : [paragraph(...leftOut)]
  return [table({
    id: `${prefix}-runs`, caption: 'Independent calibrations beside each other',
    columns: [column('Run', { align: 'text', rowHeader: true }), column('n'), column('Slope', { unit: slopeUnit(measurand) }), column('Intercept', { unit: measurand.responseUnit }), column('Residual standard deviation', detail.weights === 'none' ? { unit: measurand.responseUnit } : {})],
    rows: detail.runs.map((each) => row(each.run, count(each.n), printed(each.slope, { significant: 5 }), printed(each.intercept), printed(each.residualStandardDeviation))),
    notes: [...(detail.slopeRsdBetweenRuns === undefined ? [] : [sentence`Relative standard deviation of the slopes ${printed(detail.slopeRsdBetweenRuns)}\u202f%.`]), ...leftOut],
  })]
}
