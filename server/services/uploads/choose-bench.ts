import { type Transaction } from 'sequelize';
import { InvalidInput } from '../../http/errors';
import { Bench, Upload } from '../../models';

/** The bench an upload was measured on: the one named, else the lot's last one, else the usual one; null when there is none. */
export async function chooseBench(
  lotId: string,
  benchId: string | undefined,
  transaction: Transaction | undefined,
): Promise<Bench | null> {
  if (benchId) {
    const named = await Bench.findOne({ where: { id: benchId, active: true }, transaction });
    if (!named)
      throw new InvalidInput('This bench does not exist or is no longer used.', {
        benchId: 'Choose a bench in use.',
      });
    return named;
  }
  const last = await Upload.findOne({
    where: { lotId, state: ['queued', 'running', 'done'] },
    include: [{ model: Bench, as: 'bench', where: { active: true }, required: true }],
    order: [['number', 'DESC']],
    transaction,
  });
  return last?.bench ?? Bench.findOne({ where: { usual: true, active: true }, transaction });
}

/** How well the bench measures today, to be kept with the upload: a later calibration changes nothing about it. */
export function benchState(bench: Bench | null) {
  if (!bench) return { benchId: null, benchUncertaintyPpm: null, benchInCalibration: null };
  const today = new Date().toISOString().slice(0, 10);
  return {
    benchId: bench.id,
    benchUncertaintyPpm: bench.expandedUncertaintyPpm,
    benchInCalibration: bench.calibrationDue >= today,
  };
}
