import 'server-only'

export type SecurityEvent =
  'sign-in-refused' | 'too-many-attempts' | 'bad-origin' | 'not-allowed' | 'set-up-code-refused' | 'invitation-refused'

/**
 * One line of JSON to the log for what somebody who guards the installation wants to count. Ids and networks, never names,
 * addresses of mail, secrets or what was sent.
 */
export function logSecurityEvent(
  event: SecurityEvent,
  facts: Readonly<Record<string, string | number | null>> = {},
): void {
  console.warn(JSON.stringify({ at: new Date().toISOString(), event: `sec.${event}`, ...facts }))
}
