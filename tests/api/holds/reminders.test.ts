import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { handleReminders } from '../../../server/jobs/handlers/reminders';
import { HistoryEntry, Hold, HoldMessage, Mail } from '../../../server/models';
import { greatestReminders } from '../../../server/services/holds/reminder-due';
import { startApi, type Api } from '../../support/api';
import { heldLot } from '../../support/held-lot';

const hourMs = 3600 * 1000;

describe('overdue holds', () => {
  let api: Api;
  beforeAll(async () => {
    api = await startApi();
  });
  afterAll(() => api?.close());

  it('are reminded before and after the time, escalated, and not for ever', async () => {
    const { hold } = await heldLot(api, { acknowledgementDays: 4, answerDays: 10 });
    const at = (hours: number) => new Date(hold.openedAt.getTime() + hours * hourMs);
    const sent: number[] = [];
    // Every six hours for twenty days, as a clock would.
    for (let hours = 0; hours <= 20 * 24; hours += 6)
      if ((await handleReminders(at(hours))) > 0) sent.push(hours);
    expect(sent).toEqual([72, 96, 120, 144, 168, 192]);
    expect(sent).toHaveLength(greatestReminders);
    expect(await HoldMessage.count({ where: { holdId: hold.id, kind: 'reminder' } })).toBe(6);
    const mails = await Mail.findAll({ where: { holdId: hold.id } });
    expect(mails.filter(({ kind }) => kind === 'hold.reminder')).toHaveLength(6);
    // Two quality engineers, twice.
    expect(mails.filter(({ kind }) => kind === 'hold.escalation')).toHaveLength(4);
    expect(await HistoryEntry.count({ where: { act: 'hold.remind', recordId: hold.id } })).toBe(6);
  });

  it('start anew for the answer, and end with it', async () => {
    await Hold.update({ state: 'closed' }, { where: {} });
    const { hold } = await heldLot(api, { acknowledgementDays: 2, answerDays: 10 });
    const at = (hours: number) => new Date(hold.openedAt.getTime() + hours * hourMs);
    expect(await handleReminders(at(49))).toBe(1);
    const supplier = await api.agentFor('supplier');
    await supplier.post(`/api/holds/${hold.id}/acknowledgement`).send({}).expect(201);
    expect(await handleReminders(at(60))).toBe(0);
    expect(await handleReminders(at(9 * 24 + 1))).toBe(1);
    expect(await handleReminders(at(10 * 24 + 1))).toBe(1);
    await supplier
      .post(`/api/holds/${hold.id}/answers`)
      .send({ containment: 'x', cause: 'x', correctiveAction: 'x' })
      .expect(201);
    expect(await handleReminders(at(30 * 24))).toBe(0);
  });

  it('get one reminder from several workers', async () => {
    await Hold.update({ state: 'closed' }, { where: {} });
    const { hold } = await heldLot(api);
    const late = new Date(hold.openedAt.getTime() + 60 * hourMs);
    const counts = await Promise.all(Array.from({ length: 5 }, () => handleReminders(late)));
    expect(counts.reduce((sum, count) => sum + count, 0)).toBe(1);
  });

  it('are shown as overdue to both sides', async () => {
    const { hold } = await heldLot(api);
    await hold.update({ acknowledgementDueAt: new Date(0) });
    for (const who of ['supplier', 'quality']) {
      const { body } = await (await api.agentFor(who)).get(`/api/holds/${hold.id}`).expect(200);
      expect(body.overdue).toBe(true);
    }
  });
});
