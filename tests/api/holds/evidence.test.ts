import { createHash } from 'node:crypto';
import { deflateRawSync } from 'node:zlib';
import { afterAll, beforeAll, beforeEach, describe, expect, it } from 'vitest';
import { Attachment, Mail } from '../../../server/models';
import { startApi, type Agent, type Api } from '../../support/api';
import { heldLot } from '../../support/held-lot';
import { zip } from '../../support/zip';

const png = Buffer.from(
  'iVBORw0KGgoAAAANSUhEUgAAAAEAAAABCAYAAAAfFcSJAAAADUlEQVR42mNk+M9QDwADhgGAWjR9awAAAABJRU5ErkJggg==',
  'base64',
);
const workbook = (extra: string[] = []) =>
  zip(['[Content_Types].xml', 'xl/workbook.xml', ...extra].map((name) => [name, '<x/>']));

describe('evidence files', () => {
  let api: Api;
  let supplier: Agent;
  let quality: Agent;
  let url: string;
  beforeAll(async () => {
    api = await startApi();
    [supplier, quality] = await Promise.all([api.agentFor('supplier'), api.agentFor('quality')]);
  });
  beforeEach(async () => {
    const { hold } = await heldLot(api);
    await hold.update({ state: 'acknowledged' });
    url = `/api/holds/${hold.id}`;
  });
  afterAll(() => api?.close());

  const send = (files: [Buffer, string][]) => {
    const request = supplier
      .post(`${url}/answers`)
      .field('containment', 'Blocked.')
      .field('cause', 'Mask.')
      .field('correctiveAction', 'Replaced.');
    for (const [bytes, name] of files) request.attach('files', bytes, name);
    return request;
  };

  it('are kept byte for byte with their hash and served as attachments', async () => {
    const { body } = await send([
      [png, 'mask.png'],
      [Buffer.from('a;b\n1;2\n'), 'Prüfung 1.csv'],
      [Buffer.from('%PDF-1.7\n...'), 'report.PDF'],
      [workbook(), 'data.xlsx'],
      [Buffer.from([0xff, 0xd8, 0xff, 0xe0, 0]), 'photo.jpeg'],
    ]).expect(201);
    const { attachments } = body.messages.at(-1);
    const kept = attachments.find((file: Attachment) => file.fileName === 'mask.png');
    expect(kept).toMatchObject({
      mediaType: 'image/png',
      byteCount: png.length,
      sha256: createHash('sha256').update(png).digest('hex'),
    });
    for (const agent of [supplier, quality]) {
      const got = await agent.get(`${url}/attachments/${kept.id}`).buffer(true).expect(200);
      expect(got.headers['content-type']).toBe('application/octet-stream');
      expect(got.headers['content-disposition']).toBe('attachment; filename=mask.png');
      expect(got.headers['x-content-type-options']).toBe('nosniff');
      expect(Buffer.compare(got.body as Buffer, png)).toBe(0);
    }
    const umlaut = attachments.find((file: Attachment) => file.fileName === 'Prüfung 1.csv');
    const got = await supplier.get(`${url}/attachments/${umlaut.id}`).expect(200);
    expect(got.headers['content-disposition']).toContain("filename*=UTF-8''Pr%C3%BCfung%201.csv");
  });

  it.each<[string, Buffer, string]>([
    ['a program', Buffer.from('MZ\u0090\u0000\u0003'), 'tool.exe'],
    ['a program renamed', Buffer.from('MZ\u0090\u0000\u0003'), 'report.pdf'],
    ['a web page renamed', Buffer.from('<!doctype html><script>alert(1)</script>'), 'list.csv'],
    ['a drawing with script', Buffer.from('<svg onload="alert(1)"/>'), 'picture.svg'],
    ['a page behind a byte order mark', Buffer.from('\ufeff <html>'), 'note.txt'],
    ['binary called text', Buffer.from([65, 0, 66]), 'note.txt'],
    ['a picture of another kind', png, 'photo.jpg'],
    ['any ZIP called workbook', zip([['a.txt', 'x']]), 'data.xlsx'],
    ['a workbook with macros', workbook(['xl/vbaProject.bin']), 'data.xlsx'],
    ['a cut ZIP', workbook().subarray(0, 60), 'data.xlsx'],
    ['an empty file', Buffer.alloc(0), 'empty.txt'],
    ['a file without a kind', Buffer.from('hello'), 'README'],
  ])('refuse %s, and then nothing of the answer is kept', async (_, bytes, name) => {
    const [files, mails] = await Promise.all([Attachment.count(), Mail.count()]);
    const { body } = await send([
      [png, 'good.png'],
      [bytes, name],
    ]).expect(400);
    expect(body.error.code).toBe('attachment.type');
    expect(body.error.fields.files).toContain(name);
    expect(await Attachment.count()).toBe(files);
    expect(await Mail.count()).toBe(mails);
    expect((await supplier.get(url)).body.state).toBe('acknowledged');
  });

  it('may have 10 MB and not a byte more', async () => {
    const text = Buffer.alloc(10 * 1024 * 1024, 'x');
    await send([[text, 'long.txt']]).expect(201);
    const { body } = await send([[Buffer.concat([text, Buffer.from('x')]), 'long.txt']]).expect(
      413,
    );
    expect(body.error.code).toBe('attachment.too_large');
  });

  it('come five at a time', async () => {
    const files = Array.from({ length: 6 }, (_, n): [Buffer, string] => [png, `${n}.png`]);
    const { body } = await send(files).expect(400);
    expect(body.error.code).toBe('attachment.too_many');
    await send(files.slice(0, 5)).expect(201);
  });

  it('are called by a name that is no path and turns no text round', async () => {
    const { body } = await send([
      [png, '..\\..\\etc\\pass\u202Ewd.png'],
      [png, '.hidden"quote".png'],
    ]).expect(201);
    expect(
      body.messages
        .at(-1)
        .attachments.map((file: Attachment) => file.fileName)
        .sort(),
    ).toEqual(['hiddenquote.png', 'passwd.png']);
  });

  it('are not read for strangers or other roles', async () => {
    const technician = await api.agentFor('technician');
    await technician.post(`${url}/messages`).attach('files', png, 'a.png').expect(403);
    await api.stranger().post(`${url}/messages`).attach('files', png, 'a.png').expect(401);
  });

  it('can travel with a question too, also compressed ones', async () => {
    const packed = zip(
      ['[Content_Types].xml', 'xl/workbook.xml'].map((name) => [name, '<x/>'.repeat(50)]),
      deflateRawSync,
    );
    const { body } = await quality
      .post(`${url}/messages`)
      .field('text', 'Is this the mask?')
      .attach('files', packed, 'mask.xlsx')
      .expect(201);
    expect(body.messages.at(-1).attachments).toHaveLength(1);
  });
});
