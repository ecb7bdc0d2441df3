import { readFileSync } from 'node:fs';
import { afterAll, beforeAll, expect, test } from 'vitest';
import { type Browser, type Page } from 'playwright-core';
import { launchBrowser } from '../support/browser';
import { axeFindings, settled, sidewaysAt } from '../support/page-checks';
import { startServer, type DemoPerson, type TestServer } from '../support/server';

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

async function as(who: DemoPerson, path: string): Promise<Page> {
  const context = await browser.newContext({ viewport: { width: 1440, height: 900 } });
  const page = await context.newPage();
  await server.signIn(page, who, path);
  await settled(page);
  return page;
}
const field = (page: Page, label: string) => page.getByLabel(label, { exact: true });
const picker = (page: Page, name: string) => page.getByRole('combobox', { name, exact: true });
const press = (page: Page, name: string) => page.getByRole('button', { name, exact: true }).click();
const heading = (page: Page, name: string | RegExp) =>
  page.getByRole('heading', { level: 1, name }).waitFor();
const lotNumbers = (page: Page) => page.getByRole('rowheader').getByRole('link').allTextContents();

test('the list of lots keeps filter and sort in the address, saves them under a name and exports them', async () => {
  const page = await as('quality', '/lots');
  const all = await lotNumbers(page);
  expect(all.length).toBeGreaterThan(8);

  await page.getByRole('button', { name: /^State:/ }).click();
  await page.getByRole('checkbox', { name: 'on hold' }).check();
  await page.waitForURL(/state=on_hold/);
  await page.keyboard.press('Escape');
  await page.getByRole('columnheader', { name: 'Lot', exact: true }).getByRole('button').click();
  await page.waitForURL(/sort=lotNumber/);
  await settled(page);
  const held = await lotNumbers(page);
  expect(held).toEqual([...held].sort());
  expect(held.length).toBeLessThan(all.length);

  await page.reload();
  await settled(page);
  expect(await lotNumbers(page)).toEqual(held);

  await press(page, 'Saved filters');
  await field(page, 'Name').fill('Held lots');
  await page.getByLabel('Share with everybody of my role').check();
  await press(page, 'Save filter');
  await page
    .getByRole('button', { name: /Held lots/ })
    .first()
    .waitFor();
  expect(await axeFindings(page)).toEqual([]);
  await page.keyboard.press('Escape');

  const download = page.waitForEvent('download');
  await page.getByRole('link', { name: 'Export as CSV' }).click();
  const lines = readFileSync(await (await download).path(), 'utf8')
    .trim()
    .split(/\r?\n/);
  expect(lines.slice(1, -1).map((line) => line.split(',')[0])).toEqual(held);
  expect(lines.at(-1)).toBe(`# end of export: ${held.length} rows`);

  await press(page, 'Clear the filter');
  await page.waitForURL((url) => !url.search.includes('state'));
  await settled(page);
  expect((await lotNumbers(page)).length).toBe(all.length);

  const other = await as('quality2', '/lots');
  await press(other, 'Saved filters');
  await other.getByRole('button', { name: /^Held lots/ }).click();
  await other.waitForURL(/state=on_hold/);
  await settled(other);
  expect(await lotNumbers(other)).toEqual(held);
  expect(await other.getByRole('button', { name: 'Delete the filter Held lots' }).count()).toBe(0);
});

test('the choice of columns stays with the person, also on another machine', async () => {
  const page = await as('auditor', '/lots');
  await page.getByRole('columnheader', { name: 'Received' }).waitFor();
  await press(page, 'Columns');
  const kept = page.waitForResponse(
    (answer) => answer.url().endsWith('/api/preferences/tables/lots') && answer.ok(),
  );
  await page.getByRole('checkbox', { name: 'Received' }).uncheck();
  await kept;
  expect(await page.getByRole('columnheader', { name: 'Received' }).count()).toBe(0);

  const elsewhere = await as('auditor', '/lots');
  await elsewhere.getByRole('columnheader', { name: 'Next' }).waitFor();
  await elsewhere
    .getByRole('columnheader', { name: 'Received' })
    .waitFor({ state: 'detached', timeout: 10_000 });
});

test('a lot is found and opened by the keyboard alone', async () => {
  const page = await as('technician', '/lots');
  await page.getByRole('rowheader').getByRole('link').first().focus();
  await page.keyboard.press('ArrowDown');
  const second = (await lotNumbers(page))[1]!;
  await page.keyboard.press('Enter');
  await heading(page, new RegExp(second));
});

test('a lot is registered with its revision and plan in view, and goes on to its readings', async () => {
  const page = await as('technician', '/lots/new');
  await press(page, 'Register and go on to the readings');
  await page.getByText('Give the lot its number.').waitFor();
  expect(await page.evaluate(() => document.activeElement?.getAttribute('aria-invalid'))).toBe(
    'true',
  );

  await field(page, 'Lot number').fill('L-2612-900');
  await picker(page, 'Part').fill('TX26');
  await page.getByRole('option', { name: /TX26-16M0/ }).click();
  await picker(page, 'Supplier').fill('Marrow');
  await page.getByRole('option', { name: /Marrow Bay/ }).click();
  await field(page, 'Lot size').fill('3000');
  await page.getByText(/TX26-16M0 revision A, in force since/).waitFor();
  // MIL-STD-105E, tables I and II: 3000 units at level II is letter K, 125 units, whose arrow at AQL 0.25 leads to L.
  await page.getByText(/Letter L, AQL 0.25\s%, 200\sunits, accept on 1, reject on 2/).waitFor();
  expect(await axeFindings(page)).toEqual([]);
  await press(page, 'Register and go on to the readings');
  await page.waitForURL(/\/lots\/[0-9a-f-]{36}\/upload$/);

  const again = await as('technician', '/lots/new');
  await field(again, 'Lot number').fill('L-2612-900');
  await picker(again, 'Part').fill('TX26-16M0');
  await again.getByRole('option', { name: /TX26-16M0/ }).click();
  await picker(again, 'Supplier').fill('Marrow');
  await again.getByRole('option', { name: /Marrow Bay/ }).click();
  await field(again, 'Lot size').fill('10');
  await press(again, 'Register and go on to the readings');
  await again.locator('[aria-invalid="true"]').waitFor();
  expect(await field(again, 'Lot number').getAttribute('aria-invalid')).toBe('true');
});

test('a revision is drafted by one person, approved with a signature by another, and its difference shown', async () => {
  const draft = await as('admin', '/parts');
  await draft.getByRole('link', { name: 'XO33-40M0' }).click();
  await heading(draft, 'XO33-40M0');
  await draft.getByRole('link', { name: 'Draft a new revision' }).click();
  await heading(draft, /New revision of XO33-40M0/);
  await settled(draft);
  expect(await draft.getByRole('textbox', { name: 'Revision', exact: true }).inputValue()).toBe(
    'B',
  );
  await field(draft, 'Upper limit · optional').fill('-30');
  await field(draft, 'Upper limit · optional').blur();
  await draft.getByText('The upper limit must lie above the lower one.').waitFor();
  await field(draft, 'Upper limit · optional').fill('20');
  await draft.getByLabel('Count units beyond').check();
  await draft.getByLabel('AQL', { exact: true }).selectOption('0.4');
  await field(draft, 'Try a lot of').fill('500');
  // MIL-STD-105E: 500 units at level II is letter H; at AQL 0.40 its arrow leads to G, 32 units, none beyond.
  await draft.getByText(/Letter G, AQL 0.4\s%, 32\sunits, accept on 0, reject on 1/).waitFor();
  expect(await axeFindings(draft)).toEqual([]);
  expect(await sidewaysAt(draft, 390)).toEqual([]);
  await press(draft, 'Save draft');
  await heading(draft, 'XO33-40M0 revision B');
  expect(await draft.getByRole('button', { name: 'Sign revision B' }).count()).toBe(0);

  const sign = await as('quality', new URL(draft.url()).pathname);
  expect(await sign.getByRole('row', { name: /Limits ±25\sppm/ }).count()).toBe(1);
  await field(sign, 'Reason').fill('Data sheet of the supplier checked.');
  await sign
    .getByRole('main')
    .getByLabel('Your password', { exact: true })
    .fill('not the passphrase');
  await press(sign, 'Sign revision B');
  await sign.locator('[aria-invalid="true"], [role="alert"]').first().waitFor();
  await sign.getByRole('main').getByLabel('Your password', { exact: true }).fill(server.passphrase);
  await press(sign, 'Sign revision B');
  await sign.getByText('approval of criteria').waitFor();
  await settled(sign);
  expect(await sign.getByRole('button', { name: 'Sign revision B' }).count()).toBe(0);
  expect(await axeFindings(sign)).toEqual([]);
});

test('a receiver starts from a published air interface and shows its allowance while one types', async () => {
  const page = await as('admin', '/receivers/new');
  const choice = field(page, 'Air interface');
  await choice.selectOption({ value: 'utra-ue' });
  await press(page, 'Fill the fields from it');
  await page.getByText('What it says stands under each', { exact: false }).waitFor();
  expect(Number(await field(page, 'Carrier').inputValue())).toBeGreaterThan(0);

  await field(page, 'Name').fill('Testlink');
  await field(page, 'Carrier').fill('2440000000');
  await field(page, 'Symbol rate').fill('1000000');
  await field(page, 'Roll-off').fill('0.35');
  await field(page, 'Front-end bandwidth').fill('2000000');
  await field(page, 'Far end tolerance').fill('20');
  // 15 % of 1 Msymbol/s is 150 kHz, 61.475 ppm of 2.44 GHz; less 20 ppm of the far end.
  await page.getByText(/Of 61\.5\sppm between both ends, 41\.5\sppm are left/).waitFor();
  await field(page, 'Front-end bandwidth').fill('1500000');
  // Half the passband less half the occupied width: 750 kHz - 675 kHz = 75 kHz, 30.7 ppm.
  await page.getByText(/Of 30\.7\sppm between both ends/).waitFor();
  expect(await axeFindings(page)).toEqual([]);
  expect(await sidewaysAt(page, 390)).toEqual([]);
  await press(page, 'Add receiver');
  await heading(page, 'Testlink');
});

test('a token’s secret is shown once, and a revoked token stays revoked', async () => {
  const page = await as('admin', '/benches');
  await page.getByRole('link', { name: 'Bench 3' }).click();
  await heading(page, 'Bench 3');
  await field(page, 'New token for').fill('bench script');
  await press(page, 'Issue a token');
  const secret = page.getByRole('region', { name: 'The secret of the new token' });
  const text = await secret.locator('code').first().textContent();
  expect(text!.length).toBeGreaterThan(20);
  expect(await axeFindings(page)).toEqual([]);
  await press(page, 'I have it');
  await page.reload();
  await settled(page);
  expect(await page.content()).not.toContain(text);
  await press(page, 'Revoke the token bench script');
  await page.getByRole('dialog').getByRole('button', { name: 'Revoke' }).click();
  await page.getByText(/^revoked/).waitFor();
});

test('a person is invited, bound to a supplier, disabled with a reason and enabled again', async () => {
  const page = await as('admin', '/people/new');
  await field(page, 'Name').fill('Orla Finch');
  await field(page, 'E-mail').fill('orla@marrow.test');
  await page.getByLabel('supplier contact').check();
  await press(page, 'Send the invitation');
  await page.getByText('Choose the supplier this contact answers for.').waitFor();
  await picker(page, 'Supplier').fill('Marrow');
  await page.getByRole('option', { name: /Marrow Bay/ }).click();
  await press(page, 'Send the invitation');
  await heading(page, 'Orla Finch');
  await page.getByText(/Invitation:/).waitFor();
  await page.getByText(/delivered to the mail server, not used yet/).waitFor({ timeout: 30_000 });
  await press(page, 'Disable');
  const dialog = page.getByRole('dialog');
  await dialog.getByLabel('Reason').fill('Left the company.');
  await dialog.getByRole('button', { name: 'Disable' }).click();
  await page.getByRole('button', { name: 'Enable again' }).click();
  await page.getByRole('button', { name: 'Disable' }).waitFor();
  expect(await axeFindings(page)).toEqual([]);
});
