import { AxeBuilder } from '@axe-core/playwright';
import { type Browser, type Page } from 'playwright-core';
import { sampleCsv } from '../../seeders/readings';
import { type DemoPerson, type TestServer } from './server';

/*
 * Lots of our own beside those of the demo, so small that every unit is measured: 16 MHz crystals, limits ±10 ppm, taken up
 * to ±9 ppm (guarded by the bench's 1 ppm). Readings are invented.
 */
export interface BrowserLot {
  id: string;
  version: number;
  currentAnalysisId: string;
  lotNumber: string;
  state: string;
}

interface Recipe {
  units: number;
  prefix?: string;
  strays?: number[];
}

let files = 0;
/** No two files alike: the same file for another lot would be warned of. */
export function crystalCsv({ units, prefix = 'A', strays = [] }: Recipe): string {
  files += 1;
  return sampleCsv({
    seed: 7,
    nominalHz: '16000000',
    units,
    meanPpm: 0.5,
    sdPpm: 1.5,
    strays,
    serialPrefix: `${prefix}${files}-`,
    startedAt: '2026-11-02T08:00:00Z',
  });
}

interface Listed {
  items: { id: string; partNumber: string; name: string }[];
}

export async function lotMaker(server: TestServer) {
  const technician = await server.apiOf('technician');
  const parts = await technician<Listed>('GET', '/api/parts?limit=200');
  const partId = parts.items.find(({ partNumber }) => partNumber === 'TX26-16M0')!.id;
  const suppliers = await technician<Listed>('GET', '/api/suppliers?limit=200');
  const supplierId = suppliers.items.find(({ name }) => name === 'Marrow Bay Resonators')!.id;
  let count = 0;

  const newLot = (lotSize: number, dateCode = '') => {
    count += 1;
    return technician<BrowserLot>('POST', '/api/lots', {
      lotNumber: `T-${String(count).padStart(3, '0')}`,
      partId,
      supplierId,
      dateCode,
      lotSize,
      receivedOn: new Date().toISOString().slice(0, 10),
    });
  };

  /** Sent as a page sends it, and waited for. */
  const load = async (lotId: string, content: string, fileName = 'readings.csv') => {
    const form = new FormData();
    form.set('acceptWarnings', 'true');
    form.set('file', new Blob([content]), fileName);
    const { id } = await technician<{ id: string }>('POST', `/api/lots/${lotId}/uploads`, form);
    for (;;) {
      const { state } = await technician<{ state: string }>('GET', `/api/uploads/${id}`);
      if (state === 'done') return id;
      if (state === 'failed') throw new Error(`${fileName} was not taken.`);
      await new Promise((resolve) => setTimeout(resolve, 100));
    }
  };

  const measuredLot = async (recipe: Recipe, dateCode = '') => {
    const lot = await newLot(recipe.units, dateCode);
    await load(lot.id, crystalCsv(recipe));
    return lot;
  };

  return { partId, newLot, load, measuredLot };
}

/** A page of its own, signed in. */
export async function openAs(
  browser: Browser,
  server: TestServer,
  who: DemoPerson,
  path: string,
  width = 1440,
): Promise<Page> {
  const context = await browser.newContext({ viewport: { width, height: 900 } });
  context.setDefaultTimeout(60_000);
  const page = await context.newPage();
  await server.signIn(page, who, path);
  return page;
}

/** What axe finds wrong on the page as it is now. */
export async function axeViolations(page: Page): Promise<string[]> {
  const { violations } = await new AxeBuilder({ page }).analyze();
  return violations.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(' | ')}`);
}
