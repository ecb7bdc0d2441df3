import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { type Browser, type Page } from 'playwright-core';
import { withClient } from '../../server/database/roles';
import { launchBrowser } from '../support/browser';
import { axeViolations, crystalCsv, lotMaker, openAs } from '../support/browser-lots';
import { startServer, type TestServer } from '../support/server';
import { zip } from '../support/zip';

// Several people's pages in one test, on machines that are busy with other suites.
vi.setConfig({ testTimeout: 300_000 });

let server: TestServer;
let browser: Browser;
let lots: Awaited<ReturnType<typeof lotMaker>>;
beforeAll(async () => {
  server = await startServer();
  browser = await launchBrowser();
  lots = await lotMaker(server);
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await server?.stop();
});

const fileOf = (name: string, content: string | Buffer) => ({
  name,
  mimeType: 'text/csv',
  buffer: Buffer.from(content),
});
const chooseFiles = (page: Page, ...files: ReturnType<typeof fileOf>[]) =>
  page.locator('input[type=file]').setInputFiles(files);

describe('bringing readings in', () => {
  it('loads two files at once, gives the refused rows back, and leads to the lot', async () => {
    const lot = await lots.newLot(20);
    const page = await openAs(browser, server, 'technician', `/lots/${lot.id}/upload`);
    const broken = `${crystalCsv({ units: 9, prefix: 'B' })}B-last,25,no reading,2026-11-02T08:01:00Z\n`;
    await chooseFiles(
      page,
      fileOf('part-1.csv', crystalCsv({ units: 10 })),
      fileOf('part-2.csv', broken),
    );
    const first = page.getByRole('article', { name: 'part-1.csv' });
    const second = page.getByRole('article', { name: 'part-2.csv' });
    await first.getByText('frequency (Hz)').waitFor();
    await second.getByRole('button', { name: 'Show rows and columns' }).click();
    await second.getByLabel('What column frequency_hz is for').waitFor();
    expect(await axeViolations(page)).toEqual([]);
    await page.getByRole('button', { name: 'Load 2 files' }).click();
    await first.getByText('10 of 10 rows taken, 0 refused.').waitFor();
    await second.getByText('9 of 10 rows taken, 1 refused.').waitFor();
    const download = page.waitForEvent('download');
    await second.getByRole('link', { name: 'Download the refused rows' }).click();
    const refused = await (await download).createReadStream();
    const parts: Buffer[] = [];
    for await (const part of refused) parts.push(part as Buffer);
    expect(Buffer.concat(parts).toString()).toContain('no reading');
    expect(await axeViolations(page)).toEqual([]);
    await page.getByRole('link', { name: `To lot ${lot.lotNumber}` }).click();
    await page.getByRole('heading', { level: 1, name: `Lot ${lot.lotNumber}` }).waitFor();
    await page.getByText('One refused row (CSV)').waitFor();
    await page.context().close();
  });

  it('says of a packed file with the name of a table why it is not taken', async () => {
    const lot = await lots.newLot(20);
    const page = await openAs(browser, server, 'technician', `/lots/${lot.id}/upload`);
    await chooseFiles(page, fileOf('readings.csv', zip([['readings.csv', 'serial\n1\n']])));
    const file = page.getByRole('article', { name: 'readings.csv' });
    await file.getByText(/a spreadsheet or a zip archive/).waitFor();
    expect(await file.getByRole('button', { name: 'Load' }).count()).toBe(0);
    expect(await axeViolations(page)).toEqual([]);
    await file.getByRole('button', { name: 'Remove' }).click();
    await file.waitFor({ state: 'detached' });
    await page.context().close();
  });

  it('still shows how far a file is when the page is opened anew, and what it came to', async () => {
    const lot = await lots.newLot(20);
    const page = await openAs(browser, server, 'technician', `/lots/${lot.id}/upload`);
    await withClient(server.database.appUrl, async (client) => {
      // Nobody can write an analysis, so the file stays on its way for as long as the test wants.
      await client.query('BEGIN');
      await client.query('LOCK TABLE analyses IN EXCLUSIVE MODE');
      await chooseFiles(page, fileOf('slow.csv', crystalCsv({ units: 20 })));
      await page
        .getByRole('article', { name: 'slow.csv' })
        .getByRole('button', { name: 'Load' })
        .click();
      await page.getByText('20 rows read; analysing the lot').waitFor();
      await page.reload();
      await page.getByRole('heading', { name: 'On the way' }).waitFor();
      await page.getByRole('heading', { name: 'slow.csv' }).waitFor();
      await page.getByText('20 rows read; analysing the lot').waitFor();
      expect(await page.getByRole('progressbar').getAttribute('aria-valuenow')).toBe('100');
      await client.query('ROLLBACK');
    });
    const onTheWay = page.getByRole('region', { name: 'On the way' });
    await onTheWay.getByText('20 of 20 rows taken, 0 refused.').waitFor();
    await page.getByText('20 of 20 units measured').waitFor();
    await page.context().close();
  });
});
