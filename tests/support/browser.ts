/** A real browser on the built pages. It fails a journey on every error the page logs, content-policy refusals included. */
import { existsSync, mkdirSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { AxeBuilder } from '@axe-core/playwright';
import { chromium, type Browser, type BrowserContext, type Page } from 'playwright-core';
import { findChromium } from '../../scripts/lib/debian-packages.mjs';
import { root } from './source-files.ts';

/** Pictures of the last run, to look at when a journey fails. */
export const picturesFolder = join(tmpdir(), 'saltmark-journeys');

/** Pages wait for a busy machine, never for ever. */
const patienceMs = 30_000;

export interface Visitor {
  page: Page;
  /** What the page complained about: script errors, refused resources, failed requests. */
  complaints: string[];
  /** Everything the accessibility rules object to, one line each: rule, element, why. */
  accessibility: () => Promise<string[]>;
  picture: (name: string) => Promise<void>;
  leave: () => Promise<void>;
}

export async function openBrowser(): Promise<Browser> {
  const executablePath = process.env.SALTMARK_TEST_CHROMIUM || findChromium();
  if (!executablePath)
    throw new Error('Chromium is missing: npm test installs it, or set SALTMARK_TEST_CHROMIUM.');
  if (!existsSync(join(root, 'client/dist/index.html')))
    throw new Error('The pages are not built: npm test builds them, or run npx vite build client.');
  mkdirSync(picturesFolder, { recursive: true });
  // Chromium's sandbox refuses to run as root; it visits our own pages only.
  return chromium.launch({ executablePath, args: ['--no-sandbox', '--disable-dev-shm-usage'] });
}

/** A person with a browser of their own: no cookie is shared. */
export async function visit(browser: Browser, url: string): Promise<Visitor> {
  const context: BrowserContext = await browser.newContext({
    baseURL: url,
    viewport: { width: 1280, height: 900 },
    locale: 'en-GB',
    timezoneId: 'Europe/London',
    reducedMotion: 'reduce',
    colorScheme: 'light',
  });
  context.setDefaultTimeout(patienceMs);
  const page = await context.newPage();
  const complaints: string[] = [];
  page.on('pageerror', (error) => complaints.push(error.message));
  page.on('console', (message) => {
    const { url: about } = message.location();
    // How a page learns that nobody is signed in yet.
    const isQuestion = about.endsWith('/api/sessions/current') && message.text().includes('401');
    if (message.type() === 'error' && !isQuestion) complaints.push(`${message.text()} ${about}`);
  });
  return {
    page,
    complaints,
    accessibility: async () => {
      const tags = ['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa'];
      const { violations } = await new AxeBuilder({ page }).withTags(tags).analyze();
      return violations.flatMap(({ id, help, nodes }) =>
        nodes.map(
          ({ target, failureSummary }) => `${id} (${help}) at ${String(target)}: ${failureSummary ?? ''}`,
        ),
      );
    },
    picture: async (name) => {
      await page.screenshot({ path: join(picturesFolder, `${name}.png`) });
    },
    leave: () => context.close(),
  };
}
