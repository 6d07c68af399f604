import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { Section } from '@/components/ui/section'
import { CheckTable } from '@/components/validation/check-table'
import { ALL_CHECKS } from '@/lib/analysis/validation/all-checks'
import { once, runChecks } from '@/lib/analysis/validation/check'

export const metadata = {
  title: 'Validation',
  description: 'Every formula of the engine against published or independently computed numbers.',
}

/** The checks do not change while the server runs: computed at the first visit, with the very code that reduces the runs. */
const reports = once(() => runChecks(ALL_CHECKS))

const PROVENANCE = {
  read: 'numbers read in the source',
  recalled: 'numbers recalled from the source, trusted because the recomputation lands on them',
  computed: 'computed independently',
} as const

export default function ValidationPage() {
  const all = reports()
  const numbers = all.flatMap(({ results }) => results)
  const agreeing = numbers.filter(({ passes }) => passes).length
  return (
    <>
      <PageHead
        title="Validation"
        meta={`${String(all.length)} checks, ${String(numbers.length)} numbers, ${String(agreeing)} agree within the stated tolerance.`}
      />
      <PageBody>
        <p className="max-w-[46rem] text-ink-2">
          Each number below was published or computed elsewhere, and is computed here by the code that reduces the runs
          of this installation. Expected values come from R, scipy or arithmetic with 50 digits on the published data;
          where a book prints another figure, its reason is given. The same list runs as <code>npm run validate</code>.
        </p>
        <nav aria-label="Checks" className="mt-4">
          <ul className="flex flex-wrap gap-x-3 gap-y-1 p-0">
            {all.map(({ id, passes }) => (
              <li key={id} className="list-none">
                <a href={`#${id}`} className="inline-block min-h-6 py-0.5">
                  {id}
                  {passes ? '' : ' (disagrees)'}
                </a>
              </li>
            ))}
          </ul>
        </nav>
        {all.map((report) => (
          <div key={report.id} id={report.id} className="scroll-mt-4">
            <Section title={`${report.id} ${report.title}`}>
              <p className="mb-2 max-w-[60rem] text-ink-2">
                {report.source}; {PROVENANCE[report.provenance]}.
                {report.published === '' ? null : <> In print: {report.published}.</>}
              </p>
              <CheckTable report={report} />
            </Section>
          </div>
        ))}
      </PageBody>
    </>
  )
}
