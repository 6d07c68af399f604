import Link from 'next/link'
import { redirect } from 'next/navigation'
import { routeOf } from '@/app/_route-of'
import { SignInForm } from '@/components/forms/sign-in-form'
import { Notice } from '@/components/ui/notice'
import { getActor } from '@/lib/access/actor'
import { isSetUpNeeded } from '@/lib/access/set-up'
import { safeNextPath } from '@/lib/auth/next-path'
import { signInAction } from './actions'

export const metadata = { title: 'Sign in' }

export default async function SignInPage({
  searchParams,
}: {
  searchParams: Promise<Record<string, string | string[] | undefined>>
}) {
  const next = safeNextPath((await searchParams).next)
  if ((await getActor()) !== null) redirect(routeOf(next))
  return (
    <>
      <h1>Sign in</h1>
      <p className="mt-1 mb-6 text-ink-2">From reactor log to a ranking you can defend.</p>
      {(await isSetUpNeeded()) ? (
        <Notice kind="doubt" title="There is no admin yet." className="mb-6">
          Whoever started the server has a set-up code. <Link href="/set-up">Set this installation up</Link>.
        </Notice>
      ) : null}
      <SignInForm action={signInAction} next={next} />
      <p className="prose mt-8 text-[13px] text-ink-2">
        No account, or a lost password: an admin sends an invitation. You have its code already:{' '}
        <Link href="/invitation">choose a password</Link>.
      </p>
      <p className="prose mt-2 text-[13px] text-ink-2">
        Every formula is held against published values: <Link href="/validation">see them computed</Link>.
      </p>
    </>
  )
}
