/** A tab of the browser that prints one page after another, with scripts off and the network cut. */
import type { Page } from 'puppeteer-core'

/** Longest that one lot may take, in ms. */
const LONGEST = 120_000

/** Without margins of the browser's own; in one answer, which is much quicker than piece by piece. */
const sheet = {
  preferCSSPageSize: true,
  generateTaggedPDF: true,
  generateDocumentOutline: false,
  marginTop: 0,
  marginBottom: 0,
  marginLeft: 0,
  marginRight: 0,
} as const

export interface Tab {
  /** @returns a tagged PDF of the page, on the sheets that its own style asks for */
  readonly print: (html: string) => Promise<Uint8Array>
  readonly close: () => Promise<void>
}

export async function openTab(page: Page): Promise<Tab> {
  const client = await page.createCDPSession()
  client.on('Fetch.requestPaused', ({ requestId }) => {
    // A tab that closes meanwhile has nothing to refuse any more.
    client.send('Fetch.failRequest', { requestId, errorReason: 'BlockedByClient' }).catch(() => undefined)
  })
  const [{ frameTree }] = await Promise.all([
    client.send('Page.getFrameTree'),
    client.send('Fetch.enable', { patterns: [{ urlPattern: '*' }] }),
    page.setJavaScriptEnabled(false),
    page.setOfflineMode(true),
  ])
  const { frame } = frameTree
  // Asked of the browser from outside, so that it holds with scripts off too.
  const ask = (expression: string) => client.send('Runtime.evaluate', { expression, awaitPromise: true })
  let shell: string | undefined
  return {
    print: async html => {
      const page = parted(html)
      if (page.shell !== shell) {
        shell = undefined
        await client.send('Page.setDocumentContent', { frameId: frame.id, html: page.shell })
        await ask('Promise.all([...document.fonts].map(face => face.load())).then(() => 0, () => 0)')
        shell = page.shell
      }
      await ask(
        `document.body.innerHTML = ${JSON.stringify(page.body)}; Promise.all([document.fonts.ready, ...[...document.images].map(image => image.decode().catch(() => 0))]).then(() => 0)`,
      )
      const { data } = await client.send('Page.printToPDF', sheet, { timeout: LONGEST })
      return Buffer.from(data, 'base64')
    },
    close: () => page.close().catch(() => undefined),
  }
}

/** Nothing is laid out for the window, which nobody sees. */
const UNSEEN = '@media screen{body{display:none}}'

/**
 * A page as what its body stands in and the body: pages of one document, and of one document built again,
 * share the first, with its faces and rules, so that a tab need not read those again.
 */
function parted(html: string): { readonly shell: string; readonly body: string } {
  const start = html.indexOf('>', html.search(/<body[\s>]/)) + 1
  const end = html.lastIndexOf('</body>')
  const shell = `${html.slice(0, start)}${html.slice(end)}`
  return { shell: shell.replace('</style>', () => `${UNSEEN}</style>`), body: html.slice(start, end) }
}
