import { execFile } from 'node:child_process';
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { promisify } from 'node:util';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { AxeBuilder } from '@axe-core/playwright';
import { type Browser, type Page } from 'playwright-core';
import { withClient } from '../../server/database/roles';
import { launchBrowser } from '../support/browser';
import { startServer, type TestServer } from '../support/server';

const runProgram = promisify(execFile);

let server: TestServer;
let browser: Browser;
let page: Page;
beforeAll(async () => {
  server = await startServer();
  browser = await launchBrowser();
  page = await (await browser.newContext({ viewport: { width: 1440, height: 900 } })).newPage();
  await server.signIn(page, 'auditor', '/history');
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await server?.stop();
});

async function violations() {
  const { violations: found } = await new AxeBuilder({ page }).analyze();
  return found.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(' | ')}`);
}

describe('the auditor', () => {
  it('filters by act and person, in the address, and opens an entry with its seal', async () => {
    const filters = page.getByRole('search', { name: 'Filter the history' });
    await filters.getByLabel('Act', { exact: true }).selectOption({ label: 'answered a hold' });
    await filters.getByLabel('Person', { exact: true }).selectOption({ label: 'Pia Marlow' });
    await page.getByRole('gridcell', { name: /acknowledged → answered/ }).waitFor();
    expect(await page.getByRole('row').count()).toBe(2);
    expect(new URL(page.url()).searchParams.get('act')).toBe('hold.answer');
    expect(await violations()).toEqual([]);

    await page.getByRole('rowheader').getByRole('link').click();
    await page.getByRole('heading', { name: /^Entry \d+/ }).waitFor();
    await page
      .getByText(/^[0-9a-f]{64}$/)
      .first()
      .waitFor();
    expect(await page.getByText(/^[0-9a-f]{64}$/).count()).toBe(2);
    expect(await violations()).toEqual([]);

    await page.getByRole('link', { name: 'The record as it stood after this entry' }).click();
    await page.getByText(/As it stood after entry/).waitFor();
    const state = page.locator('dl > div', { has: page.getByText('state', { exact: true }) });
    expect(await state.innerText()).toContain('answered');
    expect(await violations()).toEqual([]);
  });

  it('takes the filtered history and the verifier out, and the verifier finds it whole', async () => {
    const folder = mkdtempSync(join(tmpdir(), 'quartzhold-export-'));
    try {
      await page.goto(`${server.url}/history/checkpoints`);
      const files: string[] = [];
      for (const name of ['Export the whole history', 'Download the verifier']) {
        const coming = page.waitForEvent('download');
        await page.getByRole('link', { name }).click();
        const file = join(folder, (await coming).suggestedFilename());
        await (await coming).saveAs(file);
        files.push(file);
      }
      const coming = page.waitForEvent('download');
      await page.getByRole('button', { name: 'Make a checkpoint' }).click();
      await page
        .getByRole('button', { name: /^Download the checkpoint/ })
        .first()
        .click();
      expect((await coming).suggestedFilename()).toMatch(/^checkpoint-\d+\.json$/);
      const { stdout } = await runProgram(process.execPath, [files[1]!, files[0]!]);
      expect(stdout).not.toContain('BROKEN');
      expect(await violations()).toEqual([]);
    } finally {
      rmSync(folder, { recursive: true, force: true });
    }
  });

  it('verifies the chain, and is told the first broken entry once somebody has altered one behind the product', async () => {
    await page.goto(`${server.url}/history`);
    await page.getByRole('button', { name: 'Verify the whole chain' }).click();
    await page
      .locator('main')
      .getByText(/^Unbroken\. All \d+/)
      .waitFor();
    await page.getByText(/It cannot show that the newest entries are all there/).waitFor();

    await withClient(server.database.adminUrl, async (client) => {
      await client.query('ALTER TABLE history_entries DISABLE TRIGGER USER');
      await client.query(
        `UPDATE history_entries SET payload = replace(payload, '"act":"lot.register"', '"act":"lot.change"')
         WHERE id = (SELECT entry_id FROM history_seals s JOIN history_entries e ON e.id = s.entry_id
                     WHERE e.act = 'lot.register' ORDER BY s.sequence LIMIT 1)`,
      );
    });
    await page.getByRole('button', { name: 'Verify the whole chain' }).click();
    const broken = page.locator('main').getByText(/^Broken at entry \d+/);
    await broken.waitFor();
    await page.getByRole('link', { name: /^Open entry/ }).click();
    await page.getByRole('heading', { name: /^Entry \d+/ }).waitFor();
  });
});
