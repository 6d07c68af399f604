import { showOrNotFound } from '@/app/_show-or-not-found'
import { ReactionForm } from '@/components/forms/reaction-form'
import { Facts } from '@/components/ui/facts'
import { PageBody } from '@/components/ui/page-body'
import { PageHead } from '@/components/ui/page-head'
import { Section } from '@/components/ui/section'
import { requireActor } from '@/lib/access/actor'
import { getReaction } from '@/lib/access/reactions'
import { equationText } from '@/lib/domain/read-equation'
import { speciesText } from '@/lib/domain/species-text'
import { can } from '@/lib/policy/can'
import { changeReactionAction } from '../actions'

export const metadata = { title: 'Reaction' }

export default async function ReactionPage({ params }: { params: Promise<{ reactionId: string }> }) {
  const actor = await requireActor()
  const reaction = await showOrNotFound(getReaction(actor, (await params).reactionId))
  return (
    <>
      <PageHead title={reaction.code} of={reaction.name} />
      <PageBody isNarrow>
        <Facts
          items={[
            ...reaction.steps.map((step, position) => ({
              label: position === 0 ? 'Main reaction' : `Side reaction ${String(position)}`,
              value: equationText(step),
            })),
            { label: 'Key reactant', value: speciesText(reaction.keyReactant) },
            {
              label: 'Thermochemistry',
              value:
                reaction.thermochemistry === null
                  ? 'built-in tables'
                  : `given for ${Object.keys(reaction.thermochemistry).map(speciesText).join(', ')}`,
            },
            ...(reaction.notes === '' ? [] : [{ label: 'Notes', value: reaction.notes }]),
          ]}
        />
        {can.makeReaction(actor) ? (
          <Section title="Change">
            <ReactionForm
              key={reaction.version}
              reaction={reaction}
              action={changeReactionAction.bind(null, { id: reaction.id, version: reaction.version })}
            />
          </Section>
        ) : null}
      </PageBody>
    </>
  )
}
