import { type Route } from 'next'
import { LinkButton } from '@/components/ui/link-button'
import { Section } from '@/components/ui/section'
import { Tag } from '@/components/ui/tag'

export interface SetUpStep {
  readonly name: string
  readonly href: Route
  readonly isDone: boolean
  readonly words: string
}

/** The order in which an empty product is set up: what is done, what comes next, what comes after. */
export function SetUpSteps({ steps }: { readonly steps: readonly SetUpStep[] }) {
  const next = steps.findIndex((step) => !step.isDone)
  return (
    <Section title="Set up, in this order">
      <ol className="max-w-[62ch] border-t border-line">
        {steps.map((step, position) => (
          <li key={step.name} className="flex flex-wrap items-center gap-x-4 gap-y-1 border-b border-line py-2.5">
            <span className="w-6 font-head text-[17px] text-ink-3">{position + 1}</span>
            <span className="min-w-0 flex-1 basis-60">
              <span className="font-semibold">{step.name}</span>
              <span className="block text-ink-2">{step.words}</span>
            </span>
            {step.isDone ? (
              <Tag kind="sound">done</Tag>
            ) : (
              <LinkButton href={step.href} kind={position === next ? 'main' : 'plain'}>
                {position === next ? `Next: ${step.name.toLowerCase()}` : step.name}
              </LinkButton>
            )}
          </li>
        ))}
      </ol>
    </Section>
  )
}
