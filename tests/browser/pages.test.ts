import { afterAll, beforeAll, expect, test } from 'vitest';
import { type Browser } from 'playwright-core';
import { launchBrowser } from '../support/browser';
import { axeFindings, listenTo, settled, sidewaysAt } from '../support/page-checks';
import { startServer, type ApiCall, type DemoPerson, type TestServer } from '../support/server';

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

const idOf = async (api: ApiCall, path: string, wanted: (item: never) => boolean = () => true) =>
  (await api<{ items: { id: string }[] }>('GET', path)).items.find((item) => wanted(item as never))!
    .id;
const lotOf = (api: ApiCall, lotNumber: string) =>
  idOf(api, '/api/lots', (lot: { lotNumber: string }) => lot.lotNumber === lotNumber);

const everybody = async () => ['/', '/account', '/keys', '/no/such/page'];

/** What everybody of the house may read. */
async function houseRecords(api: ApiCall): Promise<string[]> {
  const lots = ['L-2611-084', 'L-2611-077', 'L-2610-058', 'L-2610-061', 'L-2608-014', 'L-2612-001'];
  return [
    ...(await everybody()),
    '/lots',
    ...(await Promise.all(lots.map(async (number) => `/lots/${await lotOf(api, number)}`))),
    '/parts',
    `/parts/${await idOf(api, '/api/parts')}`,
    '/receivers',
    `/receivers/${await idOf(api, '/api/receivers')}`,
    '/benches',
    `/benches/${await idOf(api, '/api/benches')}`,
  ];
}

async function holdPages(api: ApiCall): Promise<string[]> {
  return ['/holds', `/holds/${await idOf(api, '/api/holds')}`];
}

const historyPages = ['/history', '/history/1', '/history/checkpoints'];

const pagesOf: Partial<Record<DemoPerson, (api: ApiCall) => Promise<string[]>>> = {
  technician: async (api) => [
    ...(await houseRecords(api)),
    '/lots/new',
    `/lots/${await lotOf(api, 'L-2612-001')}/upload`,
  ],
  quality: async (api) => [
    ...(await houseRecords(api)),
    ...(await holdPages(api)),
    '/lots/new',
    '/suppliers',
    `/suppliers/${await idOf(api, '/api/suppliers')}`,
    ...historyPages,
  ],
  supplier: async (api) => [...(await everybody()), ...(await holdPages(api))],
  auditor: async (api) => [
    ...(await houseRecords(api)),
    ...(await holdPages(api)),
    ...historyPages,
    '/mail',
    `/mail/${await idOf(api, '/api/mail')}`,
  ],
  admin: async (api) => [
    ...(await houseRecords(api)),
    '/parts/new',
    '/receivers/new',
    '/suppliers',
    '/suppliers/new',
    '/benches/new',
    '/people',
    '/people/new',
    ...historyPages,
    '/mail',
  ],
};

async function complaintsOf(paths: readonly string[], who?: DemoPerson): Promise<string[]> {
  const context = await browser.newContext({ reducedMotion: 'reduce' });
  const { page, said } = await listenTo(context);
  const complaints: string[] = [];
  for (const [index, path] of paths.entries()) {
    await page.emulateMedia({ colorScheme: 'light', reducedMotion: 'reduce' });
    await page.setViewportSize({ width: 1440, height: 900 });
    if (who && index === 0) await server.signIn(page, who, path);
    else await page.goto(server.url + path);
    await settled(page);
    const isMissing = (await page.getByRole('heading', { name: 'No such page' }).count()) > 0;
    const found = isMissing && path !== '/no/such/page' ? ['is not there'] : [];
    found.push(...(await axeFindings(page)));
    await page.emulateMedia({ colorScheme: 'dark', reducedMotion: 'reduce' });
    found.push(...(await axeFindings(page, ['color-contrast'])).map((line) => `dark ${line}`));
    for (const width of [1200, 390, 320]) found.push(...(await sidewaysAt(page, width)));
    // A page that asks whether somebody is signed in is answered no, and the browser notes that as an error.
    const own = said.splice(0).filter((line) => who !== undefined || !/401/.test(line));
    complaints.push(...[...found, ...own].map((line) => `${path} ${line}`));
  }
  await context.close();
  return complaints;
}

test('pages for nobody: no axe violation, no sideways scroll, nothing stopped or said', async () => {
  expect(await complaintsOf(['/sign-in', '/sign-in/forgotten'])).toEqual([]);
});

test.each(Object.keys(pagesOf) as DemoPerson[])(
  'pages of %s: no axe violation light or dark, no sideways scroll, nothing stopped or said',
  async (who) => {
    const paths = await pagesOf[who]!(await server.apiOf(who));
    expect(await complaintsOf(paths, who)).toEqual([]);
  },
  600_000,
);
