import axe from 'axe-core';
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core';

export interface WatchedPage {
  page: Page;
  /** Everything that a clean visit does not produce: console errors, page errors, requests to other hosts. */
  complaints: string[];
  close: () => Promise<void>;
}

interface Visit {
  colorScheme?: 'light' | 'dark';
  width?: number;
}

/** A real Chromium that notes what people would not see but a developer would. */
export class WatchedBrowser {
  private constructor(
    private readonly browser: Browser,
    private readonly url: string,
  ) {}

  static async launch(url: string): Promise<WatchedBrowser> {
    // No sandbox: the tests run as root in containers too, and open nothing but the product itself.
    const browser = await chromium.launch({ executablePath: '/usr/bin/chromium', args: ['--no-sandbox'] });
    return new WatchedBrowser(browser, url);
  }

  async open({ colorScheme = 'light', width = 1280 }: Visit = {}): Promise<WatchedPage> {
    const context: BrowserContext = await this.browser.newContext({
      baseURL: this.url,
      colorScheme,
      reducedMotion: 'reduce',
      viewport: { width, height: 900 },
    });
    context.setDefaultTimeout(20_000);
    const page = await context.newPage();
    const complaints: string[] = [];
    page.on('console', (message) => {
      // Chromium itself reports each refused request; asking who is signed in before sign-in is one on purpose.
      const isSessionProbe = /\/api\/v1\/session(\/renewal)?$/.test(message.location().url);
      if (message.type() === 'error' && !isSessionProbe) complaints.push(`console: ${message.text()}`);
    });
    page.on('pageerror', (error) => complaints.push(`page: ${error.message}`));
    page.on('request', (request) => {
      const { protocol, host } = new URL(request.url());
      if (protocol.startsWith('http') && host !== new URL(this.url).host) complaints.push(`request: ${request.url()}`);
    });
    return { page, complaints, close: () => context.close() };
  }

  close(): Promise<void> {
    return this.browser.close();
  }
}

/** Violations of WCAG 2.2 A and AA that a machine can find, as lines for a message. */
export async function findAccessibilityViolations(page: Page): Promise<string[]> {
  await page.evaluate(axe.source);
  const { violations } = await page.evaluate(() =>
    window.axe.run(document, {
      runOnly: ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'],
      resultTypes: ['violations'],
    }),
  );
  return violations.flatMap(({ id, nodes }) => nodes.map((node) => `${id}: ${node.html.slice(0, 160)}`));
}

declare global {
  interface Window {
    axe: typeof axe;
  }
}
