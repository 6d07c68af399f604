import { ActionButton } from '@/components/forms/action-button'
import { PasswordChangeForm } from '@/components/forms/password-change-form'
import { ProfileForm } from '@/components/forms/profile-form'
import { TokenForm } from '@/components/forms/token-form'
import { DataTable } from '@/components/ui/data-table'
import { Facts } from '@/components/ui/facts'
import { Moment } from '@/components/ui/moment'
import { PageHead } from '@/components/ui/page-head'
import { Section } from '@/components/ui/section'
import { Tag } from '@/components/ui/tag'
import { requireActor } from '@/lib/access/actor'
import { listCampaignNames } from '@/lib/access/campaign-names'
import { listSessions } from '@/lib/access/sessions'
import { listTokens } from '@/lib/access/tokens'
import { type TokenSummary } from '@/lib/domain/person'
import {
  changePasswordAction,
  changeProfileAction,
  createTokenAction,
  endOtherSessionsAction,
  endSessionAction,
  revokeTokenAction,
} from './actions'
import { describeBrowser } from './describe-browser'
import { SettingsTabs } from './settings-tabs'

export const metadata = { title: 'Settings' }

export default async function SettingsPage() {
  const actor = await requireActor()
  const [sessions, tokens, campaigns] = await Promise.all([
    listSessions(actor),
    listTokens(actor),
    listCampaignNames(actor),
  ])
  const codes = new Map(campaigns.map((campaign) => [campaign.id, campaign.code]))
  const now = new Date().toISOString()
  const isEnded = (token: TokenSummary) =>
    token.revokedAt !== null || (token.expiresAt !== null && token.expiresAt <= now)
  return (
    <>
      <PageHead title="Settings" meta={`${actor.displayName}, ${actor.email}`} />
      <SettingsTabs actor={actor} />
      <div className="max-w-[60rem] px-4 sm:px-6">
        <div className="grid gap-x-12 lg:grid-cols-2">
          <Section title="Profile">
            <ProfileForm action={changeProfileAction} displayName={actor.displayName} />
            <div className="mt-5">
              <Facts
                items={[
                  { label: 'E-mail address', value: actor.email },
                  { label: 'Role in the house', value: actor.role },
                ]}
              />
            </div>
          </Section>
          <Section title="Password">
            <PasswordChangeForm action={changePasswordAction} email={actor.email} />
          </Section>
        </div>

        <Section
          title="Sessions"
          note="30 minutes without use end one, 12 hours in any case"
          actions={
            sessions.length > 1 ? (
              <ActionButton
                action={endOtherSessionsAction}
                fields={{}}
                label="End all others"
                describes="sessions"
                busyLabel="Ending"
              />
            ) : undefined
          }
        >
          <DataTable
            caption="Places where you are signed in"
            rows={sessions}
            rowKey={(session) => session.ref}
            columns={[
              {
                key: 'where',
                head: 'Browser',
                isRowHead: true,
                cell: (session) => (
                  <>
                    {describeBrowser(session.userAgent)} {session.isThisOne ? <Tag kind="sound">this one</Tag> : null}
                  </>
                ),
              },
              { key: 'network', head: 'Network', cell: (session) => session.ipPrefix },
              { key: 'since', head: 'Signed in', cell: (session) => <Moment at={session.signedInAt} /> },
              { key: 'seen', head: 'Last used', cell: (session) => <Moment at={session.lastSeenAt} /> },
              {
                key: 'end',
                head: <span className="sr-only">End</span>,
                className: 'text-right',
                cell: (session) =>
                  session.isThisOne ? null : (
                    <ActionButton
                      action={endSessionAction}
                      fields={{ ref: session.ref }}
                      label="End"
                      describes={`session of ${describeBrowser(session.userAgent)} on ${session.ipPrefix}`}
                      busyLabel="Ending"
                    />
                  ),
              },
            ]}
          />
        </Section>

        <Section title="API tokens" note="for scripts and instrument computers">
          <DataTable
            caption="Your API tokens"
            rows={tokens}
            rowKey={(token) => token.id}
            empty="No tokens yet. A script or an instrument computer needs one to add files or read results."
            columns={[
              { key: 'name', head: 'Used by', isRowHead: true, cell: (token) => token.name },
              { key: 'scopes', head: 'May', cell: (token) => token.scopes.join(', ') },
              {
                key: 'campaign',
                head: 'Campaign',
                cell: (token) =>
                  token.campaignId === null ? 'all' : (codes.get(token.campaignId) ?? 'no longer yours'),
              },
              {
                key: 'used',
                head: 'Last used',
                cell: (token) => (token.lastUsedAt === null ? 'never' : <Moment at={token.lastUsedAt} />),
              },
              {
                key: 'expires',
                head: 'Works until',
                cell: (token) =>
                  token.revokedAt !== null ? (
                    <Tag>revoked</Tag>
                  ) : token.expiresAt === null ? (
                    'revoked'
                  ) : (
                    <>
                      <Moment at={token.expiresAt} /> {isEnded(token) ? <Tag>ended</Tag> : null}
                    </>
                  ),
              },
              {
                key: 'revoke',
                head: <span className="sr-only">Revoke</span>,
                className: 'text-right',
                cell: (token) =>
                  isEnded(token) ? null : (
                    <ActionButton
                      action={revokeTokenAction}
                      fields={{ tokenId: token.id }}
                      label="Revoke"
                      describes={`token of ${token.name}`}
                      busyLabel="Revoking"
                      question={{
                        title: `Revoke the token of ${token.name}?`,
                        text: 'Whatever uses it is refused from now on. This cannot be taken back; a new token can be made.',
                      }}
                    />
                  ),
              },
            ]}
          />
          <div className="mt-6 max-w-[34rem]">
            <h3 className="mb-3 text-[15px]">A new token</h3>
            <TokenForm
              action={createTokenAction}
              campaigns={campaigns.map((campaign) => ({
                value: campaign.id,
                label: `${campaign.code}, ${campaign.name}`,
              }))}
            />
          </div>
        </Section>
      </div>
    </>
  )
}
