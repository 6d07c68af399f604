import { showOrNotFound } from '@/app/_show-or-not-found'
import { CalibrationDrop } from '@/components/forms/calibration-drop'
import { CalibrationForm } from '@/components/forms/calibration-form'
import { DataTable } from '@/components/ui/data-table'
import { Fold } from '@/components/ui/fold'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { Section } from '@/components/ui/section'
import { requireActor } from '@/lib/access/actor'
import { listCalibrations } from '@/lib/access/calibrations'
import { listRigs } from '@/lib/access/rigs'
import { type Calibration } from '@/lib/domain/calibration'
import { formatDay } from '@/lib/domain/format-instant'
import { can } from '@/lib/policy/can'
import { createCalibrationAction } from '../actions'

export const metadata = { title: 'Calibrations' }

function uncertaintyOf(calibration: Calibration): string {
  const entry = calibration.entries[0]
  if (entry === undefined) return ''
  if (entry.relativeStandardUncertainty !== null)
    return `${Number((entry.relativeStandardUncertainty * 100).toPrecision(3))} %`
  if (entry.absoluteStandardUncertainty !== null) return `${entry.absoluteStandardUncertainty} ${entry.unit}`
  return 'method’s default'
}

export default async function CalibrationsPage() {
  const actor = await requireActor()
  const [calibrations, rigs] = await showOrNotFound(Promise.all([listCalibrations(actor), listRigs(actor)]))
  const rigOf = (id: string | null) => (id === null ? 'all' : (rigs.find((rig) => rig.id === id)?.code ?? ''))
  return (
    <>
      <PageHead
        title="Calibrations"
        meta="A run uses those that hold when it starts. A newer one re-values in the open what used the older."
      />
      <PageBody>
        <DataTable
          caption="Calibrations"
          rows={calibrations}
          rowKey={(row) => row.id}
          empty="No calibration yet. Drop a table of response factors below: one row a species."
          columns={[
            { key: 'name', head: 'Name', isRowHead: true, cell: (row) => row.name },
            { key: 'kind', head: 'Of', cell: (row) => row.kind.replace('-', ' ') },
            { key: 'rig', head: 'Rig', cell: (row) => rigOf(row.rigId) },
            {
              key: 'entries',
              head: 'Values',
              cell: (row) =>
                row.kind === 'response-factors' ? (
                  <Fold label={`${row.entries.length} species, ${row.convention ?? ''}`}>
                    <DataTable
                      caption={`Response factors of ${row.name}`}
                      rows={row.entries}
                      rowKey={(entry) => entry.species ?? ''}
                      columns={[
                        { key: 'species', head: 'Species', isRowHead: true, cell: (entry) => entry.species },
                        { key: 'value', head: 'Value', isNumber: true, cell: (entry) => entry.value.toExponential() },
                        { key: 'unit', head: 'Unit', cell: (entry) => entry.unit },
                      ]}
                    />
                  </Fold>
                ) : (
                  row.standardUsed
                ),
            },
            { key: 'u', head: 'Uncertainty', unit: 'one standard', isNumber: true, cell: uncertaintyOf },
            { key: 'from', head: 'Holds from', cell: (row) => formatDay(row.validFrom, 'UTC') },
            {
              key: 'to',
              head: 'to',
              cell: (row) => (row.validTo === null ? 'further notice' : formatDay(row.validTo, 'UTC')),
            },
          ]}
        />
        {can.makeCalibration(actor) ? (
          <Section title="Response factors">
            <div className="max-w-[46rem]">
              <CalibrationDrop rigs={rigs.map(({ id, code }) => ({ value: id, label: code }))} />
            </div>
          </Section>
        ) : null}
        {can.makeCalibration(actor) ? (
          <Section title="Add another kind" note="Flow controller, balance, thermocouple, gauge, cylinder">
            <div className="max-w-[46rem]">
              <CalibrationForm
                rigs={rigs.map(({ id, code }) => ({ value: id, label: code }))}
                action={createCalibrationAction}
              />
            </div>
          </Section>
        ) : null}
      </PageBody>
    </>
  )
}
