// 2,000 Arrhenius lines with intervals, leverage, studentised residuals and Cook distances: this engine against statsmodels, on the
// same numbers in the same run, with the agreement of the results. Debian's python3-statsmodels must be installed.
//   npx tsx tests/bench/arrhenius.mts
import { spawnSync } from 'node:child_process'
import path from 'node:path'
import { createRandomStream } from '@/lib/analysis/statistics/random'
import { diagnoseResiduals } from '@/lib/analysis/statistics/residuals'
import { coverageFactor } from '@/lib/analysis/statistics/student-t'
import { fitWeightedLine } from '@/lib/analysis/statistics/weighted-line'

const COUNT = 2_000
const stream = createRandomStream(2026)
const temperatures = [490, 500, 510, 520, 530, 540, 550, 510]
const x = temperatures.map((t) => 1 / t)
const sets = Array.from({ length: COUNT }, () =>
  x.map((value) => -6 - 10_000 * (value - 1 / 520) + 0.03 * stream.nextNormal()),
)

/** The numbers both sides give for one line, in one order. */
function fit(y: readonly number[]): number[] {
  const line = fitWeightedLine(x, y, null)
  const diagnostics = diagnoseResiduals(line)
  const t = coverageFactor(0.95, line.degreesOfFreedom)
  const error = line.scaled?.slope ?? NaN
  return [
    line.slope,
    line.intercept,
    line.slope - t * error,
    line.slope + t * error,
    ...diagnostics.leverage,
    ...diagnostics.externallyStudentised.map((value) => value ?? NaN),
    ...diagnostics.cookDistance.map((value) => value ?? NaN),
  ]
}

for (const y of sets) fit(y)
let best = Infinity
let ours: number[][] = []
for (let repeat = 0; repeat < 5; repeat += 1) {
  const started = performance.now()
  ours = sets.map(fit)
  best = Math.min(best, performance.now() - started)
}

const done = spawnSync('/usr/bin/python3', [path.join(import.meta.dirname, 'arrhenius_statsmodels.py')], {
  input: JSON.stringify({ x, sets }),
  maxBuffer: 2 ** 28,
  encoding: 'utf8',
})
if (done.status !== 0) {
  console.error(`statsmodels did not run: ${done.stderr.trim().split('\n').at(-1) ?? ''}`)
  process.exit(1)
}
const reply: unknown = JSON.parse(done.stdout)
if (typeof reply !== 'object' || reply === null || !('seconds' in reply) || !('results' in reply))
  throw new Error('unexpected reply')
const seconds = Number(reply.seconds)
const theirs = Array.isArray(reply.results) ? reply.results : []
let worst = 0
for (const [i, row] of ours.entries())
  for (const [j, value] of row.entries()) {
    const other = Number(Array.isArray(theirs[i]) ? theirs[i][j] : NaN)
    const difference = Math.abs(value - other) / Math.max(Math.abs(other), 1e-6)
    if (!(difference <= worst)) worst = difference
  }
console.log(`this engine   ${best.toFixed(1)} ms for ${String(COUNT)} lines`)
console.log(`statsmodels   ${(1_000 * seconds).toFixed(1)} ms`)
console.log(`ratio         ${((1_000 * seconds) / best).toFixed(0)}`)
console.log(`largest relative difference of all results  ${worst.toExponential(1)}`)
process.exitCode = worst < 1e-6 ? 0 : 1
