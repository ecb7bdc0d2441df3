import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { type Browser, type Page } from 'playwright-core';
import { LotState } from '@shared/contract/lots';
import { launchBrowser } from '../support/browser';
import { settled } from '../support/page-checks';
import { startServer, type TestServer } from '../support/server';

interface LotItem {
  id: string;
  lotNumber: string;
  state: LotState;
}

let server: TestServer;
let browser: Browser;
beforeAll(async () => {
  server = await startServer();
  browser = await launchBrowser(['--js-flags=--expose-gc']);
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await server?.stop();
});

async function lotItems(): Promise<LotItem[]> {
  const quality = await server.apiOf('quality');
  return (await quality<{ items: LotItem[] }>('GET', '/api/lots')).items;
}

const focused = (page: Page) =>
  page.evaluate(() => {
    const element = document.activeElement as HTMLElement;
    if (element === document.body) return null;
    const shown = element.closest<HTMLElement>('label, .el-radio, .el-checkbox') ?? element;
    const { top, bottom, left, right } = shown.getBoundingClientRect();
    // A field of the kit wears its ring on the frame around it or on the mark beside it.
    const wearers = [element, element.parentElement, element.nextElementSibling];
    const hasRing = wearers.some((wearer) => {
      if (!wearer) return false;
      const { outlineStyle, outlineWidth, boxShadow } = getComputedStyle(wearer);
      return (outlineStyle !== 'none' && parseFloat(outlineWidth) > 0) || boxShadow !== 'none';
    });
    const bar = document.querySelector('header')!;
    const x = Math.min(Math.max((left + right) / 2, 1), innerWidth - 2);
    // The middle is what one looks at; a tall region need only begin in view.
    const y = Math.min((top + bottom) / 2, top + 20);
    const over = document.elementFromPoint(x, y);
    return {
      what: element.outerHTML.slice(0, 100),
      hasRing,
      isUnderBar: !bar.contains(element) && over !== null && bar.contains(over),
      isInView: y >= 0 && y < innerHeight,
    };
  });

describe('states', () => {
  it('can be told apart in grey, by their shapes alone', async () => {
    const items = await lotItems();
    const context = await browser.newContext({ deviceScaleFactor: 4 });
    const page = await context.newPage();
    await server.signIn(page, 'quality');
    const pictures: Record<string, string> = {};
    for (const state of LotState.options) {
      const lot = items.find((item) => item.state === state)!;
      await page.goto(`${server.url}/lots/${lot.id}`);
      await settled(page);
      const mark = page.locator('.state-mark').first();
      expect((await mark.innerText()).replace(/\s+/g, ' ')).toBe(state.replaceAll('_', ' '));
      pictures[state] = (await mark.locator('svg').screenshot()).toString('base64');
    }
    // Where there is ink and where not: colour and its lightness are gone from the comparison.
    const blank = await context.newPage();
    const differences = await blank.evaluate(async (shots) => {
      const masks: Record<string, boolean[]> = {};
      for (const [state, base64] of Object.entries(shots)) {
        const picture = new Image();
        picture.src = `data:image/png;base64,${base64}`;
        await picture.decode();
        const canvas = new OffscreenCanvas(56, 56);
        const drawing = canvas.getContext('2d')!;
        drawing.drawImage(picture, 0, 0, 56, 56);
        const { data } = drawing.getImageData(0, 0, 56, 56);
        const grey = Array.from({ length: 56 * 56 }, (_, at) =>
          Math.round(
            0.2126 * data[4 * at]! + 0.7152 * data[4 * at + 1]! + 0.0722 * data[4 * at + 2]!,
          ),
        );
        masks[state] = grey.map((light) => Math.abs(light - grey[0]!) > 40);
      }
      const states = Object.keys(masks);
      return states.flatMap((one, index) =>
        states.slice(index + 1).map((other) => {
          const inked = masks[one]!.map((ink, at) => [ink, masks[other]![at]!] as const);
          const either = inked.filter(([a, b]) => a || b).length;
          const unlike = inked.filter(([a, b]) => a !== b).length;
          return { pair: `${one} and ${other}`, either, share: unlike / either };
        }),
      );
    }, pictures);
    expect(differences).toHaveLength(21);
    for (const { pair, either, share } of differences) {
      expect(either, pair).toBeGreaterThan(100);
      expect(share, pair).toBeGreaterThan(0.1);
    }
    await context.close();
  });
});

describe('the frame', () => {
  it('holds no more memory after fifty further pages than before them', async () => {
    const page = await browser.newPage();
    await server.signIn(page, 'quality');
    const devtools = await page.context().newCDPSession(page);
    const heapBytes = async () => {
      await devtools.send('HeapProfiler.collectGarbage');
      return (await devtools.send('Runtime.getHeapUsage')).usedSize;
    };
    const bar = page.getByRole('navigation', { name: 'Sections' });
    const toBar = async (name: string) => {
      await bar.getByRole('link', { name, exact: true }).click();
      await page.waitForURL(
        (url) => url.pathname === (name === 'My work' ? '/' : `/${name.toLowerCase()}`),
      );
      await settled(page);
    };
    // Five changes: work, a lot with its charts, the lots, the holds, the history.
    const round = async () => {
      await toBar('My work');
      await page.getByRole('link', { name: 'L-2611-084', exact: true }).first().click();
      await page.getByRole('heading', { level: 1, name: 'L-2611-084' }).waitFor();
      await settled(page);
      for (const name of ['Lots', 'Holds', 'History']) await toBar(name);
    };
    for (let i = 0; i < 4; i += 1) await round();
    const before = await heapBytes();
    for (let i = 0; i < 10; i += 1) await round();
    const after = await heapBytes();
    console.log(
      `heap ${(before / 2 ** 20).toFixed(1)} MiB, after 50 pages ${(after / 2 ** 20).toFixed(1)} MiB`,
    );
    expect(after / before).toBeLessThan(1.1);
    await page.close();
  }, 300_000);

  it('shows where the focus is and never hides it under the bar, forwards and backwards', async () => {
    const lot = (await lotItems()).find(({ lotNumber }) => lotNumber === 'L-2611-084')!;
    const context = await browser.newContext({
      viewport: { width: 1280, height: 420 },
      reducedMotion: 'reduce',
    });
    const page = await context.newPage();
    await server.signIn(page, 'quality', `/lots/${lot.id}`);
    await settled(page);
    for (const key of ['Tab', 'Shift+Tab']) {
      for (let step = 0; step < 60; step += 1) {
        await page.keyboard.press(key);
        const at = await focused(page);
        if (at === null) break;
        const { what, ...shown } = at;
        expect(shown, `${key} to ${what}`).toEqual({
          hasRing: true,
          isUnderBar: false,
          isInView: true,
        });
      }
    }
    await context.close();
  });

  it('says that the line is gone, keeps what was written, and takes the note back', async () => {
    const context = await browser.newContext();
    const page = await context.newPage();
    await server.signIn(page, 'technician', '/lots/new');
    await page.getByLabel('Lot number').fill('L-OFFLINE-1');
    await context.setOffline(true);
    const find = page.getByRole('combobox', { name: /^Find a lot/ });
    await find.fill('L-2611');
    await page.getByText('No connection to the server.').waitFor();
    await context.setOffline(false);
    await find.fill('L-2610');
    await page.getByText('No connection to the server.').waitFor({ state: 'detached' });
    expect(await page.getByLabel('Lot number').inputValue()).toBe('L-OFFLINE-1');
    await context.close();
  });
});

describe('“Go to”', () => {
  it('opens by key, goes to a lot by number, and gives the focus back on Escape', async () => {
    const page = await browser.newPage();
    await server.signIn(page, 'quality', '/keys');
    const button = page.getByRole('button', { name: 'Go to' });
    await button.focus();
    await page.keyboard.press('Control+k');
    const panel = page.getByRole('dialog', { name: 'Go to' });
    await panel.waitFor();
    await page.keyboard.press('Escape');
    await panel.waitFor({ state: 'hidden' });
    expect(await button.evaluate((element) => element === document.activeElement)).toBe(true);
    await page.keyboard.press('Enter');
    await page.keyboard.type('L-2611-084');
    await panel.getByRole('option', { name: /^L-2611-084 ?lot/ }).waitFor();
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { level: 1, name: 'L-2611-084' }).waitFor();
    await settled(page);
    await page.keyboard.press('Control+k');
    await page.keyboard.type('register');
    await panel.getByRole('option', { name: 'Register a lot' }).waitFor();
    await page.keyboard.press('Enter');
    await page.waitForURL('**/lots/new');
    await page.close();
  });

  it('offers a person only what is theirs', async () => {
    const page = await browser.newPage();
    await server.signIn(page, 'supplier');
    await page.keyboard.press('g');
    const panel = page.getByRole('dialog', { name: 'Go to' });
    await panel.getByRole('option', { name: 'Holds' }).waitFor();
    for (const name of ['Lots', 'Register a lot', 'History', 'Parts'])
      expect(await panel.getByRole('option', { name, exact: true }).count(), name).toBe(0);
    await page.close();
  });

  it('answers single letters only while they are switched on, and never in a field', async () => {
    const page = await browser.newPage();
    await server.signIn(page, 'technician', '/keys');
    await page.keyboard.press('/');
    await page.keyboard.type('wl');
    const find = page.getByRole('combobox', { name: /^Find a lot/ });
    expect(await find.inputValue()).toBe('wl');
    await page.getByRole('heading', { level: 1, name: 'Keys' }).click();
    await page.getByRole('checkbox', { name: 'Use single letters' }).uncheck();
    await page.getByRole('heading', { level: 1, name: 'Keys' }).click();
    await page.keyboard.press('l');
    await page.keyboard.press('g');
    expect(new URL(page.url()).pathname).toBe('/keys');
    expect(await page.getByRole('dialog').count()).toBe(0);
    await page.reload();
    expect(await page.getByRole('checkbox', { name: 'Use single letters' }).isChecked()).toBe(
      false,
    );
    await page.close();
  });
});

describe('numbers', () => {
  it('are written as the person’s locale has it, and typed with either sign', async () => {
    const context = await browser.newContext({ locale: 'de-DE' });
    const page = await context.newPage();
    await server.signIn(page, 'quality', '/account');
    await page.getByText('12\u00a0345,67').waitFor();
    await page.getByLabel('decimal point').check();
    await page.getByText('12,345.67').waitFor();
    await context.close();
  });
});

describe('a session', () => {
  it('warns before its end, is extended, ends, and is taken up again in place with the form kept', async () => {
    const short = await startServer({ SESSION_IDLE_MINUTES: '0.7' });
    try {
      const page = await browser.newPage();
      await short.signIn(page, 'technician', '/lots/new');
      await page.getByLabel('Lot number').fill('L-KEPT-1');
      const warning = page.getByRole('complementary', { name: 'Your session is about to end.' });
      await warning.waitFor({ timeout: 60_000 });
      await warning.getByRole('button', { name: 'Stay signed in' }).click();
      await warning.waitFor({ state: 'detached' });
      const again = page.getByRole('dialog', { name: 'Your session has ended' });
      await again.waitFor({ timeout: 90_000 });
      await again.getByLabel('Your password', { exact: true }).fill(short.passphrase);
      await again.getByRole('button', { name: 'Sign in' }).click();
      await again.waitFor({ state: 'hidden' });
      expect(await page.getByLabel('Lot number').inputValue()).toBe('L-KEPT-1');
      await page.close();
    } finally {
      await short.stop();
    }
  }, 300_000);
});
