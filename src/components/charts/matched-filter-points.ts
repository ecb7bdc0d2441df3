import { matchedFilterCurve, type MatchedFilterPoint } from '@shared/radio/matched-filter';
import { regimeBoundsPpm } from '@shared/radio/regimes';
import { radioReceiver } from '@shared/analysis/drift';
import { type ReceiverCriteria } from '@shared/contract/receivers';

export interface LossPoint extends MatchedFilterPoint {
  offsetPpm: number;
}

export interface LossDrawing {
  points: LossPoint[];
  /** Half-width of the drawn axis, ppm of the carrier. */
  reachPpm: number;
  symbolRateRegionPpm: number;
  frontEndWholePpm: number;
}

const POINTS = 241;

/**
 * What the matched filter loses against the offset between both ends, over an axis that holds the symbol-rate region and
 * the lot's farthest unit.
 * @param farthestPpm greatest |offset| of the lot, ppm
 */
export function lossDrawing(criteria: ReceiverCriteria, farthestPpm: number): LossDrawing {
  const receiver = radioReceiver(criteria);
  const bounds = regimeBoundsPpm(receiver);
  const symbolRateRegionPpm = Math.max(0, bounds.symbolRateRegionPpm);
  const frontEndWholePpm = Math.max(0, bounds.frontEndWholePpm);
  const nullPpm = (0.9 * receiver.symbolRateHz * 1e6) / receiver.carrierHz;
  const reachPpm = Math.min(
    Math.max(1.5 * symbolRateRegionPpm, 1.15 * farthestPpm),
    Math.max(nullPpm, 1.15 * farthestPpm),
  );
  const offsetsPpm = Array.from(
    { length: POINTS },
    (_, i) => reachPpm * ((2 * i) / (POINTS - 1) - 1),
  );
  const toRates = receiver.carrierHz / 1e6 / receiver.symbolRateHz;
  const points = matchedFilterCurve(
    receiver.pulse,
    offsetsPpm.map((ppm) => ppm * toRates),
  ).map((point, i) => ({ ...point, offsetPpm: offsetsPpm[i]! }));
  return { points, reachPpm, symbolRateRegionPpm, frontEndWholePpm };
}

/** Greatest loss that is drawn: beyond it the link is lost whatever the figure says. */
export const DEEPEST_DB = 6;
