import { afterAll, beforeAll, expect, it } from 'vitest';
import { AxeBuilder } from '@axe-core/playwright';
import { type Browser, type Page } from 'playwright-core';
import { launchBrowser } from '../support/browser';
import { startServer, type TestServer } from '../support/server';

let server: TestServer;
let browser: Browser;
beforeAll(async () => {
  // A session of three quarters of a minute: warned of half a minute before its end.
  server = await startServer({ SESSION_IDLE_MINUTES: '0.75' });
  browser = await launchBrowser();
}, 300_000);
afterAll(async () => {
  await browser?.close();
  await server?.stop();
});

const newPage = async () =>
  (await browser.newContext({ viewport: { width: 1280, height: 900 } })).newPage();

async function violations(page: Page) {
  const { violations: found } = await new AxeBuilder({ page }).analyze();
  return found.map(({ id, nodes }) => `${id}: ${nodes.map((node) => node.html).join(' | ')}`);
}

it('a session that nears its end says so in good time, and one can stay', async () => {
  const page = await newPage();
  await server.signIn(page, 'technician', '/account');
  const warning = page.getByRole('complementary', { name: 'Your session is about to end.' });
  await warning.waitFor({ timeout: 60_000 });
  const seconds = Number.parseInt(await warning.getByRole('timer').innerText(), 10);
  expect(seconds).toBeGreaterThanOrEqual(20);
  expect(await violations(page)).toEqual([]);
  await warning.getByRole('button', { name: 'Stay signed in' }).click();
  await warning.waitFor({ state: 'hidden' });
  await page.context().close();
});

it('a session that ended is taken up again in place, with what was written still there', async () => {
  const page = await newPage();
  await server.signIn(page, 'quality', '/account');
  await page.getByLabel('New password').fill('half of a sentence that');
  await page.context().clearCookies();
  await page.getByLabel('Once a day').click();
  const dialog = page.getByRole('dialog', { name: 'Your session has ended' });
  await dialog.waitFor();
  await dialog.getByLabel('Your password').fill(server.passphrase);
  await dialog.getByRole('button', { name: 'Sign in' }).click();
  await dialog.waitFor({ state: 'hidden' });
  expect(await page.getByLabel('New password').inputValue()).toBe('half of a sentence that');
  await page.context().close();
});

it('a forgotten password is mended by a mailed link that works once', async () => {
  const page = await newPage();
  await page.goto(`${server.url}/sign-in`);
  await page.getByRole('link', { name: 'Password forgotten?' }).click();
  await page.getByRole('heading', { name: 'Password forgotten' }).waitFor();
  await page.getByLabel('E-mail address').fill(server.emailOf('technician'));
  await page.getByRole('button', { name: 'Send the link' }).click();
  await page.getByRole('heading', { name: 'The request is on its way' }).waitFor();
  expect(await violations(page)).toEqual([]);

  const link = await linkFrom(page);
  await page.goto(link);
  await page.getByLabel('New password').fill('short');
  await page.getByRole('button', { name: 'Set the password' }).click();
  await page.getByText('Use at least 15 characters; 5 so far.').waitFor();
  expect(await violations(page)).toEqual([]);
  const password = 'nine swifts over the mill race';
  await page.getByLabel('New password').fill(password);
  await page.getByRole('button', { name: 'Set the password' }).click();
  await page.getByText('Your password is set.').waitFor();
  await page.getByLabel('Password', { exact: true }).fill(password);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.getByRole('button', { name: /Tove Lindqvist/ }).waitFor();

  await page.goto(link);
  await page.getByRole('heading', { name: 'This link does not work' }).waitFor();
  await page.context().close();
});

/** The link in the newest mail to the technician, once the worker has sent it. */
async function linkFrom(page: Page): Promise<string> {
  for (;;) {
    const letter = server.mail
      .letters()
      .find(
        ({ to, text }) => to.includes(server.emailOf('technician')) && text.includes('/links/'),
      );
    if (letter) return /http\S+\/links\/\S+/.exec(letter.text)![0];
    await page.waitForTimeout(300);
  }
}

it('other sessions are ended one by one or all at once', async () => {
  const [here, there] = [await newPage(), await newPage()];
  await server.signIn(there, 'auditor');
  await server.signIn(here, 'auditor', '/account');
  await here.getByRole('button', { name: 'End all other sessions' }).click();
  await here.getByText('You are signed in here only.').waitFor();
  await there.reload();
  await there.getByRole('heading', { name: 'Sign in' }).waitFor();
  expect(await violations(here)).toEqual([]);
  await Promise.all([here.context().close(), there.context().close()]);
});
