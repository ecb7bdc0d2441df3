import { afterAll, beforeAll, expect, test } from 'vitest';
import { type Browser } from 'playwright-core';
import { launchBrowser } from '../support/browser';
import { startServer, type TestServer } from '../support/server';

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

test('who is signed out is asked to sign in, and goes on to the page they wanted', async () => {
  const page = await browser.newPage();
  await page.goto(`${server.url}/holds`);
  await page.getByLabel('E-mail').fill(server.emailOf('quality'));
  await page.getByLabel('Password', { exact: true }).fill(server.passphrase);
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.getByRole('button', { name: /Ines Okafor/ }).waitFor();
  expect(new URL(page.url()).pathname).toBe('/holds');
  await page.close();
});

test('a wrong password says so in the page and keeps the address', async () => {
  const page = await browser.newPage();
  await page.goto(`${server.url}/sign-in`);
  await page.getByLabel('E-mail').fill(server.emailOf('quality'));
  await page.getByLabel('Password', { exact: true }).fill('not the passphrase at all');
  await page.getByRole('button', { name: 'Sign in' }).click();
  await page.getByRole('alert').waitFor();
  expect(await page.getByLabel('E-mail').inputValue()).toBe(server.emailOf('quality'));
  await page.close();
});
