import { afterAll, beforeAll, expect, it } from 'vitest';
import { AxeBuilder } from '@axe-core/playwright';
import { type Browser, type Page } from 'playwright-core';
import { launchBrowser } from '../support/browser';
import { startServer, type TestServer } from '../support/server';

let server: TestServer;
let browser: Browser;
let page: Page;
const refusedByPolicy: string[] = [];
beforeAll(async () => {
  server = await startServer();
  browser = await launchBrowser();
  page = await (await browser.newContext({ viewport: { width: 1440, height: 900 } })).newPage();
  page.on('console', (message) => {
    if (message.text().includes('Content Security Policy')) refusedByPolicy.push(message.text());
  });
  await server.signIn(page, 'admin', '/mail');
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await server?.stop();
});

it('a mail shows its state, its tries and both its bodies, runs nothing, and can be sent again', async () => {
  await page
    .getByRole('row', { name: /on hold.*taken by the mail server/ })
    .first()
    .getByRole('link')
    .click();
  await page.getByText('As most will see it').waitFor();
  const frame = page.frameLocator('iframe');
  await frame.getByRole('link', { name: 'Read and acknowledge' }).waitFor();
  expect(await page.locator('iframe').getAttribute('sandbox')).toBe('');
  expect(await page.locator('pre').innerText()).toContain('/holds/');
  expect(refusedByPolicy).toEqual([]);
  const { violations } = await new AxeBuilder({ page }).exclude('iframe').analyze();
  expect(violations).toEqual([]);

  const tries = page.getByRole('grid', { name: /Tries/ });
  expect(await tries.getByRole('row').count()).toBe(2);
  await page.getByRole('button', { name: 'Send again' }).click();
  await tries.getByRole('row').nth(2).waitFor();
});

it('an auditor reads it and finds no button to send', async () => {
  const other = await (await browser.newContext()).newPage();
  await server.signIn(other, 'auditor', '/mail');
  await other.getByRole('rowheader').first().getByRole('link').click();
  await other.getByText('As most will see it').waitFor();
  expect(await other.getByRole('button', { name: 'Send again' }).count()).toBe(0);
  await other.context().close();
});
