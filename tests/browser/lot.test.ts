import { afterAll, beforeAll, describe, expect, it, vi } from 'vitest';
import { type Browser, type Locator, type Page } from 'playwright-core';
import { launchBrowser } from '../support/browser';
import {
  axeViolations,
  crystalCsv,
  lotMaker,
  openAs,
  type BrowserLot,
} from '../support/browser-lots';
import { startServer, type DemoPerson, type TestServer } from '../support/server';

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

const open = (who: DemoPerson, path: string) => openAs(browser, server, who, path);
const panelOf = (page: Page) => page.getByRole('complementary', { name: 'Your decision' });
const section = (page: Page, heading: string) =>
  page.locator('section', { has: page.getByRole('heading', { name: heading, exact: true }) });

async function choose(page: Page, decision: string): Promise<void> {
  await panelOf(page).getByText(decision, { exact: true }).click();
}

async function signIn(place: Locator, reason: string, button: string): Promise<void> {
  await place.getByLabel('Reason').fill(reason);
  await place.getByLabel('Your password').fill(server.passphrase);
  await place.getByRole('button', { name: button, exact: true }).click();
}

const isState = (page: Page, state: string) =>
  page.locator('header, .page-head').getByText(state, { exact: true }).first().waitFor();

describe('deciding on a lot', () => {
  it('holds it with another lot of the same make, and accepts it only after new readings and a named correction', async () => {
    const lot = await lots.measuredLot({ units: 20 }, '2699');
    const other = await lots.newLot(20, '2699');
    const page = await open('quality', `/lots/${lot.id}`);
    await choose(page, 'Hold, tell the supplier');
    await panelOf(page).getByLabel(other.lotNumber).check();
    // Nothing goes out without a reason and the password, and the first of them has the focus.
    await panelOf(page).getByRole('button', { name: 'Sign hold' }).click();
    expect(
      await panelOf(page)
        .getByLabel('Reason')
        .evaluate((field) => field === document.activeElement),
    ).toBe(true);
    expect(await axeViolations(page)).toEqual([]);
    await signIn(panelOf(page), 'The reel was opened on arrival.', 'Sign hold');
    await isState(page, 'on hold');
    await page.getByText('No. 1: hold').waitFor();
    // Not inspected again: there is no acceptance to choose.
    await panelOf(page).getByText('Accept under concession').waitFor();
    expect(await panelOf(page).getByText('Accept', { exact: true }).count()).toBe(0);
    const auditor = await server.apiOf('auditor');
    expect((await auditor<BrowserLot>('GET', `/api/lots/${other.id}`)).state).toBe('on_hold');

    await lots.load(lot.id, crystalCsv({ units: 20, prefix: 'B' }), 'again.csv');
    await page.reload();
    await choose(page, 'Accept');
    await signIn(panelOf(page), 'Measured again, all within.', 'Sign acceptance');
    await panelOf(page).getByText('Name the correction that was made.').waitFor();
    await panelOf(page).getByLabel('Correction').fill('The reel was dried and sealed anew.');
    await panelOf(page).getByRole('button', { name: 'Sign acceptance' }).click();
    await isState(page, 'accepted');
    await page.getByText('Correction: The reel was dried and sealed anew.').waitFor();
    await page.context().close();
  });

  it('accepts under concession only by a second engineer, who may also refuse', async () => {
    const lot = await lots.measuredLot({ units: 20, strays: [12] });
    const first = await open('quality', `/lots/${lot.id}`);
    const concede = async () => {
      await choose(first, 'Accept under concession');
      await panelOf(first).getByRole('button', { name: 'Sign concession' }).click();
      await panelOf(first)
        .getByText('Limit the concession by quantity, by date, or both.')
        .first()
        .waitFor();
      await panelOf(first).getByLabel('At most').fill('19');
      await panelOf(first).getByLabel('What does not conform').fill('One of 20 at +12 ppm.');
      await signIn(panelOf(first), 'The one unit is taken out by hand.', 'Sign concession');
      await panelOf(first)
        .getByRole('heading', { name: 'Waits for the second signature' })
        .waitFor();
      // Whoever signed first cannot sign second.
      expect(await panelOf(first).getByLabel('Your password').count()).toBe(0);
    };
    await concede();

    const second = await open('quality2', `/lots/${lot.id}`);
    await panelOf(second).getByText('One of 20 at +12 ppm.').waitFor();
    await panelOf(second).getByText('up to 19 units').waitFor();
    await panelOf(second).getByRole('button', { name: 'Refuse instead' }).click();
    await panelOf(second).getByLabel('Reason').fill('Say first which serial it is.');
    await panelOf(second).getByRole('button', { name: 'Refuse', exact: true }).click();
    await second.getByText('does not count: the second signature was refused').waitFor();

    await first.reload();
    await concede();
    const waiting = section(first, 'Decisions and signatures').locator('li.decision').first();
    await waiting.getByRole('button', { name: 'Add the customer’s approval' }).click();
    await waiting.getByRole('button', { name: 'Keep with the concession' }).click();
    await waiting.getByText('Choose the file that the customer sent.').waitFor();
    await waiting.locator('input[type=file]').setInputFiles({
      name: 'approval.pdf',
      mimeType: 'application/pdf',
      buffer: Buffer.from('%PDF-1.7 The customer agrees.'),
    });
    await waiting.getByRole('button', { name: 'Keep with the concession' }).click();
    const download = first.waitForEvent('download');
    await waiting.getByRole('link', { name: 'approval.pdf' }).click();
    expect((await download).suggestedFilename()).toBe('approval.pdf');
    expect(await axeViolations(first)).toEqual([]);

    await second.reload();
    await panelOf(second).getByRole('link', { name: 'approval.pdf' }).waitFor();
    await signIn(panelOf(second), 'Agreed, serial is named.', 'Sign concession');
    await isState(second, 'accepted under concession');
    await second.getByText('No. 2: accept under concession').waitFor();
    expect(await axeViolations(second)).toEqual([]);
    await first.context().close();
    await second.context().close();
  });

  it('says who was first when two engineers sign at once, and shows the lot as it is now', async () => {
    const lot = await lots.measuredLot({ units: 20 });
    const slow = await open('quality', `/lots/${lot.id}`);
    await choose(slow, 'Reject');
    const quick = await open('quality2', `/lots/${lot.id}`);
    await choose(quick, 'Accept');
    await signIn(panelOf(quick), 'All within.', 'Sign acceptance');
    await isState(quick, 'accepted');

    await panelOf(slow).locator('label', { hasText: 'Return to supplier' }).click();
    await signIn(panelOf(slow), 'The label was torn.', 'Sign rejection');
    await panelOf(slow).getByRole('alert').getByText('cannot be rejected now').waitFor();
    expect(await axeViolations(slow)).toEqual([]);
    await panelOf(slow).getByRole('button', { name: 'Load the lot again' }).click();
    await isState(slow, 'accepted');
    await slow.getByText('No. 1: accept').waitFor();
    await panelOf(slow).getByRole('alert').waitFor({ state: 'detached' });
    await slow.context().close();
    await quick.context().close();
  });

  it('orders every unit to be measured and sorts the conforming ones into a lot of their own', async () => {
    const lot = await lots.newLot(60);
    await lots.load(lot.id, crystalCsv({ units: 50, strays: [13, -14] }), 'sample.csv');
    const page = await open('quality', `/lots/${lot.id}`);
    await choose(page, 'Inspect every unit, then sort');
    await signIn(panelOf(page), 'Two of fifty beyond: look at all.', 'Sign order');
    await isState(page, 'under inspection');
    await page.getByText('plan: 60 units').waitFor();

    await lots.load(lot.id, crystalCsv({ units: 10, prefix: 'R' }), 'rest.csv');
    await page.reload();
    await choose(page, 'Sort: conforming units go on');
    await panelOf(page).getByRole('button', { name: 'Sign sorting' }).click();
    await panelOf(page).getByText('Give the new lot its number.').waitFor();
    await panelOf(page).getByLabel('Number of the new lot').fill(`${lot.lotNumber}/A`);
    await panelOf(page).locator('label', { hasText: 'Scrap' }).click();
    await signIn(panelOf(page), 'Sorted by the guarded limits.', 'Sign sorting');
    await page.getByRole('heading', { level: 1, name: `${lot.lotNumber}/A` }).waitFor();
    await page.getByText('58 units').first().waitFor();
    await page.getByRole('link', { name: lot.lotNumber, exact: true }).click();
    await page
      .getByRole('heading', { level: 1, name: `Lot ${lot.lotNumber}`, exact: true })
      .waitFor();
    await isState(page, 'rejected');
    await page.getByText('Conforming units went on as').waitFor();
    await page.context().close();
  });
});

describe('what a lot rests on', () => {
  it('withdraws an upload after saying what goes, and keeps the earlier analysis readable by its address', async () => {
    const lot = await lots.newLot(20);
    await lots.load(lot.id, crystalCsv({ units: 20 }), 'first.csv');
    await lots.load(lot.id, crystalCsv({ units: 5, prefix: 'X', strays: [-15] }), 'strange.csv');
    const auditor = await server.apiOf('auditor');
    const before = await auditor<BrowserLot>('GET', `/api/lots/${lot.id}`);
    const page = await open('quality', `/lots/${lot.id}`);
    const line = page.locator('li.upload', { hasText: 'strange.csv' });
    await line.getByRole('button', { name: 'Withdraw' }).click();
    const dialog = page.getByRole('dialog', { name: 'Withdraw strange.csv' });
    await dialog.getByText('5 readings of 5 units go out of the analysis').waitFor();
    await dialog.getByRole('button', { name: 'Withdraw' }).click();
    await dialog.getByText('Say why, in a few words.').waitFor();
    expect(await axeViolations(page)).toEqual([]);
    await dialog.getByLabel('Reason').fill('Those units belong to another lot.');
    await dialog.getByRole('button', { name: 'Withdraw' }).click();
    await dialog.waitFor({ state: 'detached' });
    await line.getByText('“Those units belong to another lot.”').waitFor();
    await line.getByText('withdrawn', { exact: false }).first().waitFor();
    expect(await line.getByRole('button', { name: 'Withdraw' }).count()).toBe(0);

    await page.goto(`${server.url}/lots/${lot.id}?analysis=${before.currentAnalysisId}`);
    await page.getByText('You are looking at analysis').waitFor();
    await panelOf(page).getByText('A decision rests on the current analysis').waitFor();
    expect(await axeViolations(page)).toEqual([]);
    await page.getByRole('link', { name: 'Go to the current analysis' }).first().click();
    await page.getByText('You are looking at analysis').waitFor({ state: 'detached' });
    await panelOf(page).getByText('Reject').waitFor();
    await page.context().close();
  });

  it('clears the warnings of an upload with a reason, after which nothing is owed', async () => {
    const content = crystalCsv({ units: 20 });
    await lots.load((await lots.newLot(20)).id, content, 'own.csv');
    const lot = await lots.newLot(20);
    await lots.load(lot.id, content, 'same.csv');
    const page = await open('quality', `/lots/${lot.id}`);
    const line = page.locator('li.upload', { hasText: 'same.csv' });
    await line.getByRole('button', { name: 'Clear warnings' }).click();
    const dialog = page.getByRole('dialog', { name: 'Clear the warnings of same.csv' });
    expect(await dialog.getByRole('listitem').count()).toBeGreaterThan(0);
    await dialog.getByLabel('Reason').fill('The other lot got this file by mistake.');
    await dialog.getByRole('button', { name: 'Clear warnings' }).click();
    await dialog.waitFor({ state: 'detached' });
    await line.getByRole('button', { name: 'Clear warnings' }).waitFor({ state: 'detached' });
    await page.getByText('Nothing stands between this lot and a decision.').waitFor();
    await section(page, 'History').getByText('Warnings cleared').waitFor();
    await page.context().close();
  });

  it('corrects what was registered, and plans anew', async () => {
    const lot = await lots.newLot(20, '2640');
    const page = await open('technician', `/lots/${lot.id}`);
    await page.getByRole('button', { name: 'Correct what was registered' }).click();
    const dialog = page.getByRole('dialog', { name: 'Correct what was registered' });
    await dialog.getByLabel('Date code').fill('2641');
    await dialog.getByLabel('Lot size').fill('0');
    await dialog.getByRole('button', { name: 'Save' }).click();
    expect(await dialog.getByLabel('Lot size').getAttribute('aria-invalid')).toBe('true');
    await dialog.getByLabel('Lot size').fill('30');
    await dialog.getByLabel('Reason').fill('The delivery note was misread.');
    expect(await axeViolations(page)).toEqual([]);
    await dialog.getByRole('button', { name: 'Save' }).click();
    await dialog.waitFor({ state: 'detached' });
    await page.getByText('date code 2641').waitFor();
    await page.getByText('plan: 30 units').waitFor();
    await page.context().close();
  });

  it('tries other limits by typed numbers and saves nothing', async () => {
    const lot = await lots.measuredLot({ units: 20, strays: [6] });
    const auditor = await server.apiOf('auditor');
    const before = await auditor<BrowserLot>('GET', `/api/lots/${lot.id}`);
    const page = await open('quality', `/lots/${lot.id}`);
    const distribution = section(page, 'Distribution');
    await page.getByRole('textbox', { name: /^Upper limit/ }).fill('5');
    await distribution.getByText('Trial, not saved.').waitFor();
    await distribution.getByText(/1 of 20 units would lie/).waitFor();
    await page.getByRole('textbox', { name: /^Lower limit/ }).fill('7');
    await distribution.getByText('The upper limit must lie above the lower one.').waitFor();
    await page.getByRole('button', { name: 'Back to the lot’s own limits' }).click();
    await distribution.getByText('Trial, not saved.').waitFor({ state: 'detached' });
    await page.reload();
    expect(await page.getByRole('textbox', { name: /^Upper limit/ }).inputValue()).toBe('10');
    expect((await auditor<BrowserLot>('GET', `/api/lots/${lot.id}`)).version).toBe(before.version);
    await page.context().close();
  });

  it('is judged by a newer approved revision by a signed act that first shows the difference', async () => {
    const lot = await lots.measuredLot({ units: 20, strays: [8.6] });
    const engineer = await server.apiOf('quality');
    const part = await engineer<{ revisions: { id: string; revision: string }[] }>(
      'GET',
      `/api/parts/${lots.partId}`,
    );
    const draft = part.revisions.find(({ revision }) => revision === 'B')!;
    await engineer('POST', `/api/parts/${lots.partId}/revisions/${draft.id}/approval`, {
      password: server.passphrase,
      reason: 'Agreed with the radio team.',
      effectiveFrom: new Date().toISOString().slice(0, 10),
    });
    const page = await open('quality', `/lots/${lot.id}`);
    const newer = section(page, 'Newer revision');
    const row = newer.getByRole('row', { name: /Upper limit/ });
    expect(await row.getByRole('cell').allTextContents()).toEqual(['10', '8']);
    expect(await newer.getByRole('row').count()).toBe(3);
    await newer.getByRole('button', { name: 'Sign: judge by revision B' }).click();
    await newer.getByText('Say why, in a few words.').waitFor();
    await signIn(newer, 'The next radio takes these units.', 'Sign: judge by revision B');
    await newer.waitFor({ state: 'detached' });
    await page.getByText('±8 ppm').first().waitFor();
    await section(page, 'History').getByText('Judged by other criteria').waitFor();
    await section(page, 'Analyses').getByText('Analysis 2').waitFor();
    await page.context().close();
  });
});
