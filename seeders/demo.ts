import { type SignDisposition } from '../shared/contract/dispositions';
import { system, type Actor } from '../server/http/actor';
import { Hold, Lot } from '../server/models';
import { makeCheckpoint } from '../server/history/checkpoint';
import { addBench } from '../server/services/benches/keep-benches';
import { countersign } from '../server/services/dispositions/second-signature';
import { signDisposition } from '../server/services/dispositions/sign-disposition';
import { acknowledgeHold } from '../server/services/holds/acknowledge-hold';
import { answerHold } from '../server/services/holds/answer-hold';
import { hashPassword } from '../server/services/sign-in/password';
import { addSupplier } from '../server/services/suppliers/keep-suppliers';
import { seedCriteria } from './criteria';
import { seedLot, seedUpload, waitSince, type LotSeed } from './lots';
import { addPerson } from './people';
import { ageingCsv, chamberCsv, sampleCsv, type ReadingsRecipe } from './readings';

const day = 24;
const isoDay = (daysAgo: number) =>
  new Date(Date.now() - daysAgo * 86_400_000).toISOString().slice(0, 10);
const isoTime = (daysAgo: number) => new Date(Date.now() - daysAgo * 86_400_000).toISOString();

/** The demo scenario: invented suppliers, parts, people and readings, brought in through the product's own acts. */
export async function seedDemo(passphrase: string): Promise<void> {
  const passwordHash = await hashPassword(passphrase);
  const admin = await addPerson('admin', passwordHash);
  const supplier = (name: string, location: string) =>
    addSupplier(admin, { name, location, notes: 'Invented for the demo.', active: true });
  const marrow = await supplier('Marrow Bay Resonators', 'Marrow Bay');
  const halden = await supplier('Halden Timebase', 'Halden');
  const cinder = await supplier('Cinder Hill Devices', 'Cinder Hill');
  const technician = await addPerson('technician', passwordHash);
  const quality = await addPerson('quality', passwordHash);
  const quality2 = await addPerson('quality2', passwordHash);
  const marrowContact = await addPerson('supplier', passwordHash, marrow);
  await addPerson('supplier2', passwordHash, halden);
  await addPerson('auditor', passwordHash);

  const bench = (
    name: string,
    counter: string,
    expandedUncertaintyPpm: number,
    dueInDays: number,
    usual: boolean,
  ) =>
    addBench(admin, {
      name,
      counter,
      location: 'incoming inspection',
      expandedUncertaintyPpm,
      coverageFactor: 2,
      calibrationDue: isoDay(-dueInDays),
      calibrationReference: 'demo certificate',
      chamberLowC: -45,
      chamberHighC: 90,
      usual,
      active: true,
    });
  const bench3 = await bench('Bench 3', 'reciprocal counter, crystal fixture', 1, 120, true);
  const bench5 = await bench(
    'Bench 5',
    'reciprocal counter on the house reference',
    0.05,
    21,
    false,
  );
  const partIds = await seedCriteria(admin, quality, passphrase);
  const part = (partNumber: string) => partIds.get(partNumber)!;

  const lot = async (
    seed: LotSeed,
    benchId: string,
    ...files: [fileName: string, csv: string][]
  ) => {
    const id = await seedLot(technician, seed);
    for (const [fileName, csv] of files) await seedUpload(technician, id, benchId, fileName, csv);
    return id;
  };
  const decide = async (
    by: Actor,
    lotId: string,
    decision: Omit<SignDisposition, 'password' | 'analysisId'>,
  ) => {
    const { currentAnalysisId } = (await Lot.findByPk(lotId))!;
    return signDisposition(by, lotId, {
      ...decision,
      password: passphrase,
      analysisId: currentAnalysisId!,
    });
  };
  const crystals = (recipe: Omit<ReadingsRecipe, 'nominalHz'>) =>
    sampleCsv({ nominalHz: '16000000', ...recipe });
  const base = (
    lotNumber: string,
    partNumber: string,
    supplierId: string,
    dateCode: string,
    lotSize: number,
    daysAgo: number,
  ): LotSeed => ({
    lotNumber,
    partId: part(partNumber),
    supplierId,
    dateCode,
    purchaseOrder: `PO-${lotNumber.slice(2, 6)}-${lotNumber.slice(-2)}`,
    lotSize,
    receivedOn: isoDay(daysAgo),
  });

  // Decided before.
  const good = await lot(base('L-2610-051', 'TX26-16M0', marrow, '2637', 3500, 45), bench3, [
    'L-2610-051.csv',
    crystals({
      seed: 51,
      units: 200,
      meanPpm: 0.6,
      sdPpm: 2.1,
      serialPrefix: 'MB37',
      startedAt: isoTime(44),
    }),
  ]);
  await decide(quality, good, { decision: 'accept', reason: 'Plan met, links work with margin.' });
  await waitSince(good, 42 * day);
  const stray = await lot(base('L-2610-058', 'FK03-32K768', cinder, '2635', 1000, 38), bench3, [
    'L-2610-058.csv',
    sampleCsv({
      seed: 58,
      nominalHz: '32768',
      units: 200,
      meanPpm: -1.5,
      sdPpm: 4.2,
      strays: [21.8],
      serialPrefix: 'CH35',
      startedAt: isoTime(37),
      decimals: 6,
    }),
  ]);
  const concession = await decide(quality, stray, {
    decision: 'accept_under_concession',
    reason: 'One unit at +21.8 ppm; the clock it drives is set daily.',
    concession: {
      greatestQuantity: 1000,
      until: isoDay(-90),
      nonconformity: 'One of 200 units beyond +20 ppm.',
      customerReference: 'demo customer, note 14',
    },
  });
  await countersign(quality2, concession, {
    password: passphrase,
    reason: 'Agreed: no radio depends on this crystal.',
  });
  await waitSince(stray, 33 * day);
  const wide = await lot(base('L-2609-033', 'XO33-40M0', cinder, '2632', 1200, 60), bench3, [
    'L-2609-033.csv',
    sampleCsv({
      seed: 33,
      nominalHz: '40000000',
      units: 80,
      meanPpm: 9,
      sdPpm: 9.5,
      serialPrefix: 'CX32',
      startedAt: isoTime(59),
    }),
  ]);
  await decide(quality2, wide, {
    decision: 'reject',
    reason: 'The process is wide and off centre; nothing to sort.',
    treatment: 'return_to_supplier',
  });
  await waitSince(wide, 55 * day);
  await lot(base('L-2610-061', 'TX26-16M0', marrow, '2639', 50, 30), bench3, [
    'L-2610-061-chamber.csv',
    chamberCsv({
      seed: 61,
      nominalHz: '16000000',
      units: 50,
      serialPrefix: 'MB39',
      startedAt: isoTime(29),
    }),
  ]);
  await lot(base('L-2608-014', 'OC20-10M0', halden, '2628', 1, 100), bench5, [
    'L-2608-014-ageing.csv',
    ageingCsv({ seed: 14, nominalHz: '10000000', serialPrefix: 'HT28', startedAt: isoTime(96) }),
  ]);

  // Waiting for a decision.
  const second = await lot(base('L-2611-072', 'FK03-32K768', marrow, '2640', 1500, 12), bench3, [
    'L-2611-072.csv',
    sampleCsv({
      seed: 72,
      nominalHz: '32768',
      units: 200,
      meanPpm: 0.4,
      sdPpm: 4.4,
      strays: [20.9],
      serialPrefix: 'MB40',
      startedAt: isoTime(11),
      decimals: 6,
    }),
  ]);
  await decide(quality2, second, {
    decision: 'accept_under_concession',
    reason: 'One unit just beyond the limit; use in hourly-synchronised clocks only.',
    concession: {
      greatestQuantity: 1500,
      until: null,
      nonconformity: 'One of 200 units beyond +20 ppm.',
      customerReference: '',
    },
  });
  await waitSince(second, day);
  const tcxo = await lot(base('L-2611-081', 'TC10-26M0', halden, '2643', 2400, 4), bench5, [
    'L-2611-081.csv',
    sampleCsv({
      seed: 81,
      nominalHz: '26000000',
      units: 125,
      meanPpm: -0.08,
      sdPpm: 0.31,
      serialPrefix: 'HT43',
      startedAt: isoTime(1),
    }),
  ]);
  await waitSince(tcxo, 5);
  const main = await lot(base('L-2611-084', 'TX26-16M0', marrow, '2644', 3500, 3), bench3, [
    'L-2611-084.csv',
    crystals({
      seed: 84,
      units: 200,
      meanPpm: 1.9,
      sdPpm: 2.1,
      strays: [-12.9, 10.8, 11.6],
      serialPrefix: 'MB44',
      startedAt: isoTime(0.3),
    }),
  ]);
  await waitSince(main, 2);

  // On hold: one answered, one overdue.
  const shifted = await lot(base('L-2611-077', 'TX26-16M0', marrow, '2641', 3500, 9), bench3, [
    'L-2611-077.csv',
    crystals({
      seed: 77,
      units: 200,
      meanPpm: 6.8,
      sdPpm: 2.3,
      serialPrefix: 'MB41',
      startedAt: isoTime(8),
    }),
  ]);
  await decide(quality, shifted, {
    decision: 'hold',
    reason: 'The whole lot sits near the upper limit, many units beyond.',
    acknowledgementDays: 2,
    answerDays: 10,
  });
  const hold = (await Hold.findOne({ where: { lotId: shifted } }))!;
  await acknowledgeHold(
    marrowContact,
    hold.id,
    'Received. We are checking the trimming records of week 41.',
  );
  await answerHold(
    marrowContact,
    hold.id,
    {
      containment: 'Stock of date code 2641 is set aside; no further delivery.',
      cause:
        'The trimming station ran with the load capacitance of another part number for two shifts.',
      correctiveAction:
        'The station now reads the load from the work order; both shifts are remeasured.',
      text: '',
    },
    [],
  );
  await setBack(hold.id, shifted, 3 * day);
  const single = await lot(base('L-2611-075', 'XO33-40M0', halden, '2642', 1200, 10), bench3, [
    'L-2611-075.csv',
    sampleCsv({
      seed: 75,
      nominalHz: '40000000',
      units: 81,
      meanPpm: -3,
      sdPpm: 7.4,
      strays: [-26.4],
      serialPrefix: 'HX42',
      startedAt: isoTime(9),
    }),
  ]);
  await decide(quality, single, {
    decision: 'hold',
    reason: 'One unit below −25 ppm; the plan accepts none.',
    acknowledgementDays: 3,
    answerDays: 10,
  });
  await setBack((await Hold.findOne({ where: { lotId: single } }))!.id, single, 4 * day);

  // Coming.
  const started = await lot(base('L-2612-002', 'TX26-16M0', marrow, '2646', 3000, 1), bench3, [
    'L-2612-002-part-1.csv',
    crystals({
      seed: 2,
      units: 78,
      meanPpm: 0.9,
      sdPpm: 2,
      serialPrefix: 'MB46',
      startedAt: isoTime(0.1),
    }),
  ]);
  await waitSince(started, 6);
  await lot(base('L-2612-001', 'TC10-26M0', halden, '2645', 900, 0), bench5);
  await makeCheckpoint(system);
}

/** Sets a hold's clock back, so that the demo has an overdue one. What was signed keeps its true time. */
async function setBack(holdId: string, lotId: string, hours: number): Promise<void> {
  const hold = (await Hold.findByPk(holdId))!;
  const back = (at: Date) => new Date(at.getTime() - hours * 3_600_000);
  await hold.update({
    openedAt: back(hold.openedAt),
    acknowledgementDueAt: back(hold.acknowledgementDueAt),
    answerDueAt: back(hold.answerDueAt),
  });
  await waitSince(lotId, hours);
}
