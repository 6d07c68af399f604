import 'server-only'
import { IncomingMessage, Server } from 'node:http'
import { environment } from '../environment'

const STAMPED = Symbol.for('inverse-kelvin.caller-address-stamped')

/**
 * Has the server write its peer's own address at the end of X-Forwarded-For of every request. The framework only fills
 * that header in where it is missing, so that anybody could make up an address and with it a fresh budget of attempts.
 * Without a proxy in front (TRUSTED_PROXIES=0) what the caller sent is dropped.
 */
export function stampCallerAddress(): void {
  const holder: typeof globalThis & { [STAMPED]?: boolean } = globalThis
  if (holder[STAMPED] === true) return
  holder[STAMPED] = true
  const emit = Server.prototype.emit
  Server.prototype.emit = function (this: Server, event: string | symbol, ...given: unknown[]): boolean {
    const [request] = given
    if (event === 'request' && request instanceof IncomingMessage) {
      const peer = request.socket.remoteAddress ?? ''
      const sent = request.headers['x-forwarded-for']
      request.headers['x-forwarded-for'] =
        environment.TRUSTED_PROXIES > 0 && typeof sent === 'string' && sent !== '' ? `${sent}, ${peer}` : peer
    }
    return Reflect.apply(emit, this, [event, ...given])
  }
}
