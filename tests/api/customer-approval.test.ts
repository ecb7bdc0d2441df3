import { createHash } from 'node:crypto';
import { afterAll, beforeAll, expect, it } from 'vitest';
import { HistoryEntry, Signature } from '../../server/models';
import { startApi, type Agent, type Api } from '../support/api';
import {
  approvedPart,
  countersigned,
  decided,
  inspectedLot,
  openHouse,
  type House,
} from '../support/lot-life';

let api: Api;
let house: House;
let partId: string;
beforeAll(async () => {
  api = await startApi();
  house = await openHouse(api);
  partId = (await approvedPart(house)).id;
});
afterAll(() => api.close());

const letter = Buffer.from('%PDF-1.7\nThe customer agrees.\n');
const letterHash = createHash('sha256').update(letter).digest('hex');

async function conceded(): Promise<string> {
  const lot = await inspectedLot(house, { partId });
  const { id } = await decided(house.quality, lot.id, {
    decision: 'accept_under_concession',
    concession: { greatestQuantity: 10, nonconformity: 'Marking is missing.' },
  });
  return id as string;
}
const send = (agent: Agent, id: string, bytes = letter, name = 'approval.pdf') =>
  agent.post(`/api/dispositions/${id}/customer-approval`).attach('files', bytes, name);

it('is kept with the concession by one act, served as a download, and bound by the second signature', async () => {
  const id = await conceded();
  const added = await send(house.quality, id).expect(201);
  expect(added.body.customerApprovals).toEqual([
    expect.objectContaining({
      fileName: 'approval.pdf',
      mediaType: 'application/pdf',
      byteCount: letter.length,
      sha256: letterHash,
    }),
  ]);
  const entries = await HistoryEntry.findAll({
    where: { act: 'disposition.customer_approval', recordId: id },
  });
  expect(entries).toHaveLength(1);
  expect(entries[0]!.payload).toContain(letterHash);

  const [file] = added.body.customerApprovals as { id: string }[];
  const download = await house.auditor
    .get(`/api/dispositions/${id}/customer-approval/${file!.id}`)
    .buffer(true)
    .parse((response, done) => {
      const parts: Buffer[] = [];
      response.on('data', (part: Buffer) => parts.push(part));
      response.on('end', () => done(null, Buffer.concat(parts)));
    })
    .expect(200);
  expect(download.headers['content-disposition']).toMatch(
    /^attachment; filename="?approval\.pdf"?$/,
  );
  expect(download.body).toEqual(letter);

  await countersigned(house.quality2, id).expect(201);
  const second = await Signature.findOne({
    where: { recordId: id, meaning: 'acceptance under concession, second signature' },
  });
  expect(JSON.parse(second!.contentText)).toMatchObject({
    customerApprovals: [{ fileName: 'approval.pdf', sha256: letterHash }],
  });
  // It may also come later, while the concession is in force.
  const later = await send(house.quality2, id, letter, 'again.pdf').expect(201);
  expect(later.body.customerApprovals).toHaveLength(2);
});

it('is refused for another kind of file, without a file, and beyond five', async () => {
  const id = await conceded();
  const wrong = await send(house.quality, id, Buffer.from('<html>'), 'approval.pdf').expect(400);
  expect(wrong.body.error.fields.files).toContain('does not contain what its name says');
  await house.quality.post(`/api/dispositions/${id}/customer-approval`).expect(400);
  for (let n = 0; n < 5; n += 1) await send(house.quality, id).expect(201);
  const sixth = await send(house.quality, id).expect(400);
  expect(sixth.body.error.code).toBe('attachment.too_many');
});

it('goes with nothing but a concession that may still count', async () => {
  const lot = await inspectedLot(house, { partId });
  const { id } = await decided(house.quality, lot.id, { decision: 'accept' });
  const accepted = await send(house.quality, id as string).expect(409);
  expect(accepted.body.error.code).toBe('disposition.no_concession');
  const refused = await conceded();
  await house.quality2
    .post(`/api/dispositions/${refused}/refusal`)
    .send({ reason: 'Not agreed.' })
    .expect(200);
  await send(house.quality, refused).expect(409);
  const another = await conceded();
  const file = (await send(house.quality, another).expect(201)).body.customerApprovals[0];
  // A file is found only with its own decision.
  await house.auditor.get(`/api/dispositions/${id}/customer-approval/${file.id}`).expect(404);
});
