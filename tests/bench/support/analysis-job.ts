import { mkdtempSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { type AnalysisCriteria } from '../../../shared/analysis/criteria';
import { partDrift, radioReceiver } from '../../../shared/analysis/drift';
import { receiverAllowance } from '../../../shared/radio/allowance';
import { regimeBoundsPpm } from '../../../shared/radio/regimes';
import { DESCRIBED_SHARES } from '../../../shared/statistics/describe';
import { criteriaOf } from '../../support/lot-fixture';

/** What both sides of the bench are told. The figures of a receiver are worked out once: they cost nothing per unit. */
export interface AnalysisJob {
  /** Offsets in ppm, doubles, least significant byte first. */
  file: string;
  criteria: AnalysisCriteria;
  lowPpm: number;
  highPpm: number;
  guardPpm: number;
  allowancePpm: number;
  quantiles: number[];
  receivers: {
    name: string;
    tolerancePpm: number;
    symbolRatePpm: number;
    frontEndPpm: number;
  }[];
}

/** Invented readings: normal, a few strays far out; the same for every run. */
export function writeJob(size: number): AnalysisJob {
  const folder = mkdtempSync(join(tmpdir(), 'quartzhold-analysis-'));
  const file = join(folder, `offsets-${size}.f64`);
  const offsets = inventedOffsets(size);
  writeFileSync(file, new Uint8Array(offsets.buffer));
  const criteria = criteriaOf(2 * size);
  const part = criteria.part.criteria;
  const receivers = criteria.receivers.map(({ name, criteria: wished }) => {
    const receiver = radioReceiver(wished);
    const { usedUp } = receiverAllowance(receiver, partDrift(part, receiver.serviceLifeYears));
    const worstCasePpm = usedUp
      .filter(({ kind }) => kind !== 'far-end')
      .reduce((sum, { halfWidthPpm }) => sum + halfWidthPpm, 0);
    const bounds = regimeBoundsPpm(receiver);
    return {
      name,
      tolerancePpm: wished.farEndTolerancePpm,
      symbolRatePpm: Math.min(bounds.symbolRateRegionPpm, bounds.frontEndWholePpm) - worstCasePpm,
      frontEndPpm: bounds.frontEndWholePpm - worstCasePpm,
      remainsPpm: receiverAllowance(receiver, partDrift(part, receiver.serviceLifeYears))
        .remainsPpm,
    };
  });
  return {
    file,
    criteria,
    lowPpm: part.toleranceLowPpm!,
    highPpm: part.toleranceHighPpm!,
    guardPpm: criteria.bench!.expandedUncertaintyPpm,
    allowancePpm: Math.max(0, Math.min(...receivers.map(({ remainsPpm }) => remainsPpm))),
    quantiles: [...DESCRIBED_SHARES],
    receivers,
  };
}

function inventedOffsets(size: number): Float64Array {
  let state = 42;
  const next = () => {
    state = (Math.imul(state, 1_664_525) + 1_013_904_223) >>> 0;
    return (state + 0.5) / 2 ** 32;
  };
  const offsets = new Float64Array(size);
  for (let i = 0; i < size; i += 1) {
    const radius = Math.sqrt(-2 * Math.log(next()));
    offsets[i] = 1.3 + 2.1 * radius * Math.cos(2 * Math.PI * next());
  }
  [-24, 17, 19.5, 23].forEach((stray, i) => (offsets[Math.floor(((i + 0.5) * size) / 4)] = stray));
  return offsets;
}
