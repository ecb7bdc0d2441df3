import { AxeBuilder } from '@axe-core/playwright';
import { type BrowserContext, type Page } from 'playwright-core';

/** Everything a page complains of by itself: console errors, uncaught errors, and what its content policy stopped. */
export async function listenTo(context: BrowserContext): Promise<{ page: Page; said: string[] }> {
  await context.addInitScript(() => {
    document.addEventListener('securitypolicyviolation', (event) =>
      console.error(`content policy: ${event.violatedDirective} stopped ${event.blockedURI}`),
    );
  });
  const page = await context.newPage();
  const said: string[] = [];
  page.on('console', (message) => {
    if (message.type() === 'error') said.push(message.text());
  });
  page.on('pageerror', (error) => said.push(`uncaught: ${error.message}`));
  return { page, said };
}

/** Waits until nothing is being loaded or drawn any more. */
export async function settled(page: Page): Promise<void> {
  await page.getByRole('heading', { level: 1 }).first().waitFor();
  await page.waitForFunction(() => document.querySelector('[aria-busy="true"]') === null);
  await page.evaluate(async () => {
    await document.fonts.ready;
    // A page that is not in front draws no frames, and would be waited for without end.
    await new Promise((resolve) => {
      requestAnimationFrame(() => requestAnimationFrame(resolve));
      setTimeout(resolve, 200);
    });
  });
}

/** What axe finds, a line each; `rules` narrows it. */
export async function axeFindings(page: Page, rules?: string[]): Promise<string[]> {
  // Otherwise it opens a page of its own for each look, which takes longer than the look; there are no frames to gather from.
  const builder = new AxeBuilder({ page }).setLegacyMode();
  const { violations } = await (rules ? builder.withRules(rules) : builder).analyze();
  return violations.flatMap(({ id, nodes }) =>
    nodes.map(({ html, target }) => `${id}: ${target.join(' ')} ${html.slice(0, 160)}`),
  );
}

/** By how many pixels the body can be scrolled sideways at this width, and what sticks out furthest. */
export async function sidewaysAt(page: Page, width: number): Promise<string[]> {
  await page.setViewportSize({ width, height: 844 });
  await settled(page);
  return page.evaluate((at) => {
    const beyond = document.documentElement.scrollWidth - document.documentElement.clientWidth;
    if (beyond <= 0) return [];
    const widest = [...document.body.querySelectorAll('*')]
      .filter((element) => element.getBoundingClientRect().right > at + 0.5)
      .slice(-1)[0];
    return [`${at} px: ${beyond} px too wide, e.g. ${widest?.outerHTML.slice(0, 120)}`];
  }, width);
}
