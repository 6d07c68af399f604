import { notFound } from 'next/navigation'
import { NewAccountForm } from '@/components/forms/new-account-form'
import { isSetUpNeeded } from '@/lib/access/set-up'
import { setUpAction } from './actions'

export const metadata = { title: 'Set up' }

export default async function SetUpPage() {
  if (!(await isSetUpNeeded())) notFound()
  return (
    <>
      <h1>Set up this installation</h1>
      <p className="mt-1 mb-6 text-ink-2">
        You become the first admin: you invite the others, and keep rigs and backups. The server printed a set-up code
        when it started; it works once, for a day.
      </p>
      <NewAccountForm
        action={setUpAction}
        codeLabel="Set-up code"
        codeHint="In the terminal or log of the server, after “Set-up code”."
        asksWho
        submitLabel="Become the first admin"
      />
    </>
  )
}
