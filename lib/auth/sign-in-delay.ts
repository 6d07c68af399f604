/** After so many wrong passwords in a row only a new invitation opens the account again. */
export const LOCKED_AFTER = 100
const FREE_ATTEMPTS = 5
const LONG_DELAY_AFTER = 10
const LONG_DELAY_S = 900

/** Seconds that have to pass after the latest wrong password before another one is looked at. */
export function delayAfterFailures(failures: number): number {
  if (failures >= LOCKED_AFTER) return Infinity
  if (failures >= LONG_DELAY_AFTER) return LONG_DELAY_S
  return failures < FREE_ATTEMPTS ? 0 : 2 ** (failures - FREE_ATTEMPTS + 1)
}

/** Seconds still to wait; zero when the attempt may be made. */
export function secondsToWait(failures: number, lastFailedAt: Date | null, now: Date): number {
  const delay = delayAfterFailures(failures)
  if (delay === 0) return 0
  if (lastFailedAt === null) return 0
  return Math.max(0, delay - (now.getTime() - lastFailedAt.getTime()) / 1000)
}
