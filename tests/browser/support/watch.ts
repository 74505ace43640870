import type { BrowserContext } from '@playwright/test'

/**
 * Collects what a browser complains of: errors and warnings in the console (a hydration mismatch is one of
 * them), uncaught errors, what the content security policy stopped, and requests to any other host.
 */
export class Watch {
  private readonly seen: string[] = []
  private readonly awaited: RegExp[] = []
  private readonly host: string

  constructor(baseUrl: string) {
    this.host = new URL(baseUrl).host
  }

  async over(context: BrowserContext): Promise<void> {
    await context.addInitScript(() => {
      // In the page; the console is how it reaches the test.
      // eslint-disable-next-line no-console
      document.addEventListener('securitypolicyviolation', event => console.error(`securitypolicyviolation: ${event.effectiveDirective} stopped ${event.blockedURI} at ${event.sourceFile}:${event.lineNumber}`))
    })
    context.on('console', (message) => {
      if (message.type() === 'error' || message.type() === 'warning') this.seen.push(`${message.type()} on ${message.page()?.url() ?? 'a page'}: ${message.text()}`)
    })
    context.on('weberror', error => this.seen.push(`uncaught: ${error.error().stack ?? error.error().message}`))
    context.on('request', (request) => {
      const { protocol, host } = new URL(request.url())
      if (/^(https?|wss?):$/.test(protocol) && host !== this.host) this.seen.push(`request to another host: ${request.url()}`)
    })
  }

  /** The browser writes a line of its own for every refused request; a test that has something refused names it. */
  awaits(pattern: RegExp): void {
    this.awaited.push(pattern)
  }

  faults(): string[] {
    return this.seen.filter(line => !this.awaited.some(pattern => pattern.test(line)))
  }
}
