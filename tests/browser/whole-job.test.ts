import { join } from 'node:path';
import { afterAll, afterEach, beforeAll, describe, expect, it } from 'vitest';
import { type Browser, type Locator, type Page } from 'playwright-core';
import { sampleCsv } from '../../seeders/readings';
import { checkoutFolder } from '../../server/launch/checkout';
import { launchBrowser } from '../support/browser';
import { shootPages } from '../support/shoot';
import { startServer, type DemoPerson, type TestServer } from '../support/server';

const record = (name: string) => join(checkoutFolder, 'tests/records', name);
const today = new Date().toISOString().slice(0, 10);

let server: TestServer;
let browser: Browser;
beforeAll(async () => {
  server = await startServer();
  browser = await launchBrowser();
  await addClockCrystal();
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await server?.stop();
});

afterEach(async ({ task }) => {
  if (task.result?.state === 'fail') await shootPages(browser, task.name);
  await Promise.all(browser.contexts().map((context) => context.close()));
});

/** A part wide enough for the measured clock modules, whose offsets lie between −43 and +107 ppm. */
async function addClockCrystal(): Promise<void> {
  const admin = await server.apiOf('admin');
  const quality = await server.apiOf('quality');
  const part = await admin<{ id: string; revisions: { id: string }[] }>('POST', '/api/parts', {
    partNumber: 'CK99-32K768',
    description: 'clock crystal with wide limits, invented for this test',
    deviceKind: 'crystal',
    criteria: {
      nominalFrequencyHz: '32768',
      toleranceLowPpm: -150,
      toleranceHighPpm: 150,
      samplingRule: { kind: 'everyUnit' },
      decisionRule: { kind: 'simple' },
    },
  });
  await quality('POST', `/api/parts/${part.id}/revisions/${part.revisions[0]!.id}/approval`, {
    password: server.passphrase,
    reason: 'Wide on purpose.',
    effectiveFrom: today,
  });
}

/** A page of somebody's own, signed in by the form as they would. */
async function cameIn(who: DemoPerson): Promise<Page> {
  const page = await (await browser.newContext({ acceptDownloads: true })).newPage();
  await page.goto(server.url);
  await signInByForm(page, who);
  return page;
}

async function signInByForm(page: Page, who: DemoPerson): Promise<void> {
  await page.getByLabel('E-mail').fill(server.emailOf(who));
  await page.getByLabel('Password', { exact: true }).fill(server.passphrase);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.getByRole('navigation', { name: 'Sections' }).waitFor();
}

async function pick(field: Locator, text: string): Promise<void> {
  await field.fill(text);
  await field.page().getByRole('option', { name: text }).first().click();
}

async function register(
  page: Page,
  lot: { lotNumber: string; part: string; supplier: string; size: number },
): Promise<void> {
  await page
    .getByRole('navigation', { name: 'Sections' })
    .getByRole('link', { name: 'Lots' })
    .click();
  await page.getByRole('link', { name: 'Register a lot' }).first().click();
  await page.getByRole('heading', { level: 1, name: 'Register a lot' }).waitFor();
  await page.getByLabel('Lot number', { exact: true }).fill(lot.lotNumber);
  await pick(page.getByRole('combobox', { name: 'Part', exact: true }), lot.part);
  await pick(page.getByRole('combobox', { name: 'Supplier', exact: true }), lot.supplier);
  await page.getByLabel('Date code').fill('2647');
  await page.getByLabel('Lot size').fill(String(lot.size));
  await page.getByLabel('Received on').fill(today);
  await page.getByRole('button', { name: 'Register and go on to the readings' }).click();
  await page
    .getByRole('heading', { level: 1, name: `Readings for lot ${lot.lotNumber}` })
    .waitFor();
}

type UploadFile = string | { name: string; mimeType: string; buffer: Buffer };

async function choose(page: Page, file: UploadFile): Promise<Locator> {
  const [chooser] = await Promise.all([
    page.waitForEvent('filechooser'),
    page.getByRole('button', { name: 'Choose files' }).first().click(),
  ]);
  await chooser.setFiles(file);
  const name = typeof file === 'string' ? file.split('/').at(-1)! : file.name;
  return page.getByRole('article', { name });
}

/** A sample of 200 units with four beyond the limits, as the demo has them. */
const strayReadings = {
  name: 'L-2612-900.csv',
  mimeType: 'text/csv',
  buffer: Buffer.from(
    sampleCsv({
      nominalHz: '16000000',
      seed: 900,
      units: 200,
      meanPpm: 1.2,
      sdPpm: 2,
      strays: [-14.2, 11.9, 12.4, 13.8],
      serialPrefix: 'WJ47',
      startedAt: new Date(Date.now() - 3_600_000).toISOString(),
    }),
  ),
};

describe('the whole job', () => {
  it('goes from a delivery to a verified history, through the hands of four people', async () => {
    // The technician registers three lots and brings their readings in.
    const technician = await cameIn('technician');
    await register(technician, {
      lotNumber: 'L-2612-901',
      part: 'OC20-10M0',
      supplier: 'Halden Timebase',
      size: 1,
    });
    const series = await choose(technician, record('ocxo-10MHz-1s-first2000.csv'));
    await series.getByText('Read as a series of one unit').waitFor();
    await series.getByRole('button', { name: 'Show rows and columns' }).click();
    await series.getByLabel('Serial of the unit').fill('OX-1');
    await series.getByLabel('Serial of the unit').press('Tab');
    await series.getByRole('button', { name: 'Load', exact: true }).click();
    await technician.getByText('2,000 of 2,000 rows taken').first().waitFor();

    await register(technician, {
      lotNumber: 'L-2612-902',
      part: 'CK99-32K768',
      supplier: 'Cinder Hill Devices',
      size: 14,
    });
    const offsets = await choose(technician, record('rtc-units-initial-offset-ppm.csv'));
    await offsets.getByText('frequency (ppm)').waitFor();
    await offsets.getByRole('button', { name: 'Load', exact: true }).click();
    await technician.getByText('14 of 14 rows taken').first().waitFor();

    await register(technician, {
      lotNumber: 'L-2612-900',
      part: 'TX26-16M0',
      supplier: 'Marrow Bay Resonators',
      size: 3500,
    });
    const sample = await choose(technician, strayReadings);
    await sample.getByRole('button', { name: 'Load', exact: true }).click();
    await technician.getByText('200 of 200 rows taken').first().waitFor();
    await technician.getByRole('link', { name: 'To lot L-2612-900' }).click();
    await technician.getByRole('heading', { level: 1, name: 'L-2612-900' }).waitFor();
    // A technician sees at once what the file did, and may not decide.
    expect(await technician.getByText('Your decision').count()).toBe(0);
    await technician.context().close();

    // The quality engineer reads what waits, and signs a hold.
    const quality = await cameIn('quality');
    await quality.getByRole('link', { name: 'L-2612-900' }).click();
    await quality.getByRole('heading', { level: 1, name: 'L-2612-900' }).waitFor();
    const panel = quality.getByRole('complementary', { name: 'Your decision' });
    await panel.getByText('Hold, tell the supplier').click();
    await panel.getByLabel('Reason').fill('Four units beyond the limits; the plan accepts none.');
    await panel.getByLabel('Your password').fill(server.passphrase);
    await panel.getByRole('button', { name: 'Sign hold' }).click();
    await quality.getByText('No. 1: hold').waitFor();

    // The supplier reads the mail, follows its link, signs in, acknowledges and answers with a file.
    const supplier = await (await browser.newContext()).newPage();
    const notice = supplier.getByRole('link', { name: /L-2612-900/ });
    await expect
      .poll(
        async () => {
          await supplier.goto(server.mailUrl);
          return notice.count();
        },
        { timeout: 60_000 },
      )
      .toBeGreaterThan(0);
    await notice.first().click();
    const followed = supplier.context().waitForEvent('page');
    await supplier
      .getByRole('link', { name: `${server.url}/holds/` })
      .first()
      .click();
    const portal = await followed;
    await signInByForm(portal, 'supplier');
    await portal.getByRole('heading', { level: 1, name: 'Hold on lot L-2612-900' }).waitFor();
    await portal.getByLabel('Note').fill('Received.');
    await portal.getByRole('button', { name: 'Acknowledge' }).click();
    await portal.getByRole('heading', { name: 'Acknowledgement' }).waitFor();
    const send = portal.getByRole('button', { name: 'Send the answer' });
    await portal.getByLabel('Containment').fill('Date code 2647 is set aside.');
    await portal.getByLabel('Cause', { exact: true }).fill('One trimming head drifted.');
    await portal.getByLabel('Corrective action').fill('The head is checked each shift.');
    await portal
      .locator('form', { has: send })
      .locator('input[type=file]')
      .setInputFiles({
        name: 'trimming-log.csv',
        mimeType: 'text/csv',
        buffer: Buffer.from('shift,offset_ppm\n1,0.2\n2,6.1\n'),
      });
    await send.click();
    await portal.getByRole('heading', { name: 'Answer', exact: true }).waitFor();
    await supplier.context().close();

    // The quality engineer reads the answer and decides again.
    await quality.goto(server.url);
    await quality.getByRole('link', { name: 'L-2612-900' }).first().click();
    await quality.getByRole('heading', { level: 1, name: 'L-2612-900' }).waitFor();
    await panel.getByText('Reject', { exact: true }).click();
    await panel.getByText('Return to supplier').click();
    await panel.getByLabel('Reason').fill('The cause touches the whole date code.');
    await panel.getByLabel('Your password').fill(server.passphrase);
    await panel.getByRole('button', { name: 'Sign rejection' }).click();
    await quality.getByText('No. 2: reject').waitFor();
    await quality.context().close();

    // The auditor filters the history, and verifies it.
    const auditor = await cameIn('auditor');
    await auditor
      .getByRole('navigation', { name: 'Sections' })
      .getByRole('link', { name: 'History' })
      .click();
    const filters = auditor.getByRole('search', { name: 'Filter the history' });
    await filters.getByLabel('Act', { exact: true }).selectOption({ label: 'answered a hold' });
    await filters.getByLabel('Person', { exact: true }).selectOption({ label: 'Pia Marlow' });
    await auditor.getByRole('grid').getByText('L-2612-900').first().waitFor();
    await auditor.goto(`${server.url}/history`);
    await auditor.getByRole('button', { name: 'Verify the whole chain' }).click();
    await auditor
      .locator('main')
      .getByText(/^Unbroken\. All \d+/)
      .waitFor();
    await auditor.context().close();
  }, 420_000);
});

/** Presses Tab until the thing has the focus: what Tab cannot reach, a keyboard cannot. */
async function tabTo(target: Locator): Promise<void> {
  const page = target.page();
  await target.first().waitFor();
  for (let step = 0; step < 150; step += 1) {
    if (await target.first().evaluate((element) => element === document.activeElement)) return;
    await page.keyboard.press('Tab');
  }
  throw new Error(`Tab never reached ${String(target)}`);
}

describe('by keyboard alone', () => {
  it('a lot is registered, its readings are brought in, and it is accepted', async () => {
    const technician = await (await browser.newContext()).newPage();
    await technician.goto(server.url);
    const type = async (field: Locator, text: string) => {
      await tabTo(field);
      await field.page().keyboard.press('Control+a');
      await field.page().keyboard.type(text);
    };
    const press = async (button: Locator, key = 'Enter') => {
      await tabTo(button);
      await button.page().keyboard.press(key);
    };
    const pickByKeys = async (field: Locator, text: string) => {
      await type(field, text);
      // Typing has narrowed the list to the one meant, which is then pointed at.
      await expect.poll(() => field.page().getByRole('option').count()).toBe(1);
      await field.page().keyboard.press('Enter');
    };
    await type(technician.getByLabel('E-mail'), server.emailOf('technician'));
    await type(technician.getByLabel('Password', { exact: true }), server.passphrase);
    await technician.keyboard.press('Enter');
    await technician.getByRole('navigation', { name: 'Sections' }).waitFor();

    await technician.keyboard.press('n');
    await technician.getByRole('heading', { level: 1, name: 'Register a lot' }).waitFor();
    await type(technician.getByLabel('Lot number'), 'L-2612-910');
    await pickByKeys(technician.getByRole('combobox', { name: 'Part', exact: true }), 'TX26-16M0');
    await pickByKeys(
      technician.getByRole('combobox', { name: 'Supplier', exact: true }),
      'Marrow Bay Resonators',
    );
    await type(technician.getByLabel('Date code'), '2648');
    await type(technician.getByLabel('Lot size'), '3500');
    await press(technician.getByRole('button', { name: 'Register and go on to the readings' }));
    await technician.getByRole('heading', { level: 1, name: /L-2612-910/ }).waitFor();
    const chooser = technician.waitForEvent('filechooser');
    await press(technician.getByRole('button', { name: 'Choose files' }));
    await (
      await chooser
    ).setFiles({
      name: 'L-2612-910.csv',
      mimeType: 'text/csv',
      buffer: Buffer.from(
        sampleCsv({
          nominalHz: '16000000',
          seed: 910,
          units: 200,
          meanPpm: 0.4,
          sdPpm: 1.8,
          serialPrefix: 'WJ48',
          startedAt: new Date(Date.now() - 3_600_000).toISOString(),
        }),
      ),
    });
    await press(technician.getByRole('button', { name: 'Load', exact: true }));
    await technician.getByText('200 of 200 rows taken').first().waitFor();
    await technician.context().close();

    const quality = await (await browser.newContext()).newPage();
    await quality.goto(server.url);
    await type(quality.getByLabel('E-mail'), server.emailOf('quality'));
    await type(quality.getByLabel('Password', { exact: true }), server.passphrase);
    await quality.keyboard.press('Enter');
    await quality.getByRole('navigation', { name: 'Sections' }).waitFor();
    await quality.keyboard.press('g');
    await quality.keyboard.type('L-2612-910');
    await quality.getByRole('option', { name: /^L-2612-910 ?lot/ }).waitFor();
    await quality.keyboard.press('Enter');
    await quality.getByRole('heading', { level: 1, name: 'L-2612-910' }).waitFor();
    const panel = quality.getByRole('complementary', { name: 'Your decision' });
    await press(panel.getByRole('radio', { name: 'Accept', exact: true }), 'Space');
    await type(panel.getByLabel('Reason'), 'The plan is met and the links work with margin.');
    await type(panel.getByLabel('Your password'), server.passphrase);
    await press(panel.getByRole('button', { name: 'Sign acceptance' }));
    await quality.getByText('No. 1: accept').waitFor();
    await quality.context().close();
  }, 300_000);
});
