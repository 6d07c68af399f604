import { mkdtempSync, rmSync } from 'node:fs'
import { tmpdir } from 'node:os'
import path from 'node:path'
import { chromium, type BrowserContext, type Page } from 'playwright-core'

const FLAGS = [
  '--no-sandbox',
  '--disable-gpu',
  '--disable-quic',
  '--no-first-run',
  '--disable-background-networking',
  '--disable-component-update',
  '--disable-sync',
]

export interface BrowserSession {
  readonly context: BrowserContext
  readonly page: Page
  /** console errors and policy violations seen so far */
  readonly faults: readonly string[]
  close(): Promise<void>
}

/** Debian's Chromium with an empty profile of its own. */
export async function openBrowser(
  options: { width?: number; height?: number; colorScheme?: 'light' | 'dark' } = {},
): Promise<BrowserSession> {
  const profile = mkdtempSync(path.join(tmpdir(), 'ik-browser-'))
  const context = await chromium.launchPersistentContext(profile, {
    executablePath: '/usr/bin/chromium',
    headless: true,
    args: FLAGS,
    acceptDownloads: true,
    viewport: { width: options.width ?? 1440, height: options.height ?? 900 },
    colorScheme: options.colorScheme ?? 'light',
  })
  const page = context.pages()[0] ?? (await context.newPage())
  const faults: string[] = []
  page.on('console', (message) => {
    if (message.type() === 'error') faults.push(message.text())
  })
  page.on('pageerror', (error) => faults.push(error.message))
  return {
    context,
    page,
    faults,
    close: async () => {
      await context.close()
      rmSync(profile, { recursive: true, force: true })
    },
  }
}

/** Signs in through the form, as a person would. */
export async function signIn(page: Page, origin: string, email: string, password: string): Promise<void> {
  await page.goto(`${origin}/sign-in`)
  await page.getByLabel('E-mail').fill(email)
  await page.getByLabel('Password').fill(password)
  await page.getByRole('button', { name: 'Sign in' }).click()
  await page.waitForURL((url) => !url.pathname.startsWith('/sign-in'))
}
