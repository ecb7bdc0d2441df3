import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { AxeBuilder } from '@axe-core/playwright';
import { type Browser, type Page } from 'playwright-core';
import { launchBrowser } from '../support/browser';
import { startServer, type TestServer } from '../support/server';

interface HoldItem {
  id: string;
  lot: { lotNumber: string };
}

let server: TestServer;
let browser: Browser;
beforeAll(async () => {
  server = await startServer();
  browser = await launchBrowser();
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await server?.stop();
});

async function pageOf(width: number): Promise<Page> {
  const context = await browser.newContext({ viewport: { width, height: 844 } });
  return context.newPage();
}

async function scrollsSideways(page: Page): Promise<boolean> {
  return page.evaluate(
    () => document.documentElement.scrollWidth > document.documentElement.clientWidth,
  );
}

async function violations(page: Page) {
  const { violations: found } = await new AxeBuilder({ page }).analyze();
  return found.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(' | ')}`);
}

/** The demo's hold that nobody at the supplier has acknowledged. */
async function openHold(): Promise<HoldItem> {
  const supplier = await server.apiOf('supplier2');
  const { items } = await supplier<{ items: HoldItem[] }>('GET', '/api/holds?state=open');
  return items[0]!;
}

describe('a hold, from notice to answer, on a phone', () => {
  it('is acknowledged, asked about and answered with a file by the supplier, and read by the house', async () => {
    const hold = await openHold();
    const page = await pageOf(390);
    await server.signIn(page, 'supplier2');
    await page.getByRole('link', { name: hold.lot.lotNumber }).click();
    await page.getByRole('heading', { name: `Hold on lot ${hold.lot.lotNumber}` }).waitFor();
    expect(await scrollsSideways(page)).toBe(false);
    expect(await violations(page)).toEqual([]);
    expect(await page.getByRole('link', { name: `lot ${hold.lot.lotNumber}` }).count()).toBe(0);

    await page.getByLabel('Note').fill('Received; the stock is being looked through.');
    await page.getByRole('button', { name: 'Acknowledge' }).click();
    await page.getByRole('heading', { name: 'Acknowledgement' }).waitFor();

    const send = page.getByRole('button', { name: 'Send the answer' });
    await send.click();
    // Nothing was written, so nothing is sent, and the first field in error has the focus.
    expect(await page.getByLabel('Containment').getAttribute('aria-invalid')).toBe('true');
    expect(
      await page.getByLabel('Containment').evaluate((field) => field === document.activeElement),
    ).toBe(true);

    await page.getByLabel('Containment').fill('All units of the date code are set aside.');
    await page.getByLabel('Cause', { exact: true }).fill('One blank was lapped on a worn carrier.');
    await page.getByLabel('Corrective action').fill('Carriers are changed by count.');
    const files = page.locator('form', { has: send }).locator('input[type=file]');
    await files.setInputFiles({
      name: 'page.html',
      mimeType: 'text/html',
      buffer: Buffer.from('<p>no evidence</p>'),
    });
    await page.getByText('“page.html” is not taken').waitFor();
    await page.getByRole('button', { name: 'Remove page.html' }).click();
    await files.setInputFiles({
      name: 'remeasured.csv',
      mimeType: 'text/csv',
      buffer: Buffer.from('serial,frequency_hz\n1,40000000.1\n'),
    });
    expect(await scrollsSideways(page)).toBe(false);
    await send.click();
    await page.getByRole('heading', { name: 'Answer', exact: true }).waitFor();
    const download = page.waitForEvent('download');
    await page.getByRole('link', { name: 'remeasured.csv' }).click();
    expect((await download).suggestedFilename()).toBe('remeasured.csv');
    await page.context().close();

    const house = await pageOf(1440);
    await server.signIn(house, 'quality', `/holds/${hold.id}`);
    await house.getByText('All units of the date code are set aside.').waitFor();
    await house.getByLabel('Your question').fill('Which serial numbers were lapped there?');
    await house.getByRole('button', { name: 'Send' }).click();
    await house.getByRole('heading', { name: 'Question' }).waitFor();
    expect(await violations(house)).toEqual([]);
    await house.getByRole('link', { name: `Decide on lot ${hold.lot.lotNumber}` }).click();
    await house.getByRole('heading', { level: 1, name: hold.lot.lotNumber }).waitFor();
    await house.context().close();

    const again = await pageOf(390);
    await server.signIn(again, 'supplier2', `/holds/${hold.id}`);
    await again.getByText('Which serial numbers were lapped there?').waitFor();
    await again.getByLabel('Your reply').fill('MB 12 to MB 40.');
    await again.getByRole('button', { name: 'Send', exact: true }).click();
    await again.getByRole('heading', { name: 'Reply' }).first().waitFor();
    await again.context().close();
  });

  it('is not there for the contact of another supplier', async () => {
    const hold = await openHold().catch(() => undefined);
    const supplier2 = await server.apiOf('supplier2');
    const { items } = await supplier2<{ items: HoldItem[] }>('GET', '/api/holds');
    const id = (hold ?? items[0]!).id;
    const page = await pageOf(390);
    await server.signIn(page, 'supplier', '/holds');
    expect(await page.getByText((items[0] as HoldItem).lot.lotNumber).count()).toBe(0);
    await page.goto(`${server.url}/holds/${id}`);
    await page.getByRole('alert').waitFor();
    expect(await page.getByText('Halden').count()).toBe(0);
    await page.context().close();
  });
});

describe('the list of holds', () => {
  it('keeps its filter in the address and teaches when nothing matches', async () => {
    const page = await pageOf(1440);
    await server.signIn(page, 'auditor', '/holds');
    await page.getByRole('grid').waitFor();
    await page.getByRole('searchbox', { name: /^Find: hold/ }).fill('no such hold');
    await page.getByText('No hold matches.').waitFor();
    expect(new URL(page.url()).searchParams.get('find')).toBe('no such hold');
    await page.reload();
    await page.getByText('No hold matches.').waitFor();
    await page.getByRole('searchbox', { name: /^Find: hold/ }).fill('');
    await page.getByRole('grid').waitFor();
    expect(await violations(page)).toEqual([]);
    await page.context().close();
  });
});
