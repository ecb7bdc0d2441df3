import {
  type Allowance,
  type AllowedRegion,
  type PartDrift,
  type Receiver,
  receiverAllowance,
} from './allowance';
import { RadioError } from './errors';

/** A receiver in which the part is used, under the name that people know it by. */
export interface NamedReceiver extends Receiver {
  readonly name: string;
  readonly region?: AllowedRegion;
}

export interface ReceiverDemand {
  name: string;
  allowance: Allowance;
}

export interface GoverningReceiver {
  /** The receiver that leaves our unit the least. */
  governing: ReceiverDemand;
  /** All of them, strictest first; equals keep the order in which they were given. */
  demands: ReceiverDemand[];
}

/**
 * The strictest of several receivers that use one part: the one whose allowance, after the far end,
 * Doppler and the part's own drift, leaves the least ppm for the unit as measured.
 * @throws RadioError `too_few` without a receiver; whatever the allowance throws
 */
export function governingReceiver(
  receivers: readonly NamedReceiver[],
  part: PartDrift = {},
): GoverningReceiver {
  const demands = receivers
    .map((receiver) => ({
      name: receiver.name,
      allowance: receiverAllowance(receiver, part, receiver.region),
    }))
    .sort((a, b) => a.allowance.remainsPpm - b.allowance.remainsPpm);
  const governing = demands[0];
  if (!governing) throw new RadioError('too_few', 'receivers', 'must hold at least one receiver');
  return { governing, demands };
}
