import { notFound } from 'next/navigation'
import { ActionForm } from '@/components/ui/action-form'
import { CheckField } from '@/components/ui/check-field'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { SelectField } from '@/components/ui/select-field'
import { TextArea } from '@/components/ui/text-area'
import { TextField } from '@/components/ui/text-field'
import { requireActor } from '@/lib/access/actor'
import { listReactions } from '@/lib/access/reactions'
import { listSamples } from '@/lib/access/samples'
import { can } from '@/lib/policy/can'
import { createCampaignAction } from './actions'

export const metadata = { title: 'New campaign' }

export default async function NewCampaignPage() {
  const actor = await requireActor()
  if (!can.makeCampaign(actor)) notFound()
  const [reactions, samples] = await Promise.all([listReactions(actor), listSamples(actor)])
  return (
    <>
      <PageHead
        title="New campaign"
        meta="You become its lead. It starts with method 1, all settings at their defaults."
      />
      <PageBody isNarrow>
        <ActionForm action={createCampaignAction} submitLabel="Make the campaign" busyLabel="Making">
          <div className="grid gap-3 sm:grid-cols-2">
            <TextField name="code" label="Code" placeholder="CQ-METH-1" />
            <TextField name="laboratory" label="Laboratory" isOptional />
            <TextField
              name="name"
              label="Name"
              className="sm:col-span-2"
              placeholder="Low-temperature CO₂ methanation"
            />
            <SelectField
              name="reactionId"
              label="Reaction"
              className="sm:col-span-2"
              unchosen={reactions.length === 0 ? 'No reaction yet: make one first' : 'Choose a reaction'}
              choices={reactions.map((reaction) => ({
                value: reaction.id,
                label: `${reaction.code}: ${reaction.name}`,
              }))}
            />
            <TextArea name="description" label="What it is for" className="sm:col-span-2" isOptional />
          </div>
          {samples.length === 0 ? null : (
            <fieldset className="mt-4 border-t border-line pt-3">
              <legend className="pr-3 font-head text-[17px] font-[560]">Samples in it</legend>
              <div className="grid gap-2 sm:grid-cols-2">
                {samples.map((sample) => (
                  <CheckField
                    key={sample.id}
                    name="sampleIds"
                    value={sample.id}
                    label={`${sample.code}, ${sample.name}`}
                  />
                ))}
              </div>
            </fieldset>
          )}
        </ActionForm>
      </PageBody>
    </>
  )
}
