import { describe, expect, test } from 'vitest'
import { callerAddress, networkOf, restoreBudget, takeFromBudget } from '@/lib/auth/rate-limit'
import { delayAfterFailures, secondsToWait } from '@/lib/auth/sign-in-delay'

const from = (chain: string | null, trusted: number) =>
  callerAddress(new Headers(chain === null ? {} : { 'x-forwarded-for': chain }), trusted)

describe('the caller', () => {
  test.each([
    ['192.0.2.7', 0, '192.0.2.7'],
    ['::ffff:192.0.2.7', 0, '192.0.2.7'],
    ['2001:db8::7', 0, '2001:db8::7'],
    // the peer stands last; what a caller made up stands before it
    ['198.51.100.1, 192.0.2.7', 0, '192.0.2.7'],
    ['198.51.100.1, 192.0.2.7', 1, '198.51.100.1'],
    ['made-up, 198.51.100.1, 192.0.2.7', 1, '198.51.100.1'],
    ['203.0.113.9, 198.51.100.1, 192.0.2.7', 2, '203.0.113.9'],
    ['not an address', 0, 'unknown'],
    ['', 0, 'unknown'],
    [null, 0, 'unknown'],
  ])('of %j behind %i proxies is %j', (chain, trusted, expected) => {
    expect(from(chain, trusted)).toBe(expected)
  })

  test.each([
    ['192.0.2.7', '192.0.2.0/24'],
    ['2001:db8:1:2:3:4:5:6', '2001:db8:1:2::/64'],
    ['2001:db8::7', '2001:db8:0:0::/64'],
    ['fe80::', 'fe80:0:0:0::/64'],
    ['::1', 'this machine'],
    ['127.0.0.1', 'this machine'],
    ['unknown', 'unknown'],
  ])('%s is in %s', (address, network) => {
    expect(networkOf(address)).toBe(network)
  })
})

describe('a budget', () => {
  test('of an address holds 30 attempts and then says when to come back', async () => {
    for (let n = 0; n < 30; n += 1) await takeFromBudget('sign-in-address', 'a')
    const refusal = await takeFromBudget('sign-in-address', 'a').catch((error: unknown) => error)
    expect(refusal).toMatchObject({ code: 'too-many-requests' })
    expect(refusal).toHaveProperty('details.retryAfterS', 300)
    await expect(takeFromBudget('sign-in-address', 'b')).resolves.toBeUndefined()
  })

  test('comes back after a success', async () => {
    for (let n = 0; n < 10; n += 1) await takeFromBudget('sign-in-device', 'd')
    await restoreBudget('sign-in-device', 'd')
    await expect(takeFromBudget('sign-in-device', 'd')).resolves.toBeUndefined()
  })
})

describe('after wrong passwords one waits', () => {
  test.each([
    [0, 0],
    [4, 0],
    [5, 2],
    [6, 4],
    [7, 8],
    [8, 16],
    [9, 32],
    [10, 900],
    [50, 900],
    [99, 900],
    [100, Infinity],
  ])('%i times: %d s', (failures, expected) => {
    expect(delayAfterFailures(failures)).toBe(expected)
  })

  test('from the latest one on', () => {
    const failed = new Date('2026-03-02T08:00:00Z')
    expect(secondsToWait(10, failed, new Date('2026-03-02T08:10:00Z'))).toBe(300)
    expect(secondsToWait(10, failed, new Date('2026-03-02T08:15:00Z'))).toBe(0)
    expect(secondsToWait(100, failed, new Date('2027-03-02T08:15:00Z'))).toBe(Infinity)
    expect(secondsToWait(3, failed, failed)).toBe(0)
  })
})
