import { NewAccountForm } from '@/components/forms/new-account-form'
import { acceptInvitationAction } from './actions'

export const metadata = { title: 'Invitation' }

export default function InvitationPage() {
  return (
    <>
      <h1>Choose a password</h1>
      <p className="mt-1 mb-6 text-ink-2">An invitation works once, for a week. You are signed in straight away.</p>
      <NewAccountForm
        action={acceptInvitationAction}
        codeLabel="Invitation code"
        codeHint="From the admin who invited you; it stands in the link already, if you followed one."
        asksWho={false}
        submitLabel="Set the password and sign in"
      />
    </>
  )
}
