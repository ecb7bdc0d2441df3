import { openAsBlob, rmSync } from 'node:fs';
import { dirname } from 'node:path';
import { gzipSync } from 'node:zlib';
import { type Browser, type Page } from 'playwright-core';
import { startCluster } from '../../server/database/cluster';
import { launchBrowser } from '../support/browser';
import { publishCluster } from '../support/cluster';
import { settled } from '../support/page-checks';
import { startServer, type ApiCall, type TestServer } from '../support/server';
import { type BenchRow } from './bench-row';
import { writeReadingsFile } from './support/readings-file';

/*
 * What pages weigh and how they feel: gzipped script before sign-in and on the lot page beside their budgets; LCP, INP and
 * CLS at a quarter of this machine's speed beside a third of the "good" thresholds of the Core Web Vitals (2.5 s, 200 ms,
 * 0.1; web.dev/articles/vitals, from memory); a lot of a million units opened beside one of a thousand.
 * QUARTZHOLD_BENCH_UNITS=100000 takes a smaller large lot.
 */
const RUNS = 5;
const greatestUnits = Number(process.env.QUARTZHOLD_BENCH_UNITS ?? 1_000_000);
const slowdown = 4;

export default async function pagesBench(): Promise<BenchRow[]> {
  const cluster = await startCluster({ name: 'bench-cluster', durable: false });
  publishCluster(cluster);
  const server = await startServer();
  const browser = await launchBrowser();
  try {
    const api = await server.apiOf('technician');
    const small = await lotOf(api, 1_000);
    const large = await lotOf(api, greatestUnits);
    await sayWeights(server, browser, small);
    await sayVitals(server, browser, small);
    const label = greatestUnits.toLocaleString('en');
    return [
      { name: 'open a lot of 1,000 units', runsMs: await openings(server, browser, small) },
      { name: `open a lot of ${label} units`, runsMs: await openings(server, browser, large) },
    ];
  } finally {
    await browser.close();
    await server.stop();
    await cluster.stop();
  }
}

/** Registers a lot, brings in a reading of every unit, and waits for its analysis. */
async function lotOf(api: ApiCall, units: number): Promise<string> {
  const items = async (path: string) =>
    (await api<{ items: { id: string; partNumber?: string }[] }>('GET', path)).items;
  const part = (await items('/api/parts')).find(({ partNumber }) => partNumber === 'TX26-16M0')!;
  const lot = await api<{ id: string }>('POST', '/api/lots', {
    lotNumber: `L-BENCH-${units}`,
    partId: part.id,
    supplierId: (await items('/api/suppliers'))[0]!.id,
    dateCode: '2648',
    lotSize: units,
    receivedOn: new Date().toISOString().slice(0, 10),
  });
  const file = await writeReadingsFile(units);
  const form = new FormData();
  form.set('acceptWarnings', 'true');
  form.set('file', await openAsBlob(file), 'readings.csv');
  const upload = await api<{ id: string }>('POST', `/api/lots/${lot.id}/uploads`, form);
  rmSync(dirname(file), { recursive: true });
  for (;;) {
    const { state } = await api<{ state: string }>('GET', `/api/uploads/${upload.id}`);
    if (state === 'done') return lot.id;
    if (state === 'failed') throw new Error(`The readings of ${units} units were not loaded.`);
    await new Promise((resolve) => setTimeout(resolve, 200));
  }
}

async function sayWeights(server: TestServer, browser: Browser, lotId: string): Promise<void> {
  const weigh = async (open: (page: Page) => Promise<void>) => {
    const context = await browser.newContext();
    const page = await context.newPage();
    const scripts = new Map<string, Promise<Buffer>>();
    page.on('response', (response) => {
      if (/\.m?js(\?|$)/.test(response.url())) scripts.set(response.url(), response.body());
    });
    await open(page);
    await page.waitForLoadState('networkidle');
    const bodies = await Promise.all(scripts.values());
    await context.close();
    return bodies.reduce((sum, body) => sum + gzipSync(body, { level: 9 }).length, 0) / 1000;
  };
  const say = (what: string, kB: number, budget: number) =>
    console.log(
      `${what}: ${kB.toFixed(1)} kB of script, gzipped; budget ${budget} kB, ${kB <= budget ? 'kept' : 'EXCEEDED'}`,
    );
  say(
    'before sign-in',
    await weigh(async (page) => {
      await page.goto(`${server.url}/sign-in`);
      await settled(page);
    }),
    120,
  );
  say('lot page', await weigh((page) => server.signIn(page, 'quality', `/lots/${lotId}`)), 350);
}

interface Vitals {
  lcpMs: number;
  inpMs: number;
  cls: number;
}

async function sayVitals(server: TestServer, browser: Browser, lotId: string): Promise<void> {
  const places: Record<string, { path: string; act: (page: Page) => Promise<void> }> = {
    'my work': { path: '/', act: (page) => page.keyboard.press('Control+k') },
    lots: {
      path: '/lots',
      act: async (page) => {
        await page.getByRole('button', { name: 'Columns' }).click();
      },
    },
    lot: {
      path: `/lots/${lotId}`,
      act: (page) => page.getByText('Hold, tell the supplier').click(),
    },
  };
  for (const [name, { path, act }] of Object.entries(places)) {
    const { lcpMs, inpMs, cls } = await vitalsOf(server, browser, path, act);
    const line = (title: string, value: number, third: number, digits: number, unit: string) =>
      `${title} ${value.toFixed(digits)}${unit} (a third of good: ${third.toFixed(digits)}${unit}${value > third ? ', EXCEEDED' : ''})`;
    console.log(
      `${name} at ${slowdown}x slowed CPU: ${[
        line('LCP', lcpMs, 2500 / 3, 0, ' ms'),
        line('INP', inpMs, 200 / 3, 0, ' ms'),
        line('CLS', cls, 0.1 / 3, 3, ''),
      ].join('; ')}`,
    );
  }
}

async function vitalsOf(
  server: TestServer,
  browser: Browser,
  path: string,
  act: (page: Page) => Promise<void>,
): Promise<Vitals> {
  const context = await browser.newContext({ viewport: { width: 1440, height: 900 } });
  const page = await context.newPage();
  // Once before, so that files named by their content lie in the cache, as on any day but the first.
  await server.signIn(page, 'quality', path);
  await settled(page);
  await page.addInitScript(watchVitals);
  const devtools = await context.newCDPSession(page);
  await devtools.send('Emulation.setCPUThrottlingRate', { rate: slowdown });
  await page.goto(server.url + path);
  await settled(page);
  await page.waitForLoadState('networkidle');
  await act(page);
  await page.keyboard.press('Tab');
  await page.waitForTimeout(1000);
  const vitals = await page.evaluate(() => (window as unknown as { vitals: Vitals }).vitals);
  await context.close();
  return vitals;
}

/** Runs in the page before anything else. */
function watchVitals(): void {
  const vitals = { lcpMs: 0, inpMs: 0, cls: 0 };
  Object.assign(window, { vitals });
  const watch = (type: string, see: (entry: never) => void, more: object = {}) =>
    new PerformanceObserver((list) =>
      list.getEntries().forEach((entry) => see(entry as never)),
    ).observe({ type, buffered: true, ...more });
  watch('largest-contentful-paint', (entry: { startTime: number }) => {
    vitals.lcpMs = entry.startTime;
  });
  watch('layout-shift', (entry: { value: number; hadRecentInput: boolean }) => {
    if (!entry.hadRecentInput) vitals.cls += entry.value;
  });
  watch(
    'event',
    (entry: { duration: number; interactionId: number }) => {
      if (entry.interactionId) vitals.inpMs = Math.max(vitals.inpMs, entry.duration);
    },
    { durationThreshold: 16 },
  );
}

/** From the address being opened until finding and charts stand there. */
async function openings(server: TestServer, browser: Browser, lotId: string): Promise<number[]> {
  const context = await browser.newContext();
  const page = await context.newPage();
  await server.signIn(page, 'quality', `/lots/${lotId}`);
  await settled(page);
  const runsMs: number[] = [];
  for (let run = 0; run < RUNS; run += 1) {
    const begin = performance.now();
    await page.goto(`${server.url}/lots/${lotId}`);
    await settled(page);
    await page.locator('canvas, svg.band-strip, .chart svg').first().waitFor();
    runsMs.push(performance.now() - begin);
  }
  await context.close();
  return runsMs;
}
