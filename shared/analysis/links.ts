import { type z } from 'zod';
import { type LinkShares as LinkSharesView } from '../contract/analysis';
import { type PartCriteria } from '../contract/parts';
import { dopplerPpm } from '../radio/doppler';
import { frequencyBudget } from '../radio/budget';
import { type FarEnd } from '../radio/far-end';
import { linkShares } from '../radio/links';
import { matchedFilterLoss } from '../radio/matched-filter';
import { receiverAllowance, type Receiver } from '../radio/allowance';
import { regimeBounds, regimeBoundsPpm, samplesPerSymbol } from '../radio/regimes';
import { type JudgingReceiver } from './criteria';
import { partDrift, radioReceiver } from './drift';

type LinksView = z.infer<typeof LinkSharesView>;

/** A far end called normal has its tolerance taken as three standard deviations: a convention, said wherever it is used. */
const NORMAL_FAR_END_DEVIATIONS = 3;

function farEndOf({ farEndModel, farEndTolerancePpm }: JudgingReceiver['criteria']): FarEnd {
  return farEndModel === 'normal' && farEndTolerancePpm > 0
    ? { model: 'normal', meanPpm: 0, sdPpm: farEndTolerancePpm / NORMAL_FAR_END_DEVIATIONS }
    : { model: 'uniform', tolerancePpm: farEndTolerancePpm };
}

/** What each receiver makes of links with these units, strictest first. @param sortedPpm ascending */
export function judgeLinks(
  sortedPpm: Float64Array,
  part: PartCriteria,
  receivers: readonly JudgingReceiver[],
  wholeLot: boolean,
): LinksView[] {
  const judged = receivers.map((receiver) => judgeLink(sortedPpm, part, receiver, wholeLot));
  judged.sort((a, b) => a.allowance.forUnitPpm - b.allowance.forUnitPpm);
  return judged.map((links, index) => ({ ...links, strictest: index === 0 }));
}

/**
 * The same for one receiver with another measured lot at the far end, in place of the tolerance that the receiver names:
 * every pair of units counts. @param sortedPpm, farEndPpm ascending, at least one
 */
export function judgeLinksWithLot(
  sortedPpm: Float64Array,
  part: PartCriteria,
  receiver: JudgingReceiver,
  farEndPpm: Float64Array,
): LinksView {
  return judgeLink(sortedPpm, part, receiver, false, {
    model: 'measured',
    offsetsPpm: farEndPpm,
  });
}

/** The farthest that a far end can be off, ppm. */
function farEndReachPpm(farEnd: FarEnd, tolerancePpm: number): number {
  if (farEnd.model !== 'measured') return tolerancePpm;
  const { offsetsPpm } = farEnd;
  return Math.max(Math.abs(offsetsPpm[0]!), Math.abs(offsetsPpm[offsetsPpm.length - 1]!));
}

function judgeLink(
  sortedPpm: Float64Array,
  part: PartCriteria,
  { receiverId, revisionId, name, criteria }: JudgingReceiver,
  wholeLot: boolean,
  farEnd: FarEnd = farEndOf(criteria),
): LinksView {
  const receiver = radioReceiver(criteria);
  const allowance = receiverAllowance(receiver, partDrift(part, receiver.serviceLifeYears));
  const bounds = regimeBounds(receiver);
  const boundsPpm = regimeBoundsPpm(receiver);
  const halfWidthPpm = dopplerPpm(receiver.greatestSpeedMps);
  const serviceDriftPpm = allowance.usedUp
    .filter(({ kind }) => kind !== 'far-end' && kind !== 'doppler')
    .reduce((sum, c) => sum + c.halfWidthPpm, 0);
  const shares = linkShares({
    unitsPpm: sortedPpm,
    farEnd,
    doppler: { model: 'worst-case', halfWidthPpm },
    serviceDriftPpm,
    symbolRateRegionPpm: boundsPpm.symbolRateRegionPpm,
    frontEndWholePpm: boundsPpm.frontEndWholePpm,
    wholeLot,
  });
  const farthestUnitPpm = Math.max(Math.abs(sortedPpm[0]!), Math.abs(sortedPpm.at(-1)!));
  const farthestPpm =
    farthestUnitPpm +
    serviceDriftPpm +
    halfWidthPpm +
    farEndReachPpm(farEnd, receiver.farEndTolerancePpm);
  const farthestHz = (farthestPpm * receiver.carrierHz) / 1e6;
  const inRegionHz = Math.min(farthestHz, Math.max(0, bounds.symbolRateRegionHz));
  const oversampledHz = Math.min(farthestHz, Math.max(0, bounds.frontEndWholeHz));
  return {
    receiverId,
    receiverRevisionId: revisionId,
    receiverName: name,
    strictest: false,
    allowance: {
      totalHz: allowance.totalHz,
      totalPpm: allowance.totalPpm,
      forUnitPpm: allowance.remainsPpm,
    },
    symbolRate: { share: shares.symbolRate.share, lossDb: correlationLossDb(receiver, inRegionHz) },
    severalSamples: {
      share: shares.oversampled.share,
      upperBound: shares.oversampled.upperBound,
      samplesPerSymbol: samplesPerSymbol(receiver, oversampledHz),
    },
    outsideFrontEnd: {
      share: shares.outsideFrontEnd.share,
      upperBound: shares.outsideFrontEnd.upperBound,
    },
    beyondSymbolRate: {
      share: shares.beyondSymbolRate.share,
      upperBound: shares.beyondSymbolRate.upperBound,
    },
    allowedShareBeyond: receiver.allowedShareBeyond,
    withinAllowed: shares.beyondSymbolRate.upperBound <= receiver.allowedShareBeyond,
  };
}

/** Loss of the wanted symbol's power at an offset, dB, positive; null where nothing is left. */
function correlationLossDb(receiver: Receiver, offsetHz: number): number | null {
  const { correlationPeakDb } = matchedFilterLoss(receiver.pulse, offsetHz / receiver.symbolRateHz);
  return correlationPeakDb === null ? null : -correlationPeakDb;
}

const CONTRIBUTION_NAMES: Record<string, string> = {
  'initial-tolerance': 'frequency tolerance',
  temperature: 'temperature',
  ageing: 'ageing',
  supply: 'supply',
  load: 'load',
  'far-end': 'far end',
  doppler: 'Doppler',
};

/** Budget of the part by its data sheet against a receiver: what the limits alone promise, before anything is measured. */
export function partBudget(part: PartCriteria, criteria: JudgingReceiver['criteria']) {
  const receiver = radioReceiver(criteria);
  const allowance = receiverAllowance(receiver, partDrift(part, receiver.serviceLifeYears));
  const tolerancePpm = Math.max(
    Math.abs(part.toleranceLowPpm ?? 0),
    Math.abs(part.toleranceHighPpm ?? 0),
  );
  const budget = frequencyBudget(
    [{ kind: 'initial-tolerance', halfWidthPpm: tolerancePpm }, ...allowance.usedUp],
    allowance.totalPpm,
  );
  return {
    contributions: budget.contributions.map(({ kind, halfWidthPpm }) => ({
      name: CONTRIBUTION_NAMES[kind]!,
      ppm: halfWidthPpm,
    })),
    worstCasePpm: budget.worstCasePpm,
    rootSumSquarePpm: budget.rootSumSquarePpm,
    allowancePpm: budget.allowancePpm,
    marginPpm: budget.marginPpm.worstCase,
    shareBeyondAllowance: budget.shareBeyondAllowance,
  };
}
