import { readdirSync } from 'node:fs'
import { request as httpRequest } from 'node:http'
import path from 'node:path'
import { afterAll, beforeAll, describe, expect, test } from 'vitest'
import { openBrowser, type BrowserSession } from '@/tests/support/browser'
import { seriousFaults, widthAt360 } from '@/tests/support/page-checks'
import { startServer, type DemoServer } from '@/tests/support/demo-server'

let server: DemoServer
let admin: BrowserSession
let origin: string
beforeAll(async () => {
  server = await startServer({ data: 'empty' })
  origin = server.origin
  admin = await openBrowser()
})
afterAll(async () => {
  await admin?.close()
  await server?.stop()
})

const ADMIN = { name: 'Canary Ada', email: 'canary-ada@example.test', password: 'kettle orbit marzipan tundra' }
const TOM = { name: 'Canary Tom', email: 'canary-tom@example.test', password: 'lantern walrus cobalt thimble' }

interface Answer {
  readonly status: number
  readonly headers: Readonly<Record<string, string | string[] | undefined>>
  readonly body: string
}
/** A request with any header at all, which a browser would not send. */
function send(method: string, path: string, headers: Record<string, string>, body = ''): Promise<Answer> {
  return new Promise((resolve, reject) => {
    const { hostname, port } = new URL(origin)
    const sent = httpRequest({ hostname, port, method, path, headers }, (answer) => {
      let text = ''
      answer.setEncoding('utf8')
      answer.on('data', (piece: string) => (text += piece))
      answer.on('end', () => resolve({ status: answer.statusCode ?? 0, headers: answer.headers, body: text }))
    })
    sent.on('error', reject)
    sent.end(body)
  })
}
const cookieOf = async (session: BrowserSession) =>
  (await session.context.cookies()).map((cookie) => `${cookie.name}=${cookie.value}`).join('; ')

describe.sequential('people', () => {
  let invitation: string
  let tom: BrowserSession

  test('the first admin comes in with the printed code, and not with a weak password', async () => {
    const code = /Set-up code: (code_\S+)/.exec(server.output())?.[1] ?? ''
    const { page } = admin
    await page.goto(`${origin}/set-up#${code}`)
    await expect.poll(() => page.getByLabel('Set-up code').inputValue()).toBe(code)
    await page.getByLabel('Name, as others see it').fill(ADMIN.name)
    await page.getByLabel('E-mail address').fill(ADMIN.email)
    await page.getByLabel('New password', { exact: true }).fill('canary-ada-2026')
    await page.getByRole('button', { name: 'Become the first admin' }).click()
    await page.getByText('made of common words').first().waitFor()
    expect(await seriousFaults(page)).toEqual([])
    expect(await widthAt360(page)).toBe(360)
    await page.getByLabel('New password', { exact: true }).fill(ADMIN.password)
    await page.getByRole('button', { name: 'Become the first admin' }).click()
    await page.waitForURL(`${origin}/`)
    await page
      .getByRole('link', { name: `${ADMIN.name}, admin` })
      .first()
      .waitFor()
    expect((await page.request.get(`${origin}/set-up`)).status()).toBe(404)
  })

  test('cookies are for this host, out of reach of scripts, and gone with the browser', async () => {
    const cookies = await admin.context.cookies()
    const session = cookies.find((cookie) => cookie.name === '__Host-sid')
    expect(session).toMatchObject({ httpOnly: true, secure: true, sameSite: 'Lax', path: '/', expires: -1 })
    expect(await admin.page.evaluate(() => document.cookie)).toBe('')
  })

  test('settings: a token is shown once and works until it is revoked; the name changes everywhere', async () => {
    const { page } = admin
    await page.goto(`${origin}/settings`)
    await page.getByLabel('What will use it').fill('rig computer')
    await page.getByRole('button', { name: 'Make a token' }).click()
    const secret = (await page.locator('code').first().textContent()) ?? ''
    expect(secret).toMatch(/^ik_/)
    const me = () => send('GET', '/api/v1/me', { Authorization: `Bearer ${secret}` })
    expect((await me()).status).toBe(200)
    expect(await seriousFaults(page)).toEqual([])
    expect(await widthAt360(page)).toBe(360)
    await page.reload()
    expect(await page.content()).not.toContain(secret)
    await page.getByRole('button', { name: 'Revoke: token of rig computer' }).click()
    await page.getByRole('dialog').getByRole('button', { name: 'Revoke' }).click()
    await page
      .getByRole('row', { name: /rig computer/ })
      .getByText('revoked')
      .waitFor()
    expect((await me()).status).toBe(401)
  })

  test('an admin invites, the invited person chooses a password and comes in as what they are', async () => {
    const { page } = admin
    await page.goto(`${origin}/settings/people`)
    await page.getByLabel('Name', { exact: true }).fill(TOM.name)
    await page.getByLabel('E-mail address').fill(TOM.email)
    await page.getByRole('combobox', { name: 'Role in the house' }).selectOption('technician')
    await page.getByRole('button', { name: 'Invite', exact: true }).click()
    invitation = (await page.locator('code').first().textContent()) ?? ''
    await page
      .getByRole('row', { name: new RegExp(TOM.email) })
      .getByText('invited')
      .waitFor()
    expect(await seriousFaults(page)).toEqual([])
    expect(await widthAt360(page)).toBe(360)

    tom = await openBrowser()
    await tom.page.goto(invitation)
    await tom.page.getByLabel('New password', { exact: true }).fill(TOM.password)
    expect(await seriousFaults(tom.page)).toEqual([])
    await tom.page.getByRole('button', { name: 'Set the password and sign in' }).click()
    await tom.page.waitForURL(`${origin}/`)
    await tom.page
      .getByRole('link', { name: `${TOM.name}, technician` })
      .first()
      .waitFor()
    const people = await tom.page.goto(`${origin}/settings/people`)
    expect(people?.status()).toBe(404)
    expect(await tom.page.content()).not.toContain(ADMIN.email)
  })

  test('a session that an admin ends is dead at the next click, and one comes back to the same page', async () => {
    await tom.page.goto(`${origin}/settings`)
    await admin.page.goto(`${origin}/settings/people`)
    await admin.page.getByRole('button', { name: `End sessions: ${TOM.name}` }).click()
    await admin.page.getByRole('button', { name: `End sessions: ${TOM.name}` }).waitFor({ state: 'detached' })
    await tom.page.getByRole('button', { name: 'Save the name' }).click()
    await tom.page.waitForURL(/\/sign-in\?next=%2Fsettings$/)
    await tom.page.getByLabel('E-mail address').fill(TOM.email)
    await tom.page.getByLabel('Password', { exact: true }).fill('not the right words here')
    await tom.page.getByRole('button', { name: 'Sign in' }).click()
    await tom.page.getByText('do not fit together').waitFor()
    expect(await seriousFaults(tom.page)).toEqual([])
    await tom.page.getByLabel('Password', { exact: true }).fill(TOM.password)
    await tom.page.getByRole('button', { name: 'Sign in' }).click()
    await tom.page.waitForURL(`${origin}/settings`)
  })

  test('an action sent from elsewhere changes nothing, with a good cookie or without', async () => {
    const { page } = tom
    const sent = page.waitForRequest((request) => request.method() === 'POST')
    await page.getByLabel('Name, as others see it').fill('Canary Thomas')
    await page.getByRole('button', { name: 'Save the name' }).click()
    const action = await sent
    await page.getByText('Saved.').waitFor()
    const body = (action.postDataBuffer()?.toString('utf8') ?? '').replaceAll('Canary Thomas', 'Mallory')
    const headers = {
      Cookie: await cookieOf(tom),
      'Content-Type': (await action.headerValue('content-type')) ?? '',
      'Next-Action': (await action.headerValue('next-action')) ?? '',
      Accept: 'text/x-component',
    }
    for (const from of [
      {},
      { Origin: 'https://evil.example' },
      { Origin: 'null' },
      { Origin: 'https://evil.example', Host: 'evil.example' },
      { Origin: 'https://evil.example', 'X-Forwarded-Host': 'evil.example' },
      { Origin: origin, 'Sec-Fetch-Site': 'cross-site' },
      { 'Sec-Fetch-Site': 'same-site' },
    ]) {
      const answer = await send('POST', '/settings', { ...headers, ...from }, body)
      expect(answer.status, JSON.stringify(from)).toBeGreaterThanOrEqual(400)
    }
    await page.reload()
    expect(await page.getByLabel('Name, as others see it').inputValue()).toBe('Canary Thomas')
    // the same request from here does what it says, so the refusals above were about where it came from
    const { status } = await send('POST', '/settings', { ...headers, Origin: origin, Host: new URL(origin).host }, body)
    expect(status).toBe(200)
    await page.reload()
    expect(await page.getByLabel('Name, as others see it').inputValue()).toBe('Mallory')
  })

  test('signing out from elsewhere does nothing; from here the old cookie is dead', async () => {
    const cookie = await cookieOf(tom)
    const type = { 'Content-Type': 'application/x-www-form-urlencoded' }
    const refused = await send('POST', '/sign-out', { Cookie: cookie, Origin: 'https://evil.example', ...type })
    expect(refused.status).toBe(403)
    expect((await send('GET', '/api/v1/me', { Cookie: cookie })).status).toBe(200)
    await tom.page.getByRole('button', { name: 'Sign out' }).first().click()
    await tom.page.waitForURL(`${origin}/sign-in`)
    expect((await send('GET', '/api/v1/me', { Cookie: cookie })).status).toBe(401)
    expect((await tom.context.cookies()).map((one) => one.name)).not.toContain('__Host-sid')
    await tom.page.goBack()
    await tom.page.waitForURL(/\/sign-in/)
    await tom.close()
  })

  test('a broken seal is nobody’s', async () => {
    const value = (await admin.context.cookies()).find((cookie) => cookie.name === '__Host-sid')?.value ?? ''
    const me = (sid: string) => send('GET', '/api/v1/me', { Cookie: `__Host-sid=${sid}` })
    expect((await me(value)).status).toBe(200)
    for (let at = 0; at < value.length; at += 7) {
      const flipped = `${value.slice(0, at)}${value[at] === 'A' ? 'B' : 'A'}${value.slice(at + 1)}`
      // the last character of a base64 block may carry bits that nobody reads
      if (Buffer.from(flipped, 'base64').equals(Buffer.from(value, 'base64'))) continue
      expect((await me(flipped)).status, `character ${at}`).toBe(401)
    }
  })

  test('without a cookie no spelling of a page shows what is behind it', async () => {
    const canary = /canary/i
    const shown = await send('GET', '/settings/people', { Cookie: await cookieOf(admin) })
    expect(shown.body).toMatch(canary)
    for (const path of ['/settings', '/settings/people', '/'])
      for (const [spelling, headers] of [
        [path, {}],
        [`${path}?_rsc=1a2b3`, { RSC: '1' }],
        [path, { RSC: '1' }],
        [path, { RSC: '1', 'Next-Router-Prefetch': '1' }],
        [path, { RSC: '1', 'Next-Router-Prefetch': '1', 'Next-Router-Segment-Prefetch': '/_tree' }],
        [path, { Purpose: 'prefetch' }],
        [path, { 'X-Middleware-Subrequest': 'proxy:proxy:proxy:proxy:proxy' }],
        [path, { 'X-Nextjs-Data': '1' }],
        [path, { Authorization: 'Bearer ik_' + 'A'.repeat(43) }],
        [path, { Cookie: '__Host-sid=; __Host-sid=x' }],
        [`${path}.rsc`, {}],
        [`${path}/`, {}],
        [`/${path}`, {}],
        [`${path}/.`, {}],
        [`${path}?a=1&a=2&next=${path}`, {}],
        [path.toUpperCase(), {}],
        [path.replaceAll('s', '%73'), {}],
        [`/.${path}`, {}],
        [`/x/..${path}`, {}],
        [`/%2e${path}`, {}],
      ] as const) {
        const answer = await send('GET', spelling, { ...headers })
        expect(answer.body, `${spelling} ${JSON.stringify(headers)}`).not.toMatch(canary)
      }
  })

  test('without a cookie every page of the workspace sends to sign in, whichever pages there are', async () => {
    const pages = readdirSync('app/(workspace)', { recursive: true, encoding: 'utf8' })
      .filter((name) => path.basename(name) === 'page.tsx')
      .map((name) =>
        `/${path.dirname(name)}`
          .split('/')
          .filter((part) => part !== '.' && !/^\(.*\)$/.test(part))
          .map((part) => part.replace(/^\[.*\]$/, 'none'))
          .join('/'),
      )
    expect(pages.length).toBeGreaterThan(5)
    for (const page of pages) {
      const answer = await send('GET', page === '' ? '/' : page, {})
      // a page that has begun to stream sends on by its markup instead
      const to =
        answer.status === 200 ? /http-equiv="refresh" content="1;url=([^"]+)"/.exec(answer.body)?.[1] : undefined
      const target = to ?? String(answer.headers.location ?? '').replace(origin, '')
      expect(target.replace(/\?.*/, ''), page).toBe('/sign-in')
    }
  })

  test('a page that nobody touches for half an hour leaves the session, and comes back after signing in', async () => {
    const { context } = admin
    const page = await context.newPage()
    await page.clock.install()
    await page.goto(`${origin}/settings/people`)
    const cookie = await cookieOf(admin)
    await page.clock.fastForward('29:00')
    await page.mouse.move(200, 200)
    await page.clock.fastForward('29:00')
    expect((await send('GET', '/api/v1/me', { Cookie: cookie })).status).toBe(200)
    await page.clock.fastForward('02:00')
    await page.waitForURL(/\/sign-in\?next=%2Fsettings%2Fpeople$/)
    expect((await send('GET', '/api/v1/me', { Cookie: cookie })).status).toBe(401)
    await page.close()
  })

  test('every answer has the content policy, and pages broke none of it', async () => {
    for (const path of [
      '/sign-in',
      '/settings',
      '/no/such/page',
      '/api/v1/me',
      '/api/v1/no-such',
      '/_next/static/none.js',
    ]) {
      const answer = await send('GET', path, {
        'Content-Security-Policy': "script-src 'nonce-theirs'",
        'X-Nonce': 'theirs',
      })
      const policy = String(answer.headers['content-security-policy'] ?? '')
      expect(policy, path).toMatch(/^default-src 'none'; script-src 'nonce-[A-Za-z0-9+/]{22}==' 'strict-dynamic';/)
      expect(answer.headers['x-content-type-options'], path).toBe('nosniff')
      expect(answer.body, path).not.toContain('theirs')
    }
    const violations = admin.faults.filter((fault) => /content security policy|violates/i.test(fault))
    expect(violations).toEqual([])
  })

  test('made-up addresses do not bring a new budget of attempts', async () => {
    const statuses: number[] = []
    for (let group = 0; group < 3; group += 1)
      statuses.push(
        ...(await Promise.all(
          Array.from({ length: 14 }, async (_, n) => {
            const answer = await send(
              'POST',
              '/api/v1/tokens',
              { 'Content-Type': 'application/json', 'X-Forwarded-For': `198.51.100.${group * 14 + n}` },
              JSON.stringify({ email: `nobody-${group}-${n}@example.test`, password: 'wrong', name: 'x' }),
            )
            return answer.status
          }),
        )),
      )
    expect(statuses.filter((status) => status === 401).length).toBeLessThanOrEqual(30)
    expect(new Set(statuses)).toEqual(new Set([401, 429]))
  })
})
