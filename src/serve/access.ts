/** Who may ask: a page of this server, on this machine, and no other. */
import type { IncomingHttpHeaders } from 'node:http'

/**
 * A browser sends with each request the host that it was told to reach and the page that asks. A name that
 * only points here, or a page from elsewhere, is refused: else any site could read the document or start the editor.
 *
 * @returns why it is refused, with the status; undefined when it may go on
 */
export function refusal(
  method: string | undefined,
  headers: IncomingHttpHeaders,
  port: number,
): { readonly status: 403 | 405 | 421; readonly because: string } | undefined {
  const hosts = [`127.0.0.1:${port}`, `localhost:${port}`, `[::1]:${port}`]
  const { host, origin } = headers
  if (host === undefined || !hosts.includes(host.toLowerCase()))
    return { status: 421, because: 'this server answers to its own address only' }
  if (method !== 'GET' && method !== 'POST') return { status: 405, because: 'only GET is answered' }
  if (origin !== undefined && !hosts.some(each => origin.toLowerCase() === `http://${each}`))
    return { status: 403, because: 'the page that asks is not of this server' }
  // A link that someone follows here is well; a page elsewhere that draws on this server is not.
  const [site, mode] = [headers['sec-fetch-site'], headers['sec-fetch-mode']]
  const fromElsewhere = site === 'cross-site' || site === 'same-site'
  if (fromElsewhere && !(method === 'GET' && mode === 'navigate'))
    return { status: 403, because: 'the page that asks is not of this server' }
  if (method === 'POST' && origin === undefined && site !== 'same-origin')
    return { status: 403, because: 'the page that asks does not say where it is from' }
  return undefined
}

/** Goes with everything that is sent. */
export const guards: Readonly<Record<string, string>> = {
  'content-security-policy':
    "default-src 'none'; script-src 'self'; style-src 'self' 'unsafe-inline'; font-src data:; img-src data:; connect-src 'self'; base-uri 'none'; form-action 'none'; frame-ancestors 'none'",
  'x-content-type-options': 'nosniff',
  'cross-origin-resource-policy': 'same-origin',
  'cross-origin-opener-policy': 'same-origin',
  'referrer-policy': 'no-referrer',
  'cache-control': 'no-store',
}
