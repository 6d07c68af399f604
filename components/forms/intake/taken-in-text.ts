import { type Problem, type Upload } from '@/lib/domain/intake'

const rows = (count: number, kind: Upload['kind']) => {
  const word = kind === 'analyser' ? 'injection' : 'row'
  return `${count.toLocaleString('en')} ${word}${count === 1 ? '' : 's'}`
}

/** What a confirmation took in or would take in: `2,160 rows, nothing left out`. Without a count, as a kept record has none, only what was wrong. */
export function takenInText(
  kind: Upload['kind'],
  rowCount: number | null,
  problems: readonly Pick<Problem, 'severity'>[],
): string {
  if (kind === 'attachment') return 'kept beside the run, not read'
  const faults = problems.filter((problem) => problem.severity !== 'note').length
  const said =
    faults === 0
      ? 'nothing left out'
      : `${faults.toLocaleString('en')} ${faults === 1 ? 'problem' : 'problems'}, listed below`
  return rowCount === null ? said : `${rows(rowCount, kind)}, ${said}`
}
