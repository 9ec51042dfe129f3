// Reproducibility predicted from the mass fraction alone. The fraction is in g/g; the denominator of every Horwitz ratio is the
// reproducibility prediction, for repeatability too.

/** Predicted relative reproducibility in percent: 2^(1 − 0.5·lg C); the power law 2·C^−0.1505 differs in the fourth digit. Throws outside 0 < C ≤ 1. Source: Horwitz, Anal. Chem. 54 (1982) 67A. */
export function predictedReproducibility(massFraction: number): number {
  if (!(massFraction > 0 && massFraction <= 1)) throw new RangeError('a mass fraction lies above 0 and up to 1')
  return 2 ** (1 - 0.5 * Math.log10(massFraction))
}

/** Found over predicted relative standard deviation. */
export function horwitzRatio(relativeStandardDeviation: number, massFraction: number): number {
  return relativeStandardDeviation / predictedReproducibility(massFraction)
}
