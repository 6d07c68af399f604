// Every check of the engine against published and independently computed numbers: `npm run validate`. Ends with 1 when one disagrees.
import { ALL_CHECKS } from '../lib/analysis/validation/all-checks'
import { runChecks } from '../lib/analysis/validation/check'

const reports = runChecks(ALL_CHECKS)
let disagreeing = 0
let numbers = 0
for (const report of reports) {
  console.log(`\n${report.id} ${report.title}\n    ${report.source} (${report.provenance})`)
  for (const { quantity, unit, expected, obtained, relativeError, tolerance, passes } of report.results) {
    numbers += 1
    if (!passes) disagreeing += 1
    const error = relativeError === null ? 'no number' : relativeError.toExponential(1)
    const shown = obtained === null ? 'none' : String(Number(obtained.toPrecision(12)))
    console.log(
      `  ${passes ? 'ok ' : 'NO '} ${quantity} ${shown}${unit === '1' ? '' : ` ${unit}`} | expected ${String(expected)} | error ${error} of ${tolerance.toExponential(0)} allowed`,
    )
  }
}
console.log(`\n${String(reports.length)} checks, ${String(numbers)} numbers, ${String(disagreeing)} disagree.`)
process.exitCode = disagreeing === 0 ? 0 : 1
