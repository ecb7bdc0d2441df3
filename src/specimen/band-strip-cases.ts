import { type BandStripInput } from '@shared/band-strip/types';

/** Invented lots for the specimen page and the drawing's own tests: each one a case that a careless strip draws wrongly. */
function bell(mean: number, sd: number, units: number, bins: number, reach = 3.2) {
  const step = (2 * reach * sd) / bins;
  const edgesPpm = Array.from({ length: bins + 1 }, (_, index) => mean - reach * sd + index * step);
  const counts = edgesPpm.slice(0, -1).map((edge) => {
    const z = (edge + step / 2 - mean) / sd;
    return Math.round((units * step * Math.exp((-z * z) / 2)) / (sd * Math.sqrt(2 * Math.PI)));
  });
  return { edgesPpm, counts };
}

const plain: BandStripInput = {
  unitsCount: 200,
  meanPpm: 1.88,
  sdPpm: 2.44,
  lowLimitPpm: -10,
  highLimitPpm: 10,
  guardBandPpm: 1,
  allowanceLowPpm: -19.4,
  allowanceHighPpm: 19.4,
  histogram: bell(1.88, 2.44, 200, 18),
  beyondPpm: [],
  beyondCount: 0,
};

export const bandStripCases: { name: string; input: BandStripInput }[] = [
  { name: 'A lot within its limits', input: plain },
  {
    name: 'Three units beyond',
    input: { ...plain, beyondPpm: [-12.9, 10.8, 11.6], beyondCount: 3 },
  },
  { name: 'Two far outliers', input: { ...plain, beyondPpm: [-86, 240], beyondCount: 2 } },
  {
    name: 'Many units just beyond one limit',
    input: {
      ...plain,
      unitsCount: 123,
      meanPpm: 6.9,
      sdPpm: 2.6,
      histogram: bell(6.9, 2.6, 123, 16),
      beyondPpm: [
        10.1, 10.2, 10.2, 10.3, 10.4, 10.4, 10.5, 10.9, 11, 11.1, 11.3, 11.4, 12, 12.1, 12.8, 13.4,
      ],
      beyondCount: 16,
    },
  },
  {
    name: 'More beyond than can be drawn',
    input: {
      ...plain,
      unitsCount: 4000,
      meanPpm: 8.8,
      sdPpm: 3.1,
      histogram: bell(8.8, 3.1, 4000, 40),
      beyondPpm: Array.from({ length: 500 }, (_, index) => 10 + ((index * 7919) % 500) / 60),
      beyondCount: 1384,
    },
  },
  {
    name: 'Nothing measured yet',
    input: {
      ...plain,
      unitsCount: 0,
      meanPpm: null,
      sdPpm: null,
      histogram: { edgesPpm: [], counts: [] },
    },
  },
  {
    name: 'One unit',
    input: {
      ...plain,
      unitsCount: 1,
      meanPpm: 3.2,
      sdPpm: null,
      histogram: { edgesPpm: [2.7, 3.7], counts: [1] },
    },
  },
  {
    name: 'A limit on one side only',
    input: {
      ...plain,
      lowLimitPpm: null,
      allowanceLowPpm: null,
      allowanceHighPpm: 14,
      beyondPpm: [10.7],
      beyondCount: 1,
    },
  },
  {
    name: 'The receiver allows less than the limits',
    input: { ...plain, allowanceLowPpm: -4.5, allowanceHighPpm: 4.5 },
  },
  {
    name: 'The receiver allows far more than the limits',
    input: {
      ...plain,
      allowanceLowPpm: -180,
      allowanceHighPpm: 180,
      beyondPpm: [11.2, 96, 260],
      beyondCount: 3,
    },
  },
  { name: 'No receiver', input: { ...plain, allowanceLowPpm: null, allowanceHighPpm: null } },
  {
    name: 'A million units',
    input: {
      ...plain,
      unitsCount: 1_000_000,
      meanPpm: -0.42,
      sdPpm: 2.02,
      histogram: bell(-0.42, 2.02, 1_000_000, 480, 4.8),
      beyondPpm: [-10.4, -10.1, 10.2],
      beyondCount: 3,
    },
  },
];
