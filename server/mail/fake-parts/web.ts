import { readFileSync } from 'node:fs';
import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import { createRequire } from 'node:module';
import { type MailFakeBehaviour, readBehaviour, wellBehaved } from './behaviour';
import { letterHtml, letterPage, listPage, missingPage } from './pages';
import { type Letters } from './letters';
import { type FakeSmtp } from './smtp';

const pagePolicy =
  "default-src 'none'; style-src 'unsafe-inline'; img-src 'self' data:; font-src 'self'; frame-src 'self'; form-action 'self'; base-uri 'self'; frame-ancestors 'self'";

/** Pages to read what was sent, and the same as JSON under /api for tests. */
export function fakeWeb(letters: Letters, smtp: FakeSmtp): Server {
  return createServer((request, response) => {
    answer(request, response).catch((error: Error) => {
      if (!response.headersSent) send(response, 400, 'application/json', errorJson(error.message));
      else response.destroy();
    });
  });

  async function answer(request: IncomingMessage, response: ServerResponse): Promise<void> {
    const { pathname } = new URL(request.url ?? '/', 'http://fake');
    if (request.method === 'GET') return read(pathname, response);
    // Another page in the same browser must not steer the fake.
    const { origin, host } = request.headers;
    if (origin && origin !== `http://${host}`) throw new Error('Only from our own page.');
    const body = await bodyOf(request);
    if (request.method === 'DELETE' && pathname === '/api/letters') return cleared(response);
    if (request.method === 'POST' && pathname === '/clear') {
      letters.clear();
      return back(response);
    }
    if (request.method === 'PUT' && pathname === '/api/behaviour') {
      smtp.set(readBehaviour(JSON.parse(body) as Partial<MailFakeBehaviour>));
      return json(response, smtp.behaviour);
    }
    if (request.method === 'POST' && pathname === '/behaviour') {
      smtp.set(readBehaviour(Object.fromEntries(new URLSearchParams(body))));
      return back(response);
    }
    send(response, 404, 'text/html', missingPage());
  }

  function read(pathname: string, response: ServerResponse): void {
    if (pathname === '/')
      return send(response, 200, 'text/html', listPage(letters.all(), smtp.behaviour));
    if (pathname === '/api/letters') return json(response, letters.all());
    if (pathname === '/api/behaviour') return json(response, smtp.behaviour);
    const weight = /^\/fonts\/(400|600)$/.exec(pathname)?.[1];
    if (weight) return send(response, 200, 'font/woff2', readFileSync(fontFile(weight)));
    const [, number, part] = /^\/letters\/(\d+)(?:\/(.+))?$/.exec(pathname) ?? [];
    const letter = letters.find(Number(number));
    if (!letter) return send(response, 404, 'text/html', missingPage());
    if (!part) return send(response, 200, 'text/html', letterPage(letter));
    if (part === 'html') return send(response, 200, 'text/html', letterHtml(letter));
    const picture = letter.pictures[Number(/^pictures\/(\d+)$/.exec(part)?.[1] ?? NaN)];
    if (picture?.mediaType !== 'image/png') return send(response, 404, 'text/html', missingPage());
    send(response, 200, picture.mediaType, Buffer.from(picture.base64, 'base64'));
  }

  function cleared(response: ServerResponse): void {
    letters.clear();
    smtp.set(wellBehaved);
    json(response, []);
  }
}

function fontFile(weight: string): string {
  return createRequire(import.meta.url).resolve(
    `@fontsource/source-sans-3/files/source-sans-3-latin-${weight}-normal.woff2`,
  );
}

function errorJson(message: string): string {
  return JSON.stringify({ error: { code: 'input.invalid', message } });
}

function json(response: ServerResponse, value: unknown): void {
  send(response, 200, 'application/json', JSON.stringify(value));
}

function back(response: ServerResponse): void {
  response.writeHead(303, { Location: '/' }).end();
}

function send(response: ServerResponse, status: number, type: string, body: string | Buffer): void {
  response
    .writeHead(status, {
      'Content-Type': /^(image|font)\//.test(type) ? type : `${type}; charset=utf-8`,
      'Content-Security-Policy': pagePolicy,
      'X-Content-Type-Options': 'nosniff',
      'Cache-Control': 'no-store',
      'Referrer-Policy': 'no-referrer',
    })
    .end(body);
}

async function bodyOf(request: IncomingMessage): Promise<string> {
  const pieces: Buffer[] = [];
  let size = 0;
  for await (const piece of request as AsyncIterable<Buffer>) {
    size += piece.length;
    if (size > 64 * 1024) throw new Error('Too long.');
    pieces.push(piece);
  }
  return Buffer.concat(pieces).toString('utf8');
}
