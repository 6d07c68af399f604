import { SESSION_LIFE_S } from '../auth/session-life'

export const SESSION_IDLE_S = 30 * 60
/** How often a session in use is noted as such; finer would write on every page view. */
export const SESSION_TOUCH_S = 60

export interface SessionState {
  readonly epoch: number
  readonly sessionEpoch: number
  readonly signedInAt: Date
  readonly lastSeenAt: Date
  readonly expiresAt: Date
  readonly revokedAt: Date | null
  readonly disabledAt: Date | null
}

/** Whether a session still opens the door at this moment; any doubt closes it. */
export function isSessionAlive(state: SessionState, now: Date): boolean {
  return (
    state.revokedAt === null &&
    state.disabledAt === null &&
    state.epoch === state.sessionEpoch &&
    now.getTime() < state.expiresAt.getTime() &&
    now.getTime() - state.signedInAt.getTime() < SESSION_LIFE_S * 1000 &&
    now.getTime() - state.lastSeenAt.getTime() < SESSION_IDLE_S * 1000
  )
}
