// How often the 95 % intervals of the engine hold the truth, over simulated runs: `npm run study:coverage [fits]`, seeded.
import { studyAll } from '../tests/study/coverage-study'

const count = Number(process.argv[2] ?? '20000')
const tallies = studyAll(count)
let outside = 0
for (const { estimator, quantity, nominal, hits, low, high, passes } of tallies) {
  if (!passes) outside += 1
  const share = ((100 * hits) / count).toFixed(2)
  console.log(
    `${passes ? 'ok ' : 'OUT'} ${estimator.padEnd(38)} ${quantity.padEnd(34)} ${share.padStart(6)} % of ${String(count)} | stated ${String(100 * nominal)} %, allowed ${((100 * low) / count).toFixed(2)} to ${((100 * high) / count).toFixed(2)} %`,
  )
}
console.log(
  `\n${String(tallies.length)} tallies, ${String(outside)} outside the exact binomial region at the 0.1 % level.`,
)
process.exitCode = outside === 0 ? 0 : 1
