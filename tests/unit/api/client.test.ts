// @vitest-environment jsdom
import { afterEach, expect, test, vi } from 'vitest';
import { api, ApiError, withQuery } from '@/api/client';
import { onConnection } from '@/api/connection-events';

const answer = (status: number, body?: unknown) =>
  new Response(body === undefined ? null : JSON.stringify(body), { status });
const fetched = vi.spyOn(globalThis, 'fetch');
afterEach(() => fetched.mockReset());

test('unsafe requests carry our header, reads do not', async () => {
  fetched.mockImplementation(() => Promise.resolve(answer(200, { ok: true })));
  await api.post('/api/lots', { lotNumber: 'L-1' });
  await api.get('/api/lots');
  const [post, get] = fetched.mock.calls.map(([, init]) => init?.headers as Record<string, string>);
  expect(post).toMatchObject({ 'X-Quartzhold': '1', 'Content-Type': 'application/json' });
  expect(get).not.toHaveProperty('X-Quartzhold');
});

test('a refusal keeps status, code, sentence and fields', async () => {
  const error = {
    code: 'invalid',
    message: 'Two fields need mending.',
    fields: { lotSize: 'At least 1.' },
  };
  fetched.mockResolvedValue(answer(422, { error }));
  const thrown: unknown = await api.post('/api/lots', {}).catch((reason: unknown) => reason);
  expect(thrown).toBeInstanceOf(ApiError);
  expect(thrown).toMatchObject({ status: 422, ...error });
});

test('an ended session is told, but not when nobody is expected to be signed in', async () => {
  const told = vi.fn();
  const stop = onConnection('session-end', told);
  fetched.mockImplementation(() =>
    Promise.resolve(answer(401, { error: { code: 'signed_out', message: 'Sign in.' } })),
  );
  await expect(api.get('/api/session', { expectsSignedOut: true })).rejects.toThrow('Sign in.');
  expect(told).not.toHaveBeenCalled();
  await expect(api.get('/api/lots')).rejects.toThrow('Sign in.');
  expect(told).toHaveBeenCalledTimes(1);
  stop();
});

test('a broken line is an ApiError of status 0 and is told; a cancelled request stays an AbortError', async () => {
  const told = vi.fn();
  const stop = onConnection('offline', told);
  fetched.mockRejectedValueOnce(new TypeError('network'));
  await expect(api.get('/api/lots')).rejects.toMatchObject({ status: 0, code: 'offline' });
  fetched.mockRejectedValueOnce(new DOMException('stopped', 'AbortError'));
  await expect(api.get('/api/lots')).rejects.toMatchObject({ name: 'AbortError' });
  expect(told).toHaveBeenCalledTimes(1);
  stop();
});

test('empty values leave the address', () => {
  expect(withQuery('/api/lots', { find: 'TX 26', state: '', after: null, limit: 50 })).toBe(
    '/api/lots?find=TX+26&limit=50',
  );
});
