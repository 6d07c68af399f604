import ln from '@stdlib/math-base-special-ln'

/**
 * Akaike's criterion with the correction for few points: the smaller, the better the model.
 *
 * n ln(RSS/n) + 2k + 2k(k + 1)/(n − k − 1), k counts the fitted parameters and the variance
 *
 * Same data and same weights for all models compared; models within about 2 cannot be told apart.
 * Source: Hurvich and Tsai, Biometrika 76 (1989) 297; Burnham and Anderson, 2nd edition, 2002.
 *
 * @param residualSumOfSquares - weighted residual sum of squares [any] > 0
 * @param count - number of points [-]
 * @param parameters - fitted parameters plus one for the variance [-]
 * @returns criterion [-]; null with too few points for the correction, or no scatter
 */
export function aicc(residualSumOfSquares: number, count: number, parameters: number): number | null {
  if (!(count - parameters - 1 > 0) || !(residualSumOfSquares > 0)) return null
  return (
    count * ln(residualSumOfSquares / count) +
    2 * parameters +
    (2 * parameters * (parameters + 1)) / (count - parameters - 1)
  )
}
