/**
 * Derivatives of a vector function by its parameters, by central differences extrapolated twice to zero step.
 *
 * D(h) = [f(p + h) − f(p − h)]/(2h); D = [64 D(h/4) − 20 D(h/2) + D(h)]/45
 *
 * Error of order h⁶: about 1e-11 relative for smooth functions.
 * Source: Richardson, Phil. Trans. R. Soc. A 210 (1911) 307; Press et al., Numerical Recipes, 3rd edition, section 5.7.
 *
 * @param f - values at given parameters [any]
 * @param parameters - where the derivatives are wanted [any]
 * @param typicalSizes - size of each parameter, so that one near zero still gets a useful step; its own value without it [unit of each parameter]
 * @returns matrix, a row a value and a column a parameter [unit of f over unit of the parameter]
 */
export function numericalJacobian(
  f: (parameters: readonly number[]) => readonly number[],
  parameters: readonly number[],
  typicalSizes: readonly number[] | null = null,
): number[][] {
  const columns = parameters.map((value, j) => {
    const step = 2e-2 * Math.max(Math.abs(value), 0.1 * (typicalSizes?.[j] ?? 0), 1e-30)
    const slope = (h: number): number[] => {
      // the step as the machine holds it
      const up = value + h
      const down = value - h
      const above = f(parameters.map((p, k) => (k === j ? up : p)))
      const below = f(parameters.map((p, k) => (k === j ? down : p)))
      return above.map((high, i) => (high - (below[i] ?? NaN)) / (up - down))
    }
    const [wide, middle, narrow] = [slope(step), slope(step / 2), slope(step / 4)]
    return wide.map((d, i) => (64 * (narrow[i] ?? NaN) - 20 * (middle[i] ?? NaN) + d) / 45)
  })
  const rows = columns[0]?.length ?? 0
  return Array.from({ length: rows }, (_unused, i) => columns.map((column) => column[i] ?? NaN))
}
