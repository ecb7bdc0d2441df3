import nodemailer from 'nodemailer';
import { afterAll, beforeAll, beforeEach, expect, it } from 'vitest';
import { startMailFake, type Letter, type MailFake } from '../../../server/mail/fake';
import { Letters } from '../../../server/mail/fake-parts/letters';

let fake: MailFake;
beforeAll(async () => {
  fake = await startMailFake();
});
beforeEach(() => {
  fake.clear();
  fake.setBehaviour({});
});
afterAll(() => fake?.stop());

const send = (subject: string, html = '<html><head></head><body><p>Hi</p></body></html>') =>
  nodemailer
    .createTransport({ url: fake.smtpUrl } as never)
    .sendMail({ from: 'a@example.com', to: 'b@example.com', subject, text: 'Hi', html });
const page = (path: string) => fetch(new URL(path, fake.pageUrl));

it('shows what was sent on pages and as JSON, newest first', async () => {
  await send('First <b>');
  await send('Second');
  const letters = (await (await page('/api/letters')).json()) as Letter[];
  expect(letters.map(({ subject }) => subject)).toEqual(['Second', 'First <b>']);
  const list = await (await page('/')).text();
  expect(list).toContain('First &#60;b&#62;');
  const letter = await (await page(`/letters/${letters[0]!.number}`)).text();
  expect(letter).toMatch(/<iframe sandbox="(?![^"]*allow-(scripts|same-origin))/);
  const body = await page(`/letters/${letters[0]!.number}/html`);
  expect(body.headers.get('content-security-policy')).toContain("default-src 'none'");
  expect((await page('/letters/999999')).status).toBe(404);
});

it('does as it is told for as many mails as it is told, then accepts again', async () => {
  const told = await fetch(new URL('/api/behaviour', fake.pageUrl), {
    method: 'PUT',
    body: JSON.stringify({ mode: 'refuse_for_now', times: 1 }),
  });
  expect(await told.json()).toEqual({ mode: 'refuse_for_now', delayMs: 0, times: 1 });
  await expect(send('No')).rejects.toMatchObject({ responseCode: 451 });
  await send('Yes');
  expect(fake.letters().map(({ subject }) => subject)).toEqual(['Yes']);
});

it('is steered by its own page only, and names a wrong wish', async () => {
  await send('Stays');
  const foreign = await fetch(new URL('/clear', fake.pageUrl), {
    method: 'POST',
    headers: { origin: 'http://elsewhere.example' },
  });
  expect(foreign.status).toBe(400);
  expect(fake.letters()).toHaveLength(1);
  const wrong = await fetch(new URL('/api/behaviour', fake.pageUrl), {
    method: 'PUT',
    body: '{"mode":"explode"}',
  });
  expect(wrong.status).toBe(400);
  expect(await wrong.text()).toContain('mode must be one of');
});

it('keeps the newest five hundred', async () => {
  const letters = new Letters();
  for (let n = 0; n < 505; n++)
    await letters.take(Buffer.from(`Subject: Number ${n}\r\n\r\nHi`), { from: '', to: [] });
  expect(letters.all()).toHaveLength(500);
  expect(letters.all().at(-1)!.subject).toBe('Number 5');
});
