import { AnalysisError } from '../analysis-error'

/** Nodes and weights of the 15-point Kronrod rule with the 7-point Gauss rule in it. Source: Kronrod 1965; Piessens et al., QUADPACK, 1983, routine QK15. */
const NODES = [
  0.991455371120812639206854697526329, 0.949107912342758524526189684047851, 0.864864423359769072789712788640926,
  0.741531185599394439863864773280788, 0.58608723546769113029414469173014, 0.405845151377397166906606412076961,
  0.207784955007898467600689403773245, 0,
]
const KRONROD = [
  0.02293532201052922496373200805897, 0.063092092629978553290700663189204, 0.104790010322250183839876322541518,
  0.140653259715525918745189590510238, 0.16900472663926790282829543319284, 0.190350578064785409913256402421014,
  0.204432940075298892414161999234649, 0.209482141084727828012999174891714,
]
const GAUSS = [
  0.129484966168869693270611432679082, 0.27970539148927666790146777142378, 0.381830050505118944950369775488975,
  0.417959183673469387755102040816327,
]

const MAXIMUM_PIECES = 200

/**
 * Definite integral of a smooth function.
 *
 * ∫ f dx by the 15-point Gauss-Kronrod rule, halving the piece with the largest error until the sum of the errors is within the tolerance.
 *
 * Integrable end-point singularities of the kind (1−x)^(−1/2) converge slowly but surely; poles are refused.
 * Source: Piessens, de Doncker-Kapenga, Überhuber and Kahaner, QUADPACK, 1983, routine QAG.
 *
 * @param f - function of x, finite within the range [-]
 * @param from - lower end [unit of x]
 * @param to - upper end [unit of x]
 * @param relativeTolerance - largest relative error of the result [-]
 * @returns the integral [unit of f times unit of x]
 * @throws {AnalysisError} no-convergence when the tolerance is not met, or the function is not finite
 */
export function integrate(f: (x: number) => number, from: number, to: number, relativeTolerance = 1e-12): number {
  if (from === to) return 0
  const pieces = [piece(f, from, to)]
  for (;;) {
    let total = 0
    let error = 0
    let worst = 0
    for (const [index, entry] of pieces.entries()) {
      total += entry.value
      error += entry.error
      if (entry.error > (pieces[worst]?.error ?? 0)) worst = index
    }
    if (error <= relativeTolerance * Math.abs(total) || error < 1e-300) return total
    const widest = pieces[worst]
    if (!Number.isFinite(total) || widest === undefined || pieces.length >= MAXIMUM_PIECES)
      throw new AnalysisError('no-convergence', 'The integral does not converge over this range.', { from, to })
    const middle = (widest.from + widest.to) / 2
    // a piece as narrow as the spacing of numbers that still errs sits on a pole
    if (Math.abs(widest.to - widest.from) < 1e-13 * Math.max(Math.abs(from), Math.abs(to)))
      throw new AnalysisError('no-convergence', 'The integral does not converge over this range.', { from, to })
    pieces.splice(worst, 1, piece(f, widest.from, middle), piece(f, middle, widest.to))
  }
}

interface Piece {
  readonly from: number
  readonly to: number
  readonly value: number
  readonly error: number
}

function piece(f: (x: number) => number, from: number, to: number): Piece {
  const centre = (from + to) / 2
  const half = (to - from) / 2
  const middle = f(centre)
  let kronrod = middle * (KRONROD[7] ?? 0)
  let gauss = middle * (GAUSS[3] ?? 0)
  let size = Math.abs(kronrod)
  for (let i = 0; i < 7; i += 1) {
    const step = half * (NODES[i] ?? 0)
    const sum = f(centre - step) + f(centre + step)
    kronrod += sum * (KRONROD[i] ?? 0)
    size += Math.abs(sum) * (KRONROD[i] ?? 0)
    if (i % 2 === 1) gauss += sum * (GAUSS[(i - 1) / 2] ?? 0)
  }
  // below this the difference of the two rules is rounding and not error
  const rounding = 50 * Number.EPSILON * size * Math.abs(half)
  const error = Math.abs((kronrod - gauss) * half)
  return { from, to, value: kronrod * half, error: error <= rounding ? 0 : error }
}
