import { mkdirSync } from 'node:fs';
import { join } from 'node:path';
import { type Browser } from 'playwright-core';
import { checkoutFolder } from '../../server/launch/checkout';

/** Pictures of every page that is open, for whoever looks into a failed test: tests/artifacts, which git ignores. */
export async function shootPages(browser: Browser, name: string): Promise<void> {
  const folder = join(checkoutFolder, 'tests/artifacts');
  mkdirSync(folder, { recursive: true });
  const pages = browser.contexts().flatMap((context) => context.pages());
  for (const [index, page] of pages.entries()) {
    const path = join(folder, `${name.replace(/\W+/g, '-').slice(0, 60)}-${index + 1}.png`);
    await page.screenshot({ path, timeout: 5_000 }).catch(() => undefined);
  }
}
