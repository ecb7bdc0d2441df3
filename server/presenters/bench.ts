import { type z } from 'zod';
import { type Bench as BenchView, type BenchToken as TokenView } from '@shared/contract/benches';
import { type Bench, type BenchToken } from '../models';
import { isInCalibration } from '../policies/benches';

export function presentBench(bench: Bench): BenchView {
  return {
    id: bench.id,
    name: bench.name,
    counter: bench.counter,
    location: bench.location,
    expandedUncertaintyPpm: bench.expandedUncertaintyPpm,
    coverageFactor: bench.coverageFactor,
    calibrationDue: bench.calibrationDue,
    calibrationReference: bench.calibrationReference,
    inCalibration: isInCalibration(bench.calibrationDue, new Date().toISOString().slice(0, 10)),
    chamberLowC: bench.chamberLowC,
    chamberHighC: bench.chamberHighC,
    usual: bench.usual,
    active: bench.active,
    version: bench.version,
    createdAt: bench.createdAt.toISOString(),
  };
}

/** Never the secret: that is told once, by the act that makes it. */
export function presentBenchToken(token: BenchToken): z.output<typeof TokenView> {
  return {
    id: token.id,
    label: token.label,
    createdAt: token.createdAt.toISOString(),
    lastUsedAt: token.lastUsedAt?.toISOString() ?? null,
    revokedAt: token.revokedAt?.toISOString() ?? null,
  };
}
