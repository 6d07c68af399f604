'use client'

import { useState } from 'react'
import { Button } from '@/components/ui/button'
import { DataTable } from '@/components/ui/data-table'
import { Tag, type TagKind } from '@/components/ui/tag'
import { type Problem } from '@/lib/domain/intake'

const SEVERITIES: Readonly<Record<Problem['severity'], { readonly label: string; readonly kind: TagKind }>> = {
  fatal: { label: 'stops the file', kind: 'fault' },
  problem: { label: 'problem', kind: 'doubt' },
  note: { label: 'note', kind: 'plain' },
}
const ORDER: readonly Problem['severity'][] = ['fatal', 'problem', 'note']
const FIRST = 20

/** Everything that is wrong with a file, by row and column, the gravest first. */
export function ProblemTable({
  problems,
  fileName,
}: {
  readonly problems: readonly Problem[]
  readonly fileName: string
}) {
  const [isWhole, setIsWhole] = useState(false)
  if (problems.length === 0) return null
  const sorted = ORDER.flatMap((severity) => problems.filter((problem) => problem.severity === severity)).map(
    (problem, index) => ({ ...problem, key: String(index) }),
  )
  const shown = isWhole ? sorted : sorted.slice(0, FIRST)
  return (
    <div className="mt-4">
      <h3 className="mb-1">
        {problems.length === 1 ? 'One thing to know' : `${problems.length.toLocaleString('en')} things to know`}
      </h3>
      <DataTable
        caption={`Problems of ${fileName}`}
        rows={shown}
        rowKey={(row) => row.key}
        columns={[
          {
            key: 'severity',
            head: 'What',
            cell: (row) => <Tag kind={SEVERITIES[row.severity].kind}>{SEVERITIES[row.severity].label}</Tag>,
          },
          {
            key: 'row',
            head: 'Row',
            isNumber: true,
            isRowHead: true,
            cell: (row) => (row.line === null ? 'whole file' : row.line),
          },
          { key: 'column', head: 'Column', cell: (row) => row.column ?? '' },
          { key: 'sentence', head: 'In words', cell: (row) => row.sentence, className: 'min-w-64' },
          { key: 'found', head: 'Found', cell: (row) => row.found },
          { key: 'expected', head: 'Expected', cell: (row) => row.expected, className: 'min-w-44' },
        ]}
      />
      {shown.length < sorted.length ? (
        <Button className="mt-2" onClick={() => setIsWhole(true)}>
          Show all {sorted.length.toLocaleString('en')}
        </Button>
      ) : null}
    </div>
  )
}
